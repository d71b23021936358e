"""Gauges and attachments of a rod that was made shorter: those that would hang beyond its end move with the end."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

from app.names import with_kind
from app.tree import copied
from app.units import Units
from solver import Problem

Tree = dict[str, Any]
RODS = ("member", "striker", "ram")
PLACE = re.compile(r"/cases/(\d+)/(?:gauges|member/attachments)/\d+/position")


@dataclass(frozen=True)
class Moved:
    """One that was moved: what it is called, and its old and new place (m)."""

    called: str
    old: float
    new: float


def carried_along(before: Tree, after: Tree, problems: Sequence[Problem]) -> tuple[Tree, list[Moved]] | None:
    """The tree after an edit with what no longer fits on a shorter rod moved; `None` where there is no such thing.

    They keep their distance from the far end, or where one of them would come above the middle so, their share of the
    length.
    """
    cases = {int(found.group(1)) for p in problems if (found := PLACE.fullmatch(p.pointer))}
    tree: Tree = copied(after)
    moved: list[Moved] = []
    for index in cases & set(range(len(before["cases"]))):
        moved += carry(before["cases"][index], tree["cases"][index])
    return (tree, moved) if moved else None


def sentence_of(moved: Sequence[Moved], units: Units) -> str:
    """What moved, and from where to where."""
    told = [
        f"{one.called} from {units.show(one.old, 'length')} to {units.show(one.new, 'length')}"
        for one in moved
    ]
    listed = told[0] if len(told) == 1 else f"{', '.join(told[:-1])} and {told[-1]}"
    return f"Moved with the end of the shorter member: {listed}. Undo takes all of it back."


def moved_between(old: Tree, new: Tree) -> list[Moved]:
    """What lies elsewhere in a case than before; both cases have the same gauges and attachments."""
    pairs = [pair for rod in RODS for pair in zip(_on(old, rod), _on(new, rod), strict=True)]
    return [
        Moved(called, was["position"], now["position"])
        for (was, called), (now, _) in pairs
        if was["position"] != now["position"]
    ]


def carry(old: Tree, new: Tree) -> list[Moved]:
    """Move in the new tree of a case what hangs beyond the end of a rod that is shorter than in the old one."""
    moved = []
    for rod in RODS:
        was, now = _length(old, rod), _length(new, rod)
        if not 0 < now < was:
            continue
        beyond = [(one, called) for one, called in _on(new, rod) if one["position"] > now * (1 + 1e-12)]
        beyond = [(one, called) for one, called in beyond if any(one == kept for kept, _ in _on(old, rod))]
        by_share = any(was - one["position"] > now / 2 for one, _ in beyond)
        for one, called in beyond:
            place = one["position"]
            there = place / was * now if by_share else now - (was - place)
            one["position"] = min(float(f"{there:.9g}"), now)
            moved.append(Moved(called, place, one["position"]))
    return moved


def _on(case: Tree, rod: str) -> Iterator[tuple[Tree, str]]:
    """What has a place on a rod, with what it is called."""
    for gauge in case.get("gauges") or []:
        if (gauge.get("on") or "member") == rod:
            yield gauge, with_kind("gauge", str(gauge["name"]))
    if rod == "member":
        for attachment in case["member"].get("attachments") or []:
            yield attachment, f"the {attachment['kind']}"


def _length(case: Tree, rod: str) -> float:
    if rod == "member":
        segments = case["member"]["segments"]
    else:
        load = case["load"]
        holder = load if load["kind"] == "striker" else load.get("ram") or {}
        segments = (holder.get("segments") or []) if (load["kind"] == "striker") == (rod == "striker") else []
    return float(sum(segment["length"] for segment in segments))
