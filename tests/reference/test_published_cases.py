"""Whole cases whose conditions and results are published; the source stands beside each."""

from __future__ import annotations

import csv
import pathlib

import pytest

import closures

DATA = pathlib.Path(__file__).parent / "data"
SST = {"closure": {"name": "sst"}, "turbulence": {"estimate": "developed"}}
G = 9.80665


def rows(name: str) -> list[dict[str, str]]:
    with open(DATA / name, encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


@pytest.mark.parametrize(
    "row", rows("friction_handbook_hi.csv"), ids=lambda r: f"{r['nominal_in']}-{r['flow_gpm']}"
)
def test_hydraulic_institute_head_loss(row):
    """Hydraulic Institute, Engineering Data Book (1990): water at 60 F in schedule 40 steel pipe.

    Printed to two to four digits with a rounded viscosity: 0.9 % each.
    """
    s = closures.sheet({
        "fluid": {"density": "62.37 lb/ft3", "kinematic_viscosity": "1.2156e-5 ft2/s"},
        "flow": {"kind": "pipe", "diameter": f"{row['inside_diameter_in']} in",
                 "volume_flow": f"{row['flow_gpm']} gpm", "roughness": "0.00015 ft"},
        **SST,
    })  # fmt: skip
    head = 100 * s["flow"]["pressure_gradient"] / (s["fluid"]["density"] * G)  # ft per 100 ft
    assert head == pytest.approx(float(row["hf_ft_per_100ft"]), rel=9e-3)
    assert s["flow"]["velocity"] / 0.3048 == pytest.approx(float(row["velocity_ft_s"]), rel=7e-3)


def test_cengel_cimbala_example_8_3():
    """Y. A. Cengel & J. M. Cimbala, Fluid Mechanics, 3rd ed., Example 8-3: Re 126 400, f 0.0174, 11.8 psi."""
    s = closures.sheet({
        "fluid": {"density": "62.36 lb/ft3", "dynamic_viscosity": "7.536e-4 lb/ft/s"},
        "flow": {"kind": "pipe", "diameter": "2 in", "volume_flow": "0.2 ft3/s", "roughness": "7e-6 ft"},
        **SST,
    })  # fmt: skip
    assert s["flow"]["reynolds"] == pytest.approx(126_400, rel=7e-3)
    assert s["flow"]["darcy_friction"] == pytest.approx(0.0174, rel=7e-3)
    drop = s["flow"]["pressure_gradient"] * 200 * 0.3048
    assert drop / 6894.757 == pytest.approx(11.8, rel=7e-3)
    assert drop * s["flow"]["volume_flow"] == pytest.approx(461, rel=7e-3)


def test_cengel_cimbala_example_8_4():
    """The same book, Example 8-4: air in a smooth duct of 0.267 m: V 6.24 m/s, Re 100 800, f 0.0180."""
    s = closures.sheet({
        "fluid": {"kinematic_viscosity": "1.655e-5 m2/s"},
        "flow": {"kind": "pipe", "diameter": "0.267 m", "volume_flow": "0.35 m3/s"},
        **SST,
    })  # fmt: skip
    assert s["flow"]["velocity"] == pytest.approx(6.24, rel=7e-3)
    assert s["flow"]["reynolds"] == pytest.approx(100_800, rel=7e-3)
    assert s["flow"]["darcy_friction"] == pytest.approx(0.0180, rel=7e-3)
    head = s["flow"]["darcy_friction"] * 150 / 0.267 * s["flow"]["velocity"] ** 2 / (2 * G)
    assert head == pytest.approx(20.0, rel=1.5e-2)  # the diameter is rounded to three digits


@pytest.mark.parametrize(
    ("reynolds", "height", "y_plus"),
    [(5e6, 0.001478 / 275.80, 1.0), (2e7, 0.000273 / 275.80, 2 / 3)],
)
def test_drag_workshop_first_cells(reynolds, height, y_plus):
    """Fourth AIAA CFD Drag Prediction Workshop (2008) gridding guidelines: first node heights for y+.

    Distances in inches over the reference chord of 275.80 in; the guideline is rounded: 2.5 %.
    """
    s = closures.sheet({
        "fluid": {"kinematic_viscosity": 1.0 / reynolds},
        "flow": {"kind": "external", "chord": 1.0, "velocity": 1.0, "friction_law": "white"},
        "turbulence": {"viscosity_ratio": 0.2}, "closure": {"name": "sa"},
        "wall": {"first_cell_height": height, "first_unknown": "node"},
    })  # fmt: skip
    assert s["wall"]["y_plus"] == pytest.approx(y_plus, rel=2.5e-2)


def test_nasa_flat_plate_free_stream():
    """NASA Turbulence Modeling Resource (2025), flat plate, SST: Tu 0.039 %, mu_t/mu 0.009 at M 0.2.

    Set there by k = 9e-9 a^2, omega = 1e-6 a^2/nu.
    """
    a, nu = 340.0, 68.0 / 5e6  # Mach 0.2, unit Reynolds number 5e6
    s = closures.sheet({
        "fluid": {"kinematic_viscosity": nu},
        "flow": {"kind": "plate", "length": 0.97, "velocity": 0.2 * a, "tripped": True},
        "turbulence": {"k": 9e-9 * a**2, "omega": 1e-6 * a**2 / nu}, "closure": {"name": "sst-1994"},
    })  # fmt: skip
    assert 100 * s["inlet"]["intensity"] == pytest.approx(0.039, abs=5e-4)
    assert s["inlet"]["viscosity_ratio"] == pytest.approx(0.009, rel=1e-12)
    # c_f of the converged solutions there is 0.0027 at this station; a plate law is within 5 %
    assert s["flow"]["skin_friction"] == pytest.approx(0.0027, rel=5e-2)


def test_spalart_rumsey_ambient():
    """P. R. Spalart & C. L. Rumsey, AIAA J. 45 (2007): k = 1e-6 U^2, omega = 5 U/L: Tu 0.08165 %, nu_t/nu 2e-7 Re."""
    s = closures.sheet({
        "fluid": {"kinematic_viscosity": 1.5e-5},
        "flow": {"kind": "external", "length": 3.0, "velocity": 50.0},
        "turbulence": {"k": 1e-6 * 50**2, "omega": 5 * 50 / 3}, "closure": {"name": "sst-sust"},
    })  # fmt: skip
    assert 100 * s["inlet"]["intensity"] == pytest.approx(0.08165, abs=5e-6)
    assert s["inlet"]["viscosity_ratio"] == pytest.approx(2e-7 * s["flow"]["reynolds"], rel=1e-12)


@pytest.mark.parametrize("row", rows("friction_superpipe.csv"), ids=lambda r: r[next(iter(r))])
def test_superpipe_friction(row):
    """Superpipe and DNS friction (McKeon et al. 2004, Wu & Moin 2008): Colebrook smooth within 4 %."""
    names = {k.lower(): v for k, v in row.items()}
    re = float(names.get("re_d") or names.get("re"))
    f = float(next(v for k, v in names.items() if k.startswith(("f", "darcy"))))
    s = closures.sheet({"fluid": {"kinematic_viscosity": 1e-6},
                        "flow": {"kind": "pipe", "diameter": 0.1, "reynolds": re}, **SST})  # fmt: skip
    assert s["flow"]["darcy_friction"] == pytest.approx(f, rel=4e-2)
