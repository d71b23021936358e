"""The quantity that all pictures show, taken from a result: over time and place, at one time, as extremes.

Values stay in SI with tension positive; the screen's units and sign are put on where they are drawn.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import lru_cache
from itertools import accumulate
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from app.sight import ShownQuantity
from app.units import Units
from solver import Case, GaugeRecord, Result
from solver.model.member import Segment

Array = NDArray[np.float64]

#: Quantities whose sign the project chooses; the others point towards the far end whatever it chooses.
SIGNED = ("stress", "force", "strain")
DIMENSIONS: dict[str, str] = {
    "stress": "stress",
    "force": "force",
    "velocity": "velocity",
    "displacement": "small_length",
}


def screen_sign(quantity: str, units: Units) -> int:
    """What a value in SI is multiplied by to be shown."""
    return units.sign if quantity in SIGNED else 1


@lru_cache(maxsize=4)
def field_of(result: Result, quantity: ShownQuantity) -> NDArray[np.float32]:
    """The quantity over time and distance, shape (frames, columns), single precision."""
    fields = result.fields
    if quantity == "force":
        return fields.stress * fields.area.astype(np.float32)
    return getattr(fields, quantity)


@lru_cache(maxsize=4)
def largest_of(result: Result, quantity: ShownQuantity) -> float:
    """Largest magnitude in the field, 0 for an empty one: the end of the colour scale."""
    values = field_of(result, quantity)
    return float(np.max(np.abs(values))) if values.size else 0.0


def along_member(result: Result, quantity: ShownQuantity, time: float) -> Array:
    """The quantity at a time (s), linear between the two frames around it, shape (columns,)."""
    frames = result.fields.time
    values = field_of(result, quantity)
    if len(frames) == 0:
        return np.zeros(len(result.fields.position))
    place = float(np.interp(time, frames, np.arange(len(frames))))
    first = int(place)
    last = min(first + 1, len(frames) - 1)
    share = place - first
    return (1 - share) * values[first].astype(float) + share * values[last].astype(float)


def value_at(result: Result, quantity: ShownQuantity, time: float, place: float) -> float | None:
    """The quantity at a time (s) and place (m); `None` off the member and off what strikes."""
    edges = result.fields.edges
    if not len(edges) or not edges[0] <= place <= edges[-1]:
        return None
    column = min(max(int(np.searchsorted(edges, place, side="right")) - 1, 0), len(edges) - 2)
    return float(along_member(result, quantity, time)[column])


def gauge_value(gauge: GaugeRecord, quantity: str, time: float) -> float:
    """A quantity of a gauge's record at a time (s), linear between steps."""
    return float(np.interp(time, gauge.time, getattr(gauge, quantity))) if len(gauge.time) else 0.0


@lru_cache(maxsize=16)
def largest_read(result: Result, quantity: str) -> float:
    """Largest magnitude of a quantity in the records of all gauges."""
    records = (getattr(gauge, quantity) for gauge in result.gauges.values())
    return max((float(np.max(np.abs(record), initial=0.0)) for record in records), default=0.0)


@dataclass(frozen=True, eq=False)
class Extremes:
    """Lowest and highest value of the whole run along the member, shape (n,), at places (m) of the same shape."""

    position: Array
    lowest: Array
    highest: Array


@lru_cache(maxsize=4)  # the result looked at, and those laid over it
def extremes_of(result: Result, quantity: ShownQuantity) -> Extremes:
    """Of stress the solver's own envelope, on which the findings stand, and of force that times the area; of motion
    the largest from the envelope and the lowest from the field, which is thinned in time."""
    envelope, fields = result.envelope, result.fields
    if quantity in ("stress", "force"):
        area = 1.0 if quantity == "stress" else area_at(result, envelope.position)
        return Extremes(envelope.position, envelope.lowest_stress * area, envelope.highest_stress * area)
    on_member = fields.position > 0
    values = field_of(result, quantity)[:, on_member]
    place = fields.position[on_member]
    if not values.size:
        return Extremes(place, np.zeros(len(place)), np.zeros(len(place)))
    highest = envelope.max_velocity if quantity == "velocity" else envelope.max_displacement
    top = np.interp(place, envelope.position, highest)
    return Extremes(place, np.min(values, axis=0).astype(float), top)


def striking_extremes(result: Result, quantity: ShownQuantity) -> Extremes | None:
    """Of stress and force in a rod that strikes, at its negative places; `None` where there is none."""
    envelope = result.striking_envelope
    if envelope is None or quantity not in ("stress", "force"):
        return None
    area = 1.0 if quantity == "stress" else area_at(result, envelope.position)
    return Extremes(envelope.position, envelope.lowest_stress * area, envelope.highest_stress * area)


def area_at(result: Result, position: Array) -> Array:
    """Area of the section (m2) at places (m), from the columns of the fields."""
    fields = result.fields
    column = np.clip(np.searchsorted(fields.edges, position, side="right") - 1, 0, len(fields.area) - 1)
    return fields.area[column]


@dataclass(frozen=True)
class LimitLine:
    """The limit of one segment's material from `start` to `end` (m), with the sign of the solver (tension positive)."""

    sign: Literal["compression", "tension"]
    start: float
    end: float
    stress: float


def limit_lines(case: Case) -> list[LimitLine]:
    """Limits along the rod that strikes, if any, and the member, those of neighbours joined where they are equal. The
    findings use the same numbers."""
    found: list[LimitLine] = []
    signs: tuple[tuple[Literal["compression", "tension"], float], ...] = (
        ("compression", -1.0),
        ("tension", 1.0),
    )
    for sign, factor in signs:
        for start, end, segment in (*_placed(case.ram_segments, above=True), *_placed(case.member.segments)):
            limit = case.material(segment.material).limits.value(sign)
            before = found[-1] if found and found[-1].sign == sign else None
            if limit is not None and before and before.stress == factor * limit and before.end == start:
                found[-1] = LimitLine(sign, before.start, end, before.stress)
            elif limit is not None:
                found.append(LimitLine(sign, start, end, factor * limit))
    return found


def _placed(segments: Sequence[Segment], above: bool = False) -> Iterator[tuple[float, float, Segment]]:
    """Segments with where each begins and ends (m), from the struck end on, or `above` it down to it."""
    ends = [0.0, *accumulate(segment.length for segment in segments)]
    first = -ends[-1] if above else 0.0
    for segment, start, end in zip(segments, ends, ends[1:], strict=False):
        yield first + start, first + end, segment
