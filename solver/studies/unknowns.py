"""What is not known well: inputs of a case with a range, each changed by a factor, or as a share."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Annotated, Literal

from pydantic import model_validator

from solver.model.load import Drop
from solver.model.project import Case
from solver.model.quantity import Described, Positive
from solver.model.surroundings import Ground
from solver.studies.variation import StudyError, resistance_of, scaled_ground, with_value

What = Literal["quake", "toe_quake", "damping", "toe_damping", "efficiency", "cushion", "toe_share"]


class Unknown(Described):
    """An input and the factors between which it lies, 1 = as the case says. "uniform": all of the range alike;
    "likely": lognormal, nine of ten values in the range."""

    what: What
    low: Annotated[Positive, "factor"]
    high: Annotated[Positive, "factor"]
    spread: Literal["uniform", "likely"] = "uniform"

    @model_validator(mode="after")
    def _low_is_below_high(self) -> Unknown:
        if self.low >= self.high:
            raise ValueError("'low' must be below 'high'")
        return self


@dataclass(frozen=True)
class Input:
    """How one input is named, where a case has it, and how a factor changes it."""

    label: str
    present: Callable[[Case], bool]
    changed: Callable[[Case, float], Case]


def _ground(case: Case) -> Ground:
    assert case.ground is not None
    return case.ground


def _shaft(field: str) -> Callable[[Case, float], Case]:
    def change(case: Case, factor: float) -> Case:
        ground = _ground(case)
        layers = tuple(
            layer
            if getattr(layer, field) is None
            else layer.model_copy(update={field: getattr(layer, field) * factor})
            for layer in ground.layers
        )
        total = ground.shaft_total
        if total is not None and getattr(total, field) is not None:
            total = total.model_copy(update={field: getattr(total, field) * factor})
        return case.model_copy(
            update={"ground": ground.model_copy(update={"layers": layers, "shaft_total": total})}
        )

    return change


def _has_shaft(field: str) -> Callable[[Case], bool]:
    def present(case: Case) -> bool:
        ground = case.ground
        if ground is None:
            return False
        parts = [*ground.layers, *([ground.shaft_total] if ground.shaft_total else [])]
        return any(getattr(part, field) for part in parts)

    return present


def _has_toe(field: str) -> Callable[[Case], bool]:
    return lambda case: case.ground is not None and bool(case.ground.toe and getattr(case.ground.toe, field))


def _toe(field: str) -> Callable[[Case, float], Case]:
    def change(case: Case, factor: float) -> Case:
        ground = _ground(case)
        assert ground.toe is not None
        toe = ground.toe.model_copy(update={field: getattr(ground.toe, field) * factor})
        return case.model_copy(update={"ground": ground.model_copy(update={"toe": toe})})

    return change


def _efficiency(case: Case, factor: float) -> Case:
    assert isinstance(case.load, Drop)
    if case.load.drop_height is not None and case.load.efficiency is not None:
        if case.load.efficiency * factor > 1 + 1e-9:
            raise StudyError(
                f"An efficiency of {case.load.efficiency:g} times {factor:.3g} is more than 1: lower its range."
            )
        return with_value(case, "load/efficiency", min(1.0, case.load.efficiency * factor))
    if case.load.energy is not None:
        return with_value(case, "load/energy", case.load.energy * factor)
    assert case.load.impact_velocity is not None
    return with_value(case, "load/impact_velocity", case.load.impact_velocity * factor**0.5)


def _cushion(case: Case, factor: float) -> Case:
    assert isinstance(case.load, Drop)
    assert case.load.cushion is not None
    field = "stiffness" if case.load.cushion.stiffness is not None else "young_modulus"
    return with_value(case, f"load/cushion/{field}", getattr(case.load.cushion, field) * factor)


def _toe_share(case: Case, factor: float) -> Case:
    """The same total, with the toe's share times a factor (at most all of it)."""
    now = resistance_of(case)
    toe = min(now.toe * factor, now.total)
    ground = scaled_ground(_ground(case), (now.total - toe) / now.shaft, toe / now.toe)
    return case.model_copy(update={"ground": ground})


def _two_parts(case: Case) -> bool:
    now = resistance_of(case)
    return now.shaft > 0 and now.toe > 0


INPUTS: dict[What, Input] = {
    "quake": Input("quake of the shaft", _has_shaft("quake"), _shaft("quake")),
    "toe_quake": Input("quake of the toe", _has_toe("quake"), _toe("quake")),
    "damping": Input("damping of the shaft", _has_shaft("damping"), _shaft("damping")),
    "toe_damping": Input("damping of the toe", _has_toe("damping"), _toe("damping")),
    "efficiency": Input("energy of the blow", lambda case: isinstance(case.load, Drop), _efficiency),
    "cushion": Input(
        "cushion stiffness",
        lambda case: isinstance(case.load, Drop) and case.load.cushion is not None,
        _cushion,
    ),
    "toe_share": Input("share of the toe", _two_parts, _toe_share),
}

#: Ranges offered where none are given: wide ones, chosen for this program, to be replaced by what is known on site.
USUAL: tuple[Unknown, ...] = (
    Unknown(what="quake", low=0.7, high=1.5),
    Unknown(what="toe_quake", low=0.6, high=2.0),
    Unknown(what="damping", low=0.6, high=1.6),
    Unknown(what="toe_damping", low=0.6, high=1.6),
    Unknown(what="efficiency", low=0.8, high=1.1),
    Unknown(what="cushion", low=0.7, high=1.4),
    Unknown(what="toe_share", low=0.7, high=1.3),
)


def usual_unknowns(case: Case) -> tuple[Unknown, ...]:
    """The usual ranges of what the case has; the energy's upper end so that no efficiency passes 1."""
    found = []
    for unknown in USUAL:
        if not INPUTS[unknown.what].present(case):
            continue
        given = getattr(case.load, "efficiency", None)
        if unknown.what == "efficiency" and given is not None and given * unknown.high > 1:
            unknown = unknown.model_copy(update={"high": max(1 / given, unknown.low * 1.01)})
        found.append(unknown)
    return tuple(found)
