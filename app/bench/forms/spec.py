"""What a form shows, row by row, as plain values: made anew from the project at each change, compared, then drawn."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

from app.parts_library import PartKind
from solver import Case
from solver.model.quantity import Bounds

Tree = dict[str, Any]
#: Changes the tree of the whole project in place, as one edit.
Change = Callable[[Tree], None]


@dataclass(frozen=True)
class Context:
    """What a form is made from: the project's tree, and the case that is looked at with its place in the tree."""

    tree: Tree
    case: Case
    at: str
    material_way: str = "modulus_density"

    @property
    def material_names(self) -> list[str]:
        return [material["name"] for material in self.tree["materials"]]

    def full(self, pointer: str) -> str:
        """The pointer into the project, of one that may be relative to the case."""
        return pointer if pointer.startswith("/") else f"{self.at}/{pointer}"


@dataclass(frozen=True)
class Spec:
    """One row of a form. `pointer` is the place in the project that its faults and marks belong to."""

    pointer: str
    label: str
    tells: str = ""
    source: str = ""
    #: The same row of other parts that are selected too: what is entered goes to them as well.
    twins: tuple[Spec, ...] = field(default=(), kw_only=True)

    @property
    def key(self) -> tuple[Any, ...]:
        """Equal for two rows that the same widget can show."""
        return (type(self).__name__, self.pointer, self.label)


@dataclass(frozen=True)
class NumberSpec(Spec):
    """A number. `empty` tells what an empty field means, where it may be empty; `write` changes the tree where the
    number is not simply the value at `pointer`."""

    value: float | None = None
    dimension: str = "none"
    bounds: Bounds = field(default_factory=Bounds)
    empty: str | None = None
    whole: bool = False
    write: Callable[[Tree, float | None], None] | None = field(default=None, compare=False)

    @property
    def key(self) -> tuple[Any, ...]:
        return (*super().key, self.dimension, self.whole)


@dataclass(frozen=True)
class TextSpec(Spec):
    """A line of text. `write` changes the tree where more than the value at `pointer` changes with it."""

    value: str | None = None
    optional: bool = False
    write: Callable[[Tree, str], None] | None = field(default=None, compare=False)


@dataclass(frozen=True)
class CheckSpec(Spec):
    """Yes or no."""

    value: bool = False


@dataclass(frozen=True)
class Option:
    """One choice: its key, the word for it, what it means."""

    key: str
    word: str
    tells: str = ""


@dataclass(frozen=True)
class ChoiceSpec(Spec):
    """A choice. `change` gives the edit for a key; `pick` offers parts of the library for `pick_at`."""

    value: str = ""
    options: tuple[Option, ...] = ()
    change: Callable[[Tree, str], None] | None = field(default=None, compare=False)
    pick: PartKind | None = None
    pick_at: str = ""
    view: str = ""

    @property
    def key(self) -> tuple[Any, ...]:
        return (*super().key, self.options, self.pick, self.pick_at)


@dataclass(frozen=True)
class PointsSpec(Spec):
    """Points of a history: how many there are, with paste and file."""

    count: int = 0


def shape_of(specs: list[Spec]) -> list[tuple[Any, ...]]:
    """Equal for two forms that the same widgets can show."""
    return [spec.key for spec in specs]
