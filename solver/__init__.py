"""One-dimensional stress waves in struck members: describe a case, solve it, read the answer. Knows no screen."""

from solver.answer.findings import Findings, findings_of, first_blow
from solver.answer.result import Envelope, Event, Fields, GaugeRecord, Ledger, Peak, Result
from solver.convergence import Change, MeshCheck, check_mesh
from solver.errors import SolveError
from solver.many import Outcome, solve_many
from solver.marching import Progress
from solver.model.file import ProjectError, load_project, parse_project, project_from_tree, project_to_text
from solver.model.problem import Problem
from solver.model.project import Case, Project
from solver.run import solve

__all__ = [
    "Case",
    "Change",
    "Envelope",
    "Event",
    "Fields",
    "Findings",
    "GaugeRecord",
    "Ledger",
    "MeshCheck",
    "Outcome",
    "Peak",
    "Problem",
    "Progress",
    "Project",
    "ProjectError",
    "Result",
    "SolveError",
    "check_mesh",
    "findings_of",
    "first_blow",
    "load_project",
    "parse_project",
    "project_from_tree",
    "project_to_text",
    "solve",
    "solve_many",
]
