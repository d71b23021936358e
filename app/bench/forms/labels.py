"""What an edit is called in the list of undo: "Move gauge Head to 1.40 m", "Set length of Lower to 8.00 m"."""

from __future__ import annotations

import re
from typing import Any

from app.bench.forms.spec import Spec
from app.names import with_kind
from app.tree import value_at

#: Parts that are no entries of lists, by the end of their pointer.
PARTS = (
    ("load/cushion", "the cushion"),
    ("load/pile_cushion", "the pile cushion"),
    ("load", "the load"),
    ("ground/toe", "the toe"),
    ("ground", "the ground"),
    ("far_end", "the far end"),
    ("member", "the member"),
    ("run", "the run"),
)
ENTRY = re.compile(r"(.*/(segments|layers|gauges|attachments|materials)/\d+)(?:/.*|$)")
#: Words that keep their capital inside a sentence.
NAMES = ("Young", "Poisson", "Smith")


def label_of(tree: dict[str, Any], spec: Spec, shown: str) -> str:
    """The label of an edit that sets the field of `spec` to what is shown as `shown`."""
    pointer = spec.pointer.split("#")[0]
    part = part_called(tree, pointer)
    entry = ENTRY.fullmatch(pointer)
    if spec.twins and entry:
        part = f"{1 + len(spec.twins)} {entry.group(2)}"
    if pointer.endswith("/name"):
        return f"Rename {part} to {shown}"
    if pointer.endswith("/position") and "/gauges/" in pointer:
        return f"Move {part} to {shown}"
    what = spec.label if spec.label.startswith(NAMES) else spec.label[:1].lower() + spec.label[1:]
    if not shown:
        return f"Clear {what} of {part}"
    whole = part.removeprefix("the ")
    return f"Set {part} to {shown}" if what in (whole, "given by") else f"Set {what} of {part} to {shown}"


def part_called(tree: dict[str, Any], pointer: str) -> str:
    """What the part that holds a pointer is called inside a sentence."""
    entry = ENTRY.fullmatch(pointer)
    if entry:
        value = value_at(tree, entry.group(1)) or {}
        name, kind = value.get("name"), entry.group(2)[:-1]
        if name is None:
            return f"the {value.get('kind', kind)}"
        return str(name) if kind == "segment" else with_kind(kind, str(name))
    inside = re.sub(r"^/cases/\d+/", "", pointer)
    return next((name for end, name in PARTS if inside == end or inside.startswith(end + "/")), "the case")
