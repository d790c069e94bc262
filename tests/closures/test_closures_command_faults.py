"""Wrong case files and command lines: one line, field named, exit 2, standard output empty."""

from __future__ import annotations

import pathlib

import pytest

from closures.command import run

GOOD = {
    "fluid": 'name = "water"\ntemperature = "8 degC"\npressure = "3 bar"',
    "flow": 'kind = "pipe"\ndiameter = "260 mm"\nbulk_velocity = "1.9 m/s"\nroughness = "0.045 mm"',
    "turbulence": 'intensity = "5 %"\nmixing_length = "18 mm"',
    "closure": 'name = "menter-sst-2003"',
    "wall": 'treatment = "resolved"\ny_plus = 0.8\ngrowth = 1.2\nlayers = 30',
}


def case(**changes: str | None) -> str:
    """The good case with whole tables replaced (None: left out)."""
    tables = {**GOOD, **changes}
    return 'title = "A riser"\n' + "\n".join(
        f"[{name}]\n{body}" for name, body in tables.items() if body is not None
    )


# (what is wrong, text of the case, words the message must hold)
FAULTS = [
    ("not TOML", "title = ", "TOML"),
    ("not UTF-8", b'title = "\xff"', "UTF-8"),
    ("empty", "", "fluid"),
    ("unknown table", case() + "\n[wal]\ny_plus = 1", "did you mean 'wall'"),
    ("unknown key", case(flow=GOOD["flow"] + "\ndiametre = 1"), "did you mean 'diameter'"),
    ("key of another table", case(wall=GOOD["wall"] + "\nroughness = 1e-4"), "flow.roughness"),
    ("table given as a value", 'fluid = "water"', "fluid"),
    ("no fluid", case(fluid=None), "fluid"),
    ("no flow", case(flow=None), "flow"),
    ("no turbulence", case(turbulence=None), "turbulence"),
    ("no closure", case(closure=None), "closure"),
    ("unknown fluid", case(fluid='name = "watr"'), "fluid.name"),
    ("number as a name", case(fluid="name = 5"), "fluid.name"),
    (
        "unit of another dimension",
        case(fluid='name = "water"\ntemperature = "8 m"'),
        "fluid.temperature",
    ),
    ("unknown unit", case(fluid='name = "water"\ntemperature = "8 degX"'), "fluid.temperature"),
    (
        "decimal comma",
        case(flow='kind = "pipe"\ndiameter = "0,26 m"\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    (
        "text after the unit",
        case(flow='kind = "pipe"\ndiameter = "1 m 3"\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    (
        "power tower",
        case(flow='kind = "pipe"\ndiameter = "9**9**9 m"\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    ("infinite", case(flow='kind = "pipe"\ndiameter = inf\nbulk_velocity = 1'), "flow.diameter"),
    (
        "not a number",
        case(flow='kind = "pipe"\ndiameter = nan\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    (
        "overflowing text",
        case(flow='kind = "pipe"\ndiameter = "1e400 m"\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    (
        "huge integer",
        case(flow=f'kind = "pipe"\ndiameter = {"9" * 400}\nbulk_velocity = 1'),
        "flow.diameter",
    ),
    ("zero diameter", case(flow='kind = "pipe"\ndiameter = 0\nbulk_velocity = 1'), "flow.diameter"),
    (
        "negative velocity",
        case(flow='kind = "pipe"\ndiameter = 1\nbulk_velocity = "-1 m/s"'),
        "flow.bulk_velocity",
    ),
    ("array", case(flow='kind = "pipe"\ndiameter = [1, 2]\nbulk_velocity = 1'), "flow.diameter"),
    ("boolean", case(flow='kind = "pipe"\ndiameter = true\nbulk_velocity = 1'), "flow.diameter"),
    (
        "unknown kind",
        case(flow='kind = "pip"\ndiameter = 1\nbulk_velocity = 1'),
        "did you mean 'pipe'",
    ),
    ("no kind", case(flow="diameter = 1\nbulk_velocity = 1"), "flow.kind"),
    (
        "key of another kind",
        case(flow='kind = "plate"\ndiameter = 1\nvelocity = 1'),
        "flow.diameter",
    ),
    ("no geometry", case(flow='kind = "pipe"\nbulk_velocity = 1'), "flow.diameter"),
    ("nothing drives the flow", case(flow='kind = "pipe"\ndiameter = 1'), "exactly one"),
    ("two drives", case(flow=GOOD["flow"] + "\nvolume_flow = 0.1"), "exactly one"),
    (
        "inner above outer",
        case(flow='kind = "annulus"\ninner_diameter = 2\nouter_diameter = 1\nbulk_velocity = 1'),
        "inner_diameter",
    ),
    (
        "channel flow rate without width",
        case(flow='kind = "channel"\nheight = 1\nvolume_flow = 1'),
        "flow.width",
    ),
    (
        "roughness and surface",
        case(flow=GOOD["flow"] + '\nsurface = "commercial-steel"'),
        "surface",
    ),
    (
        "unknown surface",
        case(flow='kind = "pipe"\ndiameter = 1\nbulk_velocity = 1\nsurface = "comercial-steel"'),
        "commercial-steel",
    ),
    (
        "roughness larger than the pipe",
        case(flow='kind = "pipe"\ndiameter = 1\nbulk_velocity = 1\nroughness = 0.6'),
        "flow.roughness",
    ),
    (
        "percent without its sign",
        case(turbulence='intensity = 5\nmixing_length = "18 mm"'),
        'did you mean "5 %"',
    ),
    (
        "three turbulence quantities",
        case(turbulence=GOOD["turbulence"] + "\nomega = 10"),
        "exactly two",
    ),
    ("one turbulence quantity", case(turbulence='intensity = "5 %"'), "exactly two"),
    (
        "dependent pair",
        case(turbulence='mixing_length = "18 mm"\nintegral_length = "40 mm"'),
        "independent",
    ),
    ("bare length scale", case(turbulence='intensity = "5 %"\nlength_scale = 0.02'), "convention"),
    (
        "bad multiple",
        case(turbulence='intensity = "5 %"\nmixing_length = { times = 0.07, of = "diametre" }'),
        "did you mean 'diameter'",
    ),
    (
        "incomplete multiple",
        case(turbulence='intensity = "5 %"\nmixing_length = { times = 0.07 }'),
        "turbulence.mixing_length",
    ),
    (
        "multiple of a length the flow lacks",
        case(turbulence='intensity = "5 %"\nmixing_length = { times = 0.07, of = "chord" }'),
        "turbulence.mixing_length",
    ),
    ("unknown estimate", case(turbulence='estimate = "developped"'), "did you mean 'developed'"),
    (
        "estimate and intensity",
        case(turbulence='estimate = "developed"\nintensity = "5 %"'),
        "turbulence",
    ),
    ("unknown closure", case(closure='name = "menter-sst-203"'), "did you mean 'menter-sst-2003'"),
    ("closure table that is not there", case(closure='name = "./none.toml"'), "none.toml"),
    ("a heat closure", case(closure='name = "kays-crawford-1993"'), "closure.name"),
    (
        "unknown treatment",
        case(wall='treatment = "wall-functions"\ny_plus = 30'),
        "did you mean 'wall-function'",
    ),
    ("y_plus and height", case(wall='y_plus = 1\nfirst_cell_height = "1 mm"'), "wall"),
    (
        "four of four",
        case(wall='y_plus = 1\ngrowth = 1.2\nlayers = 20\ntotal_thickness = "1 mm"'),
        "wall",
    ),
    ("half a layer", case(wall="y_plus = 1\ngrowth = 1.2\nlayers = 20.5"), "wall.layers"),
    ("growth below one", case(wall="y_plus = 1\ngrowth = 0.9\nlayers = 20"), "wall.growth"),
    (
        "stack that cannot be",
        case(wall='y_plus = 1\nlayers = 30\ntotal_thickness = "1 um"'),
        "wall",
    ),
    ("unknown log law", case(wall='y_plus = 1\nlog_law = "cole"'), "wall.log_law"),
    (
        "absolute and gauge pressure",
        case(fluid='name = "water"\npressure = "3 bar"\ngauge_pressure = "2 bar"'),
        "gauge_pressure",
    ),
    (
        "dynamic viscosity as kinematic",
        case(fluid='kinematic_viscosity = "1.8e-5 Pa*s"'),
        "dynamic viscosity",
    ),
    (
        "three properties",
        case(fluid="density = 1000\ndynamic_viscosity = 1e-3\nkinematic_viscosity = 2e-6"),
        "fluid",
    ),
    (
        "below absolute zero",
        case(fluid='name = "air"\ntemperature = "-300 degC"'),
        "fluid.temperature",
    ),
    ("steam", case(fluid='name = "water"\ntemperature = "150 degC"\npressure = "1 bar"'), "fluid"),
    (
        "mass flow without density",
        case(fluid="kinematic_viscosity = 1e-6", flow='kind = "pipe"\ndiameter = 1\nmass_flow = 1'),
        "density",
    ),
]


@pytest.mark.parametrize(("text", "words"), [f[1:] for f in FAULTS], ids=[f[0] for f in FAULTS])
def test_wrong_case_file(tmp_path: pathlib.Path, capsys, text, words):
    file = tmp_path / "case.toml"
    file.write_bytes(text if isinstance(text, bytes) else text.encode())
    output = tmp_path / "sheet.json"
    for arguments in (["sheet", str(file)], ["sheet", str(file), "--output", str(output)]):
        assert run(arguments) == 2
        out, err = capsys.readouterr()
        assert out == ""
        assert words in err
        assert err.startswith("closures: ")
        assert err.count("\n") == 1
        assert len(err) < 600
    assert not output.exists()
    assert [p.name for p in tmp_path.iterdir()] == ["case.toml"]


def test_the_good_case_is_good(tmp_path, capsys):
    file = tmp_path / "case.toml"
    file.write_text(case())
    assert run(["sheet", str(file)]) == 0
    out, err = capsys.readouterr()
    assert err == ""
    assert "menter-sst-2003" in out


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (["sheet"], "CASE"),
        (["sheet", "none.toml"], "none.toml"),
        (["sheet", "."], "."),
        (["shet", "none.toml"], "did you mean 'sheet'"),
        (["sheet", "a.toml", "--form", "text"], "--form"),
        (["sheet", "a.toml", "--format", "pdf"], "pdf"),
        (["inlet", "--velocity", "4o m/s"], "velocity"),
        (["inlet", "--velocity", "40", "--intensity", "5"], "5 %"),
        (["inlet", "--closure", "sst2"], "closure"),
        (["coefficients", "show", "menter-sst-203"], "did you mean 'menter-sst-2003'"),
        (["coefficients", "shw", "sst"], "shw"),
        (["wall", "--fluid", "air", "--kind", "pipe"], "flow.diameter"),
        (["nonsense"], "command"),
    ],
    ids=lambda value: " ".join(value) if isinstance(value, list) else None,
)
def test_wrong_command_line(arguments, words, capsys, tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    assert run(arguments) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert words in err
    assert err.count("\n") == 1


def test_output_that_cannot_be_written(tmp_path, capsys):
    file = tmp_path / "case.toml"
    file.write_text(case())
    assert run(["sheet", str(file), "--output", str(tmp_path / "no" / "sheet.txt")]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "--output" in err
