"""Every rule of the review: a case that fires it and one that does not."""

from __future__ import annotations

import pytest

import closures
from closures.rules import rules
from closures.sheets import make_sheet

FLUID = {"density": 1.2, "dynamic_viscosity": 1.8e-5}
GOOD = {"intensity": "5 %", "viscosity_ratio": 20.0}
PIPE = {"kind": "pipe", "diameter": 0.3, "bulk_velocity": 20.0}
CHANNEL = {"kind": "channel", "height": 0.05, "bulk_velocity": 30.0}
PLATE = {"kind": "plate", "length": 1.0, "velocity": 40.0, "tripped": True}
SST, KEPS, SA = {"name": "sst"}, {"name": "k-epsilon"}, {"name": "sa"}


def case(flow=PIPE, turbulence=GOOD, closure=SST, fluid=FLUID, **wall):
    made = {"fluid": fluid, "flow": flow, "turbulence": turbulence, "closure": closure}
    return {**made, "wall": wall} if wall else made


WF = {"treatment": "wall-function"}
# rule -> (case that fires, case that does not)
CASES = {
    "regime-laminar": (case({**PIPE, "bulk_velocity": 0.05}), case()),
    "regime-transitional": (case({**PIPE, "bulk_velocity": 0.15}), case()),
    "correlation-range": (case({**PIPE, "reynolds": 1e9, "bulk_velocity": None}), case()),
    "compressible": (
        case({**PLATE, "velocity": 150.0}, fluid={"name": "air"}, closure=SA),
        case({**PLATE, "velocity": 50.0}, fluid={"name": "air"}, closure=SA),
    ),
    "pipe-law-on-other-passage": (
        case(CHANNEL),
        case({**CHANNEL, "friction_diameter": "laminar-equivalent"}),
    ),
    "entrance": (case({**PIPE, "length": 1.0}), case({**PIPE, "length": 100.0})),
    "intensity-high": (case(turbulence={**GOOD, "intensity": 0.4}), case()),
    "intensity-low": (case(turbulence={**GOOD, "intensity": 5e-5}), case()),
    "viscosity-ratio-free-stream-high": (
        case(PLATE, {**GOOD, "viscosity_ratio": 300.0}),
        case(PLATE, {**GOOD, "viscosity_ratio": 3.0}),
    ),
    "viscosity-ratio-free-stream-low": (
        case(PLATE, {**GOOD, "viscosity_ratio": 1e-6}),
        case(PLATE, {**GOOD, "viscosity_ratio": 3.0}),
    ),
    "viscosity-ratio-above-developed": (case(turbulence={**GOOD, "viscosity_ratio": 1e5}), case()),
    "viscosity-ratio-low-inside": (case(turbulence={**GOOD, "viscosity_ratio": 0.5}), case()),
    "length-above-developed": (
        case(turbulence={"intensity": 0.05, "mixing_length": {"times": 0.11, "of": "diameter"}}),
        case(turbulence={"intensity": 0.05, "mixing_length": {"times": 0.07, "of": "diameter"}}),
    ),
    "length-exceeds-passage": (
        case(turbulence={"intensity": 0.05, "integral_length": {"times": 0.6, "of": "diameter"}}),
        case(turbulence={"intensity": 0.05, "integral_length": {"times": 0.18, "of": "diameter"}}),
    ),
    "pipe-length-in-gap": (
        case(
            CHANNEL,
            {"intensity": 0.05, "mixing_length": {"times": 0.07, "of": "hydraulic_diameter"}},
        ),
        case(CHANNEL, {"intensity": 0.05, "mixing_length": {"times": 0.07, "of": "gap"}}),
    ),
    "no-inertial-range": (case(PLATE, {**GOOD, "viscosity_ratio": 0.5}), case()),
    "spalart-allmaras-free-stream": (
        case(PLATE, {"nu_tilde": 1.5e-6}, SA),
        case(PLATE, {"nu_tilde": 6e-5}, SA),
    ),
    "omega-free-stream": (
        case(PLATE, {"intensity": 0.01, "omega": 10.0}),
        case(PLATE, {"intensity": 0.001, "omega": 200.0}),
    ),
    "isotropic-stresses-in-duct": (case(closure={"name": "ssg"}), case()),
    "estimate-is-core-level": (case(turbulence={"estimate": "developed"}), case()),
    "treatment-not-of-closure": (
        case(closure=KEPS, treatment="resolved"),
        case(closure=KEPS, **WF),
    ),
    "y-plus-resolved": (case(y_plus=2.0), case(y_plus=0.2)),
    "y-plus-unresolved": (case(y_plus=20.0), case(y_plus=2.0)),
    "omega-y-plus-drag": (case(y_plus=0.8), case(y_plus=0.1)),
    "y-plus-below-log-law": (case(closure=KEPS, y_plus=5.0), case(closure=KEPS, y_plus=40.0)),
    "y-plus-buffer-layer": (case(closure=KEPS, y_plus=20.0), case(closure=KEPS, y_plus=40.0)),
    "y-plus-above-log-layer": (case(closure=KEPS, y_plus=1500.0), case(closure=KEPS, y_plus=40.0)),
    "no-log-layer": (
        case({**PIPE, "reynolds": 5000.0, "bulk_velocity": None}, closure=KEPS),
        case(closure=KEPS),
    ),
    "short-log-layer": (
        case({**PIPE, "reynolds": 20000.0, "bulk_velocity": None}, closure=KEPS),
        case(closure=KEPS),
    ),
    "growth-high": (
        case(y_plus=0.2, growth=1.3, layers=10),
        case(y_plus=0.2, growth=1.2, layers=10),
    ),
    "growth-refused": (
        case(y_plus=0.2, growth=1.6, layers=10),
        case(y_plus=0.2, growth=1.3, layers=10),
    ),
    "stack-thin": (
        case(PLATE, closure=SA, y_plus=0.5, growth=1.2, total_thickness=0.015),
        case(PLATE, closure=SA, y_plus=0.5, growth=1.2, total_thickness=0.03),
    ),
    "stack-far-too-thin": (
        case(PLATE, closure=SA, y_plus=0.5, growth=1.2, total_thickness=0.005),
        case(PLATE, closure=SA, y_plus=0.5, growth=1.2, total_thickness=0.015),
    ),
    "stack-exceeds-passage": (
        case(y_plus=0.5, growth=1.2, total_thickness=0.2),
        case(y_plus=0.5, growth=1.2, total_thickness=0.02),
    ),
    "first-unknown-inside-roughness": (
        case({**PIPE, "roughness": 2e-3}, closure=KEPS, y_plus=40.0),
        case({**PIPE, "roughness": 1e-5}, closure=KEPS, y_plus=40.0),
    ),
    "first-unknown-near-roughness": (
        case({**PIPE, "roughness": 6e-4}, closure=KEPS, y_plus=50.0),
        case({**PIPE, "roughness": 1e-5}, closure=KEPS, y_plus=50.0),
    ),
    "rough-wall-resolved": (
        case({**PIPE, "roughness": 1e-3}, y_plus=0.5),
        case({**PIPE, "roughness": 1e-6}, y_plus=0.5),
    ),
    "hydraulically-smooth": (
        case({**PIPE, "roughness": 1e-6}, y_plus=0.5),
        case({**PIPE, "roughness": 1e-3}, y_plus=0.5),
    ),
    "roughness-large": (case({**PIPE, "roughness": 0.02}), case({**PIPE, "roughness": 1e-4})),
}


def found(raw):
    raw = {t: {k: v for k, v in body.items() if v is not None} for t, body in raw.items()}
    return {f.id: f for f in make_sheet(closures.evaluate(raw)).findings}


def test_every_rule_has_its_cases():
    assert {rule.id for rule in rules()} == set(CASES)


@pytest.mark.parametrize("id_", CASES)
def test_rule_fires_and_stays_silent(id_):
    fires, silent = (found(raw) for raw in CASES[id_])
    assert id_ in fires
    assert id_ not in silent
    finding = fires[id_]
    assert "{" not in finding.message
    assert "nan" not in finding.message
    assert finding.why
    assert finding.action
    assert finding.source


def test_errors_come_first():
    order = [rule.severity for rule in rules()]
    assert order == sorted(order, key=("error", "warning", "note").index)


def test_rules_work_on_many_rows():
    e = closures.evaluate(case(), {"flow.bulk_velocity": [0.05, 0.15, 20.0]})
    ids = [{f.id for f in make_sheet(e, row).findings} for row in range(3)]
    assert "regime-laminar" in ids[0]
    assert "regime-transitional" in ids[1]
    assert not {"regime-laminar", "regime-transitional"} & ids[2]
