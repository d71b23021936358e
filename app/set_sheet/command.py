"""`sheet` on the command line: the set sheet of one case as CSV, JSON and a page. Imports no Qt."""

from __future__ import annotations

import sys
from collections.abc import Callable
from pathlib import Path

from app.set_sheet.answer_words import safe_words
from app.set_sheet.files import sheet_csv, sheet_json
from app.set_sheet.words import criterion
from app.units import NO_BREAK, units_of
from app.usable_project import load_usable
from solver import ProjectError

SOLVED, FAILED, UNUSABLE = 0, 1, 2


def write_sheet(path: Path, name: str | None, out: Path, quiet: bool = False) -> int:
    """Write `sheet.csv`, `sheet.json` and `sheet.pdf` into `out`; returns the exit status as `solve` does."""
    try:
        project = load_usable(path)
    except ProjectError as error:
        return _complain(str(error), UNUSABLE)
    chosen = next((c for c in project.cases if name in (None, c.name)), None)
    if chosen is None:
        known = ", ".join(f"'{c.name}'" for c in project.cases)
        return _complain(f"{path}: /cases: there is no case named '{name}' (there are: {known})", UNUSABLE)

    from app.set_sheet.printed import Page, page_pdf
    from solver import SolveError
    from solver.studies import StudyError, solve_sheet
    from solver.studies.questions import point, safe_blow
    from solver.studies.settings import settings_of

    try:
        settings = settings_of(project)
    except StudyError as error:
        return _complain(f"{path}: {error}", UNUSABLE)
    units = units_of(project)
    try:
        plan = settings.plan(chosen)
        total = len(plan.resistances) * len(plan.levels)
        sheet = solve_sheet(plan, progress=None if quiet or not sys.stderr.isatty() else _progress(total))
        level = plan.levels[0]
        if settings.asked_value is not None:
            level = type(level)(level.pointer, settings.asked_value, level.label, level.dimension)
        resistance = settings.asked_resistance or plan.own_total
        stop_at, safe = point(plan, resistance, level), safe_blow(plan, resistance)
    except (StudyError, SolveError) as error:
        return _complain(f"The set sheet of case '{chosen.name}' cannot be made: {error}", FAILED)
    words, answer = criterion(stop_at, units), safe_words(safe, stop_at, units)
    page = Page(sheet, project.title, units, words, answer, settings.per)
    try:
        out.mkdir(parents=True, exist_ok=True)
        (out / "sheet.csv").write_text(sheet_csv(sheet, project.title), encoding="utf-8", newline="\n")
        (out / "sheet.json").write_text(
            sheet_json(sheet, project.title, stop_at, safe, words.replace(NO_BREAK, " ")),
            encoding="utf-8",
            newline="\n",
        )
        (out / "sheet.pdf").write_bytes(page_pdf(page))
    except OSError as error:
        return _complain(f"The sheet cannot be written to {out}: {error.strerror or error}.", FAILED)
    if not quiet:
        print(
            f"{chosen.name}: {len(sheet.cells)} points -> {out}\n  {words}\n  {answer}".replace(NO_BREAK, " ")
        )
    return SOLVED


def _progress(total: int) -> Callable[[int], None]:
    def show(done: int) -> None:
        end = "\r\033[K" if done == total else ""
        print(f"\r{done} of {total} points{end}", end="", file=sys.stderr, flush=True)

    return show


def _complain(sentence: str, status: int) -> int:
    print(sentence, file=sys.stderr)
    return status
