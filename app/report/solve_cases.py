"""All cases of a project solved for a report, and checked on a finer mesh."""

from __future__ import annotations

import logging
from collections.abc import Callable
from dataclasses import replace

from app.report.outcome import Solved, solved
from solver import Project

Tell = Callable[[str], None]


def solve_cases(
    project: Project,
    mesh_check: bool,
    tell: Tell | None = None,
    cancel: Callable[[], bool] | None = None,
    known: tuple[Solved, ...] = (),
) -> tuple[Solved, ...]:
    """Every case in order; one that cannot be solved is kept with the sentence why. `tell` hears what is being done.
    A case that is among the `known` is not solved again."""
    from solver import SolveError, check_mesh, solve

    found = []
    for case in project.cases:
        if cancel is not None and cancel():
            break
        before = next((one for one in known if one.case == case), None)
        if before is not None and (before.mesh is not None or not mesh_check or before.result is None):
            found.append(before if mesh_check else replace(before, mesh=None))
            continue
        if tell:
            tell(f"Solving {case.name}")
        try:
            result = solve(case, cancel=cancel)
        except SolveError as error:
            found.append(Solved(case, None, str(error)))
            continue
        except Exception as error:  # the other cases shall still be told
            logging.getLogger(__name__).exception("A case failed")
            told = f"it failed unexpectedly ({type(error).__name__}: {error}); please report this."
            found.append(Solved(case, None, told))
            continue
        mesh = None
        if mesh_check and result.finished:
            if tell:
                tell(f"Checking {case.name} on a finer mesh")
            try:
                mesh = check_mesh(result, cancel)
            except SolveError:
                mesh = None
        found.append(solved(case, result, mesh))
    return tuple(found)
