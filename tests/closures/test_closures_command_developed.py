"""The command ``developed``: forms, drives, what is refused."""

from __future__ import annotations

import csv
import io
import json

import pytest

from closures.command import run
from walllaw import couette_poiseuille_flow, developed


def out(capsys, *arguments: str) -> str:
    assert run(["developed", *arguments]) == 0
    return capsys.readouterr().out


@pytest.mark.parametrize("geometry", ["pipe", "channel", "open-channel", "couette", "annulus"])
def test_every_geometry_and_form(geometry, capsys):
    extra = ["--radius-ratio", "0.4"] if geometry == "annulus" else []
    text = out(capsys, geometry, "--reynolds", "2e5", *extra)
    assert max(map(len, text.splitlines())) <= 80
    assert "darcy_friction" in text
    assert "engineer decide" in text
    assert "| darcy_friction |" in out(
        capsys, geometry, "--reynolds", "2e5", "--format", "markdown", *extra
    )
    data = json.loads(out(capsys, geometry, "--reynolds", "2e5", "--format", "json", *extra))
    assert data["summary"]["reynolds"]["value"] == pytest.approx(2e5, rel=1e-10)
    if geometry != "annulus":
        flow = developed(
            geometry,
            reynolds=2e5,
            mixing_length="linear" if geometry == "couette" else "nikuradse",
        )
        assert data["summary"]["darcy_friction"]["value"] == flow.darcy_friction
        rows = list(csv.DictReader(io.StringIO(
            out(capsys, geometry, "--reynolds", "2e5", "--format", "csv")
        )))  # fmt: skip
        assert float(rows[-1]["u_plus"]) == pytest.approx(flow.centreline_u_plus, rel=1e-6)
        eta = [float(r["eta"]) for r in rows]
        assert eta == sorted(set(eta))


def test_couette_flow_with_a_pressure_gradient(capsys):
    data = json.loads(
        out(capsys, "couette", "--stress-ratio", "0.5", "--re-tau", "900", "--format", "json")
    )
    flow = couette_poiseuille_flow(900.0, 0.5)
    assert data["summary"]["wall_u_plus"]["value"] == flow.wall_u_plus
    assert "wall_u_plus" in out(capsys, "couette", "--stress-ratio", "-0.5", "--re-tau", "900")


def test_annulus_in_units_as_profile_and_picture(capsys, tmp_path):
    case = ["annulus", "--radius-ratio", "0.5", "--diameter", "80 mm", "--fluid", "water",
            "--temperature", "20 degC", "--roughness", "0.02 mm"]  # fmt: skip
    data = json.loads(out(capsys, *case, "--bulk-velocity", "2 m/s", "--format", "json"))
    values = {n: row["value"] for n, row in data["summary"].items()}
    assert values["bulk_velocity"] == pytest.approx(2.0, rel=1e-10)
    # force balance: fall of pressure over density = f U_b^2/(2 D_h), D_h twice the gap of 20 mm
    fall = values["darcy_friction"] * 4.0 / (2.0 * 0.04)
    assert values["kinematic_pressure_gradient"] == pytest.approx(fall, rel=1e-10)
    again = out(capsys, *case, "--volume-flow", f"{values['volume_flow']!r} m3/s")
    assert f"{values['re_tau']:.6g}" in again
    profile = data["profile"]
    assert profile["wall_distance"][-1] < 0.02
    assert max(profile["si_velocity"]) == pytest.approx(2.0 * values["peak_ratio"], rel=1e-3)
    rows = out(capsys, *case, "--bulk-velocity", "2", "--format", "csv").splitlines()
    assert rows[0].startswith("place,velocity,stress,nu_t")
    assert len(rows) == len(profile["place"]) + 1
    file = tmp_path / "a.svg"
    assert (
        run(["developed", *case, "--bulk-velocity", "2", "--format", "svg", "-o", str(file)]) == 0
    )
    assert file.stat().st_size > 5000
    text = out(capsys, "couette", "--stress-ratio", "-0.4", "--re-tau", "900", "--height", "1 cm",
               "--fluid", "air")  # fmt: skip
    assert "wall_velocity" in text


def test_profile_in_si(capsys):
    case = ["channel", "--height", "0.1 m", "--fluid", "air", "--bulk-velocity", "12 m/s"]
    rows = list(csv.DictReader(io.StringIO(out(capsys, *case, "--format", "csv"))))
    assert float(rows[-1]["wall_distance"]) == pytest.approx(0.05, rel=1e-3)
    assert 12.0 < float(rows[-1]["velocity"]) < 15.0


def test_units_and_every_drive_agree(capsys):
    case = ["pipe", "--diameter", "260 mm", "--fluid", "water", "--temperature", "8 degC",
            "--roughness", "0.045 mm", "--format", "json"]  # fmt: skip
    first = json.loads(out(capsys, *case, "--bulk-velocity", "1.9 m/s"))["summary"]
    for drive, unit in (("volume_flow", "m3/s"), ("pressure_gradient", "Pa/m")):
        value = f"{first[drive]['value']!r} {unit}"
        again = json.loads(out(capsys, *case, f"--{drive.replace('_', '-')}", value))["summary"]
        for name, row in first.items():
            assert again[name]["value"] == pytest.approx(row["value"], rel=1e-10), name
    assert "nusselt_uniform_flux" in out(capsys, "pipe", "--re-tau", "2000", "--prandtl", "0.7")


@pytest.mark.parametrize("arguments", [["pipe", "--moody"], ["channel", "--re-tau", "900"]])
@pytest.mark.parametrize("form", ["svg", "png"])
def test_pictures_are_the_same_every_time(arguments, form, tmp_path):
    files = [tmp_path / f"{i}.{form}" for i in range(2)]
    for file in files:
        assert run(["developed", *arguments, "--format", form, "-o", str(file)]) == 0
    assert files[0].read_bytes() == files[1].read_bytes()
    assert files[0].stat().st_size > 5000


def test_the_chart_as_a_table(capsys):
    rows = list(csv.DictReader(io.StringIO(out(capsys, "--moody", "--format", "csv"))))
    assert {r["relative_roughness"] for r in rows} == {"0.0", "1e-05", "0.0001", "0.001", "0.01"}
    for row in rows:
        if float(row["reynolds"]) >= 1e5 and float(row["relative_roughness"]) <= 1e-3:
            ratio = float(row["darcy_friction"]) / float(row["colebrook"])
            assert abs(ratio - 1.0) < 0.03
    for form in ("text", "markdown", "json"):
        assert "colebrook" in out(capsys, "--moody", "--format", form)


def test_a_range_left_is_said(capsys):
    assert run(["developed", "pipe", "--reynolds", "3000"]) == 0
    assert "warning: Nikuradse" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("arguments", "words"),
    [(["tube", "--reynolds", "1e5"], "geometry"), (["pipe"], "--re-tau"), (["pipe", "--bulk-velocity", "3"], "--diameter"),
     (["pipe", "--reynolds", "1e5", "--re-tau", "5"], "--re-tau too"), (["channel", "--moody"], "pipe"),
     (["pipe", "--reynolds", "1e5", "--radius-ratio", "0.5"], "--radius-ratio"), (["annulus", "--reynolds", "1e5"], "--radius-ratio"),
     (["pipe", "--reynolds", "nan"], "reynolds"), (["pipe", "--reynolds", "1e5", "--mixing-length", "cass"], "did you mean 'cess'"),
     (["pipe", "--diameter", "1 kg", "--fluid", "air", "--bulk-velocity", "3"], "a length"),
     (["pipe", "--diameter", "1", "--kinematic-viscosity", "1e-5", "--pressure-gradient", "3"], "density"),
     (["pipe", "--fluid", "air", "--density", "3", "--reynolds", "1e5"], "--fluid"),
     (["pipe", "--temperature", "300 K", "--reynolds", "1e5"], "--fluid"),
     (["pipe", "--diameter", "0", "--fluid", "air", "--bulk-velocity", "3"], "--diameter"),
     (["channel", "--height", "0.1", "--fluid", "air", "--volume-flow", "3"], "--volume-flow"),
     (["pipe", "--reynolds", "1e5", "--roughness", "1 mm"], "--diameter"),
     (["annulus", "--reynolds", "1e5", "--radius-ratio", "0.5", "--pressure-gradient", "3"], "--pressure-gradient"),
     (["annulus", "--bulk-velocity", "3", "--radius-ratio", "0.5"], "--diameter"),
     (["annulus", "--reynolds", "1e5", "--radius-ratio", "0.5", "--roughness", "1 mm"], "--roughness"),
     (["annulus", "--reynolds", "1e5", "--radius-ratio", "0.5", "--roughness-model", "colebrok"], "did you mean 'colebrook'"),
     (["couette", "--stress-ratio", "0.5", "--re-tau", "900", "--height", "-1"], "--height"),
     (["couette", "--stress-ratio", "0.5"], "--re-tau"),
     (["pipe", "--stress-ratio", "0.5", "--re-tau", "900"], "--stress-ratio"),
     (["couette", "--stress-ratio", "0", "--re-tau", "900"], "stress_ratio"),
     (["couette", "--height", "0.1", "--fluid", "air", "--pressure-gradient", "3"], "bulk_velocity")],
)  # fmt: skip
def test_wrong_flags(arguments, words, capsys):
    assert run(["developed", *arguments]) == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert words in captured.err
    assert captured.err.count("\n") == 1
