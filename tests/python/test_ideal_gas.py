"""Ideal-gas enthalpy and entropy against numerical integrals of the heat capacity, read from the files by themselves."""

import math
import tomllib
from pathlib import Path

import pytest
from scipy.integrate import quad

import zeotrope

COMPOUNDS = Path(__file__).resolve().parents[2] / "fluids" / "compounds"
DILUTE = 1e-6  # mol/m3, where nothing but the ideal gas is left to 1e-9
COLD, HOT = 250.0, 400.0


def ideal_gas(compound):
    with open(COMPOUNDS / f"{compound}.toml", "rb") as file:
        equation = tomllib.load(file)["equation"][0]
    gas, R = equation["ideal_gas"], equation["gas_constant"]

    def cp0(T):
        c = gas["constant"] + sum(c * T**t for c, t in gas["power"])
        for v, u in gas["einstein"]:
            c += v * (u / T) ** 2 * math.exp(u / T) / (math.exp(u / T) - 1) ** 2
        return R * c

    return cp0, R, equation["molar_mass"]


# constants and Einstein terms; with power terms too; a polynomial alone
@pytest.mark.parametrize("compound", ["R-32", "R-125", "R-134a", "R-114", "R-717"])
def test_integrals(compound, catalogue):
    cp0, R, M = ideal_gas(compound)
    r = zeotrope.refrigerant(compound, catalogue=catalogue)
    cold, hot = (r.properties(temperature=T, molar_density=DILUTE) for T in (COLD, HOT))
    enthalpy = quad(cp0, COLD, HOT, epsabs=0, epsrel=1e-12)[0]
    entropy = quad(lambda T: (cp0(T) - R) / T, COLD, HOT, epsabs=0, epsrel=1e-12)[0]
    assert (hot.enthalpy - cold.enthalpy) * M == pytest.approx(enthalpy, rel=1e-8)
    assert (hot.entropy - cold.entropy) * M == pytest.approx(entropy, rel=1e-8)
    assert hot.isobaric_heat_capacity * M == pytest.approx(cp0(HOT), rel=1e-8)
    assert hot.isochoric_heat_capacity * M == pytest.approx(cp0(HOT) - R, rel=1e-8)
    assert hot.pressure == pytest.approx(DILUTE * R * HOT, rel=1e-8)


def test_density_changes_entropy_by_the_logarithm(catalogue):
    R, M = ideal_gas("R-32")[1:]
    r = zeotrope.refrigerant("R-32", catalogue=catalogue)
    a, b = (r.properties(temperature=300.0, molar_density=rho) for rho in (DILUTE, 3 * DILUTE))
    assert (a.entropy - b.entropy) * M == pytest.approx(R * math.log(3), rel=1e-8)


def test_blend_mixes_by_mole(catalogue):
    r = zeotrope.blend({"R-32": 0.3, "R-125": 0.7}, basis="mole", catalogue=catalogue)
    p = r.properties(temperature=HOT, molar_density=DILUTE)
    # each file's own gas constant differs from that of blends in the seventh digit
    expected = 0.3 * ideal_gas("R-32")[0](HOT) + 0.7 * ideal_gas("R-125")[0](HOT)
    assert p.isobaric_heat_capacity * r.molar_mass == pytest.approx(expected, rel=2e-6)
