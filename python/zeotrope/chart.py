"""Pressure-temperature charts."""

from collections.abc import Sequence
from typing import Literal, TypedDict, Unpack

import pandas as pd

from zeotrope import _core
from zeotrope.catalogue import Folder, catalogue_from


class ChartOptions(TypedDict, total=False):
    """Options of a chart; see pt_chart()."""

    from_: float | None
    to: float | None
    step: float | None
    by: Literal["temperature", "pressure"]
    temperature_unit: str
    pressure_unit: str | Sequence[str]
    altitude: float | None
    barometer: float | None
    extrapolate: bool
    fluids: Sequence[Folder]
    catalogue: _core.Catalogue | None


def _chart(
    refrigerant: _core.Refrigerant | str,
    *,
    from_: float | None = None,
    to: float | None = None,
    step: float | None = None,
    by: str = "temperature",
    temperature_unit: str = "C",
    pressure_unit: str | Sequence[str] = "bar(g)",
    altitude: float | None = None,
    barometer: float | None = None,
    extrapolate: bool = False,
    fluids: Sequence[Folder] = (),
    catalogue: _core.Catalogue | None = None,
) -> _core.PtChart:
    files = catalogue_from(fluids, catalogue)
    return _core.pt_chart(
        _core.refrigerant(refrigerant, files) if isinstance(refrigerant, str) else refrigerant,
        files,
        from_=from_,
        to=to,
        step=step,
        by=by,
        temperature_unit=temperature_unit,
        pressure_units=[pressure_unit] if isinstance(pressure_unit, str) else list(pressure_unit),
        altitude=altitude,
        barometer=barometer,
        extrapolate=extrapolate,
    )


def pt_chart(refrigerant: _core.Refrigerant | str, **options: Unpack[ChartOptions]) -> pd.DataFrame:
    """Pressure-temperature chart as a table.

    Options, all by keyword and optional:
      from_, to, step   rows, in the first unit of `by`; chosen for the refrigerant where left out
      by                "temperature" (default) or "pressure"
      temperature_unit  "C" (default), "F" or "K"
      pressure_unit     "bar(g)" (default), "psig", "kPa(a)" ..., or a list; the first is that of rows by pressure
      altitude          m, -1000 to 11000: gauge pressures are measured from the standard atmosphere there
      barometer         Pa: gauge pressures are measured from this; neither: from 101325 Pa
      extrapolate       fill rows outside the published range too, and mark them in the column `extrapolated`
      fluids, catalogue as for refrigerant()

    Columns carry their unit: "temperature [degC]", "bubble pressure [bar(g)]". Rows without figures hold NaN, and the
    column `note` says why: above 0.98 of the critical temperature, or outside the published range.

    `attrs` of the table holds name, designated, composition, molar_mass (kg/mol), safety_group, gwp (report -> value,
    None where not given), gwp_below (reports that print "<1" for a component), odp, sources, pairs, estimated_pairs,
    largest_glide (K), ambient (Pa), cautions and notes.

    BadInput for an unknown name or unit, a step that is not positive, ends in the wrong order, or more than 20,000 rows.
    """
    chart = _chart(refrigerant, **options)
    table = pd.DataFrame(chart.columns())
    table.attrs.update(chart.facts())
    return table


def chart_text(refrigerant: _core.Refrigerant | str, **options: Unpack[ChartOptions]) -> str:
    """The chart as aligned text; options as for pt_chart()."""
    return _chart(refrigerant, **options).text()


def chart_card(refrigerant: _core.Refrigerant | str, **options: Unpack[ChartOptions]) -> str:
    """The chart as a self-contained HTML page that prints on one sheet; options as for pt_chart()."""
    return _chart(refrigerant, **options).card()
