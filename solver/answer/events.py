"""What happened during a blow, each with its place and time."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from solver.answer.blow import Blow
from solver.answer.result import Event, EventKind
from solver.numerics.chain import Chain
from solver.numerics.records import (
    EVENT_IMPACT,
    EVENT_JOINT_CLOSED,
    EVENT_JOINT_OPENED,
    EVENT_LEFT_ELASTIC,
    EVENT_SEPARATION,
    EVENT_TOE_LIFT,
    EVENT_WALL,
)

EVENT_NAMES: dict[int, EventKind] = {
    EVENT_IMPACT: "impact",
    EVENT_SEPARATION: "separation",
    EVENT_LEFT_ELASTIC: "first_yield",
    EVENT_JOINT_OPENED: "joint_opened",
    EVENT_JOINT_CLOSED: "joint_closed",
    EVENT_WALL: "wall_contact",
    EVENT_TOE_LIFT: "toe_lift",
}
#: What ends and begins again within so many steps is one contact, not two.
FLICKER = 3
#: Gap (m) below which faces lie on each other.
TOUCHING = 1e-12


def events_of(blow: Blow) -> tuple[Event, ...]:
    """All events in order of time; of cracks the first of each segment."""
    chain = blow.chain
    kept = _without_first_touch(blow, _without_flicker(blow.events))
    found = _first_cracks(blow)
    for kind, place, step in kept:
        name = EVENT_NAMES[kind]
        striker = chain.case.load.kind == "striker" and place == chain.head - 1
        if striker and name in ("joint_closed", "joint_opened"):
            name = "impact" if name == "joint_closed" else "separation"
        found.append(Event(name, _event_position(chain, kind, place), step * chain.dt))
    return tuple(sorted(found, key=lambda e: e.time))


def _first_cracks(blow: Blow) -> list[Event]:
    """The first crack of each segment."""
    chain, first = blow.chain, dict[str, Event]()
    steps = blow.state.bounds.joint_bond[3]
    for j in np.argsort(steps, kind="stable"):
        joint = chain.joints[j]
        if joint.strength and steps[j] >= 0 and joint.segment not in first:
            first[joint.segment] = Event("crack", joint.position, float(steps[j] * chain.dt))
    return list(first.values())


def _event_position(chain: Chain, kind: int, place: int) -> float:
    if kind == EVENT_LEFT_ELASTIC:
        return float((chain.position[place] + chain.position[place + 1]) / 2)
    # a rod that strikes ends at -0.0
    return float(chain.position[place]) + 0.0


def _without_first_touch(blow: Blow, events: list[tuple[int, int, int]]) -> list[tuple[int, int, int]]:
    """Leave out the closing of joints whose faces lie on each other before the blow: the wave that comes to press them
    closes nothing. What strikes does begin so."""
    chain, rest = blow.chain, blow.rest
    touching = {
        joint.link
        for joint in chain.joints
        if joint.link >= chain.head
        and not joint.slack < np.inf
        and rest[joint.link + 1] - rest[joint.link] + joint.gap <= TOUCHING
    }
    kept = []
    for event in events:
        if not (event[0] == EVENT_JOINT_CLOSED and event[1] in touching):
            kept.append(event)
        touching.discard(event[1])
    return kept


def _without_flicker(events: NDArray[np.int64]) -> list[tuple[int, int, int]]:
    """Leave out a parting and meeting of the same place that lie a few steps apart."""
    pairs = {
        EVENT_IMPACT: EVENT_SEPARATION,
        EVENT_SEPARATION: EVENT_IMPACT,
        EVENT_JOINT_CLOSED: EVENT_JOINT_OPENED,
        EVENT_JOINT_OPENED: EVENT_JOINT_CLOSED,
    }
    kept: list[tuple[int, int, int]] = []
    for kind, place, step in events.tolist():
        opposite = pairs.get(kind)
        previous = next((i for i in range(len(kept) - 1, -1, -1) if kept[i][1] == place), None)
        if previous is not None and kept[previous][0] == opposite and step - kept[previous][2] <= FLICKER:
            del kept[previous]
        else:
            kept.append((kind, place, step))
    return kept
