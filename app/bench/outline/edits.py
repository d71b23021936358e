"""Adding, duplicating, splitting, removing and moving entries of lists: as changes of a project's tree, with labels.

Marks of typical values follow their entries. Every function gives an `Edit` that the document takes as one step.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace
from functools import partial
from itertools import pairwise
from typing import Any

from app.bench.forms.begun import mark_begun
from app.bench.forms.kinds import NEW_PARTS, filled
from app.bench.forms.spec import Context, Tree
from app.bench.forms.use_part import free_name
from app.names import with_kind
from app.provenance import forget, rearrange
from app.tree import copied, value_at
from solver.model import derived

WORDS = {
    "segments": "segment",
    "layers": "layer",
    "gauges": "gauge",
    "attachments": "attachment",
    "materials": "material",
}
#: What is added with the values of the entry before it, and so with its marks of typical values.
LIKE_THEIR_NEIGHBOUR = ("segment", "layer")


@dataclass(frozen=True)
class Edit:
    """One step of undo: its label, the change, and what is selected after it."""

    label: str
    change: Callable[[Tree], None]
    select: str
    also: tuple[str, ...] = ()


def word_for(list_pointer: str) -> str:
    """What an entry of a list is called."""
    return WORDS[list_pointer.rsplit("/", 1)[-1]]


def add(context: Context, list_pointer: str, after: int | None = None) -> Edit:
    """A new entry behind another one, or at the end."""
    entries = entries_of(context, list_pointer)
    index = len(entries) if after is None else after + 1
    entry = _new_entry(context, list_pointer, index)
    word = word_for(list_pointer)
    label = f"Add {entry['name']}" if "name" in entry else f"Add {word}"
    neighbour = max(0, index - 1) if word in LIKE_THEIR_NEIGHBOUR and entries else None
    return _insert(context, list_pointer, index, entry, neighbour, label)


def duplicate(context: Context, list_pointer: str, index: int) -> Edit:
    """The same entry once more, behind the first, under a free name."""
    entries = entries_of(context, list_pointer)
    entry = copied(entries[index])
    if "name" in entry:
        entry["name"] = free_name(entry["name"], [e["name"] for e in entries])
    if list_pointer.endswith("segments") and index == 0 and entry.get("joint_above"):
        entry["joint_above"] = {"kind": "bonded"}
    label = f"Duplicate {called(context, list_pointer, index)}"
    return _insert(context, list_pointer, index + 1, entry, index, label)


def split(context: Context, list_pointer: str, index: int, share: float = 0.5) -> Edit:
    """A segment or layer as two, at a share of its length; nothing else changes."""
    entries = entries_of(context, list_pointer)
    upper, lower = copied(entries[index]), copied(entries[index])
    size = "length" if list_pointer.endswith("segments") else "thickness"
    upper[size], lower[size] = entries[index][size] * share, entries[index][size] * (1 - share)
    lower["name"] = free_name(f"{upper['name'].removesuffix(' lower')} lower", [e["name"] for e in entries])
    if size == "length":
        lower["joint_above"] = {"kind": "bonded"}
        if upper.get("end_section"):
            middle = derived.section_at(_segments(context, list_pointer)[index], share).model_dump(
                mode="json"
            )
            upper["end_section"], lower["section"] = middle, copied(middle)
    elif upper.get("unit_resistance_bottom") is not None:
        top, bottom = upper["unit_resistance"], upper["unit_resistance_bottom"]
        middle = top + (bottom - top) * share
        upper["unit_resistance_bottom"], lower["unit_resistance"] = middle, middle

    def change(tree: Tree) -> None:
        _rearranged(tree, context.full(list_pointer), [*range(index + 1), *range(index, len(entries))])
        there = value_at(tree, context.full(list_pointer))
        there[index], there[index + 1] = upper, lower

    return Edit(f"Split {called(context, list_pointer, index)}", change, f"{list_pointer}/{index + 1}")


def remove(context: Context, list_pointer: str, indices: Sequence[int]) -> Edit:
    """Entries taken out."""
    entries = entries_of(context, list_pointer)
    kept = [i for i in range(len(entries)) if i not in indices]
    what = (
        called(context, list_pointer, indices[0])
        if len(indices) == 1
        else f"{len(indices)} {word_for(list_pointer)}s"
    )

    def change(tree: Tree) -> None:
        _rearranged(tree, context.full(list_pointer), kept)
        _first_is_bonded(tree, context.full(list_pointer))

    after = min(min(indices), len(kept) - 1)
    return Edit(f"Remove {what}", change, f"{list_pointer}/{after}" if kept else list_pointer)


def move(context: Context, list_pointer: str, index: int, by: int) -> Edit | None:
    """An entry moved up or down; `None` where it is at that end already."""
    order = list(range(len(entries_of(context, list_pointer))))
    to = index + by
    if not 0 <= to < len(order):
        return None
    order.insert(to, order.pop(index))

    def change(tree: Tree) -> None:
        _rearranged(tree, context.full(list_pointer), order)
        _first_is_bonded(tree, context.full(list_pointer))

    direction = "up" if by < 0 else "down"
    return Edit(f"Move {called(context, list_pointer, index)} {direction}", change, f"{list_pointer}/{to}")


def duplicate_all(context: Context, list_pointer: str, indices: Sequence[int]) -> Edit:
    """Copies of several entries, each behind its original."""
    steps = [(duplicate, index + done) for done, index in enumerate(sorted(indices))]
    label = f"Duplicate {len(indices)} {word_for(list_pointer)}s"
    return _in_turn(context, list_pointer, label, steps, [index + 1 for _, index in steps])


def move_all(context: Context, list_pointer: str, indices: Sequence[int], by: int) -> Edit | None:
    """Several entries moved up or down together; `None` where the first of them is at that end."""
    ahead = sorted(indices, reverse=by > 0)
    if not 0 <= ahead[0] + by < len(entries_of(context, list_pointer)):
        return None
    direction = "up" if by < 0 else "down"
    label = f"Move {len(indices)} {word_for(list_pointer)}s {direction}"
    steps = [(partial(move, by=by), index) for index in ahead]
    return _in_turn(context, list_pointer, label, steps, [index + by for index in sorted(indices)])


def _in_turn(
    context: Context,
    list_pointer: str,
    label: str,
    steps: Sequence[tuple[Callable[[Context, str, int], Edit | None], int]],
    then: Sequence[int],
) -> Edit:
    """Edits of single entries one after the other, as one."""
    tree = copied(context.tree)
    for make, index in steps:
        edit = make(replace(context, tree=tree), list_pointer, index)
        if edit is not None:
            edit.change(tree)

    def change(before: Tree) -> None:
        before.clear()
        before.update(tree)

    select, *also = [f"{list_pointer}/{index}" for index in then]
    return Edit(label, change, select, tuple(also))


def called(context: Context, list_pointer: str, index: int) -> str:
    """What an entry is called in a sentence: "Lower", "gauge Head", "mass"."""
    entry = entries_of(context, list_pointer)[index]
    word = word_for(list_pointer)
    if "name" not in entry:
        return str(entry["kind"])
    return str(entry["name"]) if word == "segment" else with_kind(word, str(entry["name"]))


def entries_of(context: Context, list_pointer: str) -> list[Any]:
    """The entries of a list of the case, or of the project where the pointer begins with "/"."""
    return value_at(context.tree, context.full(list_pointer)) or []


def _segments(context: Context, list_pointer: str) -> Sequence[Any]:
    of_member = list_pointer.startswith("member")
    return context.case.member.segments if of_member else context.case.ram_segments


def _new_entry(context: Context, list_pointer: str, index: int) -> Tree:
    entries = entries_of(context, list_pointer)
    word = word_for(list_pointer)
    if word in LIKE_THEIR_NEIGHBOUR and entries:
        entry: Tree = copied(entries[max(0, index - 1)])
        if word == "segment":
            entry.update(end_section=None, joint_above={"kind": "bonded"})
    else:
        entry = filled(NEW_PARTS[f"{word}s"], context.case.member.segments[0].material)
    if word == "gauge":
        entry["position"] = _between_gauges(context)
    if word == "attachment":
        entry["position"] = context.case.member.length
        return entry
    names = [e["name"] for e in entries]
    entry["name"] = free_name(f"{word.capitalize()} {len(entries) + 1}", names)
    return entry


def _between_gauges(context: Context) -> float:
    """The middle of the longest stretch of the member without a gauge, to a tidy centimetre where that is in it."""
    length = context.case.member.length
    stands = sorted({0.0, length, *(g.position for g in context.case.gauges if g.on == "member")})
    gap, start = max((b - a, a) for a, b in pairwise(stands))
    middle = start + gap / 2
    return round(middle, 2) if gap > 0.1 else middle


def _insert(
    context: Context, list_pointer: str, index: int, entry: Tree, copied_from: int | None, label: str
) -> Edit:
    count = len(entries_of(context, list_pointer))
    pointer = context.full(list_pointer)

    def change(tree: Tree) -> None:
        came_from: list[int | None] = [*range(index), copied_from, *range(index, count)]
        rearrange(tree, pointer, came_from)
        if value_at(tree, pointer) is None:
            parent, key = pointer.rsplit("/", 1)
            value_at(tree, parent)[key] = []
        value_at(tree, pointer).insert(index, copied(entry))
        if copied_from is None:
            mark_begun(tree, f"{pointer}/{index}")

    return Edit(label, change, f"{list_pointer}/{index}")


def _rearranged(tree: Tree, pointer: str, came_from: Sequence[int]) -> None:
    entries = value_at(tree, pointer)
    rearrange(tree, pointer, came_from)
    entries[:] = [copied(entries[i]) for i in came_from]


def _first_is_bonded(tree: Tree, pointer: str) -> None:
    """The first segment has nothing above it that it could be jointed to."""
    entries = value_at(tree, pointer)
    if pointer.endswith("segments") and entries:
        entries[0]["joint_above"] = {"kind": "bonded"}
        forget(tree, f"{pointer}/0/joint_above")
