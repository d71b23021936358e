"""What can be dragged in the member drawing, how far, and what it changes: each handle is one entry here."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from itertools import accumulate
from typing import Any, Literal

from app.carried_along import carry
from app.names import with_kind
from app.tree import copied
from app.units import Units
from solver import Case
from solver.model.derived import far_face, place_of

HandleKind = Literal["gauge", "segment", "surface", "layer", "drop"]
Change = Callable[[dict[str, Any]], None]

#: No length or thickness is dragged below this share of the member's length.
LEAST_SHARE = 1e-3
#: Drop height for a pixel of dragging, and its snap, m: the picture does not show the height to scale.
DROP_PER_PIXEL, DROP_STEP = 0.01, 0.05


@dataclass(frozen=True)
class Handle:
    """One thing to drag: where it lies (m; for the drop its height), how far it may go, and the part that it is of."""

    kind: HandleKind
    index: int
    pointer: str
    place: float
    low: float
    high: float


def handles_of(case: Case) -> list[Handle]:
    """All handles of a case; those that come first are reached first where they overlap."""
    return [*_gauges(case), *_boundaries(case), *_ground(case), *_drop(case)]


def _gauges(case: Case) -> Iterator[Handle]:
    for index, gauge in enumerate(case.gauges):
        low, high = (0.0, case.member.length) if gauge.on == "member" else (far_face(case), 0.0)
        yield Handle("gauge", index, f"gauges/{index}", place_of(case, gauge), low, high)


def _boundaries(case: Case) -> Iterator[Handle]:
    """Lower face of each segment. The far end stays in the ground; gauges and attachments are carried along."""
    least = LEAST_SHARE * case.member.length
    ends = list(accumulate(s.length for s in case.member.segments))
    starts = [0.0, *ends[:-1]]
    surface = case.ground.surface if case.ground else 0.0
    for index, (start, end) in enumerate(zip(starts, ends, strict=True)):
        last = index == len(ends) - 1
        low = max(start + least, surface) if last else start + least
        high = 2 * end if last else ends[index + 1] - least
        yield Handle("segment", index, f"member/segments/{index}", end, low, high)


def _ground(case: Case) -> Iterator[Handle]:
    if case.ground is None:
        return
    least, surface = LEAST_SHARE * case.member.length, case.ground.surface
    yield Handle("surface", 0, "ground", surface, 0.0, case.member.length)
    bottoms = [surface + t for t in accumulate(layer.thickness for layer in case.ground.layers)]
    for index, bottom in enumerate(bottoms):
        top = bottoms[index - 1] if index else surface
        last = index == len(bottoms) - 1
        high = 2 * case.member.length if last else bottoms[index + 1] - least
        yield Handle("layer", index, f"ground/layers/{index}", bottom, top + least, high)


def _drop(case: Case) -> Iterator[Handle]:
    height = case.load.drop_height if case.load.kind == "drop" else None
    if height is not None:
        yield Handle("drop", 0, "load", height, DROP_STEP, 100.0)


def gauges_along(case: Case, handle: Handle, chosen: Sequence[str]) -> tuple[Handle, ...]:
    """The other gauges that are selected where a gauge is dragged: they go along."""
    if handle.kind != "gauge":
        return ()
    others = (other for other in _gauges(case) if other.pointer in chosen)
    return tuple(other for other in others if other.index != handle.index)


def within_all(place: float, handle: Handle, along: Sequence[Handle]) -> float:
    """A place (m) for the handle at which those that go along stay within their bounds too."""
    low = max([handle.low, *(handle.place + one.low - one.place for one in along)])
    high = min([handle.high, *(handle.place + one.high - one.place for one in along)])
    return min(max(place, low), high)


def change_to(
    handle: Handle, place: float, at: int, before: dict[str, Any], along: Sequence[Handle] = ()
) -> Change:
    """The edit of the project's tree that puts a handle at a place (m); `at` is the number of the case, `before` the
    case's tree at the press: from there, not from the step before, a shorter member carries along what is on it."""

    def change(tree: dict[str, Any]) -> None:
        mine = tree["cases"][at]
        if handle.kind == "gauge":
            for one in (handle, *along):
                where = one.place + place - handle.place if one is not handle else place
                mine["gauges"][one.index]["position"] = tidy(where - one.low)
        elif handle.kind == "drop":
            mine["load"]["drop_height"] = tidy(place)
        elif handle.kind == "surface":
            mine["ground"]["surface"] = tidy(place)
        elif handle.kind == "layer":
            layers = mine["ground"]["layers"]
            top = mine["ground"]["surface"] + sum(one["thickness"] for one in layers[: handle.index])
            _divide(layers, handle.index, "thickness", place - top)
        else:
            segments = mine["member"]["segments"]
            start = sum(one["length"] for one in segments[: handle.index])
            _divide(segments, handle.index, "length", place - start)
            mine["gauges"] = copied(before["gauges"])
            mine["member"]["attachments"] = copied(before["member"]["attachments"])
            carry(before, mine)

    return change


def _divide(parts: list[dict[str, Any]], index: int, key: str, size: float) -> None:
    """Give a part a new size at the cost of the next one, so that what lies below stays where it is."""
    both = parts[index][key] + parts[index + 1][key] if index + 1 < len(parts) else None
    parts[index][key] = tidy(size)
    if both is not None:
        parts[index + 1][key] = tidy(both - tidy(size))


def tidy(value: float) -> float:
    """Without the digits that only computing has brought in."""
    return float(f"{value:.9g}")


def told(handle: Handle, place: float, case: Case, units: Units, along: Sequence[Handle] = ()) -> str:
    """What a drag does, as the name of the step of undo: "Move gauge Head to 1.40 m"."""
    # a gauge is told from where its own rod begins
    shown = units.show(place - handle.low if handle.kind == "gauge" else abs(place), "length")
    if along:
        by, way = units.show(abs(place - handle.place), "length"), "down" if place > handle.place else "up"
        return f"Move {len(along) + 1} gauges {way} by {by}, {case.gauges[handle.index].name} to {shown}"
    if handle.kind == "gauge":
        return f"Move {with_kind('gauge', case.gauges[handle.index].name)} to {shown}"
    if handle.kind == "drop":
        return f"Drop height {shown}"
    if handle.kind == "surface":
        return f"Ground surface at {shown}"
    if handle.kind == "layer":
        assert case.ground is not None
        return f"{case.ground.layers[handle.index].name} down to {shown}"
    return f"{case.member.segments[handle.index].name} down to {shown}"
