"""Passages: geometry, laminar constants against 50 digits and scipy, entrance lengths, regimes."""

from __future__ import annotations

import csv
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import ducts
from walllaw.errors import InputError, RangeWarning

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)
LENGTHS = st.floats(1e-6, 1e3)


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


# 17 digits by mpmath of the exact solutions in Shah and London 1978
CONSTANTS = {
    row["geometry"]: float(row["value"])
    for row in rows("laminar_duct_constants.csv")
    if row["quantity"] == "f_Re_fanning"
}


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


# --- laminar constants ----------------------------------------------------------------------------


@pytest.mark.parametrize("name", [name for name in CONSTANTS if name.startswith("rectangular")])
def test_rectangle_values(name):
    aspect = float(name.split("=")[1])
    assert ducts.rectangle_constant(aspect) == pytest.approx(4.0 * CONSTANTS[name], rel=2e-15)
    passage = ducts.rectangle(aspect * 0.3, 0.3)
    assert passage.laminar_constant == pytest.approx(4.0 * CONSTANTS[name], rel=4e-15)


@pytest.mark.parametrize("name", [name for name in CONSTANTS if name.startswith("annulus")])
def test_annulus_values(name):
    ratio = float(name.split("=")[1])
    assert ducts.annulus_constant(ratio) == pytest.approx(4.0 * CONSTANTS[name], rel=2e-15)
    passage = ducts.annulus(ratio * 0.3, 0.3)
    assert passage.laminar_constant == pytest.approx(4.0 * CONSTANTS[name], rel=4e-15)


def test_pipe_and_channel_values():
    assert ducts.pipe(0.1).laminar_constant == 4.0 * CONSTANTS["circular pipe"]
    assert ducts.channel(0.1).laminar_constant == 4.0 * CONSTANTS["parallel plates"]


def exact_rectangle(aspect: float):
    """The series as printed, with 100 terms of its deficit (50 digits)."""
    a = mpmath.mpf(float(aspect))
    total = mpmath.mpf(31) / 32 * mpmath.zeta(5)
    for n in range(1, 200, 2):
        total -= (1 - mpmath.tanh(n * mpmath.pi / (2 * a))) / mpmath.mpf(n) ** 5
    return 96 / ((1 + a) ** 2 * (1 - 192 * a / mpmath.pi**5 * total))


def test_rectangle_is_exact_to_6_ulp_for_every_aspect_ratio():
    rng = np.random.default_rng(30)
    aspect = np.concatenate(
        [rng.uniform(0.0, 1.0, 150), 10.0 ** rng.uniform(-12.0, 0.0, 100), [1e-3, 2e-3, 5e-3, 1.0]]
    )
    with np.errstate(all="raise"):
        values = ducts.rectangle_constant(aspect)
    errors = [ulp(v, exact_rectangle(a)) for v, a in zip(values, aspect, strict=True)]
    assert max(errors) <= 6.0
    assert ducts.rectangle_constant(0.0) == 96.0


def exact_annulus(ratio: float):
    """The closed form as printed; the cancellation near 1 is paid with 90 digits."""
    with mpmath.workdps(110):
        r = mpmath.mpf(float(ratio))
        return 64 * (1 - r) ** 2 / (1 + r * r + (1 - r * r) / mpmath.log(r))


def test_annulus_is_exact_to_6_ulp_for_every_radius_ratio():
    rng = np.random.default_rng(31)
    seam = np.exp(-2.0) * (1.0 + np.arange(-30, 31) * 2.0**-52)
    ratio = np.concatenate(
        [
            rng.uniform(0.0, 1.0, 800),
            10.0 ** rng.uniform(-300.0, 0.0, 400),
            1.0 - 10.0 ** rng.uniform(-15.9, 0.0, 400),
            seam,
        ]
    )
    with np.errstate(over="raise", divide="raise", invalid="raise"):
        values = ducts.annulus_constant(ratio)
    errors = [ulp(v, exact_annulus(r)) for v, r in zip(values, ratio, strict=True)]
    assert max(errors) <= 6.0
    assert ducts.annulus_constant([0.0, 1.0]).tolist() == [64.0, 96.0]


def test_rectangle_against_a_numerical_solution():
    # Poisson's equation on half a duct 2:1 by scipy's sparse solver, two grids and extrapolation
    from scipy.sparse import diags_array, eye_array, kron
    from scipy.sparse.linalg import spsolve

    def constant(n: int) -> float:
        def second(count: int, length: float):
            step = length / count
            matrix = diags_array([1.0, -2.0, 1.0], offsets=[-1, 0, 1], shape=(count - 1, count - 1))
            return matrix / step**2

        lap = kron(second(2 * n, 2.0), eye_array(n - 1)) + kron(
            eye_array(2 * n - 1), second(n, 1.0)
        )
        bulk = float(spsolve(lap.tocsc(), -np.ones(lap.shape[0])).sum()) / (n * 2.0 * n)
        return 2.0 * (4.0 / 3.0) ** 2 / bulk  # f Re = 2 (-dp/dx) D_h^2/(mu U_b), D_h = 4/3

    coarse, fine = constant(40), constant(80)
    assert ducts.rectangle_constant(0.5) == pytest.approx(fine + (fine - coarse) / 3.0, rel=1e-5)


def test_annulus_against_quadrature():
    # laminar profile (1 - r^2 + (r_i^2 - 1) ln r/ln r_i)/4, bulk value by scipy
    from scipy.integrate import quad

    for inner in (0.02, 0.4, 0.9):

        def profile(r: float, inner: float = inner) -> float:
            return 0.25 * r * (1.0 - r * r + (inner**2 - 1.0) * np.log(r) / np.log(inner))

        bulk = 2.0 * quad(profile, inner, 1.0, epsabs=0.0, epsrel=1e-12)[0] / (1.0 - inner**2)
        expected = 2.0 * (2.0 * (1.0 - inner)) ** 2 / bulk
        assert ducts.annulus_constant(inner) == pytest.approx(expected, rel=1e-10)


# S. J. Davies, C. M. White 1928: tau_w d/(mu U_b) of a wide rectangular channel, exactly 6; on the
# hydraulic diameter 2 d that is f Re = 8 * 2 * 6 = 96
def test_wide_channel_readings():
    table = rows("channel_laminar_davies_white_1928.csv")
    readings = np.array([16.0 * float(row["tau_d_over_mu_u"]) for row in table])
    deviation = readings / ducts.channel(0.01).laminar_constant - 1.0
    assert abs(deviation).max() < 0.021
    assert abs(np.median(deviation)) < 0.002


# --- shape factors --------------------------------------------------------------------------------


def test_shape_factors():
    # Jones and Leung 1981: phi = [(1 + a^2) ln a + 1 - a^2]/[(1 - a)^2 ln a]; 4 digits by mpmath
    assert ducts.annulus(0.5, 1.0).shape_factor == pytest.approx(0.6719, abs=5e-5)
    assert ducts.annulus(0.1, 1.0).shape_factor == pytest.approx(0.7161, abs=5e-5)
    assert ducts.channel(1.0).shape_factor == pytest.approx(2.0 / 3.0, rel=1e-15)
    assert ducts.channel(0.3).laminar_equivalent_diameter == pytest.approx(0.4, rel=1e-15)
    assert ducts.pipe(0.2).laminar_equivalent_diameter == 0.2


def test_jones_approximation():
    aspect = np.linspace(0.0, 1.0, 501)
    deviation = ducts.jones_rectangle(aspect) * ducts.rectangle_constant(aspect) / 64.0 - 1.0
    assert abs(deviation).max() < 0.019
    assert ducts.jones_rectangle(0.0) == pytest.approx(2.0 / 3.0, rel=1e-15)


@given(st.floats(0.0, 1.0), st.floats(0.0, 1.0))
@SETTINGS
def test_laminar_constants_are_monotone(first, second):
    low, high = sorted((first, second))
    assert ducts.rectangle_constant(low) >= ducts.rectangle_constant(high) * (1.0 - 1e-15)
    assert ducts.annulus_constant(low) <= ducts.annulus_constant(high) * (1.0 + 1e-15)


# --- geometry -------------------------------------------------------------------------------------


@given(LENGTHS, LENGTHS)
@SETTINGS
def test_rectangle_geometry(width, height):
    passage = ducts.rectangle(width, height)
    assert passage.area == pytest.approx(width * height, rel=1e-15)
    assert passage.wetted_perimeter == pytest.approx(2.0 * (width + height), rel=1e-14)
    assert passage.gap == min(width, height)
    assert passage == ducts.rectangle(height, width)


@given(LENGTHS, st.floats(1e-6, 0.999))
@SETTINGS
def test_annulus_geometry(outer, ratio):
    inner = ratio * outer
    passage = ducts.annulus(inner, outer)
    assert passage.hydraulic_diameter == pytest.approx(outer - inner, rel=1e-15)
    assert passage.wetted_perimeter == pytest.approx(np.pi * (outer + inner), rel=1e-14)
    assert passage.gap == pytest.approx(0.5 * (outer - inner), rel=1e-15)


def test_pipe_and_channel_geometry():
    passage = ducts.pipe(0.26)
    assert passage.area == pytest.approx(np.pi * 0.13**2, rel=1e-15)
    assert passage.wetted_perimeter == pytest.approx(np.pi * 0.26, rel=1e-15)
    assert ducts.channel(0.01).area is None
    assert ducts.channel(0.01).wetted_perimeter is None
    assert ducts.channel(0.01, 2.0).area == 0.02
    assert ducts.channel(0.01, 2.0).wetted_perimeter == 4.0


def test_shapes():
    assert ducts.pipe([0.1, 0.2]).laminar_constant.shape == (2,)
    assert ducts.channel([[0.1], [0.2]], [1.0, 2.0, 3.0]).gap.shape == (2, 3)
    assert ducts.rectangle([[0.1], [0.2]], [1.0, 2.0, 3.0]).laminar_constant.shape == (2, 3)
    assert ducts.annulus([[0.1], [0.2]], [1.0, 2.0, 3.0]).laminar_constant.shape == (2, 3)
    assert ducts.rectangle_constant(np.empty(0)).shape == (0,)
    assert isinstance(ducts.annulus(0.1, 0.2).laminar_constant, float)


def test_one_case_and_many_give_the_same_bits():
    rng = np.random.default_rng(32)
    ratio = rng.uniform(0.0, 1.0, 1000)
    for function in (ducts.rectangle_constant, ducts.annulus_constant, ducts.jones_rectangle):
        many = function(ratio)
        assert [function(r) for r in ratio.tolist()] == many.tolist()


# --- entrance lengths and regimes -----------------------------------------------------------------


def test_entrance_lengths():
    # Durst et al. 2005 (from memory): creeping limits 0.619 and 0.631, slopes 0.0567 and 0.0442
    assert ducts.entrance_length_laminar(0.0) == pytest.approx(0.619, rel=1e-14)
    assert ducts.entrance_length_laminar_channel(0.0) == pytest.approx(0.631, rel=1e-14)
    assert ducts.entrance_length_laminar(2300.0) == pytest.approx(0.0567 * 2300.0, rel=1e-3)
    assert ducts.entrance_length_laminar_channel(1e3) == pytest.approx(0.0442 * 1e3, rel=1e-3)
    # 4.4 Re^(1/6): Re = 4096 and 10^6 give whole roots
    assert ducts.entrance_length_turbulent(4096.0) == pytest.approx(4.4 * 4.0, rel=1e-15)
    assert ducts.entrance_length_turbulent(1e6) == pytest.approx(44.0, rel=1e-15)


@given(st.floats(0.0, 1100.0), st.floats(1e-3, 50.0))
@SETTINGS
def test_laminar_entrance_grows(reynolds, step):
    pair = [reynolds, reynolds + step]
    for function in (ducts.entrance_length_laminar, ducts.entrance_length_laminar_channel):
        first, second = function(pair)
        assert second >= first


def test_regime():
    names = ducts.regime([0.0, 2299.0, 2300.0, 4000.0, 4001.0])
    expected = ["laminar", "laminar", "transitional", "transitional", "turbulent"]
    assert names.tolist() == expected
    assert ducts.regime(2500.0) == "transitional"
    assert ducts.regime([[1e5]]).shape == (1, 1)


# --- refusals and warnings ------------------------------------------------------------------------


@pytest.mark.parametrize("bad", [0.0, -1.0, np.nan, np.inf])
def test_impossible_lengths_are_refused(bad):
    for call, name in (
        (lambda: ducts.pipe(bad), "diameter"),
        (lambda: ducts.channel(bad), "height"),
        (lambda: ducts.channel(1.0, bad), "width"),
        (lambda: ducts.rectangle(bad, 1.0), "width"),
        (lambda: ducts.rectangle(1.0, bad), "height"),
        (lambda: ducts.annulus(bad, 1.0), "inner_diameter"),
        (lambda: ducts.annulus(0.1, bad), "outer_diameter"),
    ):
        with pytest.raises(InputError, match=name):
            call()


@pytest.mark.parametrize(("inner", "outer"), [(1.0, 1.0), (2.0, 1.0), ([0.1, 2.0], 1.0)])
def test_annulus_with_the_walls_exchanged_is_refused(inner, outer):
    with pytest.raises(InputError, match=r"inner_diameter.*less than outer_diameter"):
        ducts.annulus(inner, outer)


@pytest.mark.parametrize("bad", [-0.1, 1.1, np.nan])
def test_impossible_ratios_are_refused(bad):
    for function in (ducts.rectangle_constant, ducts.annulus_constant, ducts.jones_rectangle):
        with pytest.raises(InputError):
            function(bad)


@pytest.mark.parametrize("bad", [-1.0, np.nan])
def test_impossible_reynolds_numbers_are_refused(bad):
    for function in (
        ducts.regime,
        ducts.entrance_length_laminar,
        ducts.entrance_length_laminar_channel,
        ducts.entrance_length_turbulent,
    ):
        with pytest.raises(InputError, match="reynolds"):
            function(bad)


@pytest.mark.parametrize(
    ("function", "outside"),
    [
        (ducts.entrance_length_laminar, 2301.0),
        (ducts.entrance_length_laminar_channel, 1151.0),
        (ducts.entrance_length_turbulent, 3e3),
    ],
)
def test_outside_the_range_of_the_source_warns(function, outside):
    with pytest.warns(RangeWarning):
        function(outside)
