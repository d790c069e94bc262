"""First cells and layer stacks: published grids, 50-digit references, round trips, refusals."""

from __future__ import annotations

import csv
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from walllaw import spacing
from walllaw.errors import InputError

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


STACKS = rows("layer_stack_values.csv")


def ulp(value: float, exact) -> float:
    return float(abs(mpmath.mpf(value) - exact) / mpmath.mpf(float(np.spacing(float(exact)))))


def exact_sum(growth: float, count: float):
    g, n = mpmath.mpf(growth), mpmath.mpf(count)
    return n if g == 1 else (g**n - 1) / (g - 1)


def close(value: float, digits: int):
    """A printed value: half a unit of its last digit, with the same again for rounded inputs."""
    return pytest.approx(value, rel=10.0 ** (1 - digits))


# --- published and printed values -----------------------------------------------------------------


@pytest.mark.parametrize("row", STACKS)
def test_each_number_of_a_stack_from_the_others(row):
    first, growth, count, total = (float(row[k]) for k in ("first", "growth", "count", "total"))
    digits = int(row["digits"])
    assert spacing.layer_growth(first, total, count) == close(growth, digits)
    # a rounded growth enters the total to the power of the count
    slack = 10.0 ** (1 - digits) * count
    assert spacing.layer_total(first, growth, count) == pytest.approx(total, rel=slack)
    assert spacing.layer_first(total, growth, count) == pytest.approx(first, rel=slack)
    assert spacing.layer_count(first, growth, total) == pytest.approx(count, rel=slack)


# Flat-plate grid of the NASA Turbulence Modeling Resource: spacing 0.5e-6, 96 layers, 0.99917 high
def test_growth_of_the_flat_plate_grid():
    assert spacing.layer_growth(0.5e-6, 0.99917, 96) == pytest.approx(1.13952, abs=1e-5)


# last layer of 30 layers from 1e-5 with 1.2: 1.2^29 in exact arithmetic
def test_last_layer():
    assert spacing.layer_last(1e-5, 1.2, 30) == pytest.approx(0.0019781359483314, rel=1e-13)


# NASA Turbulence Modeling Resource, effect of the minimum spacing: unit Reynolds number 5e6,
# c_f = 0.002683; printed y+ .09 .19 .37 .74 1.5 2.9 5.9
def test_y_plus_of_the_minimum_spacing_study():
    spacings = 0.5e-6 * 2.0 ** np.arange(7)
    y_plus = spacing.y_plus(spacings, np.sqrt(0.002683 / 2), 1 / 5e6)
    assert y_plus == pytest.approx([0.09, 0.19, 0.37, 0.74, 1.5, 2.9, 5.9], rel=0.04)
    assert y_plus == pytest.approx([0.0916, 0.183, 0.366, 0.733, 1.465, 2.93, 5.86], rel=1e-3)


# Air plate, U = 40 m/s, nu = 1.5e-5, c_f = 0.455/ln^2(0.06 Re_x) at Re_x = 2.6667e6; 30 digits
def test_first_cell_of_an_air_plate():
    u_tau = 40 * np.sqrt(0.00316873132859 / 2)
    assert u_tau == pytest.approx(1.59216364199, rel=1e-11)
    assert spacing.first_cell_centre(1.0, u_tau, 1.5e-5) == pytest.approx(9.42114215e-6, rel=1e-9)
    assert spacing.first_cell_height(1.0, u_tau, 1.5e-5) == pytest.approx(1.88422843e-5, rel=1e-9)


# DPW-4 gridding guidelines (2008): y+ about 1, 2/3, 4/9, 8/27 from coarse to extra-fine
def test_grid_family_of_the_drag_prediction_workshop():
    family = spacing.grid_family(2e-6, 1.25, 40)
    assert family.first / 2e-6 == pytest.approx([1, 2 / 3, 4 / 9, 8 / 27], rel=1e-15)
    assert family.total == pytest.approx(np.full(4, family.total[0]), rel=1e-15)
    assert family.count.tolist() == [40, 60, 90, 135]
    assert (np.diff(family.growth) < 0).all()
    assert spacing.layer_total(family.first, family.growth, family.count) == pytest.approx(
        family.total, rel=1e-13
    )


# --- 50 digits ------------------------------------------------------------------------------------


def stacks(seed: int, size: int) -> tuple[np.ndarray, np.ndarray, np.ndarray]:
    rng = np.random.default_rng(seed)
    near = 1 + rng.choice([-1, 1], size) * 10 ** rng.uniform(-16, -1, size)
    growth = np.concatenate([rng.uniform(0.5, 2, size), near, [1.0, np.nextafter(1, 2)]])
    count = np.rint(10 ** rng.uniform(0, 3, growth.size))
    inside = count * np.abs(np.log(growth)) < 60
    first = 10 ** rng.uniform(-8, 0, growth.size)
    return first[inside], growth[inside], count[inside]


def test_total_and_first_are_within_4_ulp():
    first, growth, count = stacks(5, 2500)
    sums = [exact_sum(g, n) for g, n in zip(growth.tolist(), count.tolist(), strict=True)]
    total = spacing.layer_total(first, growth, count)
    back = spacing.layer_first(total, growth, count)
    for k, exact in enumerate(sums):
        assert ulp(float(total[k]), mpmath.mpf(float(first[k])) * exact) <= 4
        assert ulp(float(back[k]), mpmath.mpf(float(total[k])) / exact) <= 4


def exact_growth(first: float, total: float, count: float, start: float):
    """Root and condition of ln(g S_(n-1)(g)) = ln(H/h - 1) by Newton with 50 digits in ln g."""
    goal = mpmath.log((mpmath.mpf(total) - mpmath.mpf(first)) / mpmath.mpf(first))
    m, x = mpmath.mpf(count) - 1, mpmath.log(mpmath.mpf(start))
    for _ in range(3):
        if abs(x) * m < mpmath.mpf(10) ** -15:
            value, slope = mpmath.log(m) + x * (m - 1) / 2, (m - 1) / 2
        else:
            value = mpmath.log(mpmath.expm1(m * x) / mpmath.expm1(x))
            slope = m / (1 - mpmath.exp(-m * x)) - 1 / (1 - mpmath.exp(-x))
        x -= (x + value - goal) / (1 + slope)
    amplified = mpmath.mpf(total) / (mpmath.mpf(total) - mpmath.mpf(first))
    return mpmath.exp(x), float(amplified / (1 + slope))


def test_growth_is_within_2_ulp_times_condition():
    rng = np.random.default_rng(6)
    count = np.rint(2 * 10 ** rng.uniform(0, 5.7, 4000))
    rest = np.where(
        rng.random(4000) < 0.4,
        10 ** rng.uniform(-12, 30, 4000),
        count * 10 ** rng.uniform(-3, 4, 4000),
    )
    level = (count - 1) * (1 + rng.choice([-1, 1], 4000) * 10 ** rng.uniform(-13, -1, 4000))
    rest = np.where(np.arange(4000) % 4 == 0, level, rest)
    total = 1 + rest
    growth = spacing.layer_growth(1.0, total, count)
    for g, t, n in zip(growth.tolist(), total.tolist(), count.tolist(), strict=True):
        exact, condition = exact_growth(1.0, t, n, g)
        assert ulp(g, exact) <= 2 * (1 + condition)


def test_count_is_within_4_ulp_times_condition():
    rng = np.random.default_rng(7)
    growth = np.concatenate([rng.uniform(1.001, 2, 1500), 1 + 10 ** rng.uniform(-16, -2, 1500)])
    total = spacing.layer_total(1.0, growth, rng.uniform(1, 100, 3000))
    count = spacing.layer_count(1.0, growth, total)
    for n, g, t in zip(count.tolist(), growth.tolist(), total.tolist(), strict=True):
        x, h = mpmath.mpf(g) - 1, mpmath.mpf(t)
        exact = h if x == 0 else mpmath.log1p(x * h) / mpmath.log1p(x)
        condition = 1 if x == 0 else float(x * h / (1 + x * h) / mpmath.log1p(x) / exact)
        assert ulp(n, exact) <= 4 * (1 + condition)


# --- identities -----------------------------------------------------------------------------------


@SETTINGS
@given(st.floats(0.6, 2.0), st.integers(2, 200), st.floats(1e-9, 1.0))
def test_total_is_the_sum_of_the_layers(growth, count, first):
    heights = first * np.power(growth, np.arange(float(count)))
    assert spacing.layer_total(first, growth, count) == pytest.approx(heights.sum(), rel=1e-12)


@SETTINGS
@given(st.floats(0.8, 1.6), st.integers(2, 120), st.floats(1e-8, 1e-2))
def test_growth_and_count_round_trip(growth, count, first):
    total = spacing.layer_total(first, growth, count)
    # below growth 1 the last layers add little: total over first resolves the growth only so far
    assume(growth**count > 1e-3)
    assert spacing.layer_growth(first, total, count) == pytest.approx(growth, rel=1e-12)
    assert spacing.layer_count(first, growth, total) == pytest.approx(count, rel=1e-11)


@SETTINGS
@given(st.integers(2, 1000), st.floats(1e-3, 1e3))
def test_growth_passes_through_one_where_the_total_is_count_times_first(count, factor):
    growth = spacing.layer_growth(1.0, 1 + (count - 1) * factor, count)
    assert np.sign(growth - 1) == np.sign(factor - 1) or abs(factor - 1) < 1e-12


def test_growth_one_is_exact():
    assert spacing.layer_growth(2.0, 14.0, 7) == 1.0
    assert spacing.layer_total(2.0, 1.0, 7) == 14.0
    assert spacing.layer_first(14.0, 1.0, 7) == 2.0
    assert spacing.layer_count(2.0, 1.0, 14.0) == 7.0


def test_growth_rises_over_the_doubles_next_to_level_layers():
    total = 30 + np.arange(-40, 41) * np.spacing(30.0)
    growth = spacing.layer_growth(1.0, total, 30)
    assert (np.diff(growth) >= 0).all()
    assert growth[40] == 1.0


def test_one_stack_and_many_give_the_same_bits():
    total = np.geomspace(1e-4, 1e-1, 300)
    many = spacing.layer_growth(1e-5, total, 25)
    assert many.tolist() == [spacing.layer_growth(1e-5, t, 25) for t in total]


# --- whole stacks ---------------------------------------------------------------------------------

FULL = {"first": 1e-5, "growth": 1.2, "count": 30.0}
FULL["total"] = spacing.layer_total(**FULL)
FULL["last"] = spacing.layer_last(FULL["first"], FULL["growth"], FULL["count"])
TRIPLES = [
    (a, b, c)
    for i, a in enumerate(FULL)
    for j, b in enumerate(FULL)
    for k, c in enumerate(FULL)
    if i < j < k
]


@pytest.mark.parametrize("names", TRIPLES)
def test_any_three_numbers_give_the_same_stack(names):
    stack = spacing.layers(**{name: FULL[name] for name in names})
    for name, value in FULL.items():
        assert getattr(stack, name) == pytest.approx(value, rel=1e-10), name
    assert stack.exact_count == pytest.approx(30, rel=1e-10)


@pytest.mark.parametrize("names", TRIPLES)
def test_any_three_numbers_give_a_stack_of_shrinking_layers(names):
    full = {"first": 2e-3, "growth": 0.9, "count": 12.0}
    full["total"] = spacing.layer_total(**full)
    full["last"] = spacing.layer_last(2e-3, 0.9, 12.0)
    stack = spacing.layers(**{name: full[name] for name in names})
    for name, value in full.items():
        assert getattr(stack, name) == pytest.approx(value, rel=1e-9), name


# 1e-5, 1.2, 0.01 need 29.0876 layers: printed with 12 digits
@pytest.mark.parametrize(
    ("adjust", "kept"),
    [
        ("growth", ("first", "total")),
        ("first", ("growth", "total")),
        ("total", ("first", "growth")),
    ],
)
def test_a_rounded_count_changes_the_named_number_only(adjust, kept):
    given_values = {"first": 1e-5, "growth": 1.2, "total": 0.01}
    stack = spacing.layers(**given_values, adjust=adjust)
    assert stack.count == 30
    assert stack.exact_count == pytest.approx(29.0876460322, rel=1e-11)
    assert all(getattr(stack, name) == given_values[name] for name in kept)
    assert getattr(stack, adjust) != given_values[adjust]
    again = spacing.layer_total(stack.first, stack.growth, stack.count)
    assert again == pytest.approx(stack.total, rel=1e-13)


# Outer cell 2e-3 over 1e-5 at 1.2: N = 30.06029029; with 31 layers growth 1.19316635847 and
# total 0.0123020009 (mpmath)
def test_match_to_an_outer_cell():
    stack = spacing.layers(first=1e-5, growth=1.2, last=2e-3)
    assert stack.exact_count == pytest.approx(30.06029029, rel=1e-9)
    assert stack.count == 31
    assert stack.growth == pytest.approx(1.19316635847, rel=1e-11)
    assert stack.total == pytest.approx(0.0123020009, rel=1e-8)
    exact = spacing.layer_total(1e-5, 1.2, stack.exact_count)
    assert exact == pytest.approx(0.01195, rel=1e-10)


def test_level_layers_between_equal_ends():
    stack = spacing.layers(first=0.1, last=0.1, total=1.0)
    assert (stack.count, stack.growth) == (10, 1.0)


def test_arrays_give_arrays():
    stack = spacing.layers(first=[1e-5, 2e-5], growth=1.2, total=[[0.01], [0.02]])
    assert stack.count.shape == (2, 2)
    one = spacing.layers(first=2e-5, growth=1.2, total=0.02)
    assert stack.growth[1, 1] == one.growth


@pytest.mark.parametrize(
    ("values", "text"),
    [
        ({"first": 1.0, "growth": 1.2}, "exactly three"),
        ({"first": 1.0, "growth": 1.2, "count": 3, "total": 9.0}, "exactly three"),
        ({}, "got nothing"),
        ({"first": 1.0, "growth": 1.2, "count": 3.5}, "whole"),
        ({"first": 1.0, "growth": 1.2, "total": 0.5}, "total"),
        ({"first": 1.0, "growth": 0.5, "total": 2.5}, "growth"),
        ({"first": 1.0, "growth": 1.0, "last": 1.0}, "total instead"),
        ({"first": 1.0, "growth": 0.9, "last": 2.0}, "last"),
        ({"first": 1.0, "total": 1.5, "last": 1.0}, "total"),
        ({"growth": 1.5, "total": 9.0, "last": 2.0}, "total"),
        ({"first": 1.0, "count": 1, "total": 2.0}, "one layer"),
        ({"first": 1.0, "count": 1, "last": 2.0}, "one layer"),
        ({"first": 1.0, "count": 5, "total": 1.0}, "above that of one layer"),
        ({"first": -1.0, "growth": 1.2, "count": 3}, "first"),
        ({"first": 1.0, "growth": 2.0, "count": 5000}, "beyond double precision"),
        ({"first": 1.0, "growth": 1.2, "count": 3, "adjust": "first"}, "adjust"),
        ({"first": 1.0, "growth": 1.2, "total": 3.0, "adjust": "last"}, "adjust"),
    ],
)
def test_what_no_stack_can_be_is_refused(values, text):
    with pytest.raises(InputError, match=text):
        spacing.layers(**values)


def test_a_single_layer_is_a_stack():
    stack = spacing.layers(first=2.0, count=1, total=2.0)
    assert (stack.growth, stack.last) == (1.0, 2.0)


@pytest.mark.parametrize(
    ("call", "text"),
    [
        (lambda: spacing.layer_growth(1.0, 1.0, 4), "total"),
        (lambda: spacing.layer_growth(1.0, 2.0, 1), "count"),
        (lambda: spacing.layer_count(1.0, 0.5, 2.0), "growth"),
        (lambda: spacing.layer_first(1.0, 2.0, 2000), "beyond"),
        (lambda: spacing.first_cell_height(0.0, 1.0, 1e-5), "y_plus"),
        (lambda: spacing.grid_family(1e-5, 1.2, 30, levels=0), "levels"),
        (lambda: spacing.grid_family(1e-5, 1.2, 30, factor=10.0), "levels"),
        (lambda: spacing.grid_family(np.array([1e-5, 2e-5]), 1.2, 30), "single numbers"),
    ],
)
def test_other_refusals(call, text):
    with pytest.raises(InputError, match=text):
        call()
