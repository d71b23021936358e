"""Many solves put together to answer one question. Pure functions of a case; knows no screen."""

from solver.studies.plan import Level, Plan, plan_of
from solver.studies.sheet import NO_SET, Cell, Sheet, cells_of, gathered, solve_sheet
from solver.studies.variation import (
    Resistance,
    StudyError,
    resistance_of,
    value_at,
    with_resistance,
    with_value,
)

__all__ = [
    "NO_SET",
    "Cell",
    "Level",
    "Plan",
    "Resistance",
    "Sheet",
    "StudyError",
    "cells_of",
    "gathered",
    "plan_of",
    "resistance_of",
    "solve_sheet",
    "value_at",
    "with_resistance",
    "with_value",
]
