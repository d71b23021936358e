"""What a person has chosen for the set sheet of a project: kept in its file under `/studies/set_sheet`."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, ValidationError

from solver.model.project import Case, Project
from solver.model.quantity import Described, NotNegative, Number, Positive, Quantity
from solver.studies.plan import COUNT, MOST_LEVELS, MOST_RESISTANCES, Plan, plan_of
from solver.studies.variation import StudyError, Vary

PLACE = "/studies/set_sheet"


class SheetSettings(Described):
    """`None` = chosen by the program, from the case. SI units.

    `lowest` and `highest` of `count` total resistances; `vary` all of it or the toe's alone; `pointer`, relative to
    the case, to the number whose `values` make the lines; `per`, for how much penetration blows are counted; the
    questions: `asked_resistance`, `asked_value` (of the number at `pointer`), and `measured_set` with `reading_error`.
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
    measured_set: Annotated[Positive, Quantity("small_length", "Measured set")] | None = None
    reading_error: Annotated[NotNegative, Quantity("small_length", "Reading error")] = 0.0005

    def plan(self, case: Case) -> Plan:
        """What to solve for a case. Raises `StudyError`."""
        return plan_of(
            case,
            pointer=self.pointer,
            values=self.values,
            vary=self.vary,
            lowest=self.lowest,
            highest=self.highest,
            count=self.count,
        )


def settings_of(project: Project) -> SheetSettings:
    """The choices in a project. Raises `StudyError` with their place in the file."""
    given = (project.studies or {}).get("set_sheet", {})
    try:
        return SheetSettings.model_validate(given)
    except ValidationError as error:
        told = error.errors(include_url=False)[0]
        place = "/".join([PLACE, *(str(part) for part in told["loc"])])
        raise StudyError(f"{place}: {told['msg']}.") from None
