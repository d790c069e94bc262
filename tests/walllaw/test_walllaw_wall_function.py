"""Wall functions and near-wall omega: printed values, the two forms, scipy, limits, refusals."""

from __future__ import annotations

import csv
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from walllaw import wall_function as wf
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)
FIELDS = tuple(wf.FirstCell.__dataclass_fields__)


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def ulp(value: float, exact) -> float:
    return float(abs(mpmath.mpf(value) - exact) / mpmath.mpf(float(np.spacing(float(exact)))))


# --- crossing of the laws -------------------------------------------------------------------------


# 30 digits by mpmath, printed to 12; 11.06, 11.225, 11.53 and 11.63 are quoted in the literature
@pytest.mark.parametrize("row", rows("wall_function_intersections.csv"))
def test_intersection(row):
    kappa, value = float(row["kappa"]), float(row["value"])
    given_as = {row["intercept"]: value}
    assert wf.intersection(kappa, **given_as) == pytest.approx(float(row["y_plus"]), rel=1e-11)


# 17 digits by mpmath of the upper root of y+ = ln(y+)/kappa + B
@pytest.mark.parametrize("row", rows("wall_law_constants.csv"))
def test_intersection_17_digits(row):
    value = wf.intersection(float(row["kappa"]), float(row["B"]))
    assert value == pytest.approx(float(row["y_plus_intersection"]), rel=1e-15)


def test_intersection_is_within_4_ulp():
    rng = np.random.default_rng(3)
    kappa, B = rng.uniform(0.3, 0.5, 1000), rng.uniform(3.0, 9.0, 1000)
    for y, k, b in zip(wf.intersection(kappa, B).tolist(), kappa.tolist(), B.tolist(), strict=True):
        k, b = mpmath.mpf(k), mpmath.mpf(b)
        exact = -mpmath.lambertw(-k * mpmath.exp(-k * b), -1).real / k
        assert ulp(y, exact) <= 4


def test_laws_that_do_not_cross_are_refused():
    # they touch where E = e kappa
    assert wf.intersection(0.41, E=0.41 * np.e * (1 + 1e-15)) == pytest.approx(1 / 0.41, rel=1e-6)
    with pytest.raises(InputError, match="cross"):
        wf.intersection(0.41, E=1.0)


# --- the first cell -------------------------------------------------------------------------------

CELL = {"kappa": 0.4187, "E": 9.793}


# kappa 0.4187, E 9.793, C_mu 0.09, nu 1.5e-5, U 8, k 0.6, y 1e-3; mpmath, printed to 12 digits
@pytest.mark.parametrize(
    ("name", "value"),
    [
        ("y_plus", 28.2842712475),
        ("wall_stress", 0.252688756776),
        ("friction_velocity", 0.502681565979),
        ("production", 359.445146609),
        ("epsilon", 182.392004701),
        ("omega", 3377.62971668),
        ("nu_t", 1.7763936557e-4),
    ],
)
def test_first_cell_from_k(name, value):
    with pytest.warns(RangeWarning, match="30 to 300"):
        cell = wf.from_k(8.0, 0.6, 1e-3, 1.5e-5, **CELL)
    assert getattr(cell, name) == pytest.approx(value, rel=1e-10)


# the same cell, from the velocity; mpmath, printed to 14 digits
def test_friction_velocity():
    value = wf.friction_velocity(8.0, 1e-3, 1.5e-5, **CELL)
    assert value == pytest.approx(0.56647567489899, rel=1e-13)
    assert wf.from_velocity(8.0, 1e-3, 1.5e-5, **CELL).friction_velocity == value


# square roots of the two stresses by mpmath: the forms differ by 21 % in the stress of this cell
def test_the_two_forms_differ_away_from_equilibrium():
    with record():
        by_k = wf.from_k(8.0, 0.6, 1e-3, 1.5e-5, **CELL)
        by_u = wf.from_velocity(8.0, 1e-3, 1.5e-5, **CELL)
    expected = (0.502681565979 / 0.56647567489899) ** 2
    assert by_k.wall_stress / by_u.wall_stress == pytest.approx(expected, rel=1e-11)


@SETTINGS
@given(
    st.floats(0.01, 300),
    st.floats(-6, -1),
    st.floats(-6.5, -4),
    st.floats(0.35, 0.45),
    st.floats(4.0, 6.0),
)
def test_the_two_forms_agree_where_k_is_in_equilibrium(velocity, log_y, log_nu, kappa, B):
    distance, nu = 10**log_y, 10**log_nu
    with record():
        by_u = wf.from_velocity(velocity, distance, nu, kappa=kappa, B=B)
        by_k = wf.from_k(velocity, by_u.k, distance, nu, kappa=kappa, B=B)
    edge = wf.intersection(kappa, B)
    if abs(by_u.y_plus / edge - 1) > 1e-9:
        for name in FIELDS:
            assert getattr(by_k, name) == pytest.approx(getattr(by_u, name), rel=1e-11), name


@SETTINGS
@given(st.floats(1e-3, 1e3), st.floats(-7, 1), st.floats(-7, -3))
def test_friction_velocity_meets_its_law(velocity, log_y, log_nu):
    distance, nu = 10**log_y, 10**log_nu
    with record():
        u_tau = wf.friction_velocity(velocity, distance, nu)
    y_plus = distance * u_tau / nu
    edge = wf.intersection(0.41, 5.0)
    u_plus = np.log(y_plus) / 0.41 + 5.0 if y_plus > edge else y_plus
    assert velocity / u_tau == pytest.approx(u_plus, rel=1e-13)


# scipy.optimize.brentq on U/u - ln(y u/nu)/kappa - B
def test_friction_velocity_against_a_bracketing_solver():
    for velocity in np.geomspace(1.0, 300.0, 12):
        with record():
            u_tau = wf.friction_velocity(velocity, 1e-2, 1.5e-5, kappa=0.41, B=5.2)

        def law(u, velocity=velocity):
            return velocity / u - np.log(1e-2 * u / 1.5e-5) / 0.41 - 5.2

        assert u_tau == pytest.approx(brentq(law, 1e-2, velocity, xtol=1e-15), rel=1e-12)


def test_friction_velocity_is_within_8_ulp():
    rng = np.random.default_rng(4)
    velocity, distance = 10 ** rng.uniform(-3, 3, 1500), 10 ** rng.uniform(-3, 3, 1500)
    nu = 10 ** rng.uniform(-9, -5, 1500)
    with record():
        values = wf.friction_velocity(velocity, distance, nu)
    edge = wf.intersection(0.41, 5.0)
    checked = 0
    for value, *given_values in zip(
        *(v.tolist() for v in (values, velocity, distance, nu)), strict=True
    ):
        u, y, n = (mpmath.mpf(v) for v in given_values)
        if u * y / n <= 1.0001 * edge**2:
            continue
        kappa, B = mpmath.mpf(0.41), mpmath.mpf(5.0)
        exact = kappa * u / mpmath.lambertw(kappa * mpmath.exp(kappa * B) * u * y / n).real
        assert ulp(value, exact) <= 8
        checked += 1
    assert checked > 1000


def test_velocity_zero():
    with record():
        assert wf.friction_velocity(0.0, 1e-3, 1.5e-5) == 0.0
        for sublayer in ("two-layer", "scalable"):
            cell = wf.from_k(0.0, 0.6, 1e-3, 1.5e-5, sublayer=sublayer)
            assert (cell.wall_stress, cell.friction_velocity, cell.production) == (0.0, 0.0, 0.0)
            assert cell.wall_viscosity > 0


@SETTINGS
@given(
    st.floats(0.1, 100),
    st.floats(1e-4, 100),
    st.floats(-6, -1),
    st.sampled_from(["two-layer", "scalable"]),
)
def test_wall_viscosity_returns_the_stress(velocity, k, log_y, sublayer):
    with record():
        cell = wf.from_k(velocity, k, 10**log_y, 1.5e-5, sublayer=sublayer)
    assert cell.wall_viscosity * velocity / 10**log_y == pytest.approx(cell.wall_stress, rel=1e-13)
    assert cell.omega * 0.09 * k == pytest.approx(cell.epsilon, rel=1e-13)


# Below the crossing: no production, epsilon = 2 nu k/y^2, viscous stress
def test_two_layer_sublayer():
    with record():
        cell = wf.from_k(1.0, 0.01, 1e-4, 1.5e-5)
    assert not cell.log_layer
    assert (cell.production, cell.nu_t) == (0.0, 0.0)
    assert cell.epsilon == pytest.approx(2 * 1.5e-5 * 0.01 / 1e-8, rel=1e-14)
    assert cell.wall_stress == pytest.approx(1.5e-5 * 1.0 / 1e-4, rel=1e-14)
    assert cell.wall_viscosity == pytest.approx(1.5e-5, rel=1e-14)


def test_stress_is_continuous_at_the_crossing():
    edge = wf.intersection(0.41, 5.0)
    k = (1.0 / np.sqrt(np.sqrt(0.09))) ** 2  # u_k = 1 m/s, so that y* = y/nu
    with record():
        cell = wf.from_k(5.0, k, edge * np.array([1 - 1e-12, 1 + 1e-12]) * 1e-5, 1e-5)
    assert cell.log_layer.tolist() == [False, True]
    assert cell.wall_stress[0] == pytest.approx(cell.wall_stress[1], rel=1e-11)


# Grotjans & Menter (1998): y* never below the crossing, so that refinement changes nothing
def test_scalable_form_does_not_depend_on_the_distance_below_the_crossing():
    edge = wf.intersection(0.41, 5.0)
    distance = np.array([1e-6, 1e-5, 2e-5])
    with record():
        cell = wf.from_k(1.0, 0.5, distance, 1.5e-5, sublayer="scalable")
        above = wf.from_k(1.0, 0.5, 1e-3, 1.5e-5, sublayer="scalable")
        same = wf.from_k(1.0, 0.5, 1e-3, 1.5e-5)
    assert (cell.y_plus < edge).all()
    assert not cell.log_layer.any()
    assert len(set(cell.wall_stress.tolist())) == 1
    u_k = np.sqrt(np.sqrt(0.09) * 0.5)
    assert cell.wall_stress[0] == pytest.approx(1.0 * u_k / edge, rel=1e-13)
    assert above == same


# production equals dissipation in the log layer in equilibrium (velocity form)
def test_production_equals_dissipation_in_equilibrium():
    cell = wf.from_velocity(8.0, 1e-3, 1.5e-5, **CELL)
    assert cell.production == pytest.approx(cell.epsilon, rel=1e-14)
    assert cell.nu_t == pytest.approx(0.09 * cell.k**2 / cell.epsilon, rel=1e-14)


def test_arrays_and_single_cells_give_the_same_bits():
    velocity, distance = np.linspace(1, 50, 40), 2e-3
    with record():
        many = wf.from_velocity(velocity, distance, 1.5e-5)
        for i, u in enumerate(velocity):
            one = wf.from_velocity(u, distance, 1.5e-5)
            assert all(getattr(many, name)[i] == getattr(one, name) for name in FIELDS)


def test_outside_30_to_300_warns():
    with pytest.warns(RangeWarning, match="y_plus"):
        wf.friction_velocity(8.0, 1e-5, 1.5e-5)
    with pytest.warns(RangeWarning, match="y_plus"):
        wf.from_velocity(50.0, 1e-2, 1.5e-5)


@pytest.mark.parametrize(
    ("call", "text"),
    [
        (lambda: wf.friction_velocity(-1.0, 1e-3, 1e-5), "velocity"),
        (lambda: wf.friction_velocity(1.0, 0.0, 1e-5), "distance"),
        (lambda: wf.friction_velocity(1e300, 1e-3, 1e-5), "velocity"),
        (lambda: wf.friction_velocity(1.0, 1e-3, 1e-5, B=5.0, E=9.0), "both B and E"),
        (lambda: wf.from_k(1.0, 0.0, 1e-3, 1e-5), "k: "),
        (lambda: wf.from_k(1.0, 1.0, 1e-3, 1e-5, sublayer="scaleable"), "'scalable'"),
        (lambda: wf.blend(1.0, 2.0, kind="linear"), "kind"),
        (lambda: wf.omega_wall(1e-6, 1e-5, beta=0.0), "beta"),
        (lambda: wf.omega_log(1e-6, 1.0, kappa=2.0), "kappa"),
    ],
)
def test_refusals(call, text):
    with pytest.raises(InputError, match=text):
        call()


# --- omega ----------------------------------------------------------------------------------------


# mpmath, printed to 10 digits; wall units are a case with nu = u_tau = 1
@pytest.mark.parametrize("row", rows("omega_blend_values.csv"))
def test_omega(row):
    y = float(row["y_plus"])
    assert wf.omega_viscous(y, 1.0) == pytest.approx(float(row["viscous"]), rel=1e-9)
    assert wf.omega_log(y, 1.0) == pytest.approx(float(row["log"]), rel=1e-9)
    for kind in ("quadratic", "exponential"):
        assert wf.omega_blended(y, 1.0, 1.0, kind=kind) == pytest.approx(float(row[kind]), rel=1e-9)


# 6 nu/(beta y^2) for beta 0.075, 0.072, 0.0708, 0.0747: 80, 83.333333, 84.745763, 80.321285; ten
# times that at the wall: Menter (1994)
@pytest.mark.parametrize(
    ("beta", "factor"),
    [(0.075, 80.0), (0.072, 83.333333), (0.0708, 84.745763), (0.0747, 80.321285)],
)
def test_wall_value_is_ten_times_the_sublayer_value(beta, factor):
    assert wf.omega_viscous(1.0, 1.0, beta=beta) == pytest.approx(factor, abs=5e-7)
    assert wf.omega_wall(1.0, 1.0, beta=beta) == pytest.approx(10 * factor, abs=5e-6)


# equal at y+ = 6 sqrt(beta*) kappa/beta = 9.84 for (0.09, 0.41, 0.075)
def test_viscous_and_log_omega_are_equal_at_9_84():
    assert wf.omega_viscous(9.84, 1.0) == pytest.approx(wf.omega_log(9.84, 1.0), rel=1e-14)


@pytest.mark.parametrize("kind", ["quadratic", "exponential"])
def test_blend_has_the_two_limits(kind):
    with np.errstate(all="raise", under="ignore"):
        y = np.array([1e-12, 1e-4, 1e12])
        omega = wf.omega_blended(y, 1.0, 1.0, kind=kind)
    assert omega[:2] == pytest.approx(wf.omega_viscous(y[:2], 1.0), rel=1e-8)
    assert omega[2] == pytest.approx(wf.omega_log(1e12, 1.0), rel=1e-10)


# between y+ 5 and 10 the exponential blend is below both of its values
def test_exponential_blend_dips_below_both():
    y = np.linspace(7.0, 10.0, 50)
    both = np.minimum(wf.omega_viscous(y, 1.0), wf.omega_log(y, 1.0))
    assert (wf.omega_blended(y, 1.0, 1.0, kind="exponential") < both).all()
