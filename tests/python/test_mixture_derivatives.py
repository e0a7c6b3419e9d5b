"""The mixture model and its derivatives by partial density and temperature against mpmath.

The formulas are those at the top of fluids/pairs.toml, in mole fractions, written here by themselves.
"""

import tomllib

import numpy as np
import pytest
from make_term_table import FORMULAS, ROOT, departure, equation, scaled_derivatives
from mpmath import mp, mpf

import zeotrope
from zeotrope import BadInput, _core

with open(ROOT / "fluids" / "pairs.toml", "rb") as _file:
    PAIRS = tomllib.load(_file)["pair"]


def total(terms, tau, delta):
    return sum(FORMULAS[kind]([float(v) for v in row], tau, delta) for kind, rows in terms.items() if kind in FORMULAS for row in rows)


class Model:
    """alpha_r(T, rho, x) with the rows of the files, whichever way round they stand there."""

    def __init__(self, *compounds):
        equations = [equation(c) for c in compounds]
        self.terms = [e["residual"] for e in equations]
        self.T = [mpf(float(e["reducing_temperature"])) for e in equations]
        self.v = [1 / mpf(float(e["reducing_density"])) for e in equations]
        self.pairs = []
        for row in PAIRS:
            if set(row["fluids"]) <= set(compounds):
                i, j = (compounds.index(f) for f in row["fluids"])
                function = departure(row["departure"]) if "departure" in row else None
                numbers = {k: mpf(float(row[k])) for k in ("beta_T", "gamma_T", "beta_v", "gamma_v", "F")}
                self.pairs.append((i, j, numbers, function))
        assert len(self.pairs) == len(compounds) * (len(compounds) - 1) // 2

    def reducing(self, x):
        Tr = sum(xi**2 * T for xi, T in zip(x, self.T, strict=True))
        vr = sum(xi**2 * v for xi, v in zip(x, self.v, strict=True))
        for i, j, p, _ in self.pairs:
            both = 2 * x[i] * x[j] * (x[i] + x[j])
            Tr += both * p["beta_T"] * p["gamma_T"] / (p["beta_T"] ** 2 * x[i] + x[j]) * mp.sqrt(self.T[i] * self.T[j])
            vr += both * p["beta_v"] * p["gamma_v"] / (p["beta_v"] ** 2 * x[i] + x[j]) * (mp.cbrt(self.v[i]) + mp.cbrt(self.v[j])) ** 3 / 8
        return Tr, vr

    def alpha(self, tau, delta, x):
        a = sum(xi * total(terms, tau, delta) for xi, terms in zip(x, self.terms, strict=True))
        for i, j, p, function in self.pairs:
            if function is not None:
                a += x[i] * x[j] * p["F"] * total(function, tau, delta)
        return a

    def psi(self, T, *rho):
        """rho alpha_r at partial densities, mol/m3."""
        whole = sum(rho)
        x = [r / whole for r in rho]
        Tr, vr = self.reducing(x)
        return whole * self.alpha(Tr / T, whole * vr, x)


CASES = [
    (("R-32", "R-125"), 290.0, (900.0, 400.0)),  # departure function; vapour
    (("R-32", "R-125"), 260.0, (12000.0, 7000.0)),  # liquid
    (("R-744", "R-290"), 280.0, (1500.0, 700.0)),  # beta not 1
    (("R-290", "R-744"), 250.0, (3000.0, 12000.0)),  # and turned round
    (("R-32", "R-125", "R-134a"), 300.0, (400.0, 350.0, 600.0)),
    (("R-32", "R-125", "R-134a"), 270.0, (5000.0, 3000.0, 6500.0)),
]
IDS = ["-".join(c[0]) + f"-{c[1]:.0f}K" for c in CASES]


@pytest.fixture(autouse=True)
def thirty_digits():
    with mp.workdps(30):
        yield


def blend_of(compounds, rho, catalogue):
    return zeotrope.blend(dict(zip(compounds, rho, strict=True)), basis="mole", normalise=True, catalogue=catalogue)


@pytest.mark.parametrize(("compounds", "T", "rho"), CASES, ids=IDS)
def test_partial_densities(compounds, T, rho, catalogue):
    model = Model(*compounds)
    value, gradient, hessian, by_T, gradient_by_T = _core.helmholtz_density(blend_of(compounds, rho, catalogue), T, rho)
    n = len(compounds)
    at = (mpf(T), *map(mpf, rho))

    def derivative(*orders):
        return float(mp.diff(model.psi, at, orders))

    def order(*components, temperature=0):
        return (temperature, *(components.count(k) for k in range(n)))

    first = np.array([derivative(*order(i)) for i in range(n)])
    second = np.array([[derivative(*order(i, j)) for j in range(n)] for i in range(n)])
    mixed = np.array([derivative(*order(i, temperature=1)) for i in range(n)])
    assert value == pytest.approx(float(model.psi(*at)), rel=1e-12)
    # relative to the largest: single entries may be differences of large ones
    for computed, expected in ((gradient, first), (hessian, second), (gradient_by_T, mixed)):
        assert computed == pytest.approx(expected, rel=0, abs=1e-11 * np.abs(expected).max())
    assert by_T == pytest.approx(derivative(*order(temperature=1)), rel=1e-12)
    assert hessian == pytest.approx(hessian.T, rel=0, abs=1e-14 * np.abs(hessian).max())


@pytest.mark.parametrize(("compounds", "T", "rho"), CASES[:4:2], ids=IDS[:4:2])
def test_fixed_composition(compounds, T, rho, catalogue):
    model = Model(*compounds)
    whole = sum(rho)
    x = [mpf(r) / mpf(whole) for r in rho]
    Tr, vr = model.reducing(x)
    computed = _core.model_residual(blend_of(compounds, rho, catalogue), T, whole, [r / whole for r in rho])
    expected = scaled_derivatives(lambda tau, delta: model.alpha(tau, delta, x), Tr / T, whole * vr)
    largest = max(abs(v) for v in expected.values())
    for (i, j), value in expected.items():
        assert abs(mpf(float(computed[i, j])) - value) <= 1e-12 * largest


def test_faults(catalogue):
    r = blend_of(("R-32", "R-125"), (1.0, 1.0), catalogue)
    with pytest.raises(BadInput, match="3 numbers for 2 components"):
        _core.helmholtz_density(r, 300.0, [1.0, 2.0, 3.0])
    with pytest.raises(BadInput, match="composition"):
        _core.model_residual(r, 300.0, 10.0, [1.0, -1.0])
