"""What a checkout needs and has: requirements, versions, stamp."""

import sys
from pathlib import Path

import pytest

from app.first_start import first_use, needs

PYPROJECT = """
[project]
requires-python = ">=3.11,<3.14"
dependencies = ["Some.Thing>=1.4,<2"]
[project.optional-dependencies]
test = ["other_thing>=0.9,<0.10"]
"""


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    (tmp_path / "pyproject.toml").write_text(PYPROJECT, encoding="utf-8")
    return tmp_path


@pytest.fixture
def site(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A folder of packages in which alone this interpreter looks."""
    folder = tmp_path / "site packages"
    folder.mkdir()
    monkeypatch.setattr(sys, "path", [str(folder)])
    return folder


def install(site: Path, name: str, version: str) -> None:
    (site / f"{name}.py").touch()
    (site / f"{name}-{version}.dist-info").mkdir()


def test_a_requirement_is_read_into_name_and_range() -> None:
    assert needs.parse_requirement("PySide6-Essentials>=6.12,<6.13") == needs.Requirement(
        "PySide6-Essentials>=6.12,<6.13", "pyside6-essentials", (6, 12), (6, 13)
    )


@pytest.mark.parametrize(
    "text", ["numpy", "numpy==2", "numpy>=2", "numpy>=2,<3; os_name == 'nt'", "numpy~=2.1"]
)
def test_any_other_form_is_refused_by_its_text(text: str) -> None:
    with pytest.raises(ValueError, match="write it as") as caught:
        needs.parse_requirement(text)
    assert text in str(caught.value)


@pytest.mark.parametrize(
    ("lower", "higher"), [("2", "2.0.1"), ("2.9", "2.10"), ("1.17.1", "1.18"), ("0.9.9", "0.10")]
)
def test_versions_compare_by_number_not_by_letter(lower: str, higher: str) -> None:
    assert needs.numbers(lower) < needs.numbers(higher)


def test_versions_that_differ_in_trailing_zeros_are_equal() -> None:
    assert needs.numbers("2.0.0") == needs.numbers("2") == needs.numbers("2.0rc1")


@pytest.mark.parametrize(
    ("version", "fits"), [("1.3.9", False), ("1.4", True), ("1.99", True), ("2.0", False)]
)
def test_a_package_outside_its_range_counts_as_missing(site: Path, version: str, fits: bool) -> None:
    install(site, "some_thing", version)
    wanted = [needs.parse_requirement("Some.Thing>=1.4,<2")]
    assert needs.missing(wanted) == ([] if fits else ["Some.Thing>=1.4,<2"])


def test_a_package_that_is_not_there_is_missing_even_if_its_metadata_stayed(site: Path) -> None:
    (site / "some_thing-1.5.dist-info").mkdir()
    assert needs.missing([needs.parse_requirement("Some.Thing>=1.4,<2")]) == ["Some.Thing>=1.4,<2"]


def test_a_package_without_metadata_is_taken_as_it_is(site: Path) -> None:
    (site / "some_thing.py").touch()
    assert needs.missing([needs.parse_requirement("Some.Thing>=1.4,<2")]) == []


def test_an_extra_adds_its_packages(folder: Path, site: Path) -> None:
    install(site, "some_thing", "1.5")
    assert needs.ready(folder)
    assert not needs.ready(folder, "test")
    install(site, "other_thing", "0.9.3")
    assert needs.ready(folder, "test")


def test_a_stamp_reads_back(tmp_path: Path) -> None:
    stamp = needs.Stamp(True, "abc", "3.12")
    needs.write_stamp(tmp_path, stamp)
    assert needs.read_stamp(tmp_path) == stamp


@pytest.mark.parametrize("text", ["", "{", "[]", "null", '{"whole": true}', '{"whole": "yes"}', "\x00\xff"])
def test_a_stamp_that_cannot_be_read_counts_as_cut_off(tmp_path: Path, text: str) -> None:
    (tmp_path / needs.STAMP_NAME).write_text(text, encoding="latin-1")
    stamp = needs.read_stamp(tmp_path)
    assert stamp is not None
    assert not stamp.whole


def test_no_stamp_is_told_from_a_broken_one(tmp_path: Path) -> None:
    assert needs.read_stamp(tmp_path) is None
    assert needs.read_stamp(tmp_path / "absent") is None


def test_up_to_date_until_pyproject_changes(folder: Path) -> None:
    venv = folder / ".venv"
    needs.venv_python(venv).parent.mkdir(parents=True)
    needs.venv_python(venv).touch()
    assert not needs.up_to_date(folder)
    needs.write_stamp(venv, needs.Stamp(True, needs.digest(folder), "3.11"))
    assert needs.up_to_date(folder)
    (folder / "pyproject.toml").write_text(PYPROJECT + "# a change", encoding="utf-8")
    assert not needs.up_to_date(folder)


@pytest.mark.parametrize("whole", [True, False])
def test_a_set_up_that_was_cut_off_is_not_up_to_date(folder: Path, whole: bool) -> None:
    venv = folder / ".venv"
    needs.venv_python(venv).parent.mkdir(parents=True)
    needs.venv_python(venv).touch()
    needs.write_stamp(venv, needs.Stamp(whole, needs.digest(folder), "3.11"))
    assert needs.up_to_date(folder) == whole


def test_a_venv_without_its_interpreter_is_not_up_to_date(folder: Path) -> None:
    (folder / ".venv").mkdir()
    needs.write_stamp(folder / ".venv", needs.Stamp(True, needs.digest(folder), "3.11"))
    assert not needs.up_to_date(folder)


@pytest.mark.parametrize("stamped", [True, False])
def test_inside_the_own_venv_an_old_stamp_counts_and_no_stamp_does_not(
    folder: Path, site: Path, monkeypatch: pytest.MonkeyPatch, stamped: bool
) -> None:
    install(site, "some_thing", "1.5")
    (folder / ".venv").mkdir()
    monkeypatch.setattr(sys, "prefix", str(folder / ".venv"))
    if stamped:
        needs.write_stamp(folder / ".venv", needs.Stamp(True, "another digest", needs.this_python()))
    assert needs.ready(folder) == (not stamped)


def test_the_own_pyproject_is_in_the_form_that_the_start_can_read() -> None:
    folder = needs.checkout()
    assert folder is not None
    assert needs.missing(needs.requirements(folder, "test")) == []


def test_both_places_name_the_same_pythons() -> None:
    folder = needs.checkout()
    assert folder is not None
    (oldest, newest) = (first_use.OLDEST[1], first_use.NEWEST[1])
    fitting = [minor for minor in range(30) if needs.python_fits(folder, f"3.{minor}")]
    assert fitting == list(range(oldest, newest + 1))
