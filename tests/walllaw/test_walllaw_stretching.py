"""Two-sided stretchings: end spacings, symmetry, order."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw.errors import InputError
from walllaw.stretching import tanh_two_sided, vinokur


@given(st.integers(5, 400), st.floats(-9, -0.1))
@settings(derandomize=True, deadline=None, max_examples=200)
def test_tanh_meets_its_first_spacing(count, share):
    first = 10.0**share / (count - 1)
    p = tanh_two_sided(count, first)
    assert p.size == count
    assert p[0] == 0.0
    assert p[-1] == 1.0
    assert p[1] == pytest.approx(first, rel=1e-9)
    assert np.all(np.diff(p) > 0)
    assert np.allclose(p + p[::-1], 1, atol=1e-15)


@given(st.floats(-4, -1.5), st.floats(-4, -1.5))
@settings(derandomize=True, deadline=None, max_examples=200)
def test_vinokur_meets_both_slopes(log_first, log_last):
    """Its definition: ds/dt = (count-1) x spacing at both ends; here by differences, many points."""
    first, last, count = 10.0**log_first, 10.0**log_last, 101
    coarse = vinokur(count, first, last)
    assert np.all(np.diff(coarse) > 0)
    fine = 2000
    p = vinokur((count - 1) * fine + 1, first / fine, last / fine)
    assert p[1] * fine == pytest.approx(first, rel=2e-2)
    assert (1 - p[-2]) * fine == pytest.approx(last, rel=2e-2)


def test_uniform_is_a_special_case():
    assert np.allclose(vinokur(51, 0.02, 0.02), np.linspace(0, 1, 51), atol=1e-9)


@pytest.mark.parametrize(
    "call",
    [lambda: tanh_two_sided(2, 0.1), lambda: tanh_two_sided(11, 0.1), lambda: tanh_two_sided(11, 0.0),
     lambda: tanh_two_sided(11, float("nan")), lambda: tanh_two_sided(10.5, 0.01),
     lambda: vinokur(11, 0.0, 0.1), lambda: vinokur(11, 0.1, 1.5), lambda: vinokur(True, 0.1, 0.1)],
)  # fmt: skip
def test_what_cannot_be(call):
    with pytest.raises(InputError):
        call()
