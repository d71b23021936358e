"""Which numbers of a case the lines of a set sheet may differ in."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from pydantic import BaseModel

from solver import Case
from solver.model.quantity import quantity_of

#: Parts that a study may vary, in the order in which the blow passes them, with the words for them.
PARTS = (
    ("load", ""),
    ("load/cushion", "Cushion"),
    ("load/pile_cushion", "Pile cushion"),
    ("ground/shaft_total", "Shaft"),
    ("ground/toe", "Toe"),
    ("ground", "Ground"),
)
#: What the resistances of the sheet replace, or what is no strength of a blow.
NOT = ("ground/toe/resistance", "ground/shaft_total/resistance", "ground/level_of_struck_end", "load/start")


def numbers_to_vary(case: Case) -> list[tuple[str, str]]:
    """Pointers relative to the case with their words; the first one that the program would choose stands first."""
    return list(_numbers(case))


def _numbers(case: Case) -> Iterator[tuple[str, str]]:
    for place, lead in PARTS:
        part = _part(case, place)
        if part is None:
            continue
        yield from _of(part, place, lead)
        if place == "ground":
            for i, layer in enumerate(part.layers):
                yield from _of(layer, f"ground/layers/{i}", layer.name)


def _part(case: Case, place: str) -> Any:
    node: Any = case
    for step in place.split("/"):
        node = getattr(node, step, None)
    return node


def _of(part: BaseModel, place: str, lead: str) -> Iterator[tuple[str, str]]:
    for name in type(part).model_fields:
        pointer = f"{place}/{name}"
        value = getattr(part, name)
        declared = quantity_of(type(part), name)
        if (
            declared is None
            or pointer in NOT
            or isinstance(value, bool)
            or not isinstance(value, int | float)
        ):
            continue
        label = declared.label if not lead else f"{lead}: {declared.label[:1].lower()}{declared.label[1:]}"
        yield pointer, label
