"""What the model's annotations tell about a field: its choices, its models, the words for fields without a quantity."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any, Literal, get_args, get_origin

from pydantic import BaseModel

from solver.model.load import Cushion, Drop, History, Pulse
from solver.model.material import Limit, Material
from solver.model.member import Attachment, Member, Segment
from solver.model.project import Gauge, RepeatedBlows, Run
from solver.model.section import FilledPipe
from solver.model.surroundings import Ground, Layer, Resistance, ShaftTotal, Toe

FieldOf = tuple[type[BaseModel], str]

#: Label and meaning of fields that declare no quantity.
WORDS: dict[FieldOf, tuple[str, str]] = {
    (Segment, "name"): ("Name", ""),
    (Segment, "material"): ("Material", ""),
    (FilledPipe, "fill"): ("Fill", "The material inside the pipe."),
    (Gauge, "name"): ("Name", ""),
    (Gauge, "side"): ("Side", "Which side of a jump in section the gauge reads, where it stands on one."),
    (Gauge, "on"): ("On", "The rod that carries the gauge."),
    (Layer, "name"): ("Name", ""),
    (Material, "name"): ("Name", ""),
    (Pulse, "release"): (
        "Lets go after it",
        "A velocity holds the struck end for the whole run, at rest after the pulse, unless it lets go.",
    ),
    (History, "release"): (
        "Lets go after it",
        "A velocity holds the struck end for the whole run, at rest after the history, unless it lets go.",
    ),
    (History, "file"): (
        "File",
        "One header row, then time in s and the value in N or m/s; relative to the project.",
    ),
    (ShaftTotal, "distribution"): (
        "Distribution",
        "Along the shaft: the same everywhere, or growing from 0.",
    ),
    (Member, "lateral_inertia"): (
        "Lateral inertia",
        "Love's rod: waves shorter than the rod is wide run slower.",
    ),
    (Run, "gravity"): ("Gravity", "The member's weight acts, and it is at rest in it before the blow."),
    (Run, "blows"): ("Number of blows", "Each blow starts from the stresses that the last one left."),
    (RepeatedBlows, "most"): ("At most", "Blows, where the set does not repeat before."),
    (Limit, "basis"): ("Basis", "What the limit rests on, such as a clause of a code."),
    (Limit, "reason"): ("Reason", ""),
    (Limit, "source"): ("Source", ""),
}

#: The dimension of a number that follows from a choice beside it.
DIMENSION_BY_CHOICE: dict[FieldOf, tuple[str, dict[str, str]]] = {
    (Pulse, "peak"): ("quantity", {"force": "force", "velocity": "velocity"}),
    (Attachment, "value"): ("kind", {"mass": "mass", "spring": "stiffness", "dashpot": "impedance"}),
}
#: Label in place of the declared one, where the declared one is not told by itself.
LABELS: dict[FieldOf, dict[str, str]] = {
    (Attachment, "value"): {"mass": "Mass", "spring": "Stiffness", "dashpot": "Coefficient"},
}

#: Fields that are rows of their own in the outline, or shown by another field.
ELSEWHERE: set[FieldOf] = {
    (Drop, "ram"),
    (Drop, "cushion"),
    (Drop, "cap_mass"),
    (Drop, "pile_cushion"),
    (History, "values"),
    (Ground, "toe"),
    (Resistance, "damping_law"),
    (Material, "density"),
}
#: Fields of which only those with a value are shown: a choice beside them decides which have one.
WHERE_GIVEN: set[FieldOf] = {
    (Drop, "ram_mass"),
    (Drop, "drop_height"),
    (Drop, "efficiency"),
    (Drop, "energy"),
    (Drop, "impact_velocity"),
    (Cushion, "stiffness"),
    (Cushion, "area"),
    (Cushion, "thickness"),
    (Cushion, "young_modulus"),
    (Pulse, "rise"),
    (Pulse, "fall"),
    (History, "file"),
    (Resistance, "quake"),
    (Resistance, "damping"),
    (Resistance, "exponent"),
    (Resistance, "model"),
    (Ground, "shaft_total"),
}
#: Fields that come first in their form, where the order of the declaration is another.
FIRST: dict[type[BaseModel], tuple[str, ...]] = {
    Layer: ("name", "thickness", "unit_resistance", "unit_resistance_bottom"),
    ShaftTotal: ("resistance", "distribution"),
    Toe: ("resistance",),
    Run: ("duration", "gravity", "blows", "initial_velocity", "element_length"),
    Gauge: ("name", "on", "position"),
}
#: What an empty field means, in the field.
EMPTY: dict[FieldOf, str] = {
    (Run, "duration"): "until at rest",
    (Run, "element_length"): "by the program",
    (Run, "initial_velocity"): "none",
    (Layer, "unit_resistance_bottom"): "the same",
    (Material, "poisson_ratio"): "not given",
    (Ground, "level_of_struck_end"): "not given",
}


def in_table(table: set[FieldOf], model: type[BaseModel], field: str) -> bool:
    """Whether the field, of the model or of what it inherits from, is in a table."""
    return any((base, field) in table for base in model.__mro__)


def fields_in_order(model: type[BaseModel]) -> list[str]:
    """The model's fields in the order of its form."""
    first = FIRST.get(model, ())
    return [*first, *(name for name in model.model_fields if name not in first)]


def parts_of_annotation(annotation: Any) -> Iterator[Any]:
    """The types inside an annotation, through `Annotated` and unions."""
    if hasattr(annotation, "__metadata__"):
        yield from parts_of_annotation(annotation.__origin__)
    elif get_origin(annotation) in (Literal, tuple, list, dict, None):
        yield annotation
    else:
        for inner in get_args(annotation):
            yield from parts_of_annotation(inner)


def choices_of(model: type[BaseModel], field: str) -> tuple[str, ...]:
    """The values of a `Literal` field, none for others."""
    for part in parts_of_annotation(model.model_fields[field].annotation):
        if get_origin(part) is Literal:
            return get_args(part)
    return ()


def model_for(model: type[BaseModel], field: str, value: Any) -> type[BaseModel] | None:
    """The model of a field's value: of a union the one whose `kind` or `shape` it has."""
    found = None
    for part in parts_of_annotation(model.model_fields[field].annotation):
        if not (isinstance(part, type) and issubclass(part, BaseModel)):
            continue
        tags = [choices_of(part, tag) for tag in ("kind", "shape") if tag in part.model_fields]
        if any(value.get(tag) in choices for tag in ("kind", "shape") for choices in tags):
            return part
        if not tags:
            found = part
    return found


def is_type(model: type[BaseModel], field: str, wanted: type) -> bool:
    """Whether a field may be of a plain type."""
    return wanted in list(parts_of_annotation(model.model_fields[field].annotation))


def is_optional(model: type[BaseModel], field: str) -> bool:
    """Whether a field may be left empty."""
    return is_type(model, field, type(None))
