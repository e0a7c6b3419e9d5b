"""Refrigerants by name and by recipe."""

from collections.abc import Mapping, Sequence
from typing import Literal

from zeotrope import _core
from zeotrope.catalogue import Folder, catalogue_from

Reference = Literal["iir", "ashrae", "normal boiling point"]


def refrigerant(
    name: str,
    *,
    fluids: Sequence[Folder] = (),
    catalogue: _core.Catalogue | None = None,
    reference: Reference = "iir",
) -> _core.Refrigerant:
    """A pure fluid or a designated blend: "R-454B", "454b", "propane".

    `fluids`: folders of coefficient files that come before the packaged ones; or `catalogue`, to read files once.
    `reference`: state in which enthalpy and entropy are set: "iir" (200 kJ/kg and 1 kJ/(kg K) in saturated liquid at
    273.15 K), "ashrae" (0 in saturated liquid at 233.15 K), "normal boiling point" (0 in saturated liquid at
    101.325 kPa). BadInput, with suggestions, for an unknown name; BadFile for a faulty file.
    """
    return _core.refrigerant(name, catalogue_from(fluids, catalogue), reference)


def blend(
    fractions: Mapping[str, float],
    *,
    basis: Literal["mass", "mole"] = "mass",
    normalise: bool = False,
    fluids: Sequence[Folder] = (),
    catalogue: _core.Catalogue | None = None,
    reference: Reference = "iir",
) -> _core.Refrigerant:
    """A blend from a recipe: {"R-32": 0.689, "R-1234yf": 0.311}.

    Fractions add to 1 (to 1e-6) unless `normalise`, else BadInput. Pairs without published parameters are estimated;
    see `Refrigerant.pairs`. The other arguments as for refrigerant().
    """
    return _core.blend(list(fractions.items()), catalogue_from(fluids, catalogue), basis, normalise, reference)
