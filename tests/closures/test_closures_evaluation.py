"""Evaluation of cases: all kinds, all drives, regimes, one row and many."""

from __future__ import annotations

import copy

import fluids as general
import numpy as np
import pytest

import closures
from closures.closure_list import closure_heads
from walllaw.errors import InputError

BASE = {
    "fluid": {"density": 1000.0, "dynamic_viscosity": 1e-3},
    "turbulence": {"intensity": 0.05, "viscosity_ratio": 50.0},
    "closure": {"name": "menter-sst-2003"},
}
KINDS = {
    "pipe": {"diameter": 0.1},
    "channel": {"height": 0.05, "width": 2.0},
    "duct": {"width": 0.3, "height": 0.1},
    "annulus": {"inner_diameter": 0.05, "outer_diameter": 0.1},
}


def flow(kind: str, **more):
    return {"kind": kind, **KINDS.get(kind, {}), **more}


def evaluate(flow_, **tables):
    return closures.evaluate({**BASE, "flow": flow_, **tables})


@pytest.mark.parametrize("kind", KINDS)
def test_every_drive_gives_the_same_flow(kind):
    first = evaluate(flow(kind, bulk_velocity=2.0, roughness=1e-4))
    for name in ("volume_flow", "mass_flow", "reynolds", "friction_velocity", "pressure_gradient"):
        other = evaluate(flow(kind, roughness=1e-4, **{name: float(first[f"flow.{name}"][0])}))
        for path in ("flow.velocity", "flow.darcy_friction", "flow.friction_velocity"):
            assert other[path][0] == pytest.approx(first[path][0], rel=2e-14), (name, path)


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("name", ["friction_velocity", "pressure_gradient"])
def test_wall_stress_drives_laminar_flow_too(kind, name):
    slow = evaluate(flow(kind, reynolds=500.0))
    again = evaluate(flow(kind, **{name: float(slow[f"flow.{name}"][0])}))
    assert again["flow.reynolds"][0] == pytest.approx(500.0, rel=1e-13)
    assert again.label("flow.regime") == "laminar"


def test_a_wall_stress_between_the_branches_is_refused():
    # Re 2299 laminar and 2301 turbulent: stresses in between belong to neither
    slow = evaluate(flow("pipe", reynolds=2299.0))["flow.friction_velocity"][0]
    fast = evaluate(flow("pipe", reynolds=2301.0))["flow.friction_velocity"][0]
    with pytest.raises(InputError, match="between the laminar and the turbulent"):
        evaluate(flow("pipe", friction_velocity=0.5 * (slow + fast)))


# R. K. Shah & A. L. London, Laminar Flow Forced Convection in Ducts (1978): Fanning f Re
@pytest.mark.parametrize(
    ("geometry", "fanning"),
    [
        ({"kind": "pipe", "diameter": 0.01}, 16.0),
        ({"kind": "channel", "height": 0.01}, 24.0),
        ({"kind": "duct", "width": 0.01, "height": 0.01}, 14.22707688478),
        ({"kind": "duct", "width": 0.02, "height": 0.01}, 15.54805614661),
        ({"kind": "annulus", "inner_diameter": 0.005, "outer_diameter": 0.01}, 23.81254015911),
    ],
)
def test_laminar_friction_is_exact(geometry, fanning):
    e = evaluate({**geometry, "reynolds": 1000.0})
    assert e["flow.darcy_friction"][0] == pytest.approx(4 * fanning / 1000, rel=1e-12)


@pytest.mark.parametrize("re", [5e3, 1e5, 1e7])
@pytest.mark.parametrize("roughness", [0.0, 1e-5, 1e-3])
def test_turbulent_friction_against_a_general_library(re, roughness):
    e = evaluate(flow("pipe", reynolds=re, roughness=roughness))
    other = general.friction.Colebrook(re, roughness / 0.1)
    assert e["flow.darcy_friction"][0] == pytest.approx(other, rel=1e-12)


def test_laminar_equivalent_diameter():
    e = evaluate(flow("duct", reynolds=1e5, friction_diameter="laminar-equivalent"))
    d_l, d_h = e["flow.laminar_equivalent_diameter"][0], e["flow.hydraulic_diameter"][0]
    other = general.friction.Colebrook(1e5 * d_l / d_h, 0.0)
    assert e["flow.darcy_friction"][0] == pytest.approx(other, rel=1e-12)


@pytest.mark.parametrize(
    ("re", "regime"),
    [
        (2299.9, "laminar"),
        (2300.0, "transitional"),
        (3999.9, "transitional"),
        (4000.1, "turbulent"),
    ],
)
def test_regime(re, regime):
    assert evaluate(flow("pipe", reynolds=re)).label("flow.regime") == regime


def test_plate_regime_trip_and_transition():
    slow = evaluate({"kind": "plate", "length": 1.0, "reynolds": 1e5})
    assert slow.label("flow.regime") == "laminar"
    # Blasius: c_f sqrt(Re_x) = 0.66411467, delta_99 sqrt(Re_x)/x = 4.90998951
    assert slow["flow.skin_friction"][0] == pytest.approx(0.66411467243 / np.sqrt(1e5), rel=1e-10)
    assert slow["flow.boundary_layer_thickness"][0] == pytest.approx(
        4.9099895133 / np.sqrt(1e5), rel=1e-9
    )
    tripped = evaluate({"kind": "plate", "length": 1.0, "reynolds": 1e5, "tripped": True})
    assert tripped.label("flow.regime") == "turbulent"
    late = evaluate({"kind": "plate", "length": 1.0, "reynolds": 1e6, "transition_reynolds": 2e6})
    assert late.label("flow.regime") == "laminar"


@pytest.mark.parametrize("law", ["schultz-grunow", "karman-schoenherr", "white", "power-1-7"])
def test_plate_laws(law):
    e = evaluate({"kind": "external", "chord": 2.0, "velocity": 5.0, "friction_law": law})
    assert 0.002 < e["flow.skin_friction"][0] < 0.0035
    assert e["flow.friction_velocity"][0] == pytest.approx(
        5.0 * np.sqrt(e["flow.skin_friction"][0] / 2), rel=1e-15
    )


@pytest.mark.parametrize("id_", [h["id"] for h in closure_heads() if h["family"] != "heat"])
@pytest.mark.parametrize("treatment", ["resolved", "wall-function", "blended"])
def test_every_closure_with_every_treatment(id_, treatment):
    e = closures.evaluate({**BASE, "flow": flow("pipe", bulk_velocity=3.0, roughness=2e-5),
                           "closure": {"name": id_}, "wall": {"treatment": treatment}})  # fmt: skip
    for path, entry in e.entries.items():
        assert np.isfinite(entry.values).all(), path
        assert entry.values.dtype == np.float64, path


@pytest.mark.parametrize("kind", [*KINDS, "plate", "external"])
def test_one_row_and_many_have_the_same_bits(kind):
    rng = np.random.default_rng(5)
    n = 40
    drive = "bulk_velocity" if kind in KINDS else "velocity"
    more = {} if kind in KINDS else {"length": 0.7}
    case = {**copy.deepcopy(BASE), "flow": flow(kind, **{drive: 1.0}, **more),
            "wall": {"treatment": "wall-function", "y_plus": 40.0, "growth": 1.2, "layers": 6}}  # fmt: skip
    columns = {
        f"flow.{drive}": 10.0 ** rng.uniform(-1, 1, n),
        "turbulence.intensity": rng.uniform(0.01, 0.2, n),
    }
    many = closures.evaluate(case, columns)
    for i in (0, 7, n - 1):
        one = copy.deepcopy(case)
        one["flow"][drive] = float(columns[f"flow.{drive}"][i])
        one["turbulence"]["intensity"] = float(columns["turbulence.intensity"][i])
        single = closures.evaluate(one)
        for path, entry in single.entries.items():
            values = many[path]
            assert entry.values[0] == values[0 if values.size == 1 else i], (kind, path)
        assert single.label("flow.regime") == many.label("flow.regime", i)


def test_layers_from_any_three():
    base = {**BASE, "flow": flow("pipe", bulk_velocity=3.0)}
    first = closures.evaluate({**base, "wall": {"y_plus": 1.0, "growth": 1.2, "layers": 20}})
    total = float(first["wall.layers.total"][0])
    height = float(first["wall.first_cell_height"][0])
    for wall in (
        {"y_plus": 1.0, "layers": 20, "total_thickness": total},
        {"first_cell_height": height, "growth": 1.2, "total_thickness": total},
        {"growth": 1.2, "layers": 20, "total_thickness": total},
        {"first_cell_height": height, "growth": 1.2, "layers": 20},
    ):
        other = closures.evaluate({**base, "wall": wall})
        for name in ("first", "growth", "count", "total", "last"):
            path = f"wall.layers.{name}"
            assert other[path][0] == pytest.approx(first[path][0], rel=1e-9), (wall, name)
        assert other["wall.y_plus"][0] == pytest.approx(1.0, rel=1e-9)


def test_first_unknown_at_the_centre_or_the_node():
    base = {**BASE, "flow": flow("pipe", bulk_velocity=3.0)}
    centre = closures.evaluate({**base, "wall": {"y_plus": 1.0}})
    node = closures.evaluate({**base, "wall": {"y_plus": 1.0, "first_unknown": "node"}})
    assert centre["wall.first_cell_height"][0] == 2 * node["wall.first_cell_height"][0]
    assert centre["wall.first_cell_centre"][0] == node["wall.first_cell_centre"][0]


def test_menter_wall_value():
    # Menter (1994): omega_w = 60 nu/(beta_1 dy_1^2), beta_1 = 0.075; a tenth of it holds in the cell
    e = closures.evaluate(
        {**BASE, "flow": flow("pipe", bulk_velocity=3.0), "wall": {"y_plus": 1.0}}
    )
    y = e["wall.first_cell_centre"][0]
    assert e["wall.omega_wall"][0] == pytest.approx(800 * 1e-6 / y**2, rel=1e-14)
    assert e["wall.set.omega"][0] == pytest.approx(80 * 1e-6 / y**2, rel=1e-14)


def test_equilibrium_first_cell():
    # log layer: k = u_tau^2/sqrt(C_mu), epsilon = u_tau^3/(kappa y), omega = u_tau/(sqrt(beta*) kappa y)
    e = closures.evaluate({**BASE, "flow": flow("pipe", bulk_velocity=3.0), "closure": {"name": "k-epsilon"},
                           "wall": {"y_plus": 60.0}})  # fmt: skip
    u, y = e["flow.friction_velocity"][0], e["wall.first_cell_centre"][0]
    assert e["wall.set.k"][0] == pytest.approx(u**2 / 0.3, rel=1e-12)
    assert e["wall.set.epsilon"][0] == pytest.approx(u**3 / (0.41 * y), rel=1e-12)
    assert e["wall.set.omega"][0] == pytest.approx(u / (0.3 * 0.41 * y), rel=1e-12)
    assert e["wall.u_plus"][0] == pytest.approx(np.log(60) / 0.41 + 5.0, rel=1e-12)


def test_a_rough_wall_function_shifts_the_law():
    wall = {"treatment": "wall-function", "y_plus": 200.0}
    smooth = closures.evaluate({**BASE, "flow": flow("pipe", bulk_velocity=3.0), "wall": wall})
    rough = closures.evaluate(
        {**BASE, "flow": flow("pipe", bulk_velocity=3.0, roughness=2e-4), "wall": wall}
    )
    shift = rough["wall.roughness_function"][0]
    assert shift > 1
    assert rough["wall.u_plus"][0] == pytest.approx(smooth["wall.u_plus"][0] - shift, rel=1e-12)


def test_every_derived_number_knows_where_it_came_from():
    e = closures.evaluate({**BASE, "flow": flow("pipe", bulk_velocity=3.0, roughness=2e-5)})
    for path, entry in e.entries.items():
        assert entry.relation is not None or entry.origin, path
        for source in entry.inputs.values():
            assert source in e, (path, source)


def test_range_of_relations_does_not_leak_warnings():
    e = evaluate(flow("pipe", reynolds=1e9))
    assert any(rel.id == "friction.colebrook" for _, _, rel, _ in e.outside())


@pytest.mark.parametrize(
    ("columns", "words"),
    [
        ({"flow.kind": [1.0]}, "flow.kind"),
        ({"flow.bulk_velocity": [1.0, -1.0]}, "index 1"),
        ({"flow.bulk_velocity": [1.0, 2.0], "turbulence.intensity": [0.1, 0.2, 0.3]}, "one length"),
        ({"flow.nonsense": [1.0]}, "flow.nonsense"),
    ],
)
def test_columns_that_cannot_be_used(columns, words):
    with pytest.raises(InputError, match=words):
        closures.evaluate({**BASE, "flow": flow("pipe", bulk_velocity=1.0)}, columns)
