"""The interpolated family against the solutions it is made from."""

from __future__ import annotations

import warnings

import numpy as np
import pytest

from walllaw import FlowFamily, developed
from walllaw.errors import InputError, RangeWarning

CLOSINGS = [
    ("pipe", {"mixing_length": "cess", "kappa": 0.421, "A_plus": 27.316}),
    ("pipe", {"mixing_length": "laminar"}),
    ("channel", {"mixing_length": "escudier"}),
    ("channel", {"damping": "van-driest"}),
    ("couette", {"mixing_length": "linear", "kappa": 0.384, "A_plus": 21.62}),
]


@pytest.fixture(autouse=True)
def _quiet():
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", RangeWarning)
        yield


@pytest.mark.parametrize(("geometry", "closing"), CLOSINGS)
def test_the_family_meets_the_solutions(geometry, closing):
    rng = np.random.default_rng(0)
    family = FlowFamily(geometry, **closing)
    re_tau = np.concatenate([[2.0, 1e9], 10.0 ** rng.uniform(0.31, 9.0, 1000)])
    exact = developed(geometry, re_tau=re_tau, **closing).bulk_u_plus
    np.testing.assert_allclose(family.bulk_u_plus(re_tau), exact, rtol=1e-12)
    re = 10.0 ** rng.uniform(1.3, 10.8, 300)
    exact = developed(geometry, reynolds=re, **closing).darcy_friction
    np.testing.assert_allclose(family.darcy_friction(re), exact, rtol=1e-12)


def test_one_point_and_many_give_the_same_bits():
    family = FlowFamily()
    re = np.geomspace(1e4, 1e9, 40_000)
    many = family.darcy_friction(re)
    for i in (0, 16383, 16384, 39_999):
        assert family.darcy_friction(float(re[i])) == many[i]
    assert isinstance(family.darcy_friction(1e5), float)
    assert np.all(np.diff(many) < 0.0)


@pytest.mark.parametrize("value", [1.0, 2e9, np.nan, -5.0])
def test_outside_the_curve_is_refused(value):
    with pytest.raises(InputError, match="re_tau"):
        FlowFamily().bulk_u_plus(value)


def test_wrong_names():
    with pytest.raises(InputError, match="geometry"):
        FlowFamily("tube")
    with pytest.raises(InputError, match="reynolds"):
        FlowFamily().darcy_friction(1e13)
