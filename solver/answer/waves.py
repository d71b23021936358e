"""Where waves are expected: straight lines on the x-t diagram from the member as it is described."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from solver.model.derived import axial_stiffness, mass_per_length
from solver.model.derived import travel_time as segment_time
from solver.model.load import History, Pulse
from solver.model.project import Case

Array = NDArray[np.float64]
Reflector = Literal["step", "joint", "ground", "toe", "far_end"]

#: Change of impedance below which a boundary of segments counts as none.
LEAST_STEP = 0.01


@dataclass(frozen=True, eq=False)
class Arrival:
    """The path of one wave front. `kind` and `position` (m) say where it turns back; `passage` counts how often it has.

    `times` (s) and `positions` (m), shape (points,): corners of the path, from the struck end on.
    """

    kind: Reflector
    position: float
    passage: int
    times: Array
    positions: Array


def travel_time_to(case: Case, position: float) -> float:
    """Time of a wave from the struck end to a distance (m) along the member, s: the integral of dx/c."""
    elapsed, passed = 0.0, 0.0
    for segment in case.member.segments:
        part = min(max((position - passed) / segment.length, 0.0), 1.0)
        if part > 0:
            elapsed += part * segment_time(segment, case.materials)
        passed += segment.length
    return elapsed


def returns_at(case: Case, arrival: Arrival, place: float) -> float | None:
    """Time (s) at which the last upward stretch of the path passes a place (m); `None` where it does not."""
    if not 0 <= place <= arrival.position:
        return None
    return float(arrival.times[-1]) - travel_time_to(case, place)


def reflectors_of(case: Case) -> list[tuple[Reflector, float]]:
    """Places that send a wave back, from the struck end on: steps of impedance, joints, ground surface, far end."""
    found: list[tuple[Reflector, float]] = []
    at = 0.0
    for upper, lower in zip(case.member.segments, case.member.segments[1:], strict=False):
        at += upper.length
        if lower.joint_above.kind != "bonded":
            found.append(("joint", at))
            continue
        materials = case.materials
        ends = []
        for segment, section in ((upper, upper.end_section or upper.section), (lower, lower.section)):
            material = materials[segment.material]
            stiffness = axial_stiffness(section, material, materials)
            ends.append(np.sqrt(stiffness * mass_per_length(section, material, materials)))
        if abs(ends[1] / ends[0] - 1) > LEAST_STEP:
            found.append(("step", at))
    if case.ground is not None and 0 < case.ground.surface < case.member.length:
        found.append(("ground", case.ground.surface))
    if case.far_end.kind != "matched":
        found.append(("toe" if case.far_end.kind == "ground" else "far_end", case.member.length))
    return sorted(found, key=lambda place: place[1])


def arrivals(case: Case, passages: int = 2) -> tuple[Arrival, ...]:
    """Fronts of the blow that turn back at each reflector and at the struck end again, `passages` times each.

    None where nothing strikes: a member that flies has its first front at what it meets.
    """
    if case.load.kind == "none":
        return ()
    start = case.load.start if isinstance(case.load, Pulse) else 0.0
    if isinstance(case.load, History):
        start = float(case.load.samples.times[0])
    found = []
    for kind, position in reflectors_of(case):
        one_way = travel_time_to(case, position)
        for passage in range(1, passages + 1):
            count = 2 * passage + 1
            times = start + one_way * np.arange(count, dtype=np.float64)
            positions = position * (np.arange(count, dtype=np.float64) % 2)
            found.append(Arrival(kind, position, passage, times, positions))
    return tuple(found)
