"""Pictures, drawn without a display and the same bytes every time."""

from __future__ import annotations

import io
from collections.abc import Iterator
from contextlib import contextmanager
from typing import TYPE_CHECKING, Any

import numpy as np

if TYPE_CHECKING:
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
