"""What a report is made of: a project, the result and mesh check of every case, and when and by whom."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import datetime

from app.report.choices import ReportChoices
from app.units import Units
from solver import Case, MeshCheck, Project, Result
from solver.answer.findings import Findings, findings_of


@dataclass(frozen=True, eq=False)
class Solved:
    """One case: its result, or why there is none; the check on a finer mesh where it was made."""

    case: Case
    result: Result | None
    refusal: str = ""
    mesh: MeshCheck | None = None
    findings: Findings | None = None


def solved(case: Case, result: Result, mesh: MeshCheck | None = None) -> Solved:
    """A case with its result, and the facts that follow from it."""
    return Solved(case, result, "", mesh, findings_of(result))


@dataclass(frozen=True, eq=False)
class Material:
    """All that the sections are written from."""

    project: Project
    cases: tuple[Solved, ...]
    choices: ReportChoices
    units: Units
    hash: str
    date: datetime
    file_name: str
