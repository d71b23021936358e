"""The decision at the start: go on here, go on in `.venv`, or say in one sentence why not."""

import ast
import sys
from pathlib import Path

import pytest

from app.first_start import first_use, needs, setting_up

ROOT = Path(__file__).resolve().parents[2]


@pytest.fixture
def calls(monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> list[str]:
    """A checkout of its own, with what would be done written down instead of done."""
    made: list[str] = []
    monkeypatch.setattr(needs, "checkout", lambda: tmp_path)
    monkeypatch.setattr(needs, "ready", lambda folder, extra: False)
    monkeypatch.setattr(needs, "up_to_date", lambda folder: False)
    monkeypatch.setattr(setting_up, "set_up", lambda folder, extra: made.append(f"set up {extra}".strip()))
    monkeypatch.setattr(setting_up, "go_on_inside", lambda venv: made.append("go on inside"))
    return made


def test_goes_on_here_when_nothing_is_missing(calls: list[str], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(needs, "ready", lambda folder, extra: True)
    first_use.prepare()
    assert calls == []


def test_goes_on_here_when_installed_as_a_package(calls: list[str], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(needs, "checkout", lambda: None)
    first_use.prepare()
    assert calls == []


def test_sets_up_and_goes_on_inside(calls: list[str]) -> None:
    first_use.prepare("test")
    assert calls == ["set up test", "go on inside"]


def test_a_second_start_sets_up_nothing(calls: list[str], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(needs, "up_to_date", lambda folder: True)
    first_use.prepare()
    assert calls == ["go on inside"]


def test_a_venv_that_lacks_a_package_despite_its_stamp_is_mended(
    calls: list[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(needs, "up_to_date", lambda folder: True)
    monkeypatch.setattr(needs, "runs_inside", lambda venv: True)
    first_use.prepare()
    assert calls == ["set up", "go on inside"]


def test_a_failure_is_one_sentence_and_status_3(
    calls: list[str], monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def fail(folder: Path, extra: str) -> None:
        raise setting_up.CannotSetUp("What is missing: `the command`.")

    monkeypatch.setattr(setting_up, "set_up", fail)
    with pytest.raises(SystemExit) as ended:
        first_use.prepare()
    assert ended.value.code == first_use.CANNOT_START == 3
    assert capsys.readouterr().err == "What is missing: `the command`.\n"


@pytest.mark.parametrize("version", [(3, 10), (3, 14)])
def test_another_python_is_refused_before_anything_else(
    calls: list[str],
    monkeypatch: pytest.MonkeyPatch,
    capsys: pytest.CaptureFixture[str],
    version: tuple[int, int],
) -> None:
    monkeypatch.setattr(sys, "version_info", (*version, 0, "final", 0))
    monkeypatch.setattr(first_use, "runs", lambda name: False)
    with pytest.raises(SystemExit) as ended:
        first_use.prepare()
    assert ended.value.code == 3
    said = capsys.readouterr().err
    assert f"this is Python {version[0]}.{version[1]}: " in said
    assert said.count("\n") == 1
    assert calls == []


def test_the_python_to_use_instead_is_the_newest_that_is_here(monkeypatch: pytest.MonkeyPatch) -> None:
    here = {"python3.11", "python3.12"}
    monkeypatch.setattr(first_use, "runs", lambda name: name in here)
    assert first_use.explain_python(3, 9, "app").endswith("start it with `python3.12 -m app`.")
    here.clear()
    assert "3.13 -m tests`" in first_use.explain_python(3, 9, "tests")


def test_a_python_that_only_refuses_does_not_count_as_here(tmp_path: Path) -> None:
    assert first_use.runs(sys.executable)
    assert not first_use.runs(str(tmp_path / "python3.13"))


@pytest.mark.parametrize(
    "name",
    [
        "app/__init__.py",
        "app/__main__.py",
        "app/first_start/first_use.py",
        "tests/__init__.py",
        "tests/__main__.py",
    ],
)
def test_old_pythons_can_read_what_refuses_them(name: str) -> None:
    ast.parse((ROOT / name).read_text(encoding="utf-8"), feature_version=(3, 6))
