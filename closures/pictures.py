"""Pictures, drawn without a display and the same bytes every time."""

from __future__ import annotations

import io
from collections.abc import Iterator
from contextlib import contextmanager
from typing import TYPE_CHECKING, Any

import numpy as np

from walllaw import tables

if TYPE_CHECKING:
    from numpy.typing import NDArray

    from walllaw.developed_flow import DevelopedFlow
    from walllaw.law import Law

INK, CURVE, SECOND, MARK = "#222222", "#1b5e8a", "#b3541e", "#6b7f3a"


@contextmanager
def figure(form: str, width: float = 7.2, height: float = 4.6) -> Iterator[tuple[Any, io.BytesIO]]:
    """Yield axes to draw on and the buffer that holds the picture afterwards."""
    import matplotlib as mpl
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure

    buffer = io.BytesIO()
    with mpl.rc_context({"svg.hashsalt": "closures", "font.size": 9, "axes.edgecolor": INK}):
        fig = Figure(figsize=(width, height), layout="constrained")
        FigureCanvasAgg(fig)
        yield fig.add_subplot(), buffer
        metadata = {"Date": None} if form == "svg" else {"Software": None}
        fig.savefig(buffer, format=form, dpi=150, metadata=metadata)


def wall_law(law: Law, name: str, low: float, high: float, faces: list[float], form: str) -> bytes:
    """Return a picture of u+ against y+ with the viscous and log lines and the layers of cells."""
    y = np.geomspace(low, high, 400)
    with figure(form) as (axes, buffer):
        axes.semilogx(y, law.u_plus(y), color=CURVE, linewidth=1.8, label=name)
        near = y[y < 16.0]
        axes.semilogx(near, near, color=INK, linewidth=0.8, linestyle=":", label="u+ = y+")
        far = y[y > 5.0]
        line = np.log(far) / law.kappa + law.B
        label = f"ln(y+)/{law.kappa:g} + {law.B:.3g}"
        axes.semilogx(far, line, color=SECOND, linewidth=0.8, linestyle="--", label=label)
        if faces:
            centre = 0.5 * faces[0]
            axes.plot(
                [centre],
                [law.u_plus(centre)],
                "o",
                color=MARK,
                label=f"first unknown, y+ = {centre:g}",
            )
            shown = [f for f in faces if low <= f <= high]
            axes.vlines(
                shown, 0.0, 1.0, color=MARK, linewidth=0.6, label=f"faces of {len(faces)} layers"
            )
        axes.set_xlabel("y+")
        axes.set_ylabel("u+")
        axes.set_xlim(low, high)
        axes.set_ylim(bottom=0.0)
        axes.grid(which="major", color="#dddddd", linewidth=0.6)
        axes.legend(frameon=False)
    return buffer.getvalue()


def developed_flow(flow: DevelopedFlow, form: str) -> bytes:
    """Return a picture of u+ and of the eddy viscosity of a developed flow."""
    p = flow.profiles()
    keep = np.concatenate([[True], np.diff(p["eta"]) > 0.0]) & (p["y_plus"] > 0.05)
    y, u, nu_t = (p[n][keep] for n in ("y_plus", "u_plus", "nu_t"))
    with figure(form) as (axes, buffer):
        axes.semilogx(y, u, color=CURVE, linewidth=1.8, label="u+")
        near = y[y < 16.0]
        axes.semilogx(near, near, color=INK, linewidth=0.8, linestyle=":", label="u+ = y+")
        axes.axhline(
            flow.bulk_u_plus, color=SECOND, linewidth=0.8, linestyle="--", label="bulk U_b+"
        )
        axes.set_xlabel("y+")
        axes.set_ylabel("u+")
        axes.set_ylim(bottom=0.0)
        axes.grid(which="major", color="#dddddd", linewidth=0.6)
        axes.set_title(
            f"{flow.geometry}, {flow.mixing_length}: Re = {flow.reynolds:.4g}, "
            f"Re_tau = {flow.re_tau:.4g}, f = {flow.darcy_friction:.4g}",
            fontsize=9,
        )
        other = axes.twinx()
        other.plot(y, nu_t, color=MARK, linewidth=1.2, label="nu_t/nu (right)")
        other.set_ylabel("nu_t/nu")
        other.set_ylim(bottom=0.0)
        lines = [*axes.get_lines(), *other.get_lines()]
        labels = [str(line.get_label()) for line in lines]
        axes.legend(lines, labels, frameon=False, loc="upper left", bbox_to_anchor=(0.0, 0.84))
    return buffer.getvalue()


def two_wall_flow(profile: dict[str, NDArray[np.float64]], title: str, form: str) -> bytes:
    """Return a picture of velocity and stress from wall to wall."""
    with figure(form) as (axes, buffer):
        axes.plot(profile["place"], profile["velocity"], color=CURVE, linewidth=1.8,
                  label="U/U_b")  # fmt: skip
        axes.plot(profile["place"], profile["stress"], color=SECOND, linewidth=1.0, linestyle="--",
                  label="stress over that at the first wall")  # fmt: skip
        axes.axhline(0.0, color=INK, linewidth=0.6)
        axes.set_xlabel("distance from the inner wall, or the wall at rest, over the gap")
        axes.set_xlim(0.0, 1.0)
        axes.grid(which="major", color="#dddddd", linewidth=0.6)
        axes.set_title(title, fontsize=9)
        axes.legend(frameon=False)
    return buffer.getvalue()


def friction_chart(
    re: NDArray[np.float64], rough: NDArray[np.float64], found: NDArray[np.float64],
    colebrook: NDArray[np.float64], form: str,
) -> bytes:  # fmt: skip
    """Return friction factor against Re for a family of roughnesses, with measured points."""
    with figure(form, 7.6, 5.2) as (axes, buffer):
        for i, ks in enumerate(rough):
            first = i == 0
            axes.loglog(
                re,
                found[:, i],
                color=CURVE,
                linewidth=1.6,
                label="mixing length" if first else None,
            )
            axes.loglog(
                re, colebrook[:, i], color=SECOND, linewidth=0.9, linestyle="--",
                label="Colebrook-White" if first else None,
            )  # fmt: skip
            text = f"k_s/D = {ks:g}" if ks else "smooth"
            axes.annotate(
                text, (re[-1], found[-1, i]), xytext=(4, 0), textcoords="offset points",
                va="center", fontsize=8, color=INK,
            )  # fmt: skip
        for (name, row), marker in zip(
            tables.read("measured_pipe_friction.toml").items(), "os", strict=True
        ):
            points = np.array(row["points"])
            points = points[points[:, 0] >= re[0]]
            axes.plot(
                points[:, 0], points[:, 1], marker, color=MARK, markersize=3.5,
                markerfacecolor="none", label=f"measured, {name} ({row['source']})",
            )  # fmt: skip
        axes.set_xlabel("Reynolds number, U_b D/nu")
        axes.set_ylabel("Darcy friction factor")
        axes.set_xlim(re[0], re[-1] * 6.0)
        axes.set_yticks([0.006, 0.008, 0.01, 0.015, 0.02, 0.03, 0.04])
        axes.set_yticklabels(["0.006", "0.008", "0.01", "0.015", "0.02", "0.03", "0.04"])
        axes.minorticks_off()
        axes.grid(which="major", color="#dddddd", linewidth=0.6)
        axes.legend(frameon=False, loc="lower left", fontsize=8)
    return buffer.getvalue()
