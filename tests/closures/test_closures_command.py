"""The command: forms, exit status, pipes, standard input, what it imports."""

from __future__ import annotations

import csv
import io
import json
import pathlib
import subprocess
import sys

import pytest

from closures.command import COMMANDS, run

ROOT = pathlib.Path(__file__).parents[2]
RISER = ROOT / "docs" / "cases" / "water-riser.toml"
STATE = ["--velocity", "40 m/s", "--intensity", "5 %", "--mixing-length", "21 mm",
         "--kinematic-viscosity", "1.5e-5"]  # fmt: skip


def command(*arguments: str, **options) -> subprocess.CompletedProcess:
    return subprocess.run(
        [sys.executable, "-m", "closures", *arguments], cwd=ROOT, capture_output=True, text=True,
        check=False, **options,
    )  # fmt: skip


def test_help_version_and_every_sub_command(capsys):
    assert run(["--help"]) == 0
    out = capsys.readouterr().out
    assert all(name in out for name in COMMANDS)
    assert "licensed" in out
    assert run(["--version"]) == 0
    assert capsys.readouterr().out.startswith("closures ")
    for name in COMMANDS:
        assert run([name, "--help"]) == 0
        capsys.readouterr()


def test_help_fits_80_columns(capsys):
    for arguments in (["--help"], *([name, "--help"] for name in COMMANDS)):
        run(arguments)
        assert max(map(len, capsys.readouterr().out.splitlines())) <= 80


@pytest.mark.parametrize("form", ["text", "json", "markdown"])
def test_sheet_forms(form, capsys, tmp_path):
    assert run(["sheet", str(RISER), "--format", form]) == 0
    shown = capsys.readouterr().out
    assert "menter-sst-2003" in shown
    file = tmp_path / "sheet"
    assert run(["sheet", str(RISER), "--format", form, "--output", str(file)]) == 0
    assert capsys.readouterr().out == ""
    assert file.read_text(encoding="utf-8") == shown
    assert [p.name for p in tmp_path.iterdir()] == ["sheet"]


def test_sheet_from_standard_input_is_the_same():
    from_file = command("sheet", str(RISER), "--format", "json")
    piped = command("sheet", "-", "--format", "json", input=RISER.read_text())
    assert from_file.returncode == piped.returncode == 0
    assert from_file.stdout == piped.stdout
    assert json.loads(piped.stdout)["flow"]["kind"] == "pipe"


def test_exit_status():
    assert command("sheet", "docs/cases/slow-duct.toml").returncode == 1
    assert command("sheet", "docs/cases/ventilation-duct.toml").returncode == 0
    assert command("sheet", "docs/cases/ventilation-duct.toml", "--strict").returncode == 1
    assert command("sheet", "none.toml").returncode == 2


@pytest.mark.parametrize("which", ["case", "sheet"])
def test_schemas_are_printed(which, capsys):
    assert run(["sheet", "--schema", which]) == 0
    assert json.loads(capsys.readouterr().out)["$schema"].endswith("2020-12/schema")


def test_inlet_for_one_closure(capsys):
    assert run(["inlet", "--closure", "sst", *STATE, "--format", "json"]) == 0
    data = json.loads(capsys.readouterr().out)
    assert data["closure"]["id"] == "menter-sst-2003"
    assert data["inlet"]["set"]["k"] == pytest.approx(6.0)
    assert data["inlet"]["set"]["omega"] == pytest.approx(212.958855, rel=1e-8)


def test_inlet_for_all_as_csv(capsys):
    assert run(["inlet", *STATE, "--format", "csv"]) == 0
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    assert len({row["closure"] for row in rows}) > 35
    assert all(float(row["value"]) >= 0 for row in rows)


@pytest.mark.parametrize("form", ["text", "markdown"])
def test_inlet_reads_well(form, capsys):
    assert run(["inlet", "--closure", "lrr", *STATE, "--format", form]) == 0
    out = capsys.readouterr().out
    assert "launder-reece-rodi-1975" in out
    assert "uu" in out


def test_inlet_with_a_fluid(capsys):
    arguments = ["inlet", "--closure", "sa", "--fluid", "air", "--temperature", "20 degC",
                 "--viscosity-ratio", "1", "--format", "json"]  # fmt: skip
    assert run(arguments) == 0
    assert json.loads(capsys.readouterr().out)["inlet"]["viscosity_ratio"] == 1.0


def test_wall(capsys):
    arguments = ["wall", "--fluid", "water", "--kind", "pipe", "--diameter", "0.2 m", "--bulk-velocity",
                 "2 m/s", "--closure", "k-epsilon", "--y-plus", "50", "--layers", "5", "--growth", "1.2"]  # fmt: skip
    assert run([*arguments, "--format", "json"]) == 0
    data = json.loads(capsys.readouterr().out)
    assert data["wall"]["layers"]["count"] == 5
    assert "inlet" not in data
    assert run(arguments) == 0
    assert "Wall" in capsys.readouterr().out


def test_coefficients(capsys):
    assert run(["coefficients", "list", "--format", "json"]) == 0
    assert len(json.loads(capsys.readouterr().out)) >= 50
    assert run(["coefficients", "list", "--family", "k-omega"]) == 0
    out = capsys.readouterr().out
    assert "wilcox-1988" in out
    assert "chien-1982" not in out
    for form in ("text", "json", "markdown"):
        assert run(["coefficients", "show", "sst-1994", "--format", form]) == 0
        out = capsys.readouterr().out
        assert "a_1" in out
        assert "0.31" in out
    for form in ("text", "csv", "markdown"):
        assert run(["coefficients", "list", "--format", form]) == 0
        capsys.readouterr()


def test_lists_fit_80_columns(capsys):
    run(["coefficients", "list"])
    assert max(map(len, capsys.readouterr().out.splitlines())) <= 82
    for name in ("sst-1994", "gamma-re-theta", "ssg"):
        run(["coefficients", "show", name])
        assert max(map(len, capsys.readouterr().out.splitlines())) <= 80


def modules(*arguments: str) -> set[str]:
    code = (
        "import sys; from closures.command import run; import io, contextlib;\n"
        "with contextlib.redirect_stdout(io.StringIO()):\n"
        f"    run({list(arguments)!r})\n"
        "print(' '.join(sorted({m.split('.')[0] for m in sys.modules})))"
    )
    done = subprocess.run(
        [sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True, check=True
    )
    return set(done.stdout.split())


@pytest.mark.parametrize("arguments", [("--help",), ("coefficients", "list"), ("sheet", "--help")])
def test_listing_imports_no_numpy(arguments):
    assert not {"numpy", "scipy", "pint", "CoolProp", "matplotlib", "jinja2"} & modules(*arguments)


def test_quick_inlet_imports_numpy_only():
    plain = [a.split()[0] if a[0].isdigit() else a for a in STATE]
    plain[3], plain[5] = "0.05", "0.021"
    assert not {"scipy", "pint", "CoolProp", "matplotlib"} & modules(
        "inlet", "--closure", "sst", *plain
    )


def test_sheet_of_water_imports_no_property_library():
    # the unit library looks for scipy by itself when it is installed
    assert not {"CoolProp", "matplotlib", "jinja2"} & modules("sheet", str(RISER))


def test_a_reader_that_closes_the_pipe_is_left_quietly():
    arguments = [sys.executable, "-m", "closures", "inlet", *STATE]
    pipes = {"stdout": subprocess.PIPE, "stderr": subprocess.PIPE}
    with subprocess.Popen(arguments, cwd=ROOT, **pipes) as process:
        process.stdout.close()
        assert process.stderr.read() == b""
        assert process.wait() == 1


def test_full_device(tmp_path):
    with open("/dev/full", "w") as full:
        done = subprocess.run(
            [sys.executable, "-m", "closures", "coefficients", "list"], cwd=ROOT, stdout=full,
            stderr=subprocess.PIPE, text=True, check=False,
        )  # fmt: skip
    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert "Traceback" not in done.stderr


def test_an_old_output_survives_a_failed_run(tmp_path, capsys):
    file = tmp_path / "sheet.txt"
    file.write_text("old")
    bad = tmp_path / "bad.toml"
    bad.write_text("x = 1")
    assert run(["sheet", str(bad), "--output", str(file)]) == 2
    assert file.read_text() == "old"


def test_shell_completion_is_there():
    done = command(env={"_CLOSURES_COMPLETE": "bash_source", "PATH": "/usr/bin:/bin"})
    assert done.returncode in (0, 2)


@pytest.mark.parametrize("law", ["viscous", "log", "two-layer", "three-layer", "power", "spalding",
                                 "reichardt", "musker", "van-driest", "spalart-allmaras", "chauhan"])  # fmt: skip
def test_profile_of_every_law(law, capsys):
    assert run(["profile", law, "--format", "csv", "--from", "1", "--points", "5"]) == 0
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    assert len(rows) == 5
    assert float(rows[-1]["u_plus"]) > 10 or law == "viscous"


def test_profile_forms(capsys):
    for form in ("text", "json", "markdown"):
        assert run(["profile", "musker", "--log-law", "lee-moser-2015", "--delta-plus", "2000",
                    "--format", form]) == 0  # fmt: skip
        out = capsys.readouterr().out
        assert "Musker" in out
    assert max(map(len, command("profile", "spalding").stdout.splitlines())) <= 80


@pytest.mark.parametrize("form", ["svg", "png"])
def test_profile_picture_is_the_same_every_time(form, tmp_path):
    pictures = []
    for n in range(2):
        file = tmp_path / f"{n}.{form}"
        arguments = [
            "profile",
            "spalding",
            "--y-plus",
            "40",
            "--layers",
            "6",
            "--format",
            form,
            "-o",
            str(file),
        ]
        assert command(*arguments).returncode == 0
        pictures.append(file.read_bytes())
    assert pictures[0] == pictures[1]
    assert pictures[0][:5] in (b"<?xml", b"\x89PNG\r")


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (["spaldng"], "did you mean 'spalding'"), (["spalding", "--order", "5"], "order"),
        (["viscous", "--kappa", "0.4"], "--kappa"), (["log", "--log-law", "cole"], "log_law"),
        (["spalding", "--from", "-1"], "--from"), (["spalding", "--points", "1"], "--points"),
        (["spalding", "--Pi", "0.5"], "--delta-plus"), (["spalding", "--kappa", "nan"], "kappa"),
        (["spalding", "--y-plus", "-2", "--format", "svg"], "--y-plus"),
    ],
)  # fmt: skip
def test_profiles_that_cannot_be(arguments, words, capsys):
    assert run(["profile", *arguments]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert words in err
    assert err.count("\n") == 1
