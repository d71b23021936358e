"""Histories of a load that cannot be used: points in the project, and CSV files beside it (name and bytes)."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

LOAD = "/cases/1/load"
TWO, THREE = [0.0, 1e-5], [0.0, 1e-5, 5e-6]


@dataclass(frozen=True)
class BrokenHistory:
    """A history load, the content of `push.csv` beside the project (`None`: no such file), and the answer."""

    name: str
    load: dict[str, Any]
    content: bytes | None
    place: str
    words: str


def _points(name: str, words: str, place: str = LOAD, **keys: Any) -> BrokenHistory:
    return BrokenHistory(name, {"kind": "history", "quantity": "force", **keys}, None, place, words)


def _file(name: str, content: bytes | None, words: str, file: str = "push.csv") -> BrokenHistory:
    return BrokenHistory(name, {"kind": "history", "quantity": "force", "file": file}, content, LOAD, words)


BROKEN_HISTORIES = [
    _points("neither points nor file", "give either 'times' and 'values', or 'file'"),
    _points(
        "points and file", "give either 'times' and 'values', or 'file'", times=TWO, values=TWO, file="a"
    ),
    _points("times alone", "'times' and 'values' go together", times=TWO),
    _points("not equally many", "'times' has 2 points and 'values' 3", times=TWO, values=THREE),
    _points("one point", "needs at least two points", times=[0.0], values=[1.0]),
    _points("a value is text", "must be a number, not 'a'", f"{LOAD}/values/1", times=TWO, values=[0.0, "a"]),
    _points("time runs back", "point 3 (5e-06 s) comes after 1e-05 s", times=THREE, values=THREE),
    _points("before time 0", "must not begin before time 0", times=[-1e-5, 1e-5], values=TWO),
    _points("no time at all", "must last longer than no time", times=[0.0, 0.0], values=TWO),
    _points(
        "not of force",
        "must be 'force' or 'velocity'",
        f"{LOAD}/quantity",
        quantity="stress",
        times=TWO,
        values=TWO,
    ),
    _points("file is a number", "must be text, not 5", f"{LOAD}/file", file=5),
    _file("file not there", None, "the history file 'push.csv' cannot be read"),
    _file("file is a folder", None, "the history file '.' cannot be read", file="."),
    _file(
        "file of letters", b"t,F\n0,0\n1e-5,high\n", "line 3 of the history file 'push.csv' needs two numbers"
    ),
    _file("semicolons", b"t;F\n0;0\n1;1\n", "a comma between them and a point before decimals"),
    _file(
        "three columns", b"t,F,n\n0,0,1\n1,1,1\n", "line 2 of the history file 'push.csv' needs two numbers"
    ),
    _file("no header", b"0,0\n1e-5,1\n", "line 1 of the history file 'push.csv' is taken for the header"),
    _file("header alone", b"t,F\n", "in the history file 'push.csv': a history needs at least two points"),
    _file(
        "NaN", b"t,F\n0,0\n1e-5,nan\n", "in the history file 'push.csv': every time and value must be finite"
    ),
    _file(
        "back in time", b"t,F\n1e-5,0\n0,1\n", "in the history file 'push.csv': time must not run backwards"
    ),
    _file(
        "no text at all", b"t,F\n\xff\xfe\x00,1\n", "the history file 'push.csv' is not UTF-8 text: save it"
    ),
]
