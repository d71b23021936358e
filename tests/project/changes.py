"""Small named changes to a project's tree: what the broken files of this folder are made with."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from tests.project.valid import Tree

#: Short for where the parts of `valid_tree` stand.
PLACES = {"steel": "/materials/0", "drop": "/cases/0", "pulse": "/cases/1", "striker": "/cases/2"}
MISSING = object()


@dataclass(frozen=True)
class Broken:
    """A project with one fault: the value put at `pointer` (or the key taken away), and the answer.

    `place` is where the answer says that the fault is, `words` stand in its sentence.
    """

    pointer: str
    value: Any
    words: str
    place: str

    @property
    def name(self) -> str:
        what = "missing" if self.value is MISSING else str(self.value)[:40]
        return f"{self.pointer} {what}"

    def apply(self, tree: Tree) -> None:
        """Break the tree."""
        *way, last = self.pointer.strip("/").split("/")
        node: Any = tree
        for part in way:
            node = node[int(part)] if isinstance(node, list) else node[part]
        key = int(last) if isinstance(node, list) else last
        if self.value is MISSING:
            del node[key]
        else:
            node[key] = self.value


def broken(pointer: str, value: Any, words: str, place: str | None = None) -> Broken:
    """A fault; `place` only where it is told elsewhere than where it was made."""
    return Broken(whole(pointer), value, words, whole(pointer if place is None else place))


def whole(pointer: str) -> str:
    """A JSON pointer from one that may begin with a word of `PLACES`."""
    first, slash, rest = pointer.partition("/")
    return f"{PLACES[first]}{slash}{rest}" if first in PLACES else pointer
