"""A target open in another program, a full disk, a folder without permission: a sentence, and nothing half written.

Windows refuses to replace a file that another program holds open with a PermissionError of the rename; the others come
from making or filling the temporary file beside the target. Each is brought about where it would happen.
"""

from __future__ import annotations

import errno
import json
import os
import tempfile
from pathlib import Path

import pytest

from app.command_line import main
from app.disk import why_not
from tests.export.conftest import bar_tree

OPEN_ELSEWHERE = (
    "replace",
    PermissionError(errno.EACCES, "used by another process"),
    "open in another program",
)
FULL = ("fsync", OSError(errno.ENOSPC, "No space left on device"), "the disk is full")
FORBIDDEN = ("mkstemp", PermissionError(errno.EACCES, "Permission denied"), "nothing may be written")


@pytest.fixture
def project(tmp_path: Path) -> Path:
    path = tmp_path / "bar.strike"
    path.write_text(json.dumps(bar_tree()), encoding="utf-8")
    return path


@pytest.fixture
def out(tmp_path: Path) -> Path:
    """A folder with the files of an earlier run in it."""
    folder = tmp_path / "out"
    folder.mkdir()
    for name in ("pulse-records.csv", "report.pdf", "report.html"):
        (folder / name).write_text("of an earlier run", encoding="utf-8")
    return folder


def break_disk(monkeypatch: pytest.MonkeyPatch, where: str, error: OSError, out: Path) -> None:
    def fails(*_given: object, **_named: object) -> None:
        raise error

    monkeypatch.setattr(tempfile if where == "mkstemp" else os, where, fails)
    if where == "mkstemp":
        monkeypatch.setattr("os.access", lambda place, how: Path(place) != out)


@pytest.mark.parametrize(("where", "error", "words"), [OPEN_ELSEWHERE, FULL, FORBIDDEN])
@pytest.mark.parametrize(
    "command", [("records", ""), ("report", "report.pdf"), ("report", "report.html")], ids=" ".join
)
def test_a_sentence_and_nothing_half_written(project, out, monkeypatch, capsys, command, where, error, words):
    before = {path.name: path.read_text(encoding="utf-8") for path in out.iterdir()}
    break_disk(monkeypatch, where, error, out)
    arguments = [command[0], str(project), "--out", str(out / command[1]), "--quiet"]
    status = main([*arguments, "--no-mesh-check"] if command[0] == "report" else arguments)
    told = capsys.readouterr().err
    assert status == 1
    assert words in told
    assert "Traceback" not in told
    assert told.count("\n") == 1
    assert {path.name: path.read_text(encoding="utf-8") for path in out.iterdir()} == before


def test_other_reasons_are_told_in_the_systems_words(tmp_path):
    assert why_not(OSError(errno.EIO, "Input/output error"), tmp_path / "a") == "Input/output error"
    assert "there is no folder" in why_not(FileNotFoundError(errno.ENOENT, "No such"), tmp_path / "b" / "c")
