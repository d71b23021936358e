"""One-dimensional stress waves in struck members: describe a case, solve it, read the answer. Knows no screen."""

from solver.answer.result import Envelope, Event, Fields, GaugeRecord, Ledger, Peak, Result
from solver.model.checks import Problem
from solver.model.file import ProjectError, load_project, parse_project, project_from_tree, project_to_text
from solver.model.project import Case, Project

__all__ = [
    "Case",
    "Envelope",
    "Event",
    "Fields",
    "GaugeRecord",
    "Ledger",
    "Peak",
    "Problem",
    "Project",
    "ProjectError",
    "Result",
    "load_project",
    "parse_project",
    "project_from_tree",
    "project_to_text",
]
