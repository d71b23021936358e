"""Where values of a project came from: the marks that tell a typical value from the user's own.

A mark stands under the JSON pointer of its value. It has to follow the value when parts are moved, and to go when
the value is edited by hand. All functions change the plain tree of a project in place.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from app.tree import parts_of, value_at

Tree = dict[str, Any]


def mark_at(tree: Tree, pointer: str) -> dict[str, str] | None:
    """The mark of a value: its source, and whether it is typical or confirmed."""
    return (tree.get("provenance") or {}).get(pointer)


def mark_typical(tree: Tree, pointer: str, source: str) -> None:
    """Tell that the value is a typical one from this source."""
    tree["provenance"] = (tree.get("provenance") or {}) | {pointer: {"source": source, "state": "typical"}}


def confirm(tree: Tree, pointer: str) -> None:
    """The user stands by the value: it keeps its source and is no longer marked as typical."""
    tree["provenance"][pointer]["state"] = "confirmed"


def forget(tree: Tree, pointer: str) -> None:
    """Drop the marks of the value and of everything inside it."""
    marks = tree.get("provenance")
    if marks:
        kept = {p: mark for p, mark in marks.items() if p != pointer and not p.startswith(pointer + "/")}
        _keep(tree, kept)


def forget_missing(tree: Tree) -> None:
    """Drop the marks of values that are not there any more, after a part has changed its kind."""
    marks = tree.get("provenance")
    if marks:
        _keep(tree, {p: mark for p, mark in marks.items() if value_at(tree, p) is not None})


def forget_changed(before: Tree, after: Tree) -> None:
    """Drop the marks of values that an edit by hand has changed; both trees have their parts at the same places. Marks
    that the edit itself has set stay."""
    marks, old = after.get("provenance"), before.get("provenance") or {}
    if marks:
        same = {p: value_at(before, p) == value_at(after, p) for p in marks if p in old}
        _keep(after, {p: mark for p, mark in marks.items() if same.get(p, True)})


def rearrange(tree: Tree, pointer: str, came_from: Sequence[int | None]) -> None:
    """Let the marks follow a list whose entry `i` now is what was `came_from[i]` (`None` = new)."""
    marks = tree.get("provenance")
    if not marks:
        return
    depth = len(parts_of(pointer))
    kept = {}
    for old, mark in marks.items():
        parts = parts_of(old)
        if not old.startswith(pointer + "/"):
            kept[old] = mark
            continue
        for new_index, old_index in enumerate(came_from):
            if parts[depth] == str(old_index):
                kept[_joined([*parts[:depth], str(new_index), *parts[depth + 1 :]])] = dict(mark)
    _keep(tree, kept)


def _keep(tree: Tree, marks: dict[str, Any]) -> None:
    if marks:
        tree["provenance"] = marks
    else:
        tree.pop("provenance", None)


def _joined(parts: list[str]) -> str:
    return "".join("/" + part.replace("~", "~0").replace("/", "~1") for part in parts)
