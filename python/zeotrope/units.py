"""Units at the edge: pressures gauge and absolute, temperatures, altitude."""

from zeotrope._core import (
    atmosphere_at_altitude,
    from_kelvin,
    from_pascal,
    parse_pressure,
    parse_temperature,
    standard_atmosphere,
    to_kelvin,
    to_pascal,
)

__all__ = [
    "atmosphere_at_altitude",
    "from_kelvin",
    "from_pascal",
    "parse_pressure",
    "parse_temperature",
    "standard_atmosphere",
    "to_kelvin",
    "to_pascal",
]
