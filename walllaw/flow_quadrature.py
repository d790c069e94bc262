"""Nodes and integrals from a wall to the axis of a developed flow, for many cases at once.

For profiles composite Gauss-Legendre panels: near the wall in a coordinate that resolves the
sublayer at any Re_tau, in the outer part in the root of the distance from the axis, where the
gradient goes like that root. For bulk values of a smooth wall and a length without kinks, one panel
that does both.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cache

import numpy as np

from walllaw.arrays import Floats
from walllaw.panels import gauss

# inner panels: y+ = 15 (exp(s) - 1), short where the van Driest slope has its singularity (0.21 off
# the real axis near s = 0.26), long further out; they end at the given Re_tau
_STRETCH = 15.0
_EDGES = np.array([0.0, 0.2, 0.4, 0.6, 0.9, 1.3, 1.9, 2.7, 3.9, 5.4, 7.4, 9.9, 12.9, 16.5, 21.0])
# outer panels: y = R (1 - z^2), shorter towards the axis
_OUTER = np.array([1.0, 0.7, 0.4, 0.15, 0.04, 0.008, 0.0])
NODES = 13  # in each panel
# the one panel: y+ = 5 sinh(t), t = T (1 - (1-x)^2), which leaves 4e-14 from Re_tau 1 to 1e8
_SINH, SINGLE = 5.0, 112
PANELS = 896  # as much room as the panels of a case take: 20 of 13 nodes, and some on the way
_POINTS = 14336  # nodes in one block, which stay in the second cache


@cache
def _gauss(count: int) -> tuple[Floats, Floats, Floats]:
    """Return nodes and weights on 0..1, and the matrix of integrals from 0 to each node."""
    share, weights = gauss(count)
    x = 2.0 * share - 1.0
    vander = np.polynomial.legendre.legvander(x, count - 1)
    antiderivative = np.array([
        [float(np.polynomial.legendre.legval(t, np.polynomial.legendre.legint(row, lbnd=-1)))
         for row in np.eye(count)]
        for t in x
    ])  # fmt: skip
    matrix = antiderivative @ np.linalg.inv(vander)
    return share, weights, 0.5 * matrix


@dataclass(frozen=True, slots=True)
class Grid:
    """Nodes of all panels of a block of cases: arrays (cases, panels, nodes)."""

    eta: Floats
    rest: Floats  # 1 - eta, without cancellation
    y_plus: Floats
    width: Floats  # d(eta) = weight x jacobian; includes the panel's width
    step: Floats  # the same without the weights, for integrals to a node


@cache
def _outer(split: float, count: int) -> tuple[Floats, Floats]:
    """Return 1 - eta and d(eta) without the weights at the nodes of the outer panels."""
    x = _gauss(count)[0]
    edges = np.sqrt(1.0 - split) * _OUTER
    width = (edges[:-1] - edges[1:])[:, np.newaxis]
    z = edges[:-1, np.newaxis] - width * x
    return z * z, width * 2.0 * z


def grid(re_tau: Floats, split: float) -> Grid:
    """Return the nodes for each Re_tau; the inner panels end at y = split R."""
    x, w, _ = _gauss(NODES)
    top = np.log1p(split * re_tau / _STRETCH)
    edges = np.minimum(_EDGES, top[:, np.newaxis])
    edges[:, -1] = top
    width = (edges[:, 1:] - edges[:, :-1])[:, :, np.newaxis]
    y = _STRETCH * np.expm1(edges[:, :-1, np.newaxis] + width * x)
    scale = re_tau[:, np.newaxis, np.newaxis]
    rest_out, step_out = _outer(split, NODES)
    inner = y.shape[1]
    eta = np.empty((re_tau.size, inner + rest_out.shape[0], NODES))
    rest, step = np.empty_like(eta), np.empty_like(eta)
    eta[:, :inner], eta[:, inner:] = y / scale, 1.0 - rest_out
    rest[:, :inner], rest[:, inner:] = 1.0 - eta[:, :inner], rest_out
    step[:, :inner] = width * ((y + _STRETCH) / scale)  # dy = 15 exp(s) ds
    step[:, inner:] = step_out
    return Grid(eta, rest, eta * scale, step * w, step)


@cache
def _single(count: int) -> tuple[Floats, Floats]:
    """Return t/T and its derivative times the weights at the nodes of the one panel."""
    x, w, _ = _gauss(count)
    return x * (2.0 - x), 2.0 * (1.0 - x) * w


def single(re_tau: Floats) -> Grid:
    """Return the nodes of one panel from wall to axis; ``step`` is of no use there."""
    share, weight = _single(SINGLE)
    top = np.arcsinh(re_tau / _SINH)[:, np.newaxis]
    e = np.expm1(top * share)
    inverse = 1.0 / (1.0 + e)
    y = e * inverse
    y += e
    y *= 0.5 * _SINH
    e += inverse
    e += 1.0  # now 2 cosh(t)
    e *= (0.5 * _SINH * weight) * (top / re_tau[:, np.newaxis])
    eta = y / re_tau[:, np.newaxis]
    eta, rest, y, width = (v[:, np.newaxis, :] for v in (eta, 1.0 - eta, y, e))
    return Grid(eta, rest, y, width, width)


def in_blocks(
    kernel: Callable[..., tuple[Floats, ...]], *columns: Floats, nodes: int = PANELS
) -> list[Floats]:
    """Evaluate a kernel of several cases block by block; its results, each over all cases."""
    size, step = columns[0].size, max(_POINTS // nodes, 1)
    parts = [kernel(*(c[i : i + step] for c in columns)) for i in range(0, max(size, 1), step)]
    return [np.concatenate(column) for column in zip(*parts, strict=True)]


def total(values: Floats) -> Floats:
    """Sum over panels and nodes; rows are contiguous, so the order is the same for any number."""
    cases, panels, nodes = values.shape
    return np.asarray(values.reshape(cases, panels * nodes).sum(axis=1))


def running(values: Floats, nodes: Grid) -> Floats:
    """Return the integral of values d(eta) from the wall to each node."""
    _, w, matrix = _gauss(NODES)
    parts = values * nodes.step
    inside = np.zeros_like(parts)
    panel = np.zeros(parts.shape[:2])
    for j in range(NODES):
        inside = inside + parts[:, :, j, np.newaxis] * matrix[:, j]
        panel = panel + w[j] * parts[:, :, j]
    before = np.cumsum(panel, axis=1) - panel
    return inside + before[:, :, np.newaxis]
