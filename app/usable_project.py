"""A project as the command line takes it: valid for the solver, and with display units that the screen knows."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

from app.unit_text import UnitError, factor_of
from app.units import SYSTEMS
from solver import Problem, Project, ProjectError, load_project


def load_usable(path: Path) -> Project:
    """Read a project. Raises `ProjectError` also for a display unit that means nothing."""
    project = load_project(path)
    problems = list(_units(project))
    if problems:
        raise ProjectError(problems, str(path))
    return project


def _units(project: Project) -> Iterator[Problem]:
    shown = project.display_units
    for dimension, unit in () if isinstance(shown, str) else shown.items():
        at = f"/display_units/{dimension}"
        if dimension == "system":
            if unit not in SYSTEMS:
                yield Problem(at, f"must be 'metric' or 'us', not '{unit}'")
            continue
        try:
            factor_of(unit, dimension)
        except UnitError as error:
            yield Problem(at, str(error).rstrip("."))
