"""`report` on the command line: solve every case and write the report as PDF or HTML. Imports no Qt."""

from __future__ import annotations

import argparse
from datetime import datetime
from pathlib import Path

from app.disk import why_not
from app.exit_status import DONE, FAILED, UNUSABLE, complain
from app.export.records_options import date_of, positive
from app.units import NO_BREAK, units_of
from app.usable_project import load_usable
from solver import ProjectError

ENDINGS = (".pdf", ".html", ".htm")


def report_parser() -> argparse.ArgumentParser:
    """Arguments after the word `report`."""
    parser = argparse.ArgumentParser(
        prog="striketrace report",
        description="Solve every case of a project and write its report. What it holds is chosen in the project.",
    )
    parser.add_argument("file", metavar="FILE.strike", type=Path)
    parser.add_argument("--out", metavar="FILE.pdf", type=_out, required=True, help="ends in .pdf or .html")
    parser.add_argument(
        "--figures",
        metavar="DIR",
        type=Path,
        help="write each figure as SVG, PDF and PNG, and each case as GIF, into this folder as well",
    )
    parser.add_argument("--dpi", metavar="N", type=_dpi, default=300.0, help="of the PNG files; default 300")
    parser.add_argument("--date", metavar="DATE", type=date_of, help="date to write, as 2026-12-01")
    parser.add_argument("--no-mesh-check", action="store_true", help="do not solve again on a finer mesh")
    parser.add_argument("--quiet", action="store_true", help="say nothing but errors")
    return parser


def _dpi(text: str) -> float:
    value = positive(text)
    if value > 1200:
        raise argparse.ArgumentTypeError(f"'{text}' is more than 1200 dots an inch")
    return value


def _out(text: str) -> Path:
    path = Path(text)
    if path.suffix.casefold() not in ENDINGS:
        raise argparse.ArgumentTypeError(f"'{text}' must end in .pdf or .html")
    return path


def run_report(given: argparse.Namespace) -> int:
    """Write the report that the arguments ask for; returns the exit status: 1 where a case has no result or the
    file cannot be written, 2 where the project is not usable."""
    try:
        project = load_usable(given.file)
    except ProjectError as error:
        return complain(str(error), UNUSABLE)
    if not given.out.absolute().parent.is_dir():
        return complain(f"There is no folder {given.out.absolute().parent} for the report.", UNUSABLE)
    # reading and refusing must not wait for the libraries that write pages, nor for the kernels
    from app.report.build import build_report
    from app.report.choices import report_choices
    from app.report.files import write_report
    from app.report.solve_cases import solve_cases

    date = given.date or datetime.now().astimezone().replace(microsecond=0)
    mesh_check = report_choices(project.studies).mesh_check and not given.no_mesh_check
    try:
        cases = solve_cases(project, mesh_check)
        report = build_report(project, cases, date, given.file)
        write_report(report, given.out, date)
        if given.figures is not None:
            from app.report.animation import write_animations
            from app.report.figure_files import write_figures

            write_figures(report, given.figures, date, given.dpi)
            write_animations(cases, units_of(project), given.figures)
    except OSError as error:
        return complain(f"The report cannot be written to {given.out}: {why_not(error, given.out)}.", FAILED)
    except MemoryError:
        return complain("The report needs more memory than there is: use longer elements.", FAILED)
    status = DONE
    for one in cases:
        if one.result is None:
            status = complain(f"Case '{one.case.name}' cannot be solved: {one.refusal}", FAILED)
    if not given.quiet:
        told = " ".join(report.front.verdict)
        print(f"{given.out}: {len(cases)} case{'s' if len(cases) > 1 else ''}. {told}".replace(NO_BREAK, " "))
    return status
