"""The repository as a whole: what lies at its top, what is installed from it, and that it fits any machine."""

import re
import subprocess
import tomllib
from pathlib import Path

import pytest

import app
from app.demo_files import demo_paths

ROOT = Path(__file__).resolve().parents[2]
TOP_LEVEL = {
    "README.md",
    "DEVELOPERS.md",
    "LICENSE",
    "pyproject.toml",
    "app",
    "solver",
    "tests",
    "demo_projects",
}


def files() -> list[Path]:
    """All files of the repository: those that git knows, or where there is no git (a download) all that are there."""
    if (ROOT / ".git").exists():
        listing = subprocess.run(["git", "ls-files", "-z"], cwd=ROOT, capture_output=True, check=True)
        return [
            ROOT / name for name in listing.stdout.decode().split("\0") if name and (ROOT / name).exists()
        ]
    return [
        path
        for top in ROOT.iterdir()
        if not top.name.startswith(".")
        for path in (top.rglob("*") if top.is_dir() else [top])
        if path.is_file() and "__pycache__" not in path.parts
    ]


def test_the_top_level_stays_as_agreed() -> None:
    tops = {path.relative_to(ROOT).parts[0] for path in files()}
    assert {name for name in tops if not name.startswith(".")} <= TOP_LEVEL


def test_no_file_names_a_place_on_somebodys_machine() -> None:
    places = re.compile(
        rb"(?<![\w.])/(?:" + rb"|".join((b"home", b"root", b"Users", b"work")) + rb")/|[A-Z]:\\+Users\\"
    )
    found = [
        f"{path.relative_to(ROOT)}: {line.decode(errors='replace').strip()}"
        for path in files()
        if path.suffix not in {".png", ".ico", ".xlsx"}
        for line in path.read_bytes().splitlines()
        if places.search(line)
    ]
    assert found == []


def test_no_source_file_exceeds_400_lines() -> None:
    long = {
        str(path.relative_to(ROOT)): lines
        for path in files()
        if path.suffix == ".py" and (lines := path.read_bytes().count(b"\n")) > 400
    }
    assert long == {}


@pytest.mark.parametrize("top", ["app", "solver"])
def test_every_folder_with_code_is_a_package_so_that_it_is_installed(top: str) -> None:
    folders = {path.parent for path in files() if path.suffix == ".py" and path.is_relative_to(ROOT / top)}
    assert [folder for folder in folders if not (folder / "__init__.py").exists()] == []


def test_the_version_stands_in_one_place() -> None:
    project = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))
    assert "version" not in project["project"]
    assert project["tool"]["setuptools"]["dynamic"]["version"] == {"attr": "app.__version__"}
    assert re.fullmatch(r"\d+\.\d+\.\d+", app.__version__)


def test_demos_are_found_beside_the_program() -> None:
    assert [path.name for path in demo_paths()] == sorted(
        path.name for path in files() if path.parent == ROOT / "demo_projects" and path.suffix == ".strike"
    )
