"""The sheet: JSON by its schema, text within 80 columns, Markdown, determinism; demo cases."""

from __future__ import annotations

import json
import math
import os
import pathlib
import subprocess
import sys

import jsonschema
import pytest

import closures
from closures import report, schemas
from closures.case import load
from walllaw import tables

CASES = sorted((pathlib.Path(__file__).parents[2] / "docs" / "cases").glob("*.toml"))


def leaves(value, path=""):
    if isinstance(value, dict):
        for name, item in value.items():
            yield from leaves(item, f"{path}.{name}" if path else name)
    elif isinstance(value, list):
        for i, item in enumerate(value):
            yield from leaves(item, f"{path}[{i}]")
    else:
        yield path, value


def test_there_are_six_cases():
    assert len(CASES) >= 6


@pytest.mark.parametrize("file", CASES, ids=lambda p: p.stem)
def test_case_and_sheet_keep_their_schemas(file):
    for schema in (schemas.case_schema(), schemas.sheet_schema()):
        jsonschema.Draft202012Validator.check_schema(schema)
    jsonschema.Draft202012Validator(schemas.case_schema()).validate(
        load(file.read_bytes(), file.name)
    )
    data = json.loads(closures.sheet(file).to_json())
    jsonschema.Draft202012Validator(schemas.sheet_schema()).validate(data)


@pytest.mark.parametrize("file", CASES, ids=lambda p: p.stem)
def test_json_holds_plain_numbers_with_units(file):
    data = json.loads(closures.sheet(file).to_json())
    for path, value in leaves(data):
        assert value is not None, path
        if isinstance(value, float):
            assert math.isfinite(value), path
    for part in ("fluid", "flow", "inlet", "wall", "scales"):
        for path, value in leaves(data.get(part, {}), part):
            assert isinstance(value, str) or path in data["units"], path
    assert data["schema"] == "closures-sheet/1"
    assert data["cautions"]
    known = {row["key"] for row in data["sources"]}
    assert known <= set(tables.sources())
    assert {f["source"] for f in data["findings"]} <= known | {"common practice"}


@pytest.mark.parametrize("file", CASES, ids=lambda p: p.stem)
def test_text_fits_80_columns_and_says_what_must_be_said(file):
    text = report.text(closures.sheet(file))
    assert max(map(len, text.splitlines())) <= 80
    assert "licensed" in text
    assert "Ranges of the relations used" in text
    assert text.isprintable() or all(c.isprintable() or c == "\n" for c in text)


@pytest.mark.parametrize("file", CASES, ids=lambda p: p.stem)
def test_markdown_has_the_same_parts(file):
    sheet = closures.sheet(file)
    text = report.markdown(sheet)
    for heading in ("Findings", "Flow", "Inlet", "Wall", "Sources", "Cautions"):
        assert f"## {heading}" in text
    assert "licensed" in text


def test_the_slow_duct_is_flagged():
    file = next(p for p in CASES if p.stem == "slow-duct")
    assert "regime-laminar" in {f.id for f in closures.sheet(file).findings}
    assert closures.sheet(file).worst() == "error"


def test_hostile_titles_do_no_harm():
    case = {
        "title": "<script>|x|\n# y " + "z" * 200,
        "fluid": {"name": "air"},
        "flow": {"kind": "pipe", "diameter": 0.1, "bulk_velocity": 10.0},
        "turbulence": {"estimate": "developed"},
        "closure": {"name": "sst"},
    }
    sheet = closures.sheet(case)
    assert max(map(len, report.text(sheet).splitlines())) <= 80
    assert "<script>" not in report.markdown(sheet)


def test_same_input_same_bytes_anywhere(tmp_path):
    outputs = set()
    for seed, zone, language in (
        ("0", "UTC", "C"),
        ("1", "Asia/Tokyo", "C.UTF-8"),
        ("7", "UTC", "C"),
    ):
        done = subprocess.run(
            [sys.executable, "-m", "closures", "sheet", str(CASES[0]), "--format", "json"],
            cwd=pathlib.Path(__file__).parents[2], capture_output=True, check=False,
            env={**os.environ, "PYTHONHASHSEED": seed, "TZ": zone, "LC_ALL": language},
        )  # fmt: skip
        assert done.stderr == b""
        outputs.add(done.stdout)
    assert len(outputs) == 1


def test_sheet_indexes_like_its_json():
    sheet = closures.sheet(CASES[0])
    assert sheet["inlet"]["k"] == json.loads(sheet.to_json())["inlet"]["k"]
