"""`sheet` on the command line: the set sheet of one case as CSV, JSON and a page. Imports no Qt."""

from __future__ import annotations

import sys
from collections.abc import Callable
from contextlib import nullcontext
from dataclasses import dataclass
from pathlib import Path

from app.disk import why_not, write_whole
from app.exit_status import DONE, FAILED, UNUSABLE, complain
from app.set_sheet.answer_words import told_of
from app.set_sheet.depth_files import depth_csv
from app.set_sheet.files import Answers, sheet_csv, sheet_json
from app.set_sheet.printed import Page, page_pdf
from app.set_sheet.words import told_in, unit_of
from app.units import NO_BREAK, Units, units_of
from app.usable_project import load_usable
from solver import Case, Project, ProjectError, SolveError
from solver.studies import Sheet, StudyError, solve_sheet
from solver.studies.cluster import on_cluster
from solver.studies.largest_blow import largest_blow
from solver.studies.plan import at_value
from solver.studies.questions import point, shown_by
from solver.studies.settings import DepthSettings, SheetSettings, depth_settings_of, settings_of
from solver.studies.sheet import Solver
from solver.studies.uncertainty import refuse_number_of_samples, sampled


@dataclass(frozen=True)
class Choices:
    """What the command line asks for; `samples` of what is not known, `None` = none; `cluster`, the
    address of a Dask cluster, `None` = this computer."""

    case: str | None = None
    samples: int | None = None
    quiet: bool = False
    cluster: str | None = None


def write_sheet(path: Path, out: Path, choices: Choices) -> int:
    """Write `sheet.csv`, `sheet.json` and `sheet.pdf` into `out`, and `depth.csv` where depths were studied; returns
    the exit status as `solve` does."""
    try:
        project = load_usable(path)
    except ProjectError as error:
        return complain(str(error), UNUSABLE)
    case = next((c for c in project.cases if choices.case in (None, c.name)), None)
    if case is None:
        known = ", ".join(f"'{c.name}'" for c in project.cases)
        return complain(
            f"{path}: /cases: there is no case named '{choices.case}' (there are: {known})", UNUSABLE
        )
    try:
        settings, depth = settings_of(project), depth_settings_of(project)
        if choices.samples is not None:
            refuse_number_of_samples(choices.samples)
    except StudyError as error:
        return complain(f"{path}: {error}", UNUSABLE)
    try:
        on_machines = on_cluster(choices.cluster) if choices.cluster is not None else nullcontext()
        with told_in(units_of(project)), on_machines as solver:
            sheet, answers = _solved(case, settings, depth, choices, units_of(project), solver)
    except (StudyError, SolveError) as error:
        return complain(f"The set sheet of case '{case.name}' cannot be made: {error}", FAILED)
    try:
        out.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        return complain(f"The folder {out} cannot be made: {error.strerror or error}.", UNUSABLE)
    try:
        told = _write(project, sheet, answers, settings, out)
    except OSError as error:
        return complain(f"The sheet cannot be written to {out}: {why_not(error, out)}.", FAILED)
    if not choices.quiet:
        print("\n  ".join([f"{case.name}: {len(sheet.cells)} points -> {out}", *told]).replace(NO_BREAK, " "))
    return DONE


def _solved(
    case: Case,
    settings: SheetSettings,
    depth: DepthSettings,
    choices: Choices,
    units: Units,
    solver: Solver | None,
) -> tuple[Sheet, Answers]:
    plan = settings.plan(case, unit_of(units))
    watched = not choices.quiet and sys.stderr.isatty()
    points = len(plan.resistances) * len(plan.levels)
    sheet = solve_sheet(plan, solver=solver, progress=_progress(points, "points") if watched else None)
    level = plan.own_level
    if settings.asked_value is not None:
        level = at_value(level, settings.asked_value)
    resistance = settings.asked_resistance or plan.own_total
    stop_at, largest = point(plan, resistance, level), largest_blow(plan, resistance, solver=solver)
    found = None
    if choices.samples is not None:
        found = sampled(
            plan,
            settings.unknown_inputs(case),
            asked=(resistance, level),
            samples=choices.samples,
            seed=settings.seed,
            solver=solver,
            progress=_progress(choices.samples, "samples") if watched else None,
        )
    depths, problem = None, ""
    try:
        depths = depth.study(case, solver=solver)
    except StudyError as error:  # the sheet stands without it
        problem = error.told(units.show)
    shown = None
    if settings.measured_set is not None:
        shown = shown_by(plan, level, settings.measured_set, settings.reading_error)
    return sheet, Answers(stop_at, largest, found, depths, problem, shown)


def _write(project: Project, sheet: Sheet, answers: Answers, settings: SheetSettings, out: Path) -> list[str]:
    """Write the files, each whole or not at all; returns the sentences of the answers."""
    units = units_of(project)
    told = told_of(answers, sheet, units)
    page = Page(sheet, project.title, units, told, settings.per, answers.sampled, answers.depths)
    words = told.criterion.replace(NO_BREAK, " ")
    write_whole(out / "sheet.csv", sheet_csv(sheet, project.title))
    write_whole(out / "sheet.json", sheet_json(sheet, project.title, answers, words))
    if answers.depths is not None:
        write_whole(out / "depth.csv", depth_csv(answers.depths, sheet.plan.case, project.title))
    write_whole(out / "sheet.pdf", page_pdf(page))
    return [told.criterion, *told.beside, *told.further]


def _progress(total: int, what: str) -> Callable[[int], None]:
    def show(done: int) -> None:
        end = "\r\033[K" if done == total else ""
        print(f"\r{done} of {total} {what}{end}", end="", file=sys.stderr, flush=True)

    return show
