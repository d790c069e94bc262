"""Rules about the inlet state: intensity, viscosity ratio, lengths against the geometry."""

from __future__ import annotations

from collections.abc import Iterator

from closures.ledger import Ledger, Mask
from closures.rules import Hit
from closures.rules.flow import INTERNAL
from walllaw.relation import relation


def _inside(e: Ledger) -> bool:
    return e.texts.get("flow.kind") in INTERNAL


def _outside(e: Ledger) -> bool:
    return e.texts.get("flow.kind") in ("plate", "external")


def intensity_high(e: Ledger) -> Iterator[Hit]:
    """k = 1.5 (Tu U)^2 loses its meaning."""
    if "inlet.intensity" in e:
        limit = relation("review", "intensity")["high"]
        yield Hit(
            e["inlet.intensity"] > limit,
            "inlet.intensity",
            limit,
            {"percent": 100.0 * e["inlet.intensity"]},
        )


def intensity_low(e: Ledger) -> Iterator[Hit]:
    """Below what any facility has."""
    if "inlet.intensity" in e:
        limit = relation("review", "intensity")["low"]
        yield Hit(
            e["inlet.intensity"] < limit,
            "inlet.intensity",
            limit,
            {"percent": 100.0 * e["inlet.intensity"]},
        )


def viscosity_ratio_free_stream_high(e: Ledger) -> Iterator[Hit]:
    """Eddy viscosity of the stream leaks into the whole field."""
    if _outside(e):
        limit = relation("review", "free_stream_viscosity_ratio")["high"]
        yield Hit(e["inlet.viscosity_ratio"] > limit, "inlet.viscosity_ratio", limit)


def viscosity_ratio_free_stream_low(e: Ledger) -> Iterator[Hit]:
    """Below the range the SST paper gives."""
    if _outside(e):
        limit = relation("review", "free_stream_viscosity_ratio")["low"]
        yield Hit(e["inlet.viscosity_ratio"] < limit, "inlet.viscosity_ratio", limit)


def viscosity_ratio_above_developed(e: Ledger) -> Iterator[Hit]:
    """More eddy viscosity than developed flow can hold."""
    if _inside(e) and "flow.re_tau" in e:
        limit = relation("review", "developed_viscosity_ratio")["slope"] * e["flow.re_tau"]
        yield Hit(e["inlet.viscosity_ratio"] > limit, "inlet.viscosity_ratio", limit)


def viscosity_ratio_low_inside(e: Ledger) -> Iterator[Hit]:
    """A turbulent duct core with hardly any eddy viscosity."""
    if _inside(e) and "inlet.intensity" in e:
        r = relation("review", "duct_core")
        rows = (e["inlet.viscosity_ratio"] < r["viscosity_ratio"]) & (
            e["inlet.intensity"] > r["intensity"]
        )
        yield Hit(
            rows,
            "inlet.viscosity_ratio",
            r["viscosity_ratio"],
            {"length": e["inlet.mixing_length"]},
        )


def length_above_developed(e: Ledger) -> Iterator[Hit]:
    """A mixing length above what developed flow has."""
    if _inside(e) and "inlet.mixing_length" in e:
        r = relation("review", "passage_length")
        passage = e["flow.passage"]
        limit = r["warn"] * passage
        rows = (e["inlet.mixing_length"] > limit) & ~_exceeds(e)
        yield Hit(rows, "inlet.mixing_length", limit, {"share": e["inlet.mixing_length"] / passage})


def _exceeds(e: Ledger) -> Mask:
    r = relation("review", "passage_length")
    return (e["inlet.mixing_length"] > r["refuse"] * e["flow.passage"]) | (
        e["inlet.integral_length"] > 0.5 * e["flow.passage"]
    )


def length_exceeds_passage(e: Ledger) -> Iterator[Hit]:
    """Eddies larger than the passage."""
    if _inside(e) and "inlet.mixing_length" in e:
        yield Hit(_exceeds(e), "inlet.integral_length", 0.5 * e["flow.passage"])


def pipe_length_in_gap(e: Ledger) -> Iterator[Hit]:
    """A multiple of the hydraulic diameter used as a length in a gap."""
    if e.texts.get("flow.kind") in ("channel", "annulus") and "inlet.mixing_length" in e:
        r = relation("review", "gap_length")
        share = e["inlet.mixing_length"] / e["flow.passage"]
        yield Hit(share > r["share"], "inlet.mixing_length", r["share"] * e["flow.passage"])


def no_inertial_range(e: Ledger) -> Iterator[Hit]:
    """The viscosity ratio is below one: a length has no meaning as a size of eddies."""
    if "inlet.viscosity_ratio" in e and "scales.re_lambda" in e:
        yield Hit(
            e["inlet.viscosity_ratio"] < 1.0,
            "inlet.viscosity_ratio",
            1.0,
            {"re_lambda": e["scales.re_lambda"]},
        )


def spalart_allmaras_free_stream(e: Ledger) -> Iterator[Hit]:
    """Outside the free-stream value the authors recommend for fully turbulent flow."""
    if _outside(e) and "inlet.set.nu_tilde" in e and "closure.c_v1" in e:
        chi = e["inlet.set.nu_tilde"] / e["fluid.kinematic_viscosity"]
        r = relation("review", "spalart_allmaras_free_stream")
        yield Hit(
            (chi < r["low"]) | (chi > r["high"]),
            "inlet.set.nu_tilde",
            None,
            {"chi": chi, "low": r["low"], "high": r["high"]},
        )


def omega_free_stream(e: Ledger) -> Iterator[Hit]:
    """Outside the far-field omega of the SST paper."""
    if _outside(e) and "inlet.set.omega" in e:
        r = relation("review", "omega_free_stream")
        unit = e["flow.velocity"] / e["flow.length"]
        share = e["inlet.set.omega"] / unit
        yield Hit(
            (share < r["low"]) | (share > r["high"]),
            "inlet.set.omega",
            None,
            {"share": share, "low": r["low"], "high": r["high"]},
        )


def isotropic_stresses_in_duct(e: Ledger) -> Iterator[Hit]:
    """Isotropic stresses at the inlet of a sheared passage."""
    if _inside(e) and "inlet.set.uu" in e:
        yield Hit(e["inlet.set.uu"] > 0.0, "inlet.set.uu")


def estimate_is_core_level(e: Ledger) -> Iterator[Hit]:
    """The estimate of developed flow gives the core, not the section mean."""
    if e.texts.get("turbulence.estimate") == "developed":
        mean = relation("review", "section_mean_intensity")["ratio"] * (
            e["flow.friction_velocity"] / e["flow.velocity"]
        )
        yield Hit(
            e["inlet.intensity"] > 0.0,
            "inlet.intensity",
            None,
            {"percent": 100.0 * e["inlet.intensity"], "mean": 100.0 * mean},
        )
