"""The form of each row of the outline, from the place that the row stands for."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import replace

from app.bench.forms.fields import field_specs, model_specs
from app.bench.forms.spec import Context, Spec
from app.tree import value_at
from solver.model.load import Drop
from solver.model.material import Material
from solver.model.member import Attachment, Member, Segment
from solver.model.project import Case, Gauge, Run
from solver.model.surroundings import Layer, Toe

#: Entries of lists: the end of their pointer, and their model.
ENTRIES = (
    (re.compile(r"segments/\d+"), Segment),
    (re.compile(r"ground/layers/\d+"), Layer),
    (re.compile(r"gauges/\d+"), Gauge),
    (re.compile(r"member/attachments/\d+"), Attachment),
    (re.compile(r"/materials/\d+"), Material),
)


def form_of_all(context: Context, pointer: str, also: Sequence[str]) -> list[Spec]:
    """The form of a part, whose rows also set what the same rows of other parts set. Names stay each part's own."""
    shared: dict[tuple[str, str], list[Spec]] = {}
    for other in also:
        for spec in form_of(context, other):
            shared.setdefault((spec.label, spec.pointer.removeprefix(context.full(other))), []).append(spec)
    found = []
    for spec in form_of(context, pointer):
        place = spec.pointer.removeprefix(context.full(pointer))
        twins = shared.get((spec.label, place), []) if place != "/name" else []
        found.append(replace(spec, twins=tuple(one for one in twins if type(one) is type(spec))))
    return found


def differing(specs: list[Spec]) -> list[str]:
    """Labels of the rows in which the parts selected together do not have the same."""
    values = [(spec, getattr(spec, "value", None)) for spec in specs]
    return [s.label for s, value in values if any(getattr(twin, "value", None) != value for twin in s.twins)]


def form_of(context: Context, pointer: str) -> list[Spec]:
    """The rows of the form of a part, by its pointer (relative to the case); none for a part that has no form."""
    for pattern, model in ENTRIES:
        if re.search(f"{pattern.pattern}$", pointer):
            if value_at(context.tree, context.full(pointer)) is None:
                return []
            return model_specs(context, model, context.full(pointer))
    if pointer == "load":
        found = field_specs(context, Case, context.at, "load")
        moves = context.case.load.kind == "none"
        return found + (field_specs(context, Run, f"{context.at}/run", "initial_velocity") if moves else [])
    if pointer in ("load/cushion", "load/pile_cushion", "load/cap_mass"):
        if context.case.load.kind != "drop":
            return []
        return field_specs(context, Drop, f"{context.at}/load", pointer.removeprefix("load/"))
    if pointer == "ground":
        return field_specs(context, Case, context.at, "ground")
    if pointer == "far_end":
        toe = context.case.ground.toe if context.case.ground else None
        found = field_specs(context, Case, context.at, "far_end")
        return found + (model_specs(context, Toe, f"{context.at}/ground/toe") if toe else [])
    if pointer == "run":
        inertia = field_specs(context, Member, f"{context.at}/member", "lateral_inertia")
        return model_specs(context, Run, f"{context.at}/run") + inertia
    return []
