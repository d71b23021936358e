"""Plain remarks under a form on what is allowed and hardly meant: slips of a unit, elements longer than what they are
to show, a run that ends before the wave has arrived."""

from __future__ import annotations

from collections.abc import Iterator

from pydantic import BaseModel

from app.tree import parts_of
from app.units import Units
from solver import Case
from solver.model import derived
from solver.model.load import Cushion, Drop, Striker
from solver.model.quantity import quantity_of
from solver.model.section import Section
from solver.model.surroundings import Layer, Resistance, Toe

#: Fewer elements than this along the member cannot carry the shape of a wave (common practice).
FEW = 20
#: Smallest and largest that anybody will have meant, SI (common practice, and wide: only slips of a unit are told).
USUAL: dict[tuple[type[BaseModel], str], tuple[float, float]] = {
    (Drop, "drop_height"): (0.01, 10.0),
    (Striker, "velocity"): (0.0, 1000.0),
    (Cushion, "area"): (1e-4, 5.0),
    (Cushion, "thickness"): (1e-3, 1.0),
    (Cushion, "young_modulus"): (1e6, 300e9),
    (Resistance, "quake"): (2e-4, 0.1),
    (Layer, "unit_resistance"): (0.0, 5e6),
    (Toe, "resistance"): (0.0, 1e9),
}
#: The same for every dimension of a section: walls of sheet metal to caissons.
USUAL_WIDTH = (3e-4, 10.0)


def remarks(case: Case, units: Units, pointer: str) -> list[str]:
    """Sentences on the part at a pointer that is relative to the case."""
    if pointer == "run":
        return [*_elements(case, units), *_duration(case, units)]
    if pointer.startswith("member/attachments/"):
        return list(_attachment(case, units, int(pointer.rpartition("/")[2])))
    return [line for part in _parts(case, pointer) for line in _slips(part, units)]


def _parts(case: Case, pointer: str) -> Iterator[BaseModel]:
    """What the form at a pointer has fields of."""
    if pointer == "far_end":
        pointer = "ground/toe"
    part: object = case
    for key in parts_of(f"/{pointer}"):
        if isinstance(part, list | tuple):
            part = part[int(key)] if int(key) < len(part) else None
        else:
            part = getattr(part, key, None)
    for one in (part, getattr(part, "section", None), getattr(part, "end_section", None)):
        if isinstance(one, BaseModel):
            yield one


def _slips(part: BaseModel, units: Units) -> Iterator[str]:
    for name in type(part).model_fields:
        value, quantity = getattr(part, name), quantity_of(type(part), name)
        bounds = next(
            (b for (model, field), b in USUAL.items() if field == name and isinstance(part, model)), None
        )
        if isinstance(part, Section) and quantity is not None and quantity.dimension == "small_length":
            bounds = USUAL_WIDTH
        if quantity is None or bounds is None or not value or bounds[0] <= value <= bounds[1]:
            continue
        shown, word = units.show(value, quantity.dimension), "small" if value < bounds[0] else "large"
        yield f"{quantity.label} {shown} is unusually {word}: check its unit."


def _attachment(case: Case, units: Units, index: int) -> Iterator[str]:
    attachment = case.member.attachments[index]
    whole = sum(derived.segment_mass(segment, case.materials) for segment in case.member.segments)
    if attachment.kind == "mass" and attachment.value > whole:
        yield f"Heavier than the whole member of {units.show(whole, 'mass')}: check its unit."


def _elements(case: Case, units: Units) -> Iterator[str]:
    longest = case.run.element_length
    if longest is None:
        return
    parts = [(s.length, f"segment {s.name}") for s in (*case.member.segments, *case.ram_segments)]
    short = min((part for part in parts if part[0] < longest), default=None)
    if short:
        length, name = units.show(short[0], "length"), short[1]
        yield (
            f"The element length is longer than {name} ({length}), which is then a single element: "
            "echoes inside it are not seen."
        )
    layers = case.ground.layers if case.ground else ()
    thin = min(((la.thickness, la.name) for la in layers if la.thickness < longest), default=None)
    if thin:
        yield (
            f"The element length is longer than layer {thin[1]} ({units.show(thin[0], 'length')}), "
            "whose resistance then acts at one place."
        )
    count = case.member.length / longest
    if count < FEW and not short:
        right = units.show(case.member.length / FEW, "length", 2)
        yield (
            f"Only about {max(1, round(count))} elements along the member: too few for the shape of a wave. "
            f"{right} or less would be right."
        )


def _duration(case: Case, units: Units) -> Iterator[str]:
    passage = derived.time_between(case, 0.0, case.member.length)
    if case.run.duration is not None and case.run.duration < passage:
        yield f"The run ends before a wave has passed along the member, which takes {units.show(passage, 'time')}."
