"""Rules about the wall: y+ against the treatment, the log layer, layers, roughness."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from closures.ledger import Ledger
from closures.rules import Hit
from walllaw.relation import relation


def _treatment(e: Ledger, *names: str) -> bool:
    return "wall.y_plus" in e and e.texts.get("wall.treatment") in names


def treatment_not_of_closure(e: Ledger) -> Iterator[Hit]:
    """The closure was not made for this wall treatment."""
    accepted = e.texts.get("closure.treatments", "").split(", ")
    if "wall.y_plus" in e and accepted != [""]:
        treatment = e.texts["wall.treatment"]
        rows = np.array([treatment not in accepted])
        yield Hit(
            rows, "wall.treatment", None, {"treatment": treatment, "accepted": ", ".join(accepted)}
        )


def y_plus_resolved(e: Ledger) -> Iterator[Hit]:
    """Too coarse for a wall-resolved closure."""
    if _treatment(e, "resolved"):
        low, high = e["wall.y_plus_high"], relation("review", "y_plus_resolved")["refuse"]
        yield Hit((e["wall.y_plus"] > low) & (e["wall.y_plus"] <= high), "wall.y_plus", low)


def y_plus_unresolved(e: Ledger) -> Iterator[Hit]:
    """The viscous sublayer is not resolved at all."""
    if _treatment(e, "resolved"):
        limit = relation("review", "y_plus_resolved")["refuse"]
        yield Hit(e["wall.y_plus"] > limit, "wall.y_plus", limit)


def omega_y_plus_drag(e: Ledger) -> Iterator[Hit]:
    """Omega closures lose drag with the first cell's y+ well below 1."""
    if _treatment(e, "resolved") and "inlet.set.omega" in e:
        low = relation("review", "y_plus_omega")["start"]
        rows = (e["wall.y_plus"] > low) & (e["wall.y_plus"] <= e["wall.y_plus_high"])
        yield Hit(rows, "wall.y_plus", low)


def y_plus_below_log_law(e: Ledger) -> Iterator[Hit]:
    """A log-law wall function whose first unknown lies in the sublayer."""
    if _treatment(e, "wall-function"):
        limit = e["wall.y_plus_intersection"]
        yield Hit(e["wall.y_plus"] < limit, "wall.y_plus", limit)


def y_plus_buffer_layer(e: Ledger) -> Iterator[Hit]:
    """A log-law wall function in the buffer layer."""
    if _treatment(e, "wall-function"):
        low, high = e["wall.y_plus_intersection"], e["wall.y_plus_low"]
        yield Hit((e["wall.y_plus"] >= low) & (e["wall.y_plus"] < high), "wall.y_plus", high)


def y_plus_above_log_layer(e: Ledger) -> Iterator[Hit]:
    """A wall function whose first unknown lies above the log layer."""
    if _treatment(e, "wall-function", "blended"):
        limit = e["wall.y_plus_high"]
        yield Hit(e["wall.y_plus"] > limit, "wall.y_plus", limit)


def no_log_layer(e: Ledger) -> Iterator[Hit]:
    """There is no y+ that a wall function could use."""
    if _treatment(e, "wall-function"):
        limit = relation("review", "log_layer")["none_below"]
        yield Hit(e["flow.re_tau"] < limit, "flow.re_tau", limit)


def short_log_layer(e: Ledger) -> Iterator[Hit]:
    """The log layer is short."""
    if _treatment(e, "wall-function"):
        r = relation("review", "log_layer")
        rows = (e["flow.re_tau"] >= r["none_below"]) & (e["flow.re_tau"] < r["short_below"])
        yield Hit(rows, "flow.re_tau", r["short_below"], {"top": e["wall.y_plus_high"]})


def growth_high(e: Ledger) -> Iterator[Hit]:
    """Layers grow faster than good practice allows."""
    if "wall.layers.growth" in e:
        r = relation("review", "growth")
        limit = r["wall_function"] if _treatment(e, "wall-function") else r["resolved"]
        growth = e["wall.layers.growth"]
        yield Hit((growth > limit) & (growth <= r["refuse"]), "wall.layers.growth", limit)


def growth_refused(e: Ledger) -> Iterator[Hit]:
    """Layers grow faster than any practice allows."""
    if "wall.layers.growth" in e:
        limit = relation("review", "growth")["refuse"]
        yield Hit(e["wall.layers.growth"] > limit, "wall.layers.growth", limit)


def stack_thin(e: Ledger) -> Iterator[Hit]:
    """The layer stack ends inside the boundary layer."""
    if "wall.layers.total" in e and e.texts.get("flow.kind") in ("plate", "external"):
        r = relation("review", "stack")
        share = e["wall.layers.total"] / e["flow.boundary_layer_thickness"]
        yield Hit(
            (share < r["warn"]) & (share >= r["refuse"]),
            "wall.layers.total",
            r["warn"] * e["flow.boundary_layer_thickness"],
            {"share": share},
        )


def stack_far_too_thin(e: Ledger) -> Iterator[Hit]:
    """The layer stack covers less than half of the boundary layer."""
    if "wall.layers.total" in e and e.texts.get("flow.kind") in ("plate", "external"):
        limit = relation("review", "stack")["refuse"]
        share = e["wall.layers.total"] / e["flow.boundary_layer_thickness"]
        yield Hit(
            share < limit,
            "wall.layers.total",
            limit * e["flow.boundary_layer_thickness"],
            {"share": share},
        )


def stack_exceeds_passage(e: Ledger) -> Iterator[Hit]:
    """The layers of the two walls do not fit between them."""
    if "wall.layers.total" in e and e.texts.get("flow.kind") not in ("plate", "external", None):
        limit = e["flow.boundary_layer_thickness"]
        yield Hit(e["wall.layers.total"] > limit, "wall.layers.total", limit)


def first_unknown_inside_roughness(e: Ledger) -> Iterator[Hit]:
    """The first unknown lies inside the roughness."""
    if _treatment(e, "wall-function", "blended") and "flow.roughness" in e:
        y, k_s = e["wall.first_cell_centre"], e["flow.roughness"]
        yield Hit(y < k_s, "wall.first_cell_centre", k_s)


def first_unknown_near_roughness(e: Ledger) -> Iterator[Hit]:
    """The first unknown lies less than two roughness heights off the wall."""
    if _treatment(e, "wall-function", "blended") and "flow.roughness" in e:
        y, k_s = e["wall.first_cell_centre"], e["flow.roughness"]
        yield Hit((y >= k_s) & (y < 2.0 * k_s), "wall.first_cell_centre", 2.0 * k_s)


def rough_wall_resolved(e: Ledger) -> Iterator[Hit]:
    """A rough wall needs its own wall condition when the sublayer is resolved."""
    if _treatment(e, "resolved") and "wall.roughness_plus" in e:
        limit = relation("review", "roughness_regime")["smooth"]
        yield Hit(e["wall.roughness_plus"] > limit, "wall.roughness_plus", limit)


def hydraulically_smooth(e: Ledger) -> Iterator[Hit]:
    """The roughness has no effect."""
    if "wall.roughness_plus" in e:
        limit = relation("review", "roughness_regime")["smooth"]
        k_s = e["wall.roughness_plus"]
        yield Hit((k_s > 0.0) & (k_s <= limit), "wall.roughness_plus", limit)


def roughness_large(e: Ledger) -> Iterator[Hit]:
    """The roughness is so large that it is geometry."""
    if "flow.roughness" in e and "flow.boundary_layer_thickness" in e:
        limit = relation("review", "roughness_large")["share"] * e["flow.boundary_layer_thickness"]
        yield Hit(e["flow.roughness"] > limit, "flow.roughness", limit)
