"""What a set sheet varies: total resistances, and levels of one number of the case such as the drop height."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

import numpy as np

from solver.model.load import Drop, Pulse, Striker
from solver.model.project import Case
from solver.studies.variation import (
    StudyError,
    Vary,
    label_of,
    resistance_of,
    value_at,
    with_resistance,
    with_value,
)

#: Range of resistances that the program chooses, as shares of the case's own total, and how many.
LOWEST, HIGHEST, COUNT = 0.4, 2.5, 10
#: Levels that the program chooses, as shares of the case's own blow.
SHARES = (0.7, 1.0, 1.3)
MOST_LEVELS = 4
MOST_RESISTANCES = 60


@dataclass(frozen=True)
class Level:
    """One line of the sheet: the number at `pointer` (relative to the case) set to `value` (SI)."""

    pointer: str
    value: float
    label: str
    dimension: str

    def of(self, case: Case) -> Case:
        """The case at this level."""
        return (
            case if value_at(case, self.pointer) == self.value else with_value(case, self.pointer, self.value)
        )


def at_value(level: Level, value: float) -> Level:
    """The same number of the case at another value."""
    return replace(level, value=value)


@dataclass(frozen=True)
class Plan:
    """`resistances` (N), rising; `levels`, one line each, in the order in which they are solved."""

    case: Case
    resistances: tuple[float, ...]
    levels: tuple[Level, ...]
    vary: Vary = "all"

    @property
    def own_total(self) -> float:
        """Total resistance of the case itself, N."""
        return resistance_of(self.case).total

    @property
    def own_level(self) -> Level:
        """The level that the case itself has, whether or not it is one of the lines."""
        return at_value(self.levels[0], float(value_at(self.case, self.levels[0].pointer)))

    def variant(self, resistance: float, level: Level) -> Case:
        """The case that is solved for one point: until the member is at rest, for its set."""
        varied = with_resistance(level.of(self.case), resistance, self.vary)
        return varied.model_copy(update={"run": varied.run.model_copy(update={"duration": None})})


#: SI value of the unit in which a dimension (a key of `SI_UNITS`) is shown.
UnitOf = Callable[[str], float]


def one(dimension: str) -> float:
    """SI units themselves."""
    return 1.0


def blow_pointer(case: Case) -> str | None:
    """Pointer to the number that says how hard the blow is; `None` where no single number does."""
    load = case.load
    if isinstance(load, Drop):
        ways = ("drop_height", "energy", "impact_velocity")
        return "load/" + next(way for way in ways if getattr(load, way) is not None)
    if isinstance(load, Pulse):
        return "load/peak"
    return "load/velocity" if isinstance(load, Striker) else None


def plan_of(
    case: Case,
    resistances: Sequence[float] | None = None,
    pointer: str | None = None,
    values: Sequence[float] | None = None,
    vary: Vary = "all",
    *,
    lowest: float | None = None,
    highest: float | None = None,
    count: int = COUNT,
    unit_of: UnitOf = one,
) -> Plan:
    """What to solve. All that is not given is chosen from the case: `count` resistances from 0.4 to 2.5 times its own
    total (N), and its blow at 0.7, 1 and 1.3 times what it is, in numbers that are round in the units of `unit_of`.
    `pointer` names another number to take `values`.

    Raises `StudyError` where a case has no ground, or a level is not valid.
    """
    total = resistance_of(case)
    if case.ground is None or total.total <= 0:
        raise StudyError("A set needs ground that resists: give the case a shaft or a toe resistance.")
    if resistances is None:
        resistances = chosen_resistances(case, lowest, highest, count, vary, unit_of("force"))
    if not resistances or min(resistances) <= 0:
        raise StudyError("The resistances of a set sheet must be more than 0.")
    if len(resistances) > MOST_RESISTANCES:
        raise StudyError(f"A set sheet takes up to {MOST_RESISTANCES} resistances, not {len(resistances)}.")
    levels = _levels(case, pointer, values, unit_of)
    plan = Plan(case, tuple(sorted({float(r) for r in resistances})), levels, vary)
    for level in plan.levels:
        plan.variant(plan.resistances[0], level)
    return plan


def chosen_resistances(
    case: Case, lowest: float | None, highest: float | None, count: int, vary: Vary, unit: float = 1.0
) -> tuple[float, ...]:
    """Even steps from `lowest` to `highest` (N); what is not given follows from the case's own total, rounded."""
    own = resistance_of(case)
    step = unit * round_step(own.total * (HIGHEST - LOWEST) / max(1, count - 1) / unit)
    low = lowest if lowest is not None else max(step, step * round(LOWEST * own.total / step))
    if vary == "toe" and lowest is None:
        low = max(low, step * float(np.ceil(own.shaft / step)))
    high = highest if highest is not None else low + step * (count - 1)
    if not 0 < low < high:
        raise StudyError(
            "The lowest resistance ({low}) must be above 0 and below the highest ({high}).",
            low=(low, "force"),
            high=(high, "force"),
        )
    if not 2 <= count <= MOST_RESISTANCES:
        raise StudyError(f"A set sheet takes 2 to {MOST_RESISTANCES} resistances, not {count}.")
    return tuple(float(r) for r in np.linspace(low, high, count))


def round_step(size: float) -> float:
    """The nearest of 1, 2, 2.5, 4, 5 or 8 times a power of ten."""
    power = 10.0 ** np.floor(np.log10(size))
    return float(min((m * power for m in (1, 2, 2.5, 4, 5, 8, 10)), key=lambda s: abs(np.log(s / size))))


def _levels(
    case: Case, pointer: str | None, values: Sequence[float] | None, unit_of: UnitOf
) -> tuple[Level, ...]:
    place = pointer or blow_pointer(case)
    if place is None:
        raise StudyError(
            "This load has no single number that makes it stronger: choose a number of the case to vary."
        )
    own = value_at(case, place)
    if isinstance(own, bool) or not isinstance(own, int | float):
        raise StudyError(f"'{place}' is not a number of this case that is given, so it cannot be varied.")
    label, dimension = label_of(case, place)
    if values is None:
        if own == 0:
            raise StudyError(f"'{label}' is 0 in the case: give the values that the lines shall have.")
        unit = unit_of(dimension)
        values = [_tidy(float(own) * share / unit) * unit if share != 1 else float(own) for share in SHARES]
    if not 1 <= len(values) <= MOST_LEVELS:
        raise StudyError(f"A set sheet takes 1 to {MOST_LEVELS} values of '{label}', not {len(values)}.")
    if len(set(values)) < len(values):
        raise StudyError(f"The same value of '{label}' is given twice.")
    # the case's own first: it is what is looked for on the screen
    ordered = sorted(values, key=lambda v: (v != own, v))
    return tuple(Level(place, float(v), label, dimension) for v in ordered)


def _tidy(value: float) -> float:
    """Two digits that count."""
    return float(f"{value:.2g}")
