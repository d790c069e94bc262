"""Pipe and channel friction: 50-digit roots, published readings, other libraries, limits."""

from __future__ import annotations

import csv
import warnings
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import friction
from walllaw.arrays import BLOCK
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)
LOG_LAWS = {  # slope and intercept of 1/sqrt(f) = slope log10(Re sqrt(f)) + intercept
    friction.prandtl_karman: ("2", "-0.8"),
    friction.mckeon: ("1.930", "-0.537"),
    friction.zagarola_smits: ("1.889", "-0.3577"),
    friction.pirozzoli_2021: ("2.102", "-1.148"),
}
SMOOTH = [*LOG_LAWS, friction.mckeon_general, friction.blasius, friction.colebrook]
TURBULENT = [
    *SMOOTH,
    friction.haaland,
    friction.swamee_jain,
    friction.dean,
    friction.zanoun,
    friction.dean_velocity_ratio,
]
ROUGH = [friction.colebrook, friction.haaland, friction.swamee_jain, friction.churchill]


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def columns(name: str, *fields: str) -> list[np.ndarray]:
    table = rows(name)
    return [np.array([float(row[field]) for row in table]) for field in fields]


def quiet(function, *arguments):
    """Evaluate outside the range of the source without its warning."""
    with record():
        return function(*arguments)


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


def exact_colebrook(reynolds: float, roughness: float, start: float):
    """50-digit root by Newton's method from a double that is already close."""
    a = mpmath.mpf(float(roughness)) / mpmath.mpf("3.7")
    b = mpmath.mpf("2.51") / mpmath.mpf(float(reynolds))
    x = 1 / mpmath.sqrt(mpmath.mpf(float(start)))
    for _ in range(5):
        y = a + b * x
        step = (x + 2 * mpmath.log10(y)) / (1 + 2 / mpmath.log(10) * b / y)
        x -= step
    assert abs(step) < mpmath.mpf(10) ** -40
    return 1 / x**2


def colebrook_error(reynolds, roughness) -> float:
    f = quiet(friction.colebrook, reynolds, roughness)
    points = zip(f.tolist(), reynolds.tolist(), roughness.tolist(), strict=True)
    return max(ulp(v, exact_colebrook(re, rr, v)) for v, re, rr in points)


# --- exact roots against 50 digits ----------------------------------------------------------------


def test_colebrook_is_exact_to_3_ulp_over_the_stated_domain():
    rng = np.random.default_rng(20)
    edge_re = np.array([2300.0, np.nextafter(2300.0, 0), 4e3, 1e8, 1e12])
    edge_rr = np.array([0.0, 1e-12, 0.05, 0.1])
    re = np.concatenate(
        [
            10.0 ** rng.uniform(np.log10(2300.0), 12.0, 2400),
            np.repeat(10.0 ** np.arange(4.0, 13.0), 4),
            np.repeat(edge_re, edge_rr.size),
        ]
    )
    rr = np.concatenate(
        [
            np.where(rng.random(2400) < 0.15, 0.0, 10.0 ** rng.uniform(-12.0, -1.0, 2400)),
            np.tile(edge_rr, 9),
            np.tile(edge_rr, edge_re.size),
        ]
    )
    assert colebrook_error(re, rr) <= 3.0


@pytest.mark.parametrize(("low", "high"), [(2.0, 3.3617), (12.0, 30.0), (30.0, 300.0)])
def test_colebrook_is_exact_to_4_ulp_far_outside(low, high):
    rng = np.random.default_rng(21)
    re = np.append(10.0 ** rng.uniform(low, high, 300), [10.0**low, 10.0**high])
    rr = np.append(rng.uniform(0.0, 0.5, 300), [0.0, 0.5])
    with np.errstate(over="raise", divide="raise", invalid="raise"):
        assert colebrook_error(re, rr) <= 4.0


@pytest.mark.parametrize("function", LOG_LAWS, ids=lambda f: f.__name__)
def test_log_laws_are_exact_to_4_ulp(function):
    slope, intercept = (mpmath.mpf(text) for text in LOG_LAWS[function])
    rng = np.random.default_rng(22)
    re = np.concatenate([10.0 ** rng.uniform(2.0, 30.0, 500), 10.0 ** np.arange(2.0, 31.0)])
    c = slope / mpmath.log(10)
    for value, reynolds in zip(quiet(function, re).tolist(), re.tolist(), strict=True):
        z = mpmath.log(mpmath.mpf(reynolds) / c) + intercept / c
        assert ulp(value, 1 / (c * mpmath.lambertw(mpmath.exp(z)).real) ** 2) <= 4.0


def test_mckeon_general_is_exact_to_4_ulp():
    slope, low, power = (mpmath.mpf(text) for text in ("1.920", "7.04", "0.55"))
    rng = np.random.default_rng(23)
    re = np.concatenate([10.0 ** rng.uniform(2.0, 30.0, 500), 10.0 ** np.arange(2.0, 31.0)])
    for value, reynolds in zip(quiet(friction.mckeon_general, re), re, strict=True):
        r, x = mpmath.mpf(float(reynolds)), 1 / mpmath.sqrt(mpmath.mpf(float(value)))
        for _ in range(5):
            term = (low * x / r) ** power
            residual = x - slope * mpmath.log10(r / x) + mpmath.mpf("0.475") + term
            x -= residual / (1 + slope / mpmath.log(10) / x + power * term / x)
        assert ulp(value, 1 / x**2) <= 4.0


def exact_churchill(re, rr):
    a = mpmath.mpf("2.457") * mpmath.log((7 / re) ** mpmath.mpf("0.9") + mpmath.mpf("0.27") * rr)
    both = (a**16 + (37530 / re) ** 16) ** mpmath.mpf("-1.5")
    return 8 * ((8 / re) ** 12 + both) ** (mpmath.mpf(1) / 12)


def exact_haaland(re, rr):
    inside = (rr / mpmath.mpf("3.7")) ** mpmath.mpf("1.11") + mpmath.mpf("6.9") / re
    return 1 / (mpmath.mpf("1.8") * mpmath.log10(inside)) ** 2


def exact_swamee_jain(re, rr):
    inside = rr / mpmath.mpf("3.7") + mpmath.mpf("5.74") / re ** mpmath.mpf("0.9")
    return mpmath.mpf("0.25") / mpmath.log10(inside) ** 2


@pytest.mark.parametrize(
    ("function", "exact"),
    [
        (friction.haaland, exact_haaland),
        (friction.swamee_jain, exact_swamee_jain),
        (friction.churchill, exact_churchill),
    ],
)
def test_explicit_laws_are_exact_to_8_ulp(function, exact):
    rng = np.random.default_rng(24)
    re = 10.0 ** rng.uniform(2.0, 20.0, 1000)
    rr = np.where(rng.random(1000) < 0.15, 0.0, 10.0 ** rng.uniform(-12.0, -0.31, 1000))
    for value, r, e in zip(quiet(function, re, rr), re, rr, strict=True):
        assert ulp(value, exact(mpmath.mpf(float(r)), mpmath.mpf(float(e)))) <= 8.0


def test_churchill_neither_overflows_nor_loses_digits_from_1e_minus_300_to_1e300():
    re = 10.0 ** np.linspace(-300.0, 300.0, 301)
    with np.errstate(all="raise"):
        values = quiet(friction.churchill, re, 1e-3)
    for value, r in zip(values, re, strict=True):
        assert ulp(value, exact_churchill(mpmath.mpf(float(r)), mpmath.mpf(1e-3))) <= 8.0


# --- 17-digit tables (mpmath, 40 digits) ----------------------------------------------------------


@pytest.mark.parametrize(
    ("column", "function"),
    [
        ("colebrook_white", friction.colebrook),
        ("haaland_1983", friction.haaland),
        ("swamee_jain_1976", friction.swamee_jain),
        ("churchill_1977", friction.churchill),
    ],
)
def test_rough_formula_values(column, function):
    re, rr, expected = columns("friction_formula_values.csv", "re", "rel_roughness", column)
    assert re.size == 49
    np.testing.assert_allclose(quiet(function, re, rr), expected, rtol=2e-15, atol=0)


@pytest.mark.parametrize(
    ("column", "function"),
    [
        ("prandtl", friction.prandtl_karman),
        ("colebrook_smooth", friction.colebrook),
        ("mckeon_2005", friction.mckeon),
        ("zagarola_smits_1998", friction.zagarola_smits),
        ("blasius", friction.blasius),
        ("pirozzoli_2021", friction.pirozzoli_2021),
    ],
)
def test_smooth_formula_values(column, function):
    re, expected = columns("friction_smooth_values.csv", "re", column)
    np.testing.assert_allclose(quiet(function, re), expected, rtol=2e-15, atol=0)


def test_fully_rough_values():
    rr, law, limit = columns(
        "nikuradse_fully_rough.csv", "ks_over_d", "nikuradse_law", "colebrook_limit"
    )
    # ks_over_d is printed to 8 digits; r/ks as in Nikuradse's table is exact
    (ratio,) = columns("nikuradse_fully_rough.csv", "r_over_ks")
    np.testing.assert_allclose(friction.nikuradse_rough(0.5 / ratio), law, rtol=2e-15)
    np.testing.assert_allclose(quiet(friction.colebrook, 1e30, 0.5 / ratio), limit, rtol=2e-15)
    np.testing.assert_allclose(rr, 0.5 / ratio, rtol=1e-7)


# 11-digit values from mpmath at 50 digits of the formula of McKeon et al. 2005, from memory
@pytest.mark.parametrize(
    ("reynolds", "expected"),
    [(1e5, 0.018083600145), (8e5, 0.012292539614), (1e7, 0.0083149938313)],
)
def test_mckeon_general_values(reynolds, expected):
    assert friction.mckeon_general(reynolds) == pytest.approx(expected, rel=5e-11)


# --- other libraries ------------------------------------------------------------------------------


@pytest.mark.parametrize(("reynolds", "roughness"), [(1e5, 1e-4), (1e4, 1e-2), (1e7, 1e-6)])
def test_against_fluids(reynolds, roughness):
    # fluids 1.3 (Colebrook by its own solver, good to 3e-14)
    import fluids.friction as library

    assert friction.colebrook(reynolds, roughness) == pytest.approx(
        library.Colebrook(reynolds, roughness), rel=1e-13
    )
    assert friction.haaland(reynolds, roughness) == pytest.approx(
        library.Haaland(reynolds, roughness), rel=1e-14
    )
    assert friction.churchill(reynolds, roughness) == pytest.approx(
        library.Churchill_1977(reynolds, roughness), rel=1e-3
    )
    assert friction.prandtl_karman(1e5) == pytest.approx(
        library.Prandtl_von_Karman_Nikuradse(1e5), rel=2e-4
    )


def test_colebrook_against_scipy():
    # the closed form p = c omega(a/c - ln c) with scipy's Wright omega
    from scipy.special import wrightomega

    rng = np.random.default_rng(25)
    re, rr = 10.0 ** rng.uniform(3.7, 8.0, 4000), 10.0 ** rng.uniform(-9.0, -1.4, 4000)
    a, c = rr / 3.7, 2.0 * 2.51 / (re * np.log(10.0))
    x = -2.0 * np.log10(c * wrightomega(a / c - np.log(c)))
    np.testing.assert_allclose(friction.colebrook(re, rr), x**-2.0, rtol=3e-15)


# --- published readings ---------------------------------------------------------------------------


def test_handbook_head_losses():
    # Hydraulic Institute, Engineering Data Book, 2nd ed. 1990: water, Schedule 40 steel pipe;
    # printed to 2 to 4 digits. g = 32.17 ft/s2, 448.831 gpm = 1 ft3/s, nu = 1.2156e-5 ft2/s.
    inches, gpm, loss = columns(
        "friction_handbook_hi.csv", "inside_diameter_in", "flow_gpm", "hf_ft_per_100ft"
    )
    diameter = inches / 12.0
    velocity = gpm / 448.831 / (np.pi / 4.0 * diameter**2)
    f = friction.colebrook(velocity * diameter / 1.2156e-5, 0.00015 / diameter)
    deviation = 100.0 * f / diameter * velocity**2 / (2.0 * 32.17) / loss - 1.0
    assert loss.size == 58
    assert abs(deviation).max() < 0.009
    assert abs(deviation.mean()) < 0.001


def test_superpipe_readings():
    # Princeton Superpipe profiles, McKeon et al. 2004 (J. Fluid Mech. 501), friction derived
    re, f = columns("friction_superpipe.csv", "re_d", "darcy_friction")
    high = re > 2e5
    for function, band in (
        (friction.mckeon, 0.008),
        (friction.mckeon_general, 0.008),
        (friction.prandtl_karman, 0.03),
    ):
        assert abs(quiet(function, re[high]) / f[high] - 1.0).max() < band
    assert abs(quiet(friction.mckeon_general, re) / f - 1.0)[re > 2e4].max() < 0.015


def test_oregon_readings():
    # Swanson et al. 2002, tabulated by McKeon et al. 2004 (J. Fluid Mech. 511); one reading, at
    # Re 40850, lies 4.6 % low
    re, f = columns("friction_oregon.csv", "re", "darcy_friction")
    high = re > 4000.0
    deviation = abs(f / quiet(friction.prandtl_karman, np.maximum(re, 100.0)) - 1.0)[high]
    assert (deviation > 0.04).sum() <= 1
    assert deviation.max() < 0.047
    laminar = (re > 200.0) & (re < 800.0)  # these readings climb away from 64/Re at higher Re
    assert abs(f / quiet(friction.laminar, re) - 1.0)[laminar].max() < 0.06


def test_stanton_pannell_readings():
    # Stanton and Pannell 1914
    re, f = columns("friction_stanton_pannell_1914.csv", "re", "darcy_friction")
    high, low = re > 4000.0, re < 2000.0
    deviation = f[high] / friction.prandtl_karman(re[high]) - 1.0
    assert abs(deviation.mean()) < 0.02
    assert deviation.std() < 0.025
    assert abs((f[low] / friction.laminar(re[low])).mean() - 1.0) < 0.02


def test_pipe_simulations():
    # direct simulations: Yao et al. 2023, Loulou et al. 1997
    re, f = columns("pipe_dns_bulk.csv", "re_d", "darcy_friction")
    assert abs(friction.prandtl_karman(re) / f - 1.0).max() < 0.02
    assert abs(quiet(friction.mckeon, re[:2]) / f[:2] - 1.0).max() < 0.025


def test_channel_simulations():
    # direct simulations: Lee and Moser 2015, and Coleman's at Re_tau 392
    half, cf, bulk, centre = columns(
        "channel_dns_bulk.csv", "re_b_half", "cf", "ub_plus", "uc_plus"
    )
    gap = 2.0 * half
    with record():
        assert abs(friction.dean(gap) / cf - 1.0).max() < 0.055
        assert abs(friction.zanoun(gap) / cf - 1.0).max() < 0.06
        assert abs(friction.dean_velocity_ratio(gap) * bulk / centre - 1.0).max() < 0.006


# Dean 1978 (formula from memory) at the Reynolds numbers of the simulations of Lee and Moser 2015
# and Coleman, 6 digits by mpmath
@pytest.mark.parametrize(
    ("gap_reynolds", "expected"),
    [(5714.29, 0.00839619), (13749.8, 0.00674138), (40000.0, 0.00516188), (250000.0, 0.00326466)],
)
def test_dean_values(gap_reynolds, expected):
    assert quiet(friction.dean, gap_reynolds) == pytest.approx(expected, abs=5e-9)


def test_sheet_metal_ducts():
    # Huebscher 1947: hydraulic-diameter concept, round and square ducts against the smooth law
    table = rows("friction_ducts_huebscher_1947.csv")
    for duct, mean in (("round", 0.013), ("square", -0.015)):
        re = np.array([float(row["re"]) for row in table if row["duct"] == duct])
        f = np.array([float(row["darcy_friction"]) for row in table if row["duct"] == duct])
        assert (f / friction.prandtl_karman(re) - 1.0).mean() == pytest.approx(mean, abs=1e-3)


# --- identities, limits, monotony -----------------------------------------------------------------


@given(st.floats(3.5, 8.0), st.floats(1e-4, 3.0), st.floats(0.0, 0.05))
@SETTINGS
def test_friction_falls_with_the_reynolds_number(log_re, step, roughness):
    re = 10.0 ** np.array([log_re, log_re + step])
    for function in SMOOTH:
        first, second = quiet(function, re)
        assert second < first
    first, second = quiet(friction.colebrook, re, roughness)
    assert second <= first


@given(st.floats(3.7, 12.0), st.floats(1e-6, 0.05), st.floats(1e-3, 1.0))
@SETTINGS
def test_friction_rises_with_roughness(log_re, roughness, step):
    rr = np.array([roughness, roughness * (1.0 + step)])
    for function in ROUGH:
        first, second = quiet(function, 10.0**log_re, rr)
        assert second >= first
    first, second = quiet(friction.nikuradse_rough, rr)
    assert second >= first


@given(st.floats(1e-6, 0.5))
@SETTINGS
def test_rough_limit(roughness):
    limit = (2.0 * np.log10(3.7 / roughness)) ** -2.0
    assert quiet(friction.colebrook, 1e30, roughness) == pytest.approx(limit, rel=1e-13)


@given(st.floats(3.7, 12.0))
@SETTINGS
def test_smooth_limit(log_re):
    re = 10.0**log_re
    smooth = quiet(friction.colebrook, re)
    assert quiet(friction.colebrook, re, 1e-30) == smooth
    # 2 log10 2.51 = 0.79935 against 0.8: 1e-4
    assert smooth == pytest.approx(quiet(friction.prandtl_karman, re), rel=3e-4)


@given(st.floats(3.0, 12.0), st.floats(0.0, 0.1))
@SETTINGS
def test_explicit_forms_of_colebrook(log_re, roughness):
    re = 10.0**log_re
    f = quiet(friction.colebrook, re, roughness)
    root = re * np.sqrt(f)
    known_gradient = quiet(friction.colebrook_from_friction_reynolds, root, roughness)
    known_stress = quiet(friction.colebrook_from_friction_velocity, root / np.sqrt(8.0), roughness)
    assert known_gradient == pytest.approx(f, rel=3e-15)
    assert known_stress == pytest.approx(f, rel=3e-15)


@pytest.mark.parametrize("roughness", [0.0, 1e-6, 1e-3, 0.05])
def test_colebrook_has_no_step_where_it_takes_one_more(roughness):
    # neighbouring doubles: the law itself changes by far less than one unit of rounding each
    re = 2300.0 + np.arange(-5000, 5001) * np.spacing(2300.0)
    f = quiet(friction.colebrook, re, roughness)
    assert np.diff(f).max() <= 2.0 * np.spacing(f.max())
    sorted_points = quiet(friction.colebrook, np.geomspace(100.0, 1e12, 100_000), roughness)
    assert np.diff(sorted_points).max() <= 2.0 * np.spacing(sorted_points[-1])


def test_approximations_of_colebrook_within_the_stated_share():
    re, rr = np.meshgrid(
        10.0 ** np.linspace(3.70, 8.0, 120), [0.0, *10.0 ** np.linspace(-6, -2, 40)]
    )
    exact = friction.colebrook(re, rr)
    assert abs(friction.haaland(re, rr) / exact - 1.0).max() < 0.015
    assert abs(friction.swamee_jain(re, rr) / exact - 1.0).max() < 0.03


def test_churchill_joins_the_regimes():
    assert friction.churchill(100.0) == pytest.approx(0.64, rel=1e-12)
    assert friction.churchill(1e7, 1e-3) == pytest.approx(friction.swamee_jain(1e7, 1e-3), rel=2e-3)


@given(st.floats(0.0, 1e300))
@SETTINGS
def test_fanning_is_a_quarter_to_the_last_bit(value):
    assert friction.darcy_from_fanning(friction.fanning_from_darcy(4.0 * value)) == 4.0 * value
    assert friction.fanning_from_darcy(4.0 * value) == value


# --- shapes, one evaluation path, errors and warnings ---------------------------------------------


@pytest.mark.parametrize("function", [*ROUGH, friction.colebrook_from_friction_reynolds])
def test_one_case_and_many_give_the_same_bits(function):
    rng = np.random.default_rng(26)
    re = 10.0 ** rng.uniform(2.5, 9.0, BLOCK + 1000)
    rr = 10.0 ** rng.uniform(-9.0, -1.0, re.size)
    whole = quiet(function, re, rr)
    for i in [0, 1, BLOCK - 1, BLOCK, BLOCK + 999]:
        assert quiet(function, float(re[i]), float(rr[i])) == whole[i]
    assert (quiet(function, re[7:999], rr[7:999]) == whole[7:999]).all()


@pytest.mark.parametrize("function", TURBULENT, ids=lambda f: f.__name__)
def test_shapes(function):
    assert isinstance(quiet(function, 2e4), float)
    assert quiet(function, [[1e5, 2e5, 3e5]]).shape == (1, 3)
    assert quiet(function, np.empty((0, 2))).shape == (0, 2)


@pytest.mark.parametrize("function", [friction.colebrook, friction.haaland])
def test_broadcasting(function):
    assert function([[1e4], [1e5]], [0.0, 1e-4, 1e-3]).shape == (2, 3)


@pytest.mark.parametrize("function", TURBULENT, ids=lambda f: f.__name__)
@pytest.mark.parametrize("bad", [0.0, -1.0, 99.0, np.nan, np.inf, [1e5, -3.0]])
def test_impossible_reynolds_numbers_are_refused(function, bad):
    with pytest.raises(InputError, match="reynolds"):
        function(bad)


@pytest.mark.parametrize("function", ROUGH, ids=lambda f: f.__name__)
@pytest.mark.parametrize("bad", [-1e-9, 0.51, np.nan])
def test_impossible_roughness_is_refused(function, bad):
    with pytest.raises(InputError, match="relative_roughness"):
        function(1e5, bad)


@pytest.mark.parametrize("bad", [0.0, -1.0, np.nan])
def test_other_impossible_input_is_refused(bad):
    for function in (friction.laminar, friction.churchill, friction.nikuradse_rough):
        with pytest.raises(InputError):
            function(bad)
    for function in (
        friction.colebrook_from_friction_reynolds,
        friction.colebrook_from_friction_velocity,
    ):
        with pytest.raises(InputError, match="friction_reynolds"):
            function(bad)
    with pytest.raises(InputError):
        friction.fanning_from_darcy(bad - 1e-3)
    with pytest.raises(InputError):
        friction.darcy_from_fanning(bad - 1e-3)


@pytest.mark.parametrize(
    ("function", "outside"),
    [
        (friction.laminar, 2301.0),
        (friction.blasius, 1.01e5),
        (friction.prandtl_karman, 3.9e3),
        (friction.zagarola_smits, 9e4),
        (friction.mckeon, 2.9e5),
        (friction.mckeon_general, 3.6e7),
        (friction.pirozzoli_2021, 2.9e5),
        (friction.colebrook, 2300.0),
        (friction.haaland, 1.1e8),
        (friction.swamee_jain, 4.9e3),
        (friction.churchill, 1.1e8),
        (friction.nikuradse_rough, 0.04),
        (friction.dean, 5e3),
        (friction.zanoun, 7e5),
        (friction.dean_velocity_ratio, 7e5),
    ],
)
def test_outside_the_range_of_the_source_warns(function, outside):
    with pytest.warns(RangeWarning):
        function(outside)


def test_range_warning_points_at_the_caller():
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always")
        friction.mckeon(1e5)
    assert caught[0].filename == __file__
