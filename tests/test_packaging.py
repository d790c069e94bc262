"""Wheel, sdist and editable install carry the tables and work from another folder."""

from __future__ import annotations

import os
import pathlib
import subprocess
import sys
import tarfile
import zipfile

import pytest

ROOT = pathlib.Path(__file__).parents[1]
TABLES = {
    str(path.relative_to(ROOT / "tables"))
    for path in (ROOT / "tables").rglob("*")
    if path.is_file()
}


def run(*arguments: str, cwd: pathlib.Path, **environment: str) -> str:
    clean = {k: v for k, v in os.environ.items() if k != "PYTHONPATH"}
    done = subprocess.run(
        arguments,
        cwd=cwd,
        capture_output=True,
        text=True,
        check=False,
        env={**clean, **environment},
    )
    assert done.returncode == 0, done.stdout + done.stderr
    return done.stdout


@pytest.fixture(scope="module")
def built(tmp_path_factory: pytest.TempPathFactory) -> pathlib.Path:
    folder = tmp_path_factory.mktemp("dist")
    run(
        sys.executable,
        "-m",
        "build",
        "--no-isolation",
        "--outdir",
        str(folder),
        str(ROOT),
        cwd=folder,
    )
    return folder


def installed(folder: pathlib.Path, *what: str) -> pathlib.Path:
    """Install into an empty environment that sees the dependencies of this one; no network."""
    run(sys.executable, "-m", "venv", "--without-pip", str(folder / "venv"), cwd=folder)
    site = next((folder / "venv" / "lib").glob("python*/site-packages"))
    here = [p for p in sys.path if p.endswith("site-packages")]
    (site / "dependencies.pth").write_text("\n".join(here))
    python = folder / "venv" / "bin" / "python"
    run(sys.executable, "-m", "pip", "--python", str(python), "install", "--quiet", "--no-deps",
        "--no-build-isolation", "--no-index", "--ignore-installed", *what, cwd=folder)  # fmt: skip
    return python


def check(python: pathlib.Path, folder: pathlib.Path) -> None:
    where = run(str(python), "-c", "import closures; print(closures.__file__)", cwd=folder)
    shown = run(
        str(python), "-m", "closures", "coefficients", "show", "menter-sst-2003", cwd=folder
    )
    assert "a_1" in shown
    listed = run(
        str(python), "-c",
        "import os; from walllaw import tables; r = tables.root();"
        "print('\\n'.join(os.path.relpath(os.path.join(d, f), r) for d, _, fs in os.walk(r) for f in fs))",
        cwd=folder,
    )  # fmt: skip
    assert set(listed.split()) == TABLES, where


def test_wheel_holds_the_two_packages_and_the_tables(built):
    (wheel,) = built.glob("*.whl")
    names = zipfile.ZipFile(wheel).namelist()
    tops = {name.split("/")[0] for name in names if ".dist-info" not in name.split("/")[0]}
    assert tops == {"closures", "walllaw"}
    inside = {n.removeprefix("walllaw/_tables/") for n in names if n.startswith("walllaw/_tables/")}
    assert inside == TABLES
    assert {"closures/py.typed", "walllaw/py.typed"} <= set(names)


def test_sdist_is_complete(built):
    (sdist,) = built.glob("*.tar.gz")
    names = {name.partition("/")[2] for name in tarfile.open(sdist).getnames()}
    assert {"README.md", "DEVELOPERS.md", "CHANGELOG.md", "LICENSE", "pyproject.toml"} <= names
    assert {f"tables/{name}" for name in TABLES} <= names
    assert any(name.startswith("tests/") for name in names)
    assert any(name.startswith("docs/") for name in names)


def test_wheel_works_from_another_folder(built, tmp_path):
    (wheel,) = built.glob("*.whl")
    check(installed(tmp_path, str(wheel)), tmp_path)


def test_sdist_works_from_another_folder(built, tmp_path):
    (sdist,) = built.glob("*.tar.gz")
    check(installed(tmp_path, str(sdist)), tmp_path)


def test_editable_install_works_from_another_folder(tmp_path):
    check(installed(tmp_path, "--editable", str(ROOT)), tmp_path)
