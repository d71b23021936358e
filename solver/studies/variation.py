"""One case made into another: its resistance scaled, its blow changed, or any one number of it replaced.

Every variation goes through the checks of the model, so that a study never solves what a file could not describe.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal

from pydantic import BaseModel, ValidationError

from solver.answer.remark import Show
from solver.model.checks import problems_of
from solver.model.derived import shaft_resistance
from solver.model.project import FORMAT, VERSION, Case, Project
from solver.model.quantity import SI_UNITS, quantity_of
from solver.model.surroundings import Ground, Layer

#: What of the resistance is varied: shaft and toe together, or the toe alone.
Vary = Literal["all", "toe"]


class StudyError(ValueError):
    """A study that cannot be made: one sentence for a person, with a place in braces for each of `values` (SI, and the
    dimension, a key of `SI_UNITS`). Its text is in SI; `told` writes the values as the reader has them."""

    def __init__(self, sentence: str, **values: tuple[float, str]) -> None:
        self._sentence, self._values = sentence, values
        super().__init__(self.told(_in_si))

    def told(self, show: Show) -> str:
        """The sentence with values written by `show`, from the value and its dimension."""
        if not self._values:
            return self._sentence
        return self._sentence.format(**{name: show(*value) for name, value in self._values.items()})


def _without_places(text: str) -> str:
    return text.replace("{", "{{").replace("}", "}}")


def _in_si(value: float, dimension: str) -> str:
    return f"{value:.6g} {SI_UNITS[dimension]}".strip()


@dataclass(frozen=True)
class Resistance:
    """Static resistance of the ground, N."""

    shaft: float
    toe: float

    @property
    def total(self) -> float:
        return self.shaft + self.toe


def resistance_of(case: Case) -> Resistance:
    """Static resistance along the embedded shaft and under the toe, N; zero without ground."""
    toe = case.ground.toe if case.ground is not None else None
    standing = toe is not None and case.far_end.kind == "ground"
    return Resistance(shaft_resistance(case), toe.resistance if toe is not None and standing else 0.0)


def with_resistance(case: Case, total: float, vary: Vary = "all") -> Case:
    """The case with another total resistance (N). "all" keeps the distribution and the toe's share; "toe" keeps the
    shaft as it is and gives the toe the rest.

    Raises `StudyError` where there is nothing to scale, or where the shaft alone is stronger than the total.
    """
    now, ground = resistance_of(case), case.ground
    if ground is None or now.total <= 0:
        raise StudyError(
            "The case has no resistance that could be varied: give its ground a shaft or a toe resistance."
        )
    if vary == "all":
        return case.model_copy(update={"ground": scaled_ground(ground, total / now.total, total / now.total)})
    if ground.toe is None or now.toe <= 0:
        raise StudyError(
            "The case has no toe resistance that could be varied alone: let its far end stand in the ground."
        )
    rest = total - now.shaft
    if rest < 0:
        raise StudyError(
            "The shaft alone has {shaft}, more than the total of {total}: vary all of the resistance.",
            shaft=(now.shaft, "force"),
            total=(total, "force"),
        )
    return case.model_copy(update={"ground": scaled_ground(ground, 1.0, rest / now.toe)})


def scaled_ground(ground: Ground, shaft: float, toe: float) -> Ground:
    """The ground with the resistance of its shaft and of its toe times two factors (not negative)."""
    total = ground.shaft_total
    return ground.model_copy(
        update={
            "layers": tuple(_scaled_layer(layer, shaft) for layer in ground.layers),
            "shaft_total": total and total.model_copy(update={"resistance": total.resistance * shaft}),
            "toe": ground.toe and ground.toe.model_copy(update={"resistance": ground.toe.resistance * toe}),
        }
    )


def _scaled_layer(layer: Layer, factor: float) -> Layer:
    bottom = layer.unit_resistance_bottom
    return layer.model_copy(
        update={
            "unit_resistance": layer.unit_resistance * factor,
            "unit_resistance_bottom": None if bottom is None else bottom * factor,
        }
    )


def value_at(case: Case, pointer: str) -> Any:
    """What stands at a pointer relative to the case, such as "load/drop_height". Raises `StudyError`."""
    node: Any = case
    for part in _parts(pointer):
        node = _child(node, part, pointer)
    return node


def label_of(case: Case, pointer: str) -> tuple[str, str]:
    """Words and dimension (a key of `SI_UNITS`) for a number of the case: ("Drop height", "length")."""
    *way, last = _parts(pointer)
    owner = value_at(case, "/".join(way)) if way else case
    declared = quantity_of(type(owner), last) if isinstance(owner, BaseModel) else None
    if declared is None:
        return last.replace("_", " "), "none"
    return declared.label, declared.dimension


def with_value(case: Case, pointer: str, value: float) -> Case:
    """The case with one number replaced, checked as a file would be.

    Raises `StudyError`, which names the place and says what would be right.
    """
    parts = _parts(pointer)
    if not isinstance(value_at(case, pointer), int | float) or isinstance(value_at(case, pointer), bool):
        raise StudyError(f"'{pointer}' is not a number of the case that is given, so it cannot be varied.")
    try:
        changed = _replaced(case, parts, float(value), pointer)
    except ValidationError as error:
        told = error.errors(include_url=False)[0]
        reason = told.get("ctx", {}).get("error") or told["msg"]
        label, dimension = label_of(case, pointer)
        words = [
            _without_places(f"{label} ('{pointer}')"),
            "cannot be {value}:",
            _without_places(f"{reason}."),
        ]
        raise StudyError(" ".join(words), value=(value, dimension)) from None
    materials = tuple(case.materials.values())
    bound: Case = changed.with_materials(materials)
    return checked(bound)


def checked(case: Case) -> Case:
    """The case itself, once what must hold between its parts does hold. Raises `StudyError`."""
    around = Project(
        format=FORMAT, version=VERSION, title="", materials=tuple(case.materials.values()), cases=(case,)
    )
    problems = problems_of(around)
    if problems:
        place = problems[0].pointer.removeprefix("/cases/0/")
        raise StudyError(f"The varied case is not valid at '{place}': {problems[0].sentence}.")
    return case


def _parts(pointer: str) -> list[str]:
    return [part.replace("~1", "/").replace("~0", "~") for part in pointer.strip("/").split("/")]


def _child(node: Any, part: str, pointer: str) -> Any:
    if isinstance(node, tuple) and part.isdigit() and int(part) < len(node):
        return node[int(part)]
    if isinstance(node, BaseModel) and part in type(node).model_fields:
        return getattr(node, part)
    raise StudyError(f"The case has nothing at '{pointer}': '{part}' is not there.")


def _replaced(node: Any, parts: list[str], value: float, pointer: str) -> Any:
    """A copy in which only what lies on the way to the number is built, and so checked, anew."""
    if not parts:
        return value
    first, *rest = parts
    child = _replaced(_child(node, first, pointer), rest, value, pointer)
    if isinstance(node, tuple):
        return (*node[: int(first)], child, *node[int(first) + 1 :])
    kept = {name: getattr(node, name) for name in node.model_fields_set}
    return type(node).model_validate({**kept, first: child})
