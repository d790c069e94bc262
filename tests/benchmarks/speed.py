"""Run every speed script and write docs/speed.md; quote ratios, not times."""

from __future__ import annotations

import pathlib
import platform
import subprocess
import sys

HERE = pathlib.Path(__file__).parent
SCRIPTS = {
    "startup.py": 'Whole commands, cold, against `python -c "import numpy"`',
    "colebrook.py": "Colebrook-White root: error over a million points, speed against SciPy and a general library",
    "friction_velocity.py": "Friction velocity from (U, y, nu) against SciPy's root finders",
    "conversion.py": "State conversion of a million points against the formula typed with NumPy powers",
    "developed.py": "Developed flow against SciPy's quadrature, initial-value and boundary-value solvers",
}


def main() -> None:
    lines = ["# Speed", "", "Written by `tests/benchmarks/speed.py`: the output of each script, in one run, on one core of a",
             f"{platform.machine()} machine with Python {platform.python_version()}. Only ratios within a section mean something.", ""]  # fmt: skip
    for script, title in SCRIPTS.items():
        done = subprocess.run(
            [sys.executable, HERE / script], capture_output=True, text=True, check=True
        )
        lines += [
            f"## {title}",
            "",
            f"`tests/benchmarks/{script}`",
            "",
            "```",
            done.stdout.rstrip(),
            "```",
            "",
        ]
    target = HERE.parents[1] / "docs" / "speed.md"
    target.write_text("\n".join(lines).rstrip() + "\n", encoding="utf-8")
    print(target)


if __name__ == "__main__":
    main()
