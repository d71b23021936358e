"""Several entries of one list selected at once: what a click or a key with a modifier makes of the selection."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from app.sight import Sight


def toggled(sight: Sight, pointer: str) -> dict[str, Any]:
    """One entry more, or less where it is selected already; one of another list is selected alone."""
    chosen = [sight.selection, *sight.also]
    if _list_of(pointer) is None or _list_of(pointer) != _list_of(sight.selection):
        return {"selection": pointer}
    left = [one for one in chosen if one != pointer]
    if len(left) == len(chosen):
        return {"selection": pointer, "also": tuple(chosen)}
    return {"selection": left[0], "also": tuple(left[1:])} if left else {}


def reaching(sight: Sight, pointer: str) -> dict[str, Any]:
    """All entries from the selected one to another one of its list."""
    place, first, last = _list_of(pointer), _index_of(sight.selection), _index_of(pointer)
    if place is None or place != _list_of(sight.selection):
        return {"selection": pointer}
    between = range(min(first, last), max(first, last) + 1)
    return {"also": tuple(f"{place}/{index}" for index in between if index != first)}


def extended(sight: Sight, by: int, pointers: Sequence[str]) -> dict[str, Any]:
    """The range that begins at the selected entry, longer or shorter by one; `pointers` are those that there are."""
    place, first = _list_of(sight.selection), _index_of(sight.selection)
    if place is None:
        return {}
    ends = [_index_of(one) for one in sight.also if _list_of(one) == place]
    end = first if not ends else max(ends) if max(ends) > first else min(ends)
    to = f"{place}/{end + by}"
    return reaching(sight, to) if to in pointers else {}


def _list_of(pointer: str) -> str | None:
    """The list that a pointer is an entry of."""
    place, _, last = pointer.rpartition("/")
    return place if last.isdecimal() else None


def _index_of(pointer: str) -> int:
    last = pointer.rpartition("/")[2]
    return int(last) if last.isdecimal() else -1
