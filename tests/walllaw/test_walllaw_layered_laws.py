"""Laws made of layers: crossings, friction velocities of 45 digits, seams."""

from __future__ import annotations

import csv
import dataclasses
import pathlib

import mpmath
import numpy as np
import pytest

import walllaw
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

DATA = pathlib.Path(__file__).parents[1] / "reference" / "data"
mpmath.mp.dps = 50
mpf = mpmath.mpf


def rows(name: str) -> list[dict[str, str]]:
    with open(DATA / name, encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def test_intersections_and_E():
    # 20 digits, mpmath
    for row in rows("wall_law_constants.csv"):
        law = walllaw.LogLaw(float(row["kappa"]), float(row["B"]))
        assert law.intersection == pytest.approx(
            float(row["y_plus_intersection"]), rel=9e-16, abs=0
        )
        assert pytest.approx(float(row["E"]), rel=9e-16, abs=0) == law.E
    # crossing quoted for kappa 0.4187 with E 9.793: 12 digits
    assert walllaw.LogLaw(0.4187, E=9.793).intersection == pytest.approx(11.2247080760, abs=5e-11)
    # Werner & Wengle (1991): 8.3^(7/6) = 11.81
    assert walllaw.PowerLaw().intersection == pytest.approx(11.81, abs=5e-3)
    assert walllaw.PowerLaw().intersection == pytest.approx(
        float(mpmath.mpf("8.3") ** (mpf(7) / 6)), rel=9e-16
    )


def test_B_or_E():
    law = walllaw.LogLaw(0.41, E=9.8)
    assert law == walllaw.LogLaw(0.41, law.B)
    assert hash(law) == hash(walllaw.LogLaw(0.41, law.B))
    assert pytest.approx(5.566786307, abs=5e-10) == law.B  # ln(9.8)/0.41
    assert walllaw.LogLaw(0.41).B == 5.0
    assert dataclasses.replace(law) == law
    with pytest.raises(InputError, match="^E"):
        walllaw.LogLaw(0.41, 5.0, E=9.8)
    with pytest.raises(InputError, match="^E"):
        walllaw.TwoLayer(0.41, E=-1.0)


def test_friction_velocity_of_45_digits():
    """50 triples (U, y, nu), Re_y 1 to 1e9: the two-layer law and Spalding's fourth order."""
    laws = {
        "two_layer_a": walllaw.TwoLayer(0.41, 5.0), "two_layer_b": walllaw.TwoLayer(0.40, 5.5),
        "spalding4_a": walllaw.Spalding(0.41, 5.0, 4), "spalding4_b": walllaw.Spalding(0.40, 5.5, 4),
    }  # fmt: skip
    for row in rows("friction_velocity_oracle.csv"):
        flow = [float(row[n]) for n in ("U_m_s", "y_m", "nu_m2_s")]
        for name, law in laws.items():
            u = law.friction_velocity(*flow)
            assert abs(mpf(u) - mpf(row[name])) <= 4 * np.spacing(u), (name, row)


def around(edge: float, count: int = 10_000) -> np.ndarray:
    """Neighbouring doubles on both sides."""
    return edge * (1 + np.arange(-count // 2, count // 2) * 2.220446049250313e-16)


@pytest.mark.parametrize(
    "law", [walllaw.TwoLayer(0.41, 5.2), walllaw.ThreeLayer(0.40, 5.5), walllaw.PowerLaw()]
)
def test_no_law_falls_or_jumps_at_a_seam(law):
    edges = {
        "TwoLayer": lambda: [law.log_law.intersection],
        "ThreeLayer": lambda: [5.0, law.edge],
        "PowerLaw": lambda: [law.intersection],
    }[type(law).__name__]()
    for edge in edges:
        u = law.u_plus(around(edge))
        steps = np.diff(u)
        below, above = u[: u.size // 2], u[u.size // 2 :]
        assert below.max() <= above.min()
        # the log and power branches round within one unit, and rise by less than one
        assert np.all(steps >= -np.spacing(u[:-1]))
        assert np.max(steps) <= 4 * np.spacing(edge)
        top = float(law.u_plus(edge))
        for values, method in ((around(top * edge), law.u_plus_of_re_y), (around(top), law.y_plus)):
            found = method(values)
            assert np.max(np.abs(np.diff(found))) <= 40 * np.spacing(found[0])


@pytest.mark.parametrize("law", [walllaw.TwoLayer(0.41, 5.2), walllaw.ThreeLayer(0.40, 5.5)])
def test_friction_velocity_to_a_few_ulp(law):
    with mpmath.workdps(50):
        for re in (10.0 ** np.random.default_rng(2).uniform(-12, 18, 300)).tolist():
            u = law.u_plus_of_re_y(re)
            y = re / u
            k, b = mpf(law.kappa), mpf(law.B)
            if isinstance(law, walllaw.ThreeLayer) and 5 < y < law.edge:
                k, b = mpf("0.2"), 5 - 5 * mpmath.log(5)
            exact = (
                mpmath.sqrt(re)
                if y == pytest.approx(u, rel=1e-12)
                else mpmath.lambertw(k * mpf(re) * mpmath.exp(k * b)).real / k
            )
            assert abs(u - exact) <= 3 * np.spacing(u)


def test_the_buffer_layer_of_three_layers():
    # Th. von Karman, Trans. ASME 61 (1939): 5 ln(y+) - 3.05 in the buffer, 2.5 ln(y+) + 5.5 above 30
    law = walllaw.ThreeLayer(0.40, 5.5)
    y = np.array([6.0, 10.0, 20.0, 29.0])
    assert law.u_plus(y) == pytest.approx(5 * np.log(y) - 3.05, abs=5e-3)
    assert law.edge == pytest.approx(30, rel=0.02)


@pytest.mark.parametrize(
    ("law", "y"),
    [(walllaw.ViscousSublayer(), 6.0), (walllaw.LogLaw(), 20.0), (walllaw.PowerLaw(), 2000.0)],
)
def test_range_of_the_source(law, y):
    with pytest.warns(RangeWarning, match="y_plus"):
        u = law.u_plus(y)
    for use in (
        lambda: law.slope(y),
        lambda: law.y_plus(u),
        lambda: law.integral(y),
        lambda: law.u_plus_of_re_y(u * y),
        lambda: law.friction_velocity(u, y, 1.0),
    ):
        with pytest.warns(RangeWarning, match="y_plus"):
            use()
    with record() as uses:
        law.u_plus(y)
        law.friction_velocity(u, y, 1.0)
    assert [use.relation.id for use in uses] == [f"laws.{law.ROW}"] * 2
    assert uses[1].inputs["y_plus"] == pytest.approx(y, rel=1e-14, abs=0)


@pytest.mark.parametrize(
    ("make", "name"),
    [
        (lambda: walllaw.LogLaw(-1.0), "kappa"),
        (lambda: walllaw.LogLaw(0.41, -3.0).intersection, "B"),
        (lambda: walllaw.TwoLayer(0.41, -3.0), "B"),
        (lambda: walllaw.ThreeLayer(0.41, -3.0), "B"),
        (lambda: walllaw.ThreeLayer(0.15, 5.0), "kappa"),
        (lambda: walllaw.PowerLaw(A=-1.0), "A"),
        (lambda: walllaw.PowerLaw(n=1.0), "n"),
    ],
)
def test_laws_that_cannot_be(make, name):
    with pytest.raises(InputError, match=rf"^{name}"):
        make()
