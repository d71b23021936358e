"""A choice that changes the shape of a part: its kind, or the way in which it is told."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

from pydantic import BaseModel

from app.bench.forms.kinds import KINDS, filled
from app.bench.forms.spec import Context, Option, Tree
from app.parts_library import PartKind


@dataclass(frozen=True)
class Chooser:
    """`key_of` reads the choice from the part that holds the field, `change` puts another one into it."""

    label: str
    options: tuple[Option, ...]
    key_of: Callable[[Tree], str]
    change: Callable[[Tree, str, Context], None]
    tells: str = ""
    pick: PartKind | None = None


#: By the field of the model that the choice decides about.
Choosers = Mapping[tuple[type[BaseModel], str], Chooser]


def options(*words: tuple[str, str] | tuple[str, str, str]) -> tuple[Option, ...]:
    """Choices from key, word and what it means."""
    return tuple(Option(*word) for word in words)


def options_of_union(model: type[BaseModel], field: str) -> tuple[Option, ...]:
    """A choice for each kind of a union of the model."""
    return tuple(Option(key, kind.word, kind.tells) for key, kind in KINDS[(model, field)].items())


def start_value(model: type[BaseModel], field: str, key: str, context: Context) -> Tree:
    """The complete value to begin with, made of a material that the member has."""
    return filled(KINDS[(model, field)][key].value, context.case.member.segments[0].material)


def new_kind(model: type[BaseModel], field: str) -> Callable[[Tree, str, Context], None]:
    """Begin anew with the complete value of the chosen kind."""

    def change(parent: Tree, key: str, context: Context) -> None:
        parent[field] = start_value(model, field, key, context)

    return change
