"""Annuli and Couette-Poiseuille flow: exact laminar flow, one-wall limits, measured radii."""

from __future__ import annotations

import warnings

import numpy as np
import pytest

from walllaw import developed, ducts
from walllaw.errors import InputError, RangeWarning
from walllaw.two_wall_flow import annulus_flow, couette_poiseuille_flow

PIPE = {"mixing_length": "cess", "kappa": 0.421, "A_plus": 27.316}


@pytest.fixture(autouse=True)
def _quiet():
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", RangeWarning)
        yield


@pytest.mark.parametrize("ratio", [0.01, 0.1, 0.5, 0.9, 0.999])
def test_laminar_annulus_is_exact(ratio):
    flow = annulus_flow(ratio, reynolds=500.0, mixing_length="laminar")
    # Shah and London 1978: zero stress at r_m^2 = (1 - r^2)/(2 ln 1/r)
    exact = np.sqrt((1.0 - ratio) * (1.0 + ratio) / (2.0 * np.log(1.0 / ratio)))
    assert flow.zero_stress_radius == pytest.approx(exact, rel=1e-12)
    passage = ducts.annulus(ratio, 1.0)
    assert flow.darcy_friction * 500.0 == pytest.approx(passage.laminar_constant, rel=1e-11)


# 4-digit values of the same equations computed independently with mpmath
@pytest.mark.parametrize(
    ("ratio", "reynolds", "radius", "darcy", "stress"),
    [(0.5, 1e5, 0.720793, 0.018470, 1.1220), (0.5, 1e6, 0.718683, 0.011979, None),
     (0.1, 1e5, 0.379072, 0.018283, 1.5613), (0.1, 1e6, 0.366852, 0.011860, None)],
)  # fmt: skip
def test_turbulent_annulus(ratio, reynolds, radius, darcy, stress):
    flow = annulus_flow(ratio, reynolds=reynolds, **PIPE)
    assert flow.zero_stress_radius == pytest.approx(radius, abs=6e-7)
    assert flow.darcy_friction == pytest.approx(darcy, abs=6e-7)
    assert flow.reynolds == pytest.approx(reynolds, rel=1e-11)
    if stress:
        assert flow.stress_ratio == pytest.approx(stress, abs=6e-5)


@pytest.mark.parametrize("ratio", [0.1, 0.3, 0.5])
def test_zero_stress_radius_lies_in_the_measured_band(ratio):
    # (r_m - r_i)/(r_o - r_m) = (r_i/r_o)^n: n = 0.343 (Kays and Leung 1963) to 0.386 (Rehme 1974)
    flow = annulus_flow(ratio, reynolds=3e5, **PIPE)
    r = flow.zero_stress_radius
    n = np.log((r - ratio) / (1.0 - r)) / np.log(ratio)
    assert 0.335 < n < 0.39


def test_a_thin_annulus_is_a_channel():
    thin = annulus_flow(0.999, re_tau=2000.0, mixing_length="nikuradse")
    channel = developed("channel", re_tau=2000.0)
    assert thin.bulk_u_plus == pytest.approx(channel.bulk_u_plus, rel=1e-5)
    assert thin.stress_ratio == pytest.approx(1.0, abs=1e-3)


def test_annuli_one_by_one_and_together():
    ratio, re = np.array([[0.2], [0.6]]), np.array([1e5, 1e6, 1e7])
    many = annulus_flow(ratio, reynolds=re)
    assert many.darcy_friction.shape == (2, 3)
    assert annulus_flow(0.6, reynolds=1e6).darcy_friction == many.darcy_friction[1, 1]
    assert np.all(np.diff(many.darcy_friction, axis=1) < 0.0)
    assert np.all(many.peak_ratio > 1.0)


@pytest.mark.parametrize("re_tau", [1.0, 180.0, 1e4, 1e7])
@pytest.mark.parametrize("length", ["nikuradse", "linear", "cess", "escudier", "laminar"])
def test_ends_of_the_family(re_tau, length):
    still = couette_poiseuille_flow(re_tau, -1.0, mixing_length=length)
    channel = developed("channel", re_tau=re_tau, mixing_length=length)
    assert still.bulk_u_plus == pytest.approx(channel.bulk_u_plus, rel=2e-12)
    assert abs(still.wall_u_plus) < 1e-11 * channel.centreline_u_plus
    moving = couette_poiseuille_flow(re_tau, 1.0, mixing_length="linear")
    couette = developed("couette", re_tau=re_tau, mixing_length="linear")
    assert moving.wall_u_plus == pytest.approx(2.0 * couette.centreline_u_plus, rel=1e-13)
    assert moving.bulk_u_plus == pytest.approx(couette.bulk_u_plus, rel=1e-12)


@pytest.mark.parametrize("ratio", [-0.9, -0.4, -0.01, 0.05, 0.3, 0.8])
def test_laminar_couette_poiseuille_is_exact(ratio):
    # U+ = Re_tau (e - (1 - s) e^2/4), e = y/h from 0 to 2
    flow = couette_poiseuille_flow(50.0, ratio, mixing_length="laminar")
    assert flow.wall_u_plus == pytest.approx(50.0 * (2.0 - (1.0 - ratio)), rel=1e-12, abs=1e-10)
    assert flow.bulk_u_plus == pytest.approx(50.0 * (1.0 - (1.0 - ratio) / 3.0), rel=1e-12)
    assert flow.pressure_gradient_plus == pytest.approx(0.5 * (1.0 - ratio))


def test_the_moving_wall_speeds_up_with_its_stress():
    ratio = np.concatenate([np.linspace(-1.0, -0.002, 50), np.linspace(0.05, 1.0, 50)])
    speed = couette_poiseuille_flow(1000.0, ratio).wall_u_plus
    # the layers meet elsewhere once the stress changes sign: a jump there is stated
    assert np.all(np.diff(speed[:50]) > 0.0)
    assert np.all(np.diff(speed[50:]) > 0.0)


def test_laminar_annulus_profile_is_exact():
    ratio = 0.4
    p = annulus_flow(ratio, reynolds=500.0, mixing_length="laminar").profiles()
    r = ratio + (1.0 - ratio) * p["place"]
    # Shah and London 1978: u ~ 1 - r^2 + 2 r_m^2 ln r
    m2 = (1.0 - ratio**2) / (2.0 * np.log(1.0 / ratio))
    exact = 1.0 - r * r + 2.0 * m2 * np.log(r)
    mean = 0.5 * (1.0 + ratio**2 - 2.0 * m2)
    assert p["velocity"] == pytest.approx(exact / mean, abs=1e-11)
    stress = (m2 - r * r) / r / ((m2 - ratio**2) / ratio)
    assert p["stress"] == pytest.approx(stress, abs=1e-11)
    assert np.all(np.diff(p["place"]) >= 0.0)
    assert not p["nu_t"].any()


@pytest.mark.parametrize("ratio", [-0.6, 0.3])
def test_laminar_couette_poiseuille_profile_is_exact(ratio):
    flow = couette_poiseuille_flow(50.0, ratio, mixing_length="laminar")
    p = flow.profiles()
    e = 2.0 * p["place"]
    exact = 50.0 * (e - 0.25 * (1.0 - ratio) * e * e) / flow.bulk_u_plus
    assert p["velocity"] == pytest.approx(exact, abs=1e-11)
    assert p["stress"] == pytest.approx(1.0 - 0.5 * (1.0 - ratio) * e, abs=1e-12)


@pytest.mark.parametrize("flow", [
    annulus_flow(0.3, reynolds=2e5, relative_roughness=1e-3, **PIPE),
    couette_poiseuille_flow(3000.0, [-0.5, 0.5], relative_roughness=1e-3),
])  # fmt: skip
def test_profiles_carry_the_flow_and_join(flow):
    p = flow.profiles()
    weight = 1.0
    if hasattr(flow, "radius_ratio"):
        r = flow.radius_ratio + (1.0 - flow.radius_ratio) * p["place"]
        weight = 2.0 * r / (1.0 + flow.radius_ratio)
    assert np.trapezoid(weight * p["velocity"], p["place"]) == pytest.approx(1.0, abs=3e-3)
    # no jump where the layers meet
    assert np.max(np.abs(np.diff(p["velocity"], axis=-1))) < 0.12


def test_rough_annulus_and_gap_against_one_wall_flows():
    thin = annulus_flow(0.999, re_tau=2e4, relative_roughness=1e-3, mixing_length="nikuradse")
    channel = developed("channel", re_tau=2e4, relative_roughness=1e-3)
    assert thin.bulk_u_plus == pytest.approx(channel.bulk_u_plus, rel=1e-5)
    still = couette_poiseuille_flow(2e4, -1.0, relative_roughness=1e-3, mixing_length="nikuradse")
    assert still.bulk_u_plus == pytest.approx(channel.bulk_u_plus, rel=1e-11)
    couette = developed("couette", re_tau=2e4, relative_roughness=1e-3, mixing_length="linear")
    moving = couette_poiseuille_flow(2e4, 1.0, relative_roughness=1e-3)
    assert moving.bulk_u_plus == pytest.approx(couette.bulk_u_plus, rel=1e-11)
    smooth = annulus_flow(0.5, reynolds=1e6, **PIPE)
    rough = annulus_flow(0.5, reynolds=1e6, relative_roughness=[0.0, 1e-5, 1e-3], **PIPE)
    assert rough.darcy_friction[0] == smooth.darcy_friction
    assert np.all(np.diff(rough.darcy_friction) > 0.0)


@pytest.mark.parametrize(
    ("function", "arguments", "field"),
    [(annulus_flow, {"radius_ratio": 1.0, "reynolds": 1e5}, "radius_ratio"),
     (annulus_flow, {"radius_ratio": 0.5}, "reynolds"),
     (annulus_flow, {"radius_ratio": 0.5, "reynolds": 1e5, "mixing_length": "ces"}, "cess"),
     (annulus_flow, {"radius_ratio": np.nan, "reynolds": 1e5}, "radius_ratio"),
     (couette_poiseuille_flow, {"re_tau": 100.0, "stress_ratio": 0.0}, "stress_ratio"),
     (couette_poiseuille_flow, {"re_tau": 100.0, "stress_ratio": 2.0}, "stress_ratio"),
     (couette_poiseuille_flow, {"re_tau": -1.0, "stress_ratio": 1.0}, "re_tau")],
)  # fmt: skip
def test_wrong_arguments(function, arguments, field):
    with pytest.raises(InputError, match=field):
        function(**arguments)
