"""Usual values: roughness, terrain, intensities, lengths."""

from __future__ import annotations

import pytest

import closures
from closures import situations
from walllaw import tables
from walllaw.errors import InputError, TableError


# Hydraulic Institute, Engineering Data Book (2nd ed. 1990), Table 3.A.1; first rows L. F. Moody,
# Trans. ASME 66 (1944): equivalent roughness in mm.
@pytest.mark.parametrize(
    ("name", "millimetres"),
    [
        ("commercial-steel", 0.0457), ("drawn-tubing", 0.00152), ("cast-iron", 0.26),
        ("asphalted-cast-iron", 0.122), ("copper-tubing", 0.0015), ("fiberglass", 0.005),
        ("stainless-steel", 0.015), ("cement-lined-steel", 1.5),
    ],
)  # fmt: skip
def test_surfaces(name, millimetres):
    assert situations.surface(name)["value"] == pytest.approx(1e-3 * millimetres, rel=1e-12)


# EN 1991-1-4, Table 4.1: z0 in m
@pytest.mark.parametrize(
    ("name", "z0"), [("en-0", 0.003), ("en-1", 0.01), ("en-2", 0.05), ("en-3", 0.3), ("en-4", 1.0)]
)
def test_terrains(name, z0):
    assert situations.terrain(name)["z0"] == z0


def test_sustained_intensity_is_that_of_the_paper():
    # P. R. Spalart & C. L. Rumsey, AIAA J. 45 (2007): k = 1e-6 U^2 is Tu = 0.08165 %
    assert 100 * situations.usual_intensity("ambient-sustained")["value"] == pytest.approx(
        0.08165, abs=5e-6
    )


def test_the_two_names_of_one_length_agree():
    # 0.07 D_h as mixing length is 0.0383 D_h as eddy viscosity length (C_mu = 0.09)
    pipe = situations.usual_length("developed-pipe")
    other = situations.usual_length("developed-duct-viscosity-length")
    assert other["times"] == pytest.approx(0.0383405790, rel=1e-9)
    assert pipe.convention != other.convention


def test_the_four_names_of_the_length_of_a_pipe():
    # the integral length is 0.43 of the dissipation length; both against hand calculation
    dissipation = situations.usual_length("developed-pipe-dissipation-length")
    integral = situations.usual_length("developed-pipe-integral-length")
    assert dissipation["times"] == pytest.approx(0.426006434, abs=5e-10)
    assert integral["times"] == pytest.approx(0.183182766, abs=5e-10)


def test_ranges_of_surfaces_are_those_of_the_handbook():
    # Hydraulic Institute (1990), Table 3.A.1, in mm
    riveted, stave = situations.surface("riveted-steel"), situations.surface("wood-stave")
    assert (riveted["low"], riveted["high"]) == (0.914e-3, 9.14e-3)
    assert (stave["low"], stave["high"]) == (0.18e-3, 0.91e-3)


def test_davenport_classes():
    # J. Wieringa (1992): roughness length of the classes
    names = ["sea", "smooth", "open", "rough", "very-rough", "chaotic"]
    found = [situations.terrain(f"{name}-davenport")["z0"] for name in names]
    assert found == [0.0002, 0.005, 0.03, 0.25, 0.5, 2.0]


@pytest.mark.parametrize("table", ["surfaces", "terrains", "intensities", "lengths"])
def test_every_row_has_a_source(table):
    for row in situations.listing(table):
        assert row.source == "common practice" or row.source in tables.sources()
        assert row.title
        assert all(value > 0 for value in row.numbers.values())


def test_misspelt_names_get_the_nearest():
    with pytest.raises(InputError, match="did you mean 'cast-iron'"):
        situations.surface("cast-irom")
    with pytest.raises(InputError, match="did you mean 'wind-tunnel'"):
        situations.usual_intensity("windtunnel")


@pytest.mark.parametrize(
    ("row", "words"),
    [
        ({"title": "t", "value": "1", "source": "moody-1944"}, "status is missing"),
        ({"title": "t", "source": "moody-1944", "status": "memory"}, "value is missing"),
        ({"title": "t", "value": "1", "source": "nobody-1900", "status": "memory"}, "nobody-1900"),
        (
            {
                "title": "t",
                "value": "3",
                "low": "1",
                "high": "2",
                "source": "moody-1944",
                "status": "memory",
            },
            "not between",
        ),
        ({"title": "t", "value": "one", "source": "moody-1944", "status": "memory"}, "one"),
    ],
)
def test_damage_is_found(row, words, monkeypatch):
    monkeypatch.setattr(tables, "read", lambda *parts: {"broken": row})
    with pytest.raises(TableError, match=words):
        situations.listing("surfaces")


def test_a_length_the_case_does_not_have_is_refused():
    case = {
        "flow": {"kind": "pipe", "diameter": 0.1, "bulk_velocity": 2.0},
        "fluid": {"density": 998.0, "kinematic_viscosity": 1e-6},
        "turbulence": {"intensity": 0.05, "length_estimate": "grid-mesh"},
        "closure": {"name": "sst"},
    }
    with pytest.raises(InputError, match="a multiple of mesh_width, which a pipe does not have"):
        closures.sheet(case)
