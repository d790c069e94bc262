"""Inlet values: every closure, the transition correlation, one-quantity closures."""

from __future__ import annotations

import numpy as np
import pytest

import closures
from closures.closure_list import closure_heads
from closures.closure_tables import closure
from closures.transition import onset_momentum_reynolds
from walllaw.errors import InputError

STATE = {"velocity": 40.0, "intensity": 0.05, "mixing_length": 0.021, "kinematic_viscosity": 1.5e-5}


@pytest.mark.parametrize("id_", [h["id"] for h in closure_heads() if h["variables"]])
def test_every_closure_has_its_own_set(id_):
    i = closures.inlet(id_, **STATE)
    c = closure(id_)
    flat = [v for v in c.variables if v not in ("f", "reynolds_stresses")]
    assert set(flat) <= set(i.set)
    assert all(np.isfinite(v) and v >= 0 for v in i.set.values())
    assert id_ in repr(i)


@pytest.mark.parametrize("id_", [h["id"] for h in closure_heads() if h["variables"]])
def test_the_set_returns_the_eddy_viscosity_of_the_state(id_):
    """nu_t computed from the closure's own variables, by its own definition, is the state's nu_t."""
    i = closures.inlet(id_, **STATE)
    c, s, nu = closure(id_), i.set, STATE["kinematic_viscosity"]
    if "omega" in s and "turbulent_k" not in s:
        k = s.get("k", 0.5 * (s.get("uu", 0) + s.get("vv", 0) + s.get("ww", 0)))
        nu_t = k / s["omega"]
    elif "v2" in s:
        nu_t = c["C_mu"] * s["v2"] * s["k"] / s["epsilon"]
    elif "zeta" in s:
        nu_t = c["C_mu"] * s["zeta"] * s["k"] ** 2 / s["epsilon"]
    elif "tau" in s:
        nu_t = c["C_mu"] * s["k"] * s["tau"]
    elif "R" in s:
        nu_t = c["C_mu"] * s["R"]
    elif "nu_tilde" in s and "c_v1" in c.coefficients:
        chi = s["nu_tilde"] / nu
        nu_t = s["nu_tilde"] * chi**3 / (chi**3 + c["c_v1"] ** 3)
    elif "nu_tilde" in s:
        x = s["nu_tilde"] / (c["A_plus"] * c["kappa"] * nu)
        nu_t = s["nu_tilde"] * (1 - np.exp(-(x**2)))
    elif "turbulent_k" in s:
        nu_t = s["turbulent_k"] / s["omega"]
    elif {"epsilon", "epsilon_tilde"} & set(s):
        k = s.get("k", 0.5 * (s.get("uu", 0) + s.get("vv", 0) + s.get("ww", 0)))
        nu_t = c.C_mu * k**2 / s.get("epsilon", s.get("epsilon_tilde"))
    else:  # k alone: the length is prescribed, the state keeps it
        nu_t = i.nu_t
    assert nu_t == pytest.approx(i.nu_t, rel=1e-12)


def test_k_is_exactly_six():
    # k = 3/2 (0.05 x 40)^2
    assert closures.inlet("sst", **STATE).set["k"] == pytest.approx(6.0, rel=1e-15)


# NASA Turbulence Modeling Resource (2025): farfield nu_tilde/nu 3 and 5 -> nu_t/nu
@pytest.mark.parametrize(("chi", "ratio"), [(3.0, 0.210438), (5.0, 1.294234)])
def test_spalart_allmaras_from_its_own_variable(chi, ratio):
    i = closures.inlet("sa", kinematic_viscosity=1.5e-5, nu_tilde=chi * 1.5e-5)
    assert i.viscosity_ratio == pytest.approx(ratio, abs=5e-7)
    assert i.set == {"nu_tilde": chi * 1.5e-5}


# NASA Turbulence Modeling Resource (2025), Langtry-Menter page: correlation values recomputed there
# from the printed coefficients; Tu in per cent -> Re_theta_t
@pytest.mark.parametrize(
    ("percent", "onset"),
    [(0.027, 1458.830012), (0.1, 1136.527200), (0.5, 879.674400), (1.0, 584.301600),
     (1.3, 407.383541), (2, 260.254598), (3, 182.489753), (6, 106.465165)],
)  # fmt: skip
def test_onset_of_transition(percent, onset):
    assert onset_momentum_reynolds(percent / 100) == pytest.approx(onset, abs=5e-7)


def test_onset_is_at_least_twenty_and_below_the_minimum_intensity_constant():
    assert onset_momentum_reynolds(1.0) >= 20
    assert onset_momentum_reynolds(1e-6) == onset_momentum_reynolds(0.00027)


def test_arrays_and_shapes():
    i = closures.inlet("realizable", velocity=[10.0, 20.0], intensity=0.05, viscosity_ratio=10.0,
                       kinematic_viscosity=1e-6)  # fmt: skip
    assert i.set["k"].shape == (2,)
    assert i.set["k"].tolist() == [0.375, 1.5]


def test_algebraic_closures_need_nothing():
    i = closures.inlet("mixing-length", **STATE)
    assert i.set == {}
    assert "transports nothing" in i.notes[0]


@pytest.mark.parametrize(
    ("name", "arguments", "words"),
    [
        ("sst", {"viscosity_ratio": 1.0, "kinematic_viscosity": 1e-5}, "exactly two"),
        ("sa", {"k": 1.0, "kinematic_viscosity": 1e-5}, "viscosity_ratio"),
        ("sa", {"viscosity_ratio": 1.0}, "kinematic_viscosity"),
        ("sa", {"k": 1.0, "epsilon": 1.0}, "kinematic_viscosity"),
        ("gamma-re-theta", {"k": 1.0, "omega": 1.0}, "velocity"),
        ("sst", {"k": 1.0, "length_scale": 1.0}, "convention"),
    ],
)
def test_what_is_missing_is_named(name, arguments, words):
    with pytest.raises(InputError, match=words):
        closures.inlet(name, **arguments)
