"""State algebra against 50-digit arithmetic, worked values and identities."""

from __future__ import annotations

import itertools

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from closures.states import INPUTS, convert, dependence, state
from walllaw.errors import InputError

mpmath.mp.dps = 50
NU = 1.5e-5

# Exponents of k, epsilon and the constants, written down again from the definitions in
# S. B. Pope, Turbulent Flows (2000), ch. 5-6, and Launder & Spalding (1974): not the table's own.
DEFINITIONS = {
    "k": lambda k, e, c, cl, nu, u: k,
    "epsilon": lambda k, e, c, cl, nu, u: e,
    "omega": lambda k, e, c, cl, nu, u: e / (c * k),
    "nu_t": lambda k, e, c, cl, nu, u: c * k**2 / e,
    "viscosity_ratio": lambda k, e, c, cl, nu, u: c * k**2 / e / nu,
    "time_scale": lambda k, e, c, cl, nu, u: k / e,
    "mixing_length": lambda k, e, c, cl, nu, u: c ** mpmath.mpf("0.75") * k ** mpmath.mpf(1.5) / e,
    "eddy_viscosity_length": lambda k, e, c, cl, nu, u: c * k ** mpmath.mpf(1.5) / e,
    "dissipation_length": lambda k, e, c, cl, nu, u: k ** mpmath.mpf(1.5) / e,
    "integral_length": lambda k, e, c, cl, nu, u: cl * k ** mpmath.mpf(1.5) / e,
    "intensity": lambda k, e, c, cl, nu, u: mpmath.sqrt(2 * k / 3) / u,
    "kolmogorov_length": lambda k, e, c, cl, nu, u: (nu**3 / e) ** mpmath.mpf(0.25),
    "kolmogorov_time": lambda k, e, c, cl, nu, u: mpmath.sqrt(nu / e),
    "kolmogorov_velocity": lambda k, e, c, cl, nu, u: (nu * e) ** mpmath.mpf(0.25),
    "taylor_length": lambda k, e, c, cl, nu, u: mpmath.sqrt(10 * nu * k / e),
    "rms_velocity": lambda k, e, c, cl, nu, u: mpmath.sqrt(2 * k / 3),
    "re_lambda": lambda k, e, c, cl, nu, u: (
        mpmath.sqrt(2 * k / 3) * mpmath.sqrt(10 * nu * k / e) / nu
    ),
    "turbulence_reynolds": lambda k, e, c, cl, nu, u: k**2 / (nu * e),
}
PAIRS = [
    pair
    for pair in itertools.combinations([n for n in INPUTS if n != "nu_tilde"], 2)
    if dependence(*pair) is None
]


def exact(name, k, e, c=0.09, cl=0.43, nu=NU, u=40.0):
    return DEFINITIONS[name](*(mpmath.mpf(float(x)) for x in (k, e, c, cl, nu, u)))


def ulp(computed: float, reference) -> float:
    return float(
        abs(mpmath.mpf(computed) - reference) / mpmath.mpf(float(np.spacing(float(reference))))
    )


def condition(first: str, second: str, wanted: str) -> float:
    """Sum of the absolute exponents with which the two inputs enter: rounding of the inputs."""
    from closures.monomials import plan

    return float(sum(abs(p) for base, p in plan(wanted, first, second) if base in (first, second)))


def test_every_pair_is_independent_or_named():
    dependent = {
        frozenset(p) for p in itertools.combinations(INPUTS, 2) if dependence(*p) is not None
    }
    lengths = ("mixing_length", "eddy_viscosity_length", "dissipation_length", "integral_length")
    viscosities = ("nu_t", "viscosity_ratio", "nu_tilde")
    expected = {
        frozenset(p) for group in (lengths, viscosities) for p in itertools.combinations(group, 2)
    }
    expected |= {frozenset(("k", "intensity")), frozenset(("omega", "time_scale"))}
    assert dependent == expected


@pytest.mark.parametrize("pair", PAIRS, ids="+".join)
def test_every_pair_gives_all_the_others_to_a_few_ulp(pair):
    """60 decades of k and epsilon; bound 4 ulp x (1 + condition) of the exact function."""
    rng = np.random.default_rng(7)
    for k, e in 10.0 ** rng.uniform(-30, 30, (6, 2)) * [[1, 1]]:
        u = float(np.sqrt(k) * 30)  # an intensity below one
        inputs = {n: float(exact(n, k, e, u=u)) for n in pair}
        s = state(**inputs, kinematic_viscosity=NU, velocity=u)
        # the state that the rounded inputs really define, solved in logarithms with 50 digits
        kk, ee = _solve(pair, inputs, u)
        for name in DEFINITIONS:
            reference = exact_mp(name, kk, ee, u)
            assert ulp(getattr(s, name), reference) <= 4 * (1 + condition(*pair, name)), name


def exact_mp(name, k, e, u):
    return DEFINITIONS[name](k, e, *(mpmath.mpf(x) for x in (0.09, 0.43, NU, u)))


def _solve(pair, inputs, u):
    """k and epsilon from two values: definitions are log-linear, so probes give exponents."""
    rows, rhs = [], []
    for name in pair:
        base = mpmath.log(exact_mp(name, mpmath.mpf(1), mpmath.mpf(1), u))
        e = mpmath.e
        rows.append(
            [
                mpmath.log(exact_mp(name, e, mpmath.mpf(1), u)) - base,
                mpmath.log(exact_mp(name, mpmath.mpf(1), e, u)) - base,
            ]
        )
        rhs.append(mpmath.log(mpmath.mpf(inputs[name])) - base)
    x = mpmath.lu_solve(mpmath.matrix(rows), mpmath.matrix(rhs))
    return mpmath.exp(x[0]), mpmath.exp(x[1])


# U = 40 m/s, Tu = 5 %, l_m = 0.07 x 0.3 m, nu = 1.5e-5: 30 digits from the definitions;
# k = 6 is the definition itself.
def test_duct_example():
    s = state(intensity=0.05, velocity=40.0, mixing_length=0.021, kinematic_viscosity=NU)
    assert s.k == pytest.approx(6.0, rel=1e-15)
    assert s.epsilon == pytest.approx(114.9977817, rel=1e-9)
    assert s.omega == pytest.approx(212.958855, rel=1e-8)
    assert s.viscosity_ratio == pytest.approx(1878.2971011, rel=1e-10)
    assert s.dissipation_length == pytest.approx(0.127801930, rel=1e-8)
    assert s.time_scale == pytest.approx(0.0521749195, rel=1e-8)
    assert s.kolmogorov_length == pytest.approx(7.36030953e-5, rel=1e-8)
    assert s.taylor_length == pytest.approx(0.00279754141, rel=1e-8)
    assert s.re_lambda == pytest.approx(373.005520871, rel=1e-11)


@pytest.mark.parametrize(
    ("name", "epsilon", "ratio"),
    [  # the same number 0.021 m read under each convention: epsilon differs up to 6.1 times
        ("mixing_length", 114.997782, 1878.297101),
        ("eddy_viscosity_length", 62.9868791, 3429.285640),
        ("integral_length", 300.937311, 717.757460),
        ("dissipation_length", 699.854212, 308.635708),
    ],
)
def test_conventions_of_length(name, epsilon, ratio):
    s = state(k=6.0, kinematic_viscosity=NU, **{name: 0.021})
    assert s.epsilon == pytest.approx(epsilon, rel=5e-9)  # printed digits
    assert s.viscosity_ratio == pytest.approx(ratio, rel=5e-9)  # printed digits


# G. Comte-Bellot & S. Corrsin, J. Fluid Mech. 48 (1971): stations tU0/M = 42 and 98, measured
# u', epsilon -> measured Taylor length [cm] and Re_lambda (printed digits).
@pytest.mark.parametrize(
    ("u_rms", "epsilon", "taylor_cm", "re_lambda"),
    [(0.222, 0.4740, 0.484, 71.6), (0.128, 0.0633, 0.764, 65.3)],
)
def test_grid_turbulence_scales(u_rms, epsilon, taylor_cm, re_lambda):
    s = state(k=1.5 * u_rms**2, epsilon=epsilon, kinematic_viscosity=NU)
    assert 100 * s.taylor_length == pytest.approx(taylor_cm, rel=4e-3)
    assert s.re_lambda == pytest.approx(re_lambda, rel=4e-3)


@given(
    st.sampled_from(PAIRS),
    st.floats(-20, 20),
    st.floats(-20, 20),
    st.sampled_from([0.0845, 0.09, 0.22, 0.033]),
)
@settings(derandomize=True, deadline=None, max_examples=200)
def test_round_trip(pair, log_k, log_e, c_mu):
    k, e = 10.0**log_k, 10.0**log_e
    u = 30.0 * np.sqrt(k)
    first = state(k=k, epsilon=e, C_mu=c_mu, kinematic_viscosity=NU, velocity=u)
    back = state(
        C_mu=c_mu, kinematic_viscosity=NU, velocity=u, **{n: getattr(first, n) for n in pair}
    )
    assert back.k == pytest.approx(k, rel=2e-14)
    assert back.epsilon == pytest.approx(e, rel=2e-14)


def test_identities_between_scales():
    s = state(
        k=[0.01, 1.5, 600.0], epsilon=[0.003, 20.0, 1e5], kinematic_viscosity=[1e-6, NU, 3e-5]
    )
    # Pope (2000) ch. 6: Re_lambda^2 = (20/3) Re_L, eta/L = Re_L^(-3/4)
    assert np.allclose(s.re_lambda**2, 20 / 3 * s.turbulence_reynolds, rtol=1e-14)
    assert np.allclose(
        s.kolmogorov_length / s.dissipation_length, s.turbulence_reynolds**-0.75, rtol=1e-14
    )


def test_one_point_and_many_have_the_same_bits():
    rng = np.random.default_rng(3)
    n = 40_000
    u, tu, length = rng.uniform(1, 100, n), rng.uniform(0.001, 0.3, n), 10 ** rng.uniform(-4, 1, n)
    names = ("k", "epsilon", "omega", "nu_t", "kolmogorov_length", "nu_tilde", "intensity")
    many = convert(names, velocity=u, intensity=tu, mixing_length=length, kinematic_viscosity=NU)
    whole = state(velocity=u, intensity=tu, mixing_length=length, kinematic_viscosity=NU)
    for name in names:
        assert np.array_equal(many[name], getattr(whole, name)), name
        for i in (0, 1, 777, n - 1):
            one = state(
                velocity=float(u[i]),
                intensity=float(tu[i]),
                mixing_length=float(length[i]),
                kinematic_viscosity=NU,
            )
            assert getattr(one, name) == many[name][i], name
    backwards = state(velocity=u[::-1], intensity=tu[::-1], mixing_length=length[::-1])
    assert np.array_equal(backwards.epsilon[::-1], many["epsilon"])


def test_shapes_broadcast_and_scalars_are_floats():
    s = state(k=np.ones((3, 1)), epsilon=np.ones((1, 4)))
    assert s.omega.shape == (3, 4)
    assert isinstance(state(k=1, epsilon=np.float32(2)).omega, float)
    assert state(k=[], epsilon=1.0).nu_t.shape == (0,)
    assert np.array_equal(
        convert(["omega"], k=[1.0, 2.0], epsilon=3.0)["omega"], state(k=[1, 2], epsilon=3).omega
    )


def test_convert_writes_into_the_arrays_it_is_given():
    out = {"k": np.empty(2)}
    result = convert(["k"], out=out, intensity=[0.05, 0.1], velocity=40.0, mixing_length=0.021)
    assert result["k"] is out["k"]
    assert out["k"] == pytest.approx([6.0, 24.0])


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        ({"k": 1.0}, "exactly two"),
        ({"k": 1.0, "epsilon": 1.0, "omega": 1.0}, "exactly two"),
        ({}, "exactly two"),
        ({"k": 1.0, "intensity": 0.1, "velocity": 1.0}, "same combination, k"),
        ({"omega": 1.0, "time_scale": 0.1}, "k/epsilon"),
        ({"mixing_length": 1.0, "integral_length": 0.1}, r"k\^\(3/2\)/epsilon"),
        ({"nu_t": 1.0, "viscosity_ratio": 0.1, "kinematic_viscosity": 1.0}, r"k\^2/epsilon"),
        ({"length_scale": 1.0, "k": 0.1}, "convention"),
        ({"epsilom": 1.0, "k": 0.1}, "did you mean 'epsilon'"),
        ({"intensity": 0.1, "mixing_length": 1.0}, "velocity"),
        ({"viscosity_ratio": 0.1, "k": 1.0}, "kinematic_viscosity"),
        ({"k": -1.0, "epsilon": 1.0}, "k: got -1"),
        ({"k": float("nan"), "epsilon": 1.0}, "k: got nan"),
        ({"k": float("inf"), "epsilon": 1.0}, "k: got inf"),
        ({"k": 0.0, "epsilon": 1.0}, "k: got 0"),
        ({"k": [1.0, -2.0], "epsilon": 1.0}, "index 1"),
        ({"k": "1", "epsilon": 1.0}, "real numbers"),
        ({"k": 1j, "epsilon": 1.0}, "real numbers"),
        ({"k": [[1.0], [1.0, 2.0]], "epsilon": 1.0}, "regular array"),
        ({"k": [1.0, 2.0], "epsilon": [1.0, 2.0, 3.0]}, "broadcast"),
        ({"intensity": 5.0, "velocity": 1.0, "epsilon": 1.0}, "intensity: got 5"),
        ({"k": 1.0, "epsilon": 1.0, "C_mu": 0.0}, "C_mu"),
    ],
)
def test_wrong_arguments_are_named(arguments, words):
    with pytest.raises(InputError, match=words) as caught:
        state(**arguments)
    assert "\n" not in str(caught.value)


def test_a_bad_value_late_in_a_long_array_is_found_by_convert():
    k = np.ones(50_000)
    k[40_000] = -1.0
    with pytest.raises(InputError, match="index 40000"):
        convert(["omega"], k=k, epsilon=1.0)


def test_missing_parameter_is_named_on_access():
    s = state(k=1.0, epsilon=1.0)
    assert "viscosity_ratio" not in s.available()
    assert "intensity" not in s.available()
    with pytest.raises(InputError, match="kinematic_viscosity"):
        _ = s.viscosity_ratio
    with pytest.raises(AttributeError):
        _ = s.nonsense
