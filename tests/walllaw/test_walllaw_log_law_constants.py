"""Named pairs of log-law constants: E and B agree, and meet the viscous law where they should."""

from __future__ import annotations

import mpmath
import pytest

from walllaw import log_law_pair, log_law_pairs, tables
from walllaw.errors import InputError, TableError

# y+ at which u+ = y+ meets the log law, upper root of y = ln(E y)/kappa by mpmath, ten digits
INTERSECTIONS = [
    ("coles-hirst-1968", 10.8048708141), ("nikuradse-1932", 11.6350566681),
    ("white-1974", 11.6350566681), ("pope-2000", 11.0622997843), ("mckeon-2004", 11.3754292084),
    ("lee-moser-2015", 10.3578857842), ("smooth-wall-function", 11.2247080760),
    ("launder-spalding-1974", 10.9243250959), ("wall-function-9", 11.2658565476),
    ("wall-function-9-8", 11.5301074023),
]  # fmt: skip
# B = ln(E)/kappa of the pairs that are printed with E, six decimals
B_OF_E = [("launder-spalding-1974", 5.231487), ("smooth-wall-function", 5.449410),
          ("wall-function-9", 5.359084), ("wall-function-9-8", 5.566786)]  # fmt: skip


@pytest.mark.parametrize("name", log_law_pairs())
def test_E_is_exp_of_kappa_B(name):
    pair = log_law_pair(name)
    with mpmath.workdps(30):
        expected = mpmath.exp(mpmath.mpf(pair.kappa) * mpmath.mpf(pair.B))
    # B = ln(E)/kappa rounded once is uncertain by half a unit in the last place times kappa B
    assert pytest.approx(float(expected), rel=1e-15) == pair.E
    assert pair.printed in ("B", "E")
    assert pair.source == "common practice" or pair.source in tables.sources()


@pytest.mark.parametrize(("name", "y_plus"), INTERSECTIONS)
def test_intersection_with_the_viscous_law(name, y_plus):
    pair = log_law_pair(name)
    with mpmath.workdps(30):
        kappa = mpmath.mpf(pair.kappa)
        root = -mpmath.lambertw(-kappa / mpmath.mpf(pair.E), -1) / kappa
    assert float(root.real) == pytest.approx(y_plus, abs=1e-9)


@pytest.mark.parametrize(("name", "b"), B_OF_E)
def test_intercept_of_pairs_printed_with_E(name, b):
    pair = log_law_pair(name)
    assert pair.printed == "E"
    assert pytest.approx(b, abs=5e-7) == pair.B


def test_spalart_allmaras_intercept():
    # the closed law of the wall of Allmaras, Johnson & Spalart (2012) tends to this intercept:
    # u+ = integral of 1/(1 + kappa y+ f_v1(kappa y+)), by mpmath up to y+ = 1e6
    pair = log_law_pair("allmaras-2012")
    kappa, c_v1 = mpmath.mpf("0.41"), mpmath.mpf("7.1")

    def slope(y):
        chi = kappa * y
        return 1 / (1 + chi**4 / (chi**3 + c_v1**3))

    top = mpmath.mpf(10) ** 6
    u = mpmath.quad(slope, [0, 5, 20, 100, 1000, 10**4, 10**5, top])
    # beyond the top the slope is 1/(kappa y) to the order 1/(kappa y)^2
    assert float(u - mpmath.log(top) / kappa) == pytest.approx(pair.B, abs=1e-5)


def test_misspelt_pair():
    with pytest.raises(InputError, match="did you mean 'nikuradse-1932'"):
        log_law_pair("nikuradse-1923")


@pytest.mark.parametrize(
    "row",
    [
        {"kappa": "0.41", "B": "5.0", "source": "coles-hirst-1968"},
        {"kappa": "0.41", "source": "coles-hirst-1968", "status": "memory"},
        {"kappa": "0.41", "B": "5", "E": "9", "source": "coles-hirst-1968", "status": "memory"},
        {"kappa": "0.41", "B": "5", "source": "nobody-1900", "status": "memory"},
        {"kappa": "0.41", "B": "5", "source": "coles-hirst-1968", "status": "memory", "C": "1"},
    ],
)
def test_a_damaged_pair_is_found(row, monkeypatch):
    monkeypatch.setattr(tables, "read", lambda *parts: {"broken": row})
    with pytest.raises(TableError, match=r"log_law.toml: broken"):
        log_law_pair("broken")
