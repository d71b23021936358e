"""Rows of a form from the declarations of a model: one function per kind of field, none per part."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from pydantic import BaseModel

from app.bench.forms import declared
from app.bench.forms.begun import mark_begun
from app.bench.forms.chooser import Chooser, Choosers
from app.bench.forms.choosers_ground import OF_GROUND
from app.bench.forms.choosers_load import OF_LOAD
from app.bench.forms.choosers_member import OF_MEMBER
from app.bench.forms.kinds import words_of
from app.bench.forms.meanings import OF_CHOICES, OF_FIELDS, meaning_of
from app.bench.forms.more_fields import INSTEAD, MORE, ONLY_IF
from app.bench.forms.spec import CheckSpec, ChoiceSpec, Context, NumberSpec, Option, Spec, TextSpec, Tree
from app.bench.forms.use_part import name_material
from app.provenance import forget_missing
from app.tree import copied, value_at
from solver.model.member import Segment
from solver.model.quantity import Quantity, bounds_of, quantity_of
from solver.model.section import FilledPipe

CHOOSERS: Choosers = {**OF_LOAD, **OF_MEMBER, **OF_GROUND}
NAMES_A_MATERIAL = {(Segment, "material"), (FilledPipe, "fill")}


def model_specs(context: Context, model: type[BaseModel], pointer: str, ending: str = "") -> list[Spec]:
    """All rows of the part at a pointer. `ending` is put behind each label, to tell the ends of a taper apart."""
    found: list[Spec] = []
    for name in declared.fields_in_order(model):
        if not declared.in_table(declared.ELSEWHERE, model, name):
            found += field_specs(context, model, pointer, name, ending)
    return found


def field_specs(
    context: Context, model: type[BaseModel], pointer: str, name: str, ending: str = ""
) -> list[Spec]:
    """The rows of one field: the choice about it, its own row, the rows of a model inside it."""
    if (model, name) in ONLY_IF and not ONLY_IF[(model, name)](context, pointer):
        return []
    if (model, name) in INSTEAD:
        return INSTEAD[(model, name)](context, pointer)
    value = (value_at(context.tree, pointer) or {}).get(name)
    chooser = _chooser(model, name)
    found: list[Spec] = (
        [_choice_spec(context, chooser, pointer, name, meaning_of(OF_CHOICES, model, name))]
        if chooser
        else []
    )
    if value is None and (chooser or declared.in_table(declared.WHERE_GIVEN, model, name)):
        return found
    if isinstance(value, dict):
        inner = declared.model_for(model, name, value)
        assert inner is not None
        below = " at the end" if name == "end_section" else ending
        return found + model_specs(context, inner, f"{pointer}/{name}", below)
    own = _own_spec(context, model, pointer, name, value, ending, chooser is not None)
    more = MORE.get((model, name))
    return found + ([own] if own else []) + (more(context, pointer) if more else [])


def _own_spec(
    context: Context,
    model: type[BaseModel],
    pointer: str,
    name: str,
    value: Any,
    ending: str,
    chosen: bool,
) -> Spec | None:
    at = f"{pointer}/{name}"
    quantity = quantity_of(model, name)
    if quantity is not None and not isinstance(value, list):
        return _number_spec(context, model, pointer, name, quantity, value, ending)
    label, tells = declared.WORDS.get((model, name), (name.replace("_", " ").capitalize(), ""))
    tells = tells or meaning_of(OF_FIELDS, model, name)
    if (model, name) in NAMES_A_MATERIAL:
        options = tuple(Option(material, material) for material in context.material_names)
        return ChoiceSpec(
            at,
            label,
            tells,
            value=value,
            options=options,
            change=lambda tree, key: name_material(tree, at, key),
            pick="material",
            pick_at=at,
        )
    if declared.is_type(model, name, bool):
        return CheckSpec(at, label, tells, value=bool(value))
    if declared.is_type(model, name, int):
        if chosen and value == 1:
            return None
        return NumberSpec(at, label, tells, value=value, whole=True, bounds=bounds_of(model, name))
    if declared.is_type(model, name, str):
        return TextSpec(at, label, tells, value=value, optional=declared.is_optional(model, name))
    choices = declared.choices_of(model, name)
    if len(choices) > 1 and not chosen:
        words = words_of(model, name)
        options = tuple(Option(choice, words.get(choice, choice.replace("_", " "))) for choice in choices)
        return ChoiceSpec(at, label, tells, value=value, options=options)
    return None  # the tag of a union, or a list whose entries are rows of the outline


def _number_spec(
    context: Context,
    model: type[BaseModel],
    pointer: str,
    name: str,
    quantity: Quantity,
    value: float | None,
    ending: str,
) -> NumberSpec:
    dimension, label = quantity.dimension, quantity.label
    if (model, name) in declared.DIMENSION_BY_CHOICE:
        beside, dimensions = declared.DIMENSION_BY_CHOICE[(model, name)]
        choice = value_at(context.tree, f"{pointer}/{beside}")
        dimension = dimensions[choice]
        label = declared.LABELS.get((model, name), {}).get(choice, label)
    empty = declared.EMPTY.get((model, name), "") if declared.is_optional(model, name) else None
    given = declared.in_table(declared.WHERE_GIVEN, model, name)
    return NumberSpec(
        f"{pointer}/{name}",
        label + ending,
        quantity.tells or meaning_of(OF_FIELDS, model, name),
        quantity.source,
        value=value,
        dimension=dimension,
        bounds=bounds_of(model, name),
        empty=None if given else empty,
    )


def _chooser(model: type[BaseModel], name: str) -> Chooser | None:
    for base in model.__mro__:
        if (base, name) in CHOOSERS:
            return CHOOSERS[(base, name)]
    return None


def _choice_spec(context: Context, chooser: Chooser, pointer: str, name: str, meaning: str) -> ChoiceSpec:
    parent = value_at(context.tree, pointer)
    return ChoiceSpec(
        f"{pointer}/{name}#kind",
        chooser.label,
        chooser.tells or meaning,
        value=chooser.key_of(parent),
        options=chooser.options,
        change=_changing(context, chooser, pointer),
        pick=chooser.pick,
        pick_at=f"{pointer}/{name}" if chooser.pick in ("section", "cushion") else pointer,
    )


def _changing(context: Context, chooser: Chooser, pointer: str) -> Callable[[Tree, str], None]:
    def change(tree: Tree, key: str) -> None:
        part = value_at(tree, pointer)
        if key != chooser.key_of(part):
            before = copied(tree)
            chooser.change(part, key, context)
            forget_missing(tree)
            mark_begun(tree, pointer, before)

    return change
