"""Predicted arrivals on the x-t diagram: each wave front as a thin line, with a name, and where it passes a gauge.

Where waves turn back is the solver's (`arrivals`), and so are the travel times; here they are named and made to bend
where the wave speed changes.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from app.sight import Sight
from app.units import Units
from solver import Case, Result
from solver.answer.waves import Arrival, arrivals, reflectors_of, travel_time_to

Array = NDArray[np.float64]
#: Places that send waves back, above which the lines are off until they are asked for: they would cover the picture.
MANY = 2
TURNS = {
    "step": "the step at {}",
    "joint": "the joint at {}",
    "ground": "the ground surface at {}",
    "toe": "the toe",
    "far_end": "the far end",
}


@dataclass(frozen=True, eq=False)
class Leg:
    """One stretch of a path, from one turn to the next: `times` (s) and `places` (m), both of shape (points,)."""

    times: Array
    places: Array

    @property
    def downwards(self) -> bool:
        return bool(self.places[-1] > self.places[0])


@dataclass(frozen=True, eq=False)
class Line:
    """One predicted arrival: the legs of its whole path, and those of them that no other arrival has drawn."""

    arrival: Arrival
    legs: tuple[Leg, ...]
    own: tuple[Leg, ...]

    def named(self, units: Units) -> str:
        """ "reflection from the step at 12.0 m, 2nd pass"."""
        of = self.arrival
        where = TURNS[of.kind].format(units.show(of.position, "length"))
        return f"reflection from {where}, {ordinal(of.passage)} pass"

    def passes(self, place: float) -> float | None:
        """Time (s) at which it comes back past a place (m); `None` where it does not."""
        back = self.legs[-1]
        if not back.places[-1] <= place <= back.places[0]:
            return None
        return float(np.interp(place, back.places[::-1], back.times[::-1]))


@lru_cache(maxsize=4)
def lines_of(result: Result) -> tuple[Line, ...]:
    """The arrivals of a result's case that begin to come back before its end."""
    there = [a for a in arrivals(result.case) if a.times[-2] < result.duration]
    deepest = max((a.position for a in there), default=0.0)
    drawn: set[tuple[float, float]] = set()
    found = []
    for arrival in there:
        legs = _legs(result.case, arrival)
        own = []
        for number, leg in enumerate(legs):
            key = (round(float(leg.times[0]), 12), arrival.position)
            # the way of the blow itself is drawn once, down to the deepest turn
            if key not in drawn and (number > 0 or arrival.position == deepest):
                drawn.add(key)
                own.append(leg)
        found.append(Line(arrival, legs, tuple(own)))
    return tuple(found)


def arrivals_shown(sight: Sight, result: Result | None) -> bool:
    """Whether predicted arrivals are drawn: as chosen, and where nothing is, unless they are many."""
    if result is None:
        return False
    return _few(result) if sight.arrivals is None else sight.arrivals


@lru_cache(maxsize=4)
def _few(result: Result) -> bool:
    return len(reflectors_of(result.case)) <= MANY


def ordinal(number: int) -> str:
    """1st, 2nd, 3rd, 4th ..., 11th, 12th, 13th."""
    ending = "th" if number % 100 in (11, 12, 13) else {1: "st", 2: "nd", 3: "rd"}.get(number % 10, "th")
    return f"{number}{ending}"


def all_named(lines: Sequence[Line], numbers: Sequence[int], units: Units) -> str:
    """The names of those that are pointed at, in one line; those that a new result has not any more are left out."""
    return "; ".join(lines[n].named(units) for n in numbers if n < len(lines))


def _legs(case: Case, arrival: Arrival) -> tuple[Leg, ...]:
    """The path from turn to turn, with a corner wherever a segment ends: there the wave speed may change."""
    joints = np.cumsum([s.length for s in case.member.segments])[:-1]
    elapsed = {p: travel_time_to(case, p) for p in (0.0, arrival.position, *joints.tolist())}
    within = joints[joints < arrival.position].tolist()
    legs = []
    for begins, start, end in zip(arrival.times, arrival.positions, arrival.positions[1:], strict=False):
        places = [float(start), *(within if end > start else within[::-1]), float(end)]
        times = [float(begins) + abs(elapsed[p] - elapsed[float(start)]) for p in places]
        legs.append(Leg(np.array(times), np.array(places)))
    return tuple(legs)
