"""`records` on the command line: gauge records of the cases of a file, in the formats asked for. Imports no Qt."""

from __future__ import annotations

from collections.abc import Callable
from datetime import datetime
from pathlib import Path

from app.disk import why_not
from app.exit_status import DONE, FAILED, UNUSABLE, complain
from app.export.record_choices import RecordChoices
from app.usable_project import load_usable
from solver import Case, Project, ProjectError, Result


def write_records_of(
    path: Path, out: Path, choices: RecordChoices, date: datetime | None, tell: Callable[[str], None] | None
) -> int:
    """Solve the cases and write their records; returns the exit status as `solve` does."""
    try:
        project = load_usable(path)
    except ProjectError as error:
        return complain(str(error), UNUSABLE)
    unknown = _unknown(project, choices)
    if unknown:
        return complain(f"{path}: {unknown}", UNUSABLE)
    try:
        out.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        return complain(f"The folder {out} cannot be made: {why_not(error, out)}.", UNUSABLE)
    status = DONE
    for case in project.cases:
        if choices.cases is None or case.name in choices.cases:
            status = max(status, _one(project, case, choices, out, date, tell))
    return status


def _unknown(project: Project, choices: RecordChoices) -> str:
    """A sentence where a case or gauge that was asked for does not exist."""
    cases = [case.name for case in project.cases]
    gauges = list(dict.fromkeys(g.name for case in project.cases for g in case.gauges))
    for what, wanted, there in (("case", choices.cases, cases), ("gauge", choices.gauges, gauges)):
        for name in wanted or ():
            if name not in there:
                known = ", ".join(f"'{n}'" for n in there) or "none"
                return f"there is no {what} named '{name}' (there are: {known})"
    return ""


def _one(
    project: Project,
    case: Case,
    choices: RecordChoices,
    out: Path,
    date: datetime | None,
    tell: Callable[[str], None] | None,
) -> int:
    from app.export.record_files import write_records
    from solver import SolveError, solve

    if not case.gauges or not (choices.gauges is None or {g.name for g in case.gauges} & {*choices.gauges}):
        if tell:
            tell(f"{case.name}: no gauges, nothing written")
        return DONE
    try:
        result: Result = solve(case)
        for written in write_records(project, [result], choices, out, date):
            if tell:
                tell(f"{case.name}: {written}")
    except SolveError as error:
        return complain(f"Case '{case.name}' cannot be solved: {error}", FAILED)
    except ValueError as error:
        return complain(f"The records of case '{case.name}' cannot be written: {error}", FAILED)
    except OSError as error:
        return complain(f"The records of case '{case.name}' cannot be written to {out}. {error}", FAILED)
    except MemoryError:
        return complain(f"Case '{case.name}' needs more memory than there is: use longer elements.", FAILED)
    return DONE
