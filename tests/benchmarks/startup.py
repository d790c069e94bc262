"""Whole commands, cold, against `python -c "import numpy"`: medians of interleaved runs."""

from __future__ import annotations

import pathlib
import statistics
import subprocess
import sys
import time

ROOT = pathlib.Path(__file__).parents[2]
STATE = ["--kinematic-viscosity", "1.5e-5", "--closure", "menter-sst-2003"]
RUN = [str(pathlib.Path(sys.executable).with_name("closures"))]
COMMANDS = {
    "import numpy": [sys.executable, "-c", "import numpy"],
    "closures --help": [*RUN, "--help"],
    "coefficients list": [*RUN, "coefficients", "list"],
    "inlet, SI numbers": [
        *RUN,
        "inlet",
        "--velocity",
        "40",
        "--intensity",
        "0.05",
        "--mixing-length",
        "0.021",
        *STATE,
    ],
    "inlet, units": [
        *RUN,
        "inlet",
        "--velocity",
        "144 km/h",
        "--intensity",
        "5 %",
        "--mixing-length",
        "21 mm",
        *STATE,
    ],
    "sheet": [*RUN, "sheet", str(ROOT / "docs" / "cases" / "water-riser.toml")],
}


def main() -> None:
    times: dict[str, list[float]] = {name: [] for name in COMMANDS}
    for repeat in range(16):
        for name, arguments in COMMANDS.items():
            start = time.perf_counter()
            subprocess.run(arguments, stdout=subprocess.DEVNULL, check=True)
            if repeat:
                times[name].append(time.perf_counter() - start)
    base = statistics.median(times["import numpy"])
    for name, values in times.items():
        print(
            f"{name:20} {statistics.median(values) * 1e3:8.1f} ms   {statistics.median(values) / base:.2f}"
        )


if __name__ == "__main__":
    main()
