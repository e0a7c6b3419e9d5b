"""Derivatives of every kind of term to 32 digits -> tests/equation/term_derivatives.csv.

The formulas are written from fluids/README.md and differentiated numerically by mpmath with 50 digits; nothing of the
library is used. Inputs are exactly the doubles of the rows.

    python tests/tools/make_term_table.py [OUTPUT]
"""

import sys
import tomllib
from collections.abc import Callable, Iterator, Sequence
from pathlib import Path
from typing import Any

from mpmath import mp, mpf

ROOT = Path(__file__).resolve().parents[2]
OUTPUT = ROOT / "tests" / "equation" / "term_derivatives.csv"
DIGITS = 50
ORDERS = [(i, j) for i in range(4) for j in range(4 - i)]
POINTS = [(1.25, 0.7), (0.96, 1.15)]

Row = Sequence[float]


def power(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d = map(mpf, row)
    return n * tau**t * delta**d


def exponential(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, l = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-(delta**l))


def scaled_exponential(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, g, l = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-g * delta**l)


def tau_exponential(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, l, m = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-(delta**l) - tau**m)


def gaussian(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, eta, epsilon, beta, gamma = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-eta * (delta - epsilon) ** 2 - beta * (tau - gamma) ** 2)


def reciprocal_gaussian(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, eta, epsilon, beta, gamma, b = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-eta * (delta - epsilon) ** 2 + 1 / (beta * (tau - gamma) ** 2 + b))


def delta_gaussian(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, t, d, eta, epsilon, beta, gamma = map(mpf, row)
    return n * tau**t * delta**d * mp.exp(-eta * (delta - epsilon) ** 2 - beta * (delta - gamma))


def critical_region(row: Row, tau: mpf, delta: mpf) -> mpf:
    n, a, b, beta, A, B, C, D = map(mpf, row)
    q = (delta - 1) ** 2
    distance = (1 - tau + A * q ** (1 / (2 * beta))) ** 2 + B * q**a
    return n * distance**b * delta * mp.exp(-C * q - D * (tau - 1) ** 2)


FORMULAS: dict[str, Callable[[Row, mpf, mpf], mpf]] = {
    f.__name__: f
    for f in (
        power,
        exponential,
        scaled_exponential,
        tau_exponential,
        gaussian,
        reciprocal_gaussian,
        delta_gaussian,
        critical_region,
    )
}


def scaled_derivatives(f: Callable[[mpf, mpf], mpf], tau: float, delta: float) -> dict[tuple[int, int], mpf]:
    """(i, j) -> delta^i tau^j d^(i+j) f(tau, delta) / d delta^i d tau^j."""
    t, d = mpf(tau), mpf(delta)
    values = {(i, j): d**i * t**j * mp.diff(f, (t, d), (j, i)) for i, j in ORDERS}
    # differences leave a rest where a derivative is exactly zero
    noise = max(abs(v) for v in values.values()) * mpf(10) ** (12 - mp.dps)
    return {order: v if abs(v) > noise else mpf(0) for order, v in values.items()}


def equation(compound: str, index: int = 0) -> dict[str, Any]:
    with open(ROOT / "fluids" / "compounds" / f"{compound}.toml", "rb") as file:
        found: dict[str, Any] = tomllib.load(file)["equation"][index]
    return found


def departure(name: str) -> dict[str, Any]:
    with open(ROOT / "fluids" / "departures.toml", "rb") as file:
        found: dict[str, Any] = next(d for d in tomllib.load(file)["departure"] if d["name"] == name)
    return found


def rows() -> Iterator[tuple[str, list[float]]]:
    """Two rows of each kind, of real files."""
    for kind, terms, numbers in (
        ("power", equation("R-32")["residual"], (0, -1)),
        ("exponential", equation("R-32")["residual"], (0, -1)),
        ("scaled_exponential", equation("R-114")["residual"], (0, 3)),
        ("tau_exponential", equation("R-125")["residual"], (0, 2)),
        ("gaussian", equation("R-227ea")["residual"], (0, 1)),
        ("reciprocal_gaussian", equation("R-717")["residual"], (0, 1)),
        ("delta_gaussian", departure("KW2012-methane-nitrogen"), (0, 2)),
        ("critical_region", equation("R-744")["residual"], (0,)),
        ("critical_region", equation("R-718")["residual"], (1,)),
    ):
        for number in numbers:
            yield kind, [float(v) for v in terms[kind][number]]


def table() -> str:
    lines = [
        "# Scaled derivatives delta^i tau^j d^(i+j) f / d delta^i d tau^j of one row of each kind of term, 32 digits.",
        "# Made by tests/tools/make_term_table.py from the formulas of fluids/README.md with mpmath, 50 digits.",
        "# Rows of R-32, R-114, R-125, R-227ea, R-717, R-744, R-718 and of the departure KW2012-methane-nitrogen; row,",
        "# tau and delta stand for the nearest doubles. 0 is exact.",
        "kind,row,tau,delta,i,j,value",
    ]
    with mp.workdps(DIGITS):
        for kind, row in rows():
            for tau, delta in POINTS:
                values = scaled_derivatives(lambda t, d: FORMULAS[kind](row, t, d), tau, delta)
                for (i, j), value in values.items():
                    lines.append(f"{kind},{'|'.join(map(repr, row))},{tau!r},{delta!r},{i},{j},{mp.nstr(value, 32)}")
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    Path(sys.argv[1] if len(sys.argv) > 1 else OUTPUT).write_text(table(), encoding="ascii")
