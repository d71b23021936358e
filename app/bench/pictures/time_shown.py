"""Which part of the run the pictures show: its opening, all of it, or what somebody has zoomed to.

A pile in soft ground rings for twenty times as long as the blow takes to pass it and come back. A run that goes on
until it rests therefore opens on its first passages, in which waves can be told apart; all of it is one key away.
"""

from __future__ import annotations

from math import inf
from typing import Any

from app.bench.pictures.axes import inside
from app.sight import Sight
from solver import Case, Result
from solver.model.derived import travel_time

Range = tuple[float, float]
#: Travel times along the member that the opening shows: the blow comes back to the struck end five times.
PASSES = 10.0
#: The opening takes in the blow and half as much again, however short the member.
BLOWS = 1.5
#: Where all of the run is hardly longer than its opening, it opens on all of it.
HARDLY = 1.3
#: A range of times that is all of the run, whatever that is.
WHOLE: Range = (0.0, inf)


def whole_time(case: Case, result: Result | None) -> Range:
    """Times from the blow to the end of the run, s; of a case that is not solved yet what it asks for."""
    if case.run.duration is not None:
        return 0.0, case.run.duration
    if result is not None and result.duration > 0:
        return 0.0, result.duration
    return 0.0, PASSES * _passage(case)


def opening_time(case: Case, result: Result | None) -> Range:
    """What is shown of a run at first, s. A duration that somebody has typed is shown whole."""
    whole = whole_time(case, result)
    if case.run.duration is not None:
        return whole
    end = max(PASSES * _passage(case), BLOWS * _end_of_blow(result))
    return (0.0, end) if HARDLY * end < whole[1] else whole


def shown_time(sight: Sight, case: Case, result: Result | None) -> Range:
    """The times that the pictures show, s."""
    return inside(sight.time_range or opening_time(case, result), whole_time(case, result))


def shows_all(sight: Sight, case: Case, result: Result | None) -> bool:
    return shown_time(sight, case, result) == whole_time(case, result)


def all_of_it(case: Case, result: Result | None) -> Range | None:
    """The range to set for all of the run: none where it opens on all of it."""
    return None if opening_time(case, result) == whole_time(case, result) else WHOLE


def all_or_opening(sight: Sight, case: Case, result: Result | None) -> dict[str, Any]:
    """What to set in the sight for all of both axes; and where they are shown already, for the opening."""
    shown = sight.distance_range is None and shows_all(sight, case, result)
    return {"time_range": None if shown else all_of_it(case, result), "distance_range": None}


def with_moment_shown(sight: Sight, case: Case, result: Result | None, time: float) -> dict[str, Any]:
    """What to set in the sight to bring the cursor to a time (s): the times shown go along where it lies outside."""
    low, high = shown_time(sight, case, result)
    if low <= time <= high:
        return {"time": time}
    half = (high - low) / 2
    return {"time": time, "time_range": inside((time - half, time + half), whole_time(case, result))}


def _passage(case: Case) -> float:
    return sum(travel_time(segment, case.materials) for segment in case.member.segments)


def _end_of_blow(result: Result | None) -> float:
    """When what strikes has left for the first time, s; 0 where it has not."""
    events = () if result is None else result.events
    return min((event.time for event in events if event.kind == "separation"), default=0.0)
