"""What is said beside an element length that is too long for what it is to show."""

from __future__ import annotations

from app.units import Units
from solver import Case

#: Fewer elements than this along the member cannot carry the shape of a wave (common practice).
FEW = 20


def remarks(case: Case, units: Units) -> list[str]:
    """A sentence on the shortest segment or layer that is shorter than an element, and on too few in all."""
    longest = case.run.element_length
    if longest is None:
        return []
    parts = [(s.length, f"segment {s.name}") for s in (*case.member.segments, *case.ram_segments)]
    found = []
    short = min((part for part in parts if part[0] < longest), default=None)
    if short:
        length, name = units.show(short[0], "length"), short[1]
        found.append(
            f"The element length is longer than {name} ({length}), which is then a single element: "
            "echoes inside it are not seen."
        )
    layers = case.ground.layers if case.ground else ()
    thin = min(((la.thickness, la.name) for la in layers if la.thickness < longest), default=None)
    if thin:
        found.append(
            f"The element length is longer than layer {thin[1]} ({units.show(thin[0], 'length')}), "
            "whose resistance then acts at one place."
        )
    count = case.member.length / longest
    if count < FEW and not short:
        right = units.show(case.member.length / FEW, "length", 2)
        found.append(
            f"Only about {max(1, round(count))} elements along the member: too few for the shape of a wave. "
            f"{right} or less would be right."
        )
    return found
