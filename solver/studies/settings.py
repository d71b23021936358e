"""What a person has chosen for studies: kept in the project under `/studies/set_sheet` and `/studies/depth`."""

from __future__ import annotations

from typing import Annotated, Literal, TypeVar

from pydantic import Field, ValidationError

from solver.model.project import Case, Project
from solver.model.quantity import Described, NotNegative, Number, Positive, Quantity
from solver.studies.plan import COUNT, MOST_LEVELS, MOST_RESISTANCES, Plan, UnitOf, one, plan_of
from solver.studies.uncertainty import FEWEST, MOST
from solver.studies.unknowns import Unknown, usual_unknowns
from solver.studies.variation import StudyError, Vary

Given = TypeVar("Given", bound=Described)
#: Depths that the program chooses.
STEPS = 12


class SheetSettings(Described):
    """`None` = chosen by the program, from the case. SI units.

    `lowest` and `highest` of `count` total resistances; `vary` all of it or the toe's alone; `pointer`, relative to
    the case, to the number whose `values` make the lines; `per`, for how much penetration blows are counted. The
    questions: `asked_resistance`, `asked_value` (of the number at `pointer`), `measured_set` with `reading_error`.
    What is not known: `unknowns`, factors in a range, with the number of `samples` and their `seed`.
    """

    lowest: Annotated[Positive, Quantity("force", "Lowest resistance")] | None = None
    highest: Annotated[Positive, Quantity("force", "Highest resistance")] | None = None
    count: Annotated[int, Field(strict=True, ge=2, le=MOST_RESISTANCES)] = COUNT
    vary: Vary = "all"
    pointer: Annotated[str, Field(strict=True, min_length=1)] | None = None
    values: Annotated[tuple[Number, ...], Field(min_length=1, max_length=MOST_LEVELS)] | None = None
    per: Literal["0.25 m", "m", "ft"] | None = None
    asked_resistance: Annotated[Positive, Quantity("force", "Resistance asked for")] | None = None
    asked_value: Number | None = None
    unknowns: Annotated[tuple[Unknown, ...], Field(min_length=1)] | None = None
    samples: Annotated[int, Field(strict=True, ge=FEWEST, le=MOST)] = 2000
    seed: Annotated[int, Field(strict=True, ge=0)] = 1
    measured_set: Annotated[Positive, Quantity("small_length", "Measured set")] | None = None
    reading_error: Annotated[NotNegative, Quantity("small_length", "Reading error")] = 0.0005

    def unknown_inputs(self, case: Case) -> tuple[Unknown, ...]:
        """What is not known of a case: as given, or the usual ranges of what it has."""
        return usual_unknowns(case) if self.unknowns is None else self.unknowns

    def plan(self, case: Case, unit_of: UnitOf = one) -> Plan:
        """What to solve for a case; what the program chooses is round in units of `unit_of`. Raises `StudyError`."""
        return plan_of(
            case,
            pointer=self.pointer,
            values=self.values,
            vary=self.vary,
            lowest=self.lowest,
            highest=self.highest,
            count=self.count,
            unit_of=unit_of,
        )


class DepthSettings(Described):
    """What a study of depths takes: `penetrations` (m), `None` = even steps down to that of the case; `factors` on the
    resistance of layers by their name ("toe", "shaft" for a total); `toe_at`, pairs of depth (m) and toe resistance
    (N); `blows_per_minute`."""

    penetrations: Annotated[tuple[Positive, ...], Field(min_length=1, max_length=200)] | None = None
    factors: dict[str, NotNegative] = Field(default_factory=dict)
    toe_at: tuple[tuple[NotNegative, NotNegative], ...] = ()
    blows_per_minute: Positive = 40.0

    def depths(self, case: Case) -> tuple[float, ...]:
        """Penetrations to solve, m: as given, or twelve even steps down to that of the case."""
        if self.penetrations is not None:
            return self.penetrations
        surface = case.ground.surface if case.ground else 0.0
        embedded = case.member.length - surface
        return tuple(embedded * n / STEPS for n in range(1, STEPS + 1))


def settings_of(project: Project) -> SheetSettings:
    """The choices in a project. Raises `StudyError` with their place in the file."""
    return _read(project, "set_sheet", SheetSettings)


def depth_settings_of(project: Project) -> DepthSettings:
    """The choices for depths in a project. Raises `StudyError` with their place in the file."""
    return _read(project, "depth", DepthSettings)


def _read(project: Project, key: str, kind: type[Given]) -> Given:
    try:
        return kind.model_validate((project.studies or {}).get(key, {}))
    except ValidationError as error:
        told = error.errors(include_url=False)[0]
        place = "/".join(["/studies", key, *(str(part) for part in told["loc"])])
        raise StudyError(f"{place}: {told['msg']}.") from None
