"""Thermodynamic properties of refrigerants and their blends.

Quantities are in SI (K, Pa, kg/m3, J/kg) and fractions by mass, unless a name says otherwise. Refrigerants are
immutable and may be used from several threads.

    >>> import zeotrope
    >>> r = zeotrope.refrigerant("R-454B")
    >>> r.saturation(temperature=280.0).bubble.pressure
    >>> zeotrope.pt_chart(r, pressure_unit="psig", temperature_unit="F")
"""

from zeotrope import units
from zeotrope._core import (
    Component,
    Pair,
    Phase,
    Properties,
    Range,
    Refrigerant,
    Saturation,
    SaturationPoint,
    TwoPhaseTop,
    __version__,
)
from zeotrope.catalogue import Catalogue
from zeotrope.chart import chart_card, chart_text, pt_chart
from zeotrope.errors import BadFile, BadInput, Error, NoSolution, NotConverged, OutOfRange
from zeotrope.refrigerants import blend, refrigerant

__all__ = [
    "BadFile",
    "BadInput",
    "Catalogue",
    "Component",
    "Error",
    "NoSolution",
    "NotConverged",
    "OutOfRange",
    "Pair",
    "Phase",
    "Properties",
    "Range",
    "Refrigerant",
    "Saturation",
    "SaturationPoint",
    "TwoPhaseTop",
    "__version__",
    "blend",
    "chart_card",
    "chart_text",
    "pt_chart",
    "refrigerant",
    "units",
]
