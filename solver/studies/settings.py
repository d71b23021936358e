"""What a person has chosen for studies: kept in the project under `/studies/set_sheet` and `/studies/depth`."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from typing import Annotated, Literal, TypeVar

from pydantic import Field

from solver.model.file import faults_of
from solver.model.problem import Problem, step
from solver.model.project import Case, Project
from solver.model.quantity import Described, NotNegative, Number, Positive, Quantity
from solver.studies.depth import Depths, check_factors, down_to_depth
from solver.studies.plan import COUNT, MOST_LEVELS, MOST_RESISTANCES, Plan, UnitOf, one, plan_of
from solver.studies.sheet import Solver
from solver.studies.uncertainty import FEWEST, MOST
from solver.studies.unknowns import INPUTS, Unknown, usual_unknowns
from solver.studies.variation import StudyError, Vary, resistance_of

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

    def study(
        self,
        case: Case,
        *,
        cancel: Callable[[], bool] | None = None,
        workers: int | None = None,
        solver: Solver | None = None,
    ) -> Depths | None:
        """The case down to these depths; `None` when `cancel` answered True. Raises `StudyError`."""
        return down_to_depth(
            case,
            self.depths(case),
            self.factors,
            toe_at=self.toe_at,
            blows_per_minute=self.blows_per_minute,
            cancel=cancel,
            workers=workers,
            solver=solver,
        )


def settings_of(project: Project) -> SheetSettings:
    """The choices in a project. Raises `StudyError` with their place in the file."""
    return _read(project, "set_sheet", SheetSettings)


def depth_settings_of(project: Project) -> DepthSettings:
    """The choices for depths in a project. Raises `StudyError` with their place in the file."""
    return _read(project, "depth", DepthSettings)


def _read(project: Project, key: str, kind: type[Given]) -> Given:
    tree = (project.studies or {}).get(key, {})
    faults = faults_of(kind, tree, f"/studies/{key}")
    if faults:
        raise StudyError(f"{faults[0]}.")
    return kind.model_validate(tree)


def faults_in_studies(project: Project) -> list[Problem]:
    """What is wrong with the choices of a project, each with its place; also what fits none of its cases."""
    studies = project.studies or {}
    found = faults_of(SheetSettings, studies.get("set_sheet", {}), "/studies/set_sheet")
    found += faults_of(DepthSettings, studies.get("depth", {}), "/studies/depth")
    if not found and "set_sheet" in studies:
        found += _sheet_fits_none(project.cases, settings_of(project))
    if not found and "depth" in studies:
        found += _depth_fits_none(project.cases, depth_settings_of(project))
    return found


def _sheet_fits_none(cases: Sequence[Case], settings: SheetSettings) -> Iterator[Problem]:
    if settings.lowest is not None and settings.highest is not None and settings.lowest >= settings.highest:
        yield Problem("/studies/set_sheet/lowest", "must be below 'highest'")
        return
    # a case without ground has no sheet, and the choices wait for one that has
    told = [_why_not(settings.plan, case) for case in cases if resistance_of(case).total > 0]
    if told and all(told):
        key = "pointer" if settings.pointer is not None else "values" if settings.values is not None else ""
        yield Problem("/studies/set_sheet" + (key and f"/{key}"), f"fits no case of the project: {told[0]}")
    for index, unknown in enumerate(settings.unknowns or ()):
        if not any(INPUTS[unknown.what].present(case) for case in cases):
            yield Problem(
                f"/studies/set_sheet/unknowns/{index}/what",
                f"no case of the project has a {INPUTS[unknown.what].label} to vary",
            )


def _depth_fits_none(cases: Sequence[Case], settings: DepthSettings) -> Iterator[Problem]:
    for name in settings.factors:
        told = [_why_not(check_factors, case, [name]) for case in cases]
        if all(told):
            yield Problem("/studies/depth/factors" + step(name), f"fits no case of the project: {told[0]}")
    longest = max(case.member.length for case in cases)
    for index, depth in enumerate(settings.penetrations or ()):
        if depth > longest:
            sentence = f"a penetration of {depth:g} m is more than the length of any member, {longest:g} m"
            yield Problem(f"/studies/depth/penetrations/{index}", sentence)


def _why_not(attempt: Callable[..., object], *given: object) -> str:
    try:
        attempt(*given)
    except StudyError as error:
        return str(error).rstrip(".")
    return ""
