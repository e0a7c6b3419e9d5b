"""Every derivative of every kind of term against formulas written from fluids/README.md and differentiated by mpmath."""

import numpy as np
import pytest
from make_term_table import FORMULAS, OUTPUT, POINTS, departure, equation, rows, scaled_derivatives, table
from mpmath import mp, mpf

from zeotrope import BadFile, BadInput, _core

FILE = """
[identity]
designation = "one row"
chemical_name = "none"
formula = "CH4"
cas = "74-82-8"
molar_mass = 0.05

[[equation]]
name = "Nobody 2000"
kind = "helmholtz"
source = "none"
provenance = "none"
molar_mass = 0.05
gas_constant = 8.314
reducing_temperature = 350.0
reducing_density = 8000.0
critical_point = {{ temperature = 350.0, pressure = 5.0e6, density = 8000.0 }}
temperature_range = [100.0, 500.0]
maximum_pressure = 1.0e8

[equation.ideal_gas]
source = "none"
constant = 4.0
power = []
einstein = []

[equation.residual]
{kind} = [{row}]
"""

# dilute gas, dense liquid, warm gas, near the critical point
STATES = [(1.3, 0.01), (1.45, 2.6), (0.7, 0.5), (1.01, 1.02)]
SINGLE = [
    *[("power", r) for r in equation("R-32")["residual"]["power"]],
    *[("exponential", r) for r in equation("R-32")["residual"]["exponential"]],
    *[("scaled_exponential", r) for r in equation("R-114")["residual"]["scaled_exponential"]],
    *[("scaled_exponential", r) for r in equation("R-13")["residual"]["scaled_exponential"][:2]],
    *[("tau_exponential", r) for r in equation("R-125")["residual"]["tau_exponential"]],
    *[("gaussian", r) for r in equation("R-227ea")["residual"]["gaussian"]],
    *[("reciprocal_gaussian", r) for r in equation("R-717")["residual"]["reciprocal_gaussian"]],
    *[("critical_region", r) for r in equation("R-744")["residual"]["critical_region"]],
    *[("critical_region", r) for r in equation("R-718")["residual"]["critical_region"]],
    *[("delta_gaussian", r) for r in departure("KW2012-methane-nitrogen")["delta_gaussian"]],
]


def assert_agree(computed, expected, within=1e-12):
    largest = max(abs(v) for v in expected.values())
    for (i, j), value in expected.items():
        assert abs(mpf(float(computed[i, j])) - value) <= within * largest, (i, j)


@pytest.fixture(autouse=True)
def fifty_digits():
    with mp.workdps(50):
        yield


@pytest.mark.parametrize(("kind", "row"), SINGLE, ids=lambda v: v if isinstance(v, str) else "")
def test_one_row(kind, row):
    row = [float(v) for v in row]
    text = FILE.format(kind=kind, row=row)
    for tau, delta in STATES:
        expected = scaled_derivatives(lambda t, d: FORMULAS[kind](row, t, d), tau, delta)
        assert_agree(_core.residual_derivatives(text, 0, tau, delta), expected)


@pytest.mark.parametrize(("compound", "index"), [("R-32", 0), ("R-125", 0), ("R-717", 0), ("R-717", 1), ("R-114", 0)])
def test_whole_file(compound, index, catalogue):
    terms = equation(compound, index)["residual"]

    def total(t, d):
        return sum(FORMULAS[kind]([float(v) for v in row], t, d) for kind, rows in terms.items() for row in rows)

    for tau, delta in STATES[:2]:
        computed = _core.residual_derivatives(compound, index, tau, delta, catalogue)
        assert_agree(computed, scaled_derivatives(total, tau, delta))


def test_layout(catalogue):
    a = _core.residual_derivatives("R-32", 0, 1.2, 0.5, catalogue)
    assert a.shape == (4, 4)
    assert all(np.isnan(a[i, j]) == (i + j > 3) for i in range(4) for j in range(4))


def test_faults(catalogue):
    with pytest.raises(BadInput, match="tau"):
        _core.residual_derivatives("R-32", 0, 0.0, 0.5, catalogue)
    with pytest.raises(BadInput, match="equation 5"):
        _core.residual_derivatives("R-32", 5, 1.0, 0.5, catalogue)
    with pytest.raises(BadFile) as caught:
        _core.residual_derivatives(FILE.format(kind="power", row=[1.0, 2.0]), 0, 1.0, 0.5)
    assert caught.value.file == "text"
    assert caught.value.line > 0
    assert "power" in caught.value.key


def test_table_is_current():
    assert OUTPUT.read_text(encoding="ascii") == table()


def test_table_digits():
    """The 32 digits do not depend on the digits worked with."""
    for kind, row in rows():
        tau, delta = POINTS[0]
        few, many = (mp_values(kind, row, tau, delta, digits) for digits in (50, 90))
        largest = max(abs(v) for v in many.values())
        for order, value in many.items():
            assert abs(few[order] - value) <= mpf(10) ** -36 * largest


def mp_values(kind, row, tau, delta, digits):
    with mp.workdps(digits):
        return scaled_derivatives(lambda t, d: FORMULAS[kind](row, t, d), tau, delta)
