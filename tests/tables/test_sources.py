"""The bibliography: complete, sorted, used."""

from __future__ import annotations

import json
import pathlib
import re

from closures.table_checks import STATUS
from walllaw import tables
from walllaw.relation import relations

ROOT = pathlib.Path(__file__).parents[2]
KEY = re.compile(r"\b(?:source|read_in)\s*=\s*\"([^\"]+)\"")


def items() -> list[dict]:
    return json.loads((ROOT / "tables" / "sources.json").read_text(encoding="utf-8"))


def test_items_are_sorted_unique_and_complete():
    keys = [item["id"] for item in items()]
    assert keys == sorted(set(keys))
    for item in items():
        assert item["title"], item["id"]
        assert item["author"], item["id"]
        assert all("literal" in a or "family" in a for a in item["author"]), item["id"]
        assert isinstance(item["issued"]["date-parts"][0][0], int), item["id"]
        assert item["custom"]["status"] in ("confirmed", "memory"), item["id"]
        assert re.fullmatch(r"[a-z0-9-]+", item["id"]), item["id"]


def test_every_key_used_in_a_table_exists():
    known = set(tables.sources())
    for path in (ROOT / "tables").rglob("*.toml"):
        for key in KEY.findall(path.read_text(encoding="utf-8")):
            assert key == "common practice" or key in known, (path, key)


def test_every_item_is_used():
    places = [*ROOT.glob("tables/**/*.toml"), *ROOT.glob("walllaw/**/*.py"), *ROOT.glob("closures/**/*.py"),
              *ROOT.glob("tests/**/*"), *ROOT.glob("docs/**/*.md")]  # fmt: skip
    text = "\n".join(
        p.read_text(encoding="utf-8") for p in places if p.suffix in (".toml", ".py", ".md", ".csv")
    )
    words = set(re.findall(r"[a-z0-9]+(?:-[a-z0-9]+)+", text))
    unused = [item["id"] for item in items() if item["id"] not in words]
    assert unused == []


def test_every_status_is_known():
    for path in (ROOT / "tables").rglob("*.toml"):
        for status in re.findall(r"\bstatus\s*=\s*\"([^\"]*)\"", path.read_text(encoding="utf-8")):
            assert status in STATUS, (path, status)


def test_every_source_names_its_status():
    # a row of a small table that gives a source gives the status of its evidence too
    for name in ("log_law", "surfaces", "terrains", "intensities", "lengths"):
        for key, row in tables.read(f"{name}.toml").items():
            assert row["source"], (name, key)
            assert row["status"] in STATUS, (name, key)


def test_every_relation_loads():
    found = relations()
    assert len(found) > 100
    for r in found:
        assert r.title, r.id
        assert r.formula, r.id
        assert r.unit, r.id


def test_every_cited_key_in_docstrings_exists():
    known = set(tables.sources())
    pattern = re.compile(r"References\n\s+-+\n((?:\s+[^\n]+\n)+?)\s*\n")
    for path in [*ROOT.glob("walllaw/*.py"), *ROOT.glob("closures/*.py")]:
        for block in pattern.findall(path.read_text(encoding="utf-8")):
            for key in re.findall(r"\b[a-z][a-z-]*-(?:1[89]|20)[0-9]{2}[a-z0-9-]*\b", block):
                assert key in known, (path, key)
