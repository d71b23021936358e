"""What is said where Qt cannot start. These are questions to a Linux system; elsewhere there is nothing to ask."""

import sys

import pytest

from app.first_start import qt_needs

linux = pytest.mark.skipif(not sys.platform.startswith("linux"), reason="asks the loader of Linux")


@pytest.fixture(autouse=True)
def _no_display(monkeypatch: pytest.MonkeyPatch) -> None:
    for name in ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"):
        monkeypatch.delenv(name, raising=False)


@pytest.fixture
def all_there(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(qt_needs, "_not_loadable", lambda libraries: [])


@pytest.mark.parametrize(
    ("library", "debian", "fedora"),
    [
        ("libEGL.so.1", "libegl1", "libglvnd-egl"),
        ("libxcb-cursor.so.0", "libxcb-cursor0", "xcb-util-cursor"),
        ("libxkbcommon.so.0", "libxkbcommon0", "libxkbcommon"),
    ],
)
@pytest.mark.usefixtures("all_there")
def test_a_missing_library_is_named_with_its_package(library: str, debian: str, fedora: str) -> None:
    error = ImportError(f"{library}: cannot open shared object file: No such file or directory")
    sentence = qt_needs.explain_qt_failure(error)
    assert f"the system library {library} is missing" in sentence
    assert f"`sudo apt install {debian}`" in sentence
    assert f"`sudo dnf install {fedora}`" in sentence


def test_one_command_brings_all_that_is_missing(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(qt_needs, "_not_loadable", lambda libraries: list(libraries))
    error = ImportError("libGL.so.1: cannot open shared object file: No such file or directory")
    assert "libxcb-cursor0" not in qt_needs.explain_qt_failure(error)
    monkeypatch.setenv("DISPLAY", ":0")
    sentence = qt_needs.explain_qt_failure(error)
    for package in ("libgl1", "libegl1", "libdbus-1-3", "libxcb-cursor0"):
        assert package in sentence


@pytest.mark.usefixtures("all_there")
def test_a_library_that_is_not_in_the_table_is_still_named() -> None:
    error = ImportError("libnew.so.7: cannot open shared object file: No such file or directory")
    assert "libnew.so.7" in qt_needs.explain_qt_failure(error)


@pytest.mark.parametrize(
    "error", [ModuleNotFoundError("No module named 'PySide6'", name="PySide6"), ImportError("?")]
)
def test_any_other_failure_is_a_sentence_too(error: ImportError) -> None:
    sentence = qt_needs.explain_qt_failure(error)
    assert sentence.startswith("Striketrace cannot start Qt, which draws its window, because ")
    assert "PySide6" in sentence


def test_only_what_the_loader_does_not_find_is_missing() -> None:
    def load(name: str) -> None:
        if name == "b":
            raise OSError("b: cannot open shared object file")

    assert qt_needs._not_loadable(["a", "b", "c"], load) == ["b"]


@linux
def test_a_session_without_display_is_told() -> None:
    assert "no display" in qt_needs.explain_no_display()


@linux
@pytest.mark.usefixtures("all_there")
def test_a_display_that_does_not_answer_is_told_by_its_name(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("DISPLAY", ":65001")
    assert "DISPLAY=:65001" in qt_needs.explain_no_display()


@linux
def test_a_display_without_the_libraries_for_it_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("DISPLAY", ":0")
    monkeypatch.setattr(qt_needs, "_not_loadable", lambda libraries: ["libxcb-cursor.so.0"])
    assert "sudo apt install libxcb-cursor0" in qt_needs.explain_no_display()


@linux
def test_one_display_that_works_is_enough(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("DISPLAY", ":0")
    monkeypatch.setenv("WAYLAND_DISPLAY", "wayland-0")
    monkeypatch.setattr(qt_needs, "_x11_problem", lambda: "no")
    monkeypatch.setattr(qt_needs, "_wayland_problem", lambda: "")
    assert qt_needs.explain_no_display() == ""


def test_a_platform_that_was_chosen_is_not_questioned(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("QT_QPA_PLATFORM", "offscreen")
    assert qt_needs.explain_no_display() == ""
