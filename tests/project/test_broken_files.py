"""A file that is not usable: exit status 2, a sentence for each problem with its place, nothing written."""

from __future__ import annotations

import json
import subprocess
import sys
from pathlib import Path

import pytest

from app.command_line import main
from tests.project.broken_histories import BROKEN_HISTORIES, LOAD
from tests.project.broken_texts import BROKEN_TEXTS
from tests.project.broken_trees import BROKEN_TREES
from tests.project.changes import Broken
from tests.project.valid import valid_tree

ROOT = Path(__file__).resolve().parents[2]
#: Words of the program's own workings, which no sentence for a person holds.
INNER_WORDS = (
    "Traceback",
    "pydantic",
    "NoneType",
    "None",
    "True",
    "False",
    "<class",
    "Error",
    "type=",
    "Input",
)


def refused(path: Path, answers: tuple[tuple[str, str], ...], capsys) -> None:
    """Both commands refuse the file with these answers, (place, words), and leave the folder as it was."""
    before = sorted(path.parent.rglob("*"))
    for arguments in (["check", str(path)], ["solve", str(path), "--out", str(path.parent / "results")]):
        assert main(arguments) == 2
        said = capsys.readouterr()
        assert said.out == ""
        lines = said.err.splitlines()
        assert len(lines) == len(answers), lines
        for line, (place, words) in zip(lines, answers, strict=True):
            lead = f"{path}: {place}: " if place else f"{path}: "
            assert line.startswith(lead), line
            sentence = line.removeprefix(lead)
            assert words in sentence
            assert not sentence.startswith("/"), line
            assert not [word for word in INNER_WORDS if word in sentence.split("'")[0]], line
    assert sorted(path.parent.rglob("*")) == before


def test_the_project_that_all_others_are_made_from_is_valid(tmp_path, capsys):
    path = tmp_path / "good.strike"
    path.write_text(json.dumps(valid_tree()), encoding="utf-8")
    assert main(["check", str(path)]) == 0
    assert capsys.readouterr() == (f"{path}: valid, 3 cases\n", "")


@pytest.mark.parametrize("fault", BROKEN_TREES, ids=lambda fault: fault.name)
def test_a_fault_is_told_at_its_place(fault: Broken, tmp_path, capsys):
    tree = valid_tree()
    fault.apply(tree)
    path = tmp_path / "broken.strike"
    path.write_text(json.dumps(tree), encoding="utf-8")
    refused(path, ((fault.place, fault.words),), capsys)


@pytest.mark.parametrize(
    ("content", "place", "words"), [text[1:] for text in BROKEN_TEXTS], ids=[text[0] for text in BROKEN_TEXTS]
)
def test_a_text_that_is_no_project(content: bytes, place: str, words: str, tmp_path, capsys):
    path = tmp_path / "broken.strike"
    path.write_bytes(content)
    refused(path, ((place, words),), capsys)


@pytest.mark.parametrize("fault", BROKEN_HISTORIES, ids=lambda fault: fault.name)
def test_a_history_that_is_none(fault, tmp_path, capsys):
    tree = valid_tree()
    tree["cases"][1]["load"] = fault.load
    if fault.content is not None:
        (tmp_path / "push.csv").write_bytes(fault.content)
    path = tmp_path / "broken.strike"
    path.write_text(json.dumps(tree), encoding="utf-8")
    refused(path, ((fault.place, fault.words),), capsys)


def test_the_history_load_they_are_made_from_is_valid(tmp_path, capsys):
    assert LOAD == "/cases/1/load"
    tree = valid_tree()
    tree["cases"][1]["load"] = {"kind": "history", "quantity": "force", "file": "push.csv"}
    (tmp_path / "push.csv").write_bytes(b"time_s,force_N\n0,0\n1e-5,5000\n\n2e-5,0,\n")
    path = tmp_path / "good.strike"
    path.write_text(json.dumps(tree), encoding="utf-8")
    assert main(["check", str(path)]) == 0


@pytest.mark.parametrize("what", ["missing.strike", ""], ids=["no such file", "a folder"])
def test_a_file_that_cannot_be_read(what: str, tmp_path, capsys):
    refused(tmp_path / "there" / what if what else _folder(tmp_path), (("", "cannot be read: "),), capsys)


def _folder(parent: Path) -> Path:
    folder = parent / "folder.strike"
    folder.mkdir()
    return folder


def test_a_name_that_is_taken_leaves_another_unknown(tmp_path, capsys):
    tree = valid_tree()
    tree["materials"][1]["name"] = "steel"
    path = tmp_path / "broken.strike"
    path.write_text(json.dumps(tree), encoding="utf-8")
    answers = (
        ("/materials/1/name", "numbers 1 and 2 of the materials are both called 'steel'"),
        ("/cases/2/member/segments/1/material", "no material named 'copper' (it has: 'steel')"),
    )
    refused(path, answers, capsys)


def test_every_problem_of_a_file_is_told_at_once(tmp_path, capsys):
    tree = valid_tree()
    tree["colour"] = "red"
    tree["materials"][0]["density"] = -1.0
    tree["cases"][2]["load"]["velocity"] = "fast"
    path = tmp_path / "broken.strike"
    path.write_text(json.dumps(tree), encoding="utf-8")
    answers = (
        ("/materials/0/density", "must be more than 0"),
        ("/cases/2/load/velocity", "must be a number, not 'fast'"),
        ("/colour", "is not a key that is known here"),
    )
    refused(path, answers, capsys)


@pytest.mark.parametrize("command", ["check", "solve"])
def test_so_it_is_from_a_shell(command: str, tmp_path):
    """In a process of its own: the exit status, and that nothing else is said."""
    path, out = tmp_path / "cut off.strike", tmp_path / "results"
    path.write_bytes(BROKEN_TEXTS[2][1])
    arguments = [sys.executable, "-m", "app", command, str(path)]
    arguments += ["--out", str(out)] if command == "solve" else []
    ended = subprocess.run(arguments, cwd=ROOT, capture_output=True, text=True, timeout=120, encoding="utf-8")
    assert (ended.returncode, ended.stdout) == (2, "")
    assert ended.stderr.startswith(f"{path}: is not valid JSON at line ")
    assert ended.stderr.count("\n") == 1
    assert not out.exists()


def test_there_are_enough_of_them():
    """Forty are asked for; a table that lost its entries would pass silently."""
    assert len(BROKEN_TREES) + len(BROKEN_TEXTS) + len(BROKEN_HISTORIES) > 120
