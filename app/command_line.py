"""The command line: the window, `solve`, `records`, `report` and `check`. Qt is imported only for the window."""

from __future__ import annotations

import argparse
import sys
from collections.abc import Sequence
from dataclasses import replace
from errno import ENOSPC
from math import isfinite
from pathlib import Path

from app import __version__
from app.exit_status import DONE, FAILED, NO_WINDOW, UNUSABLE, complain
from app.frame.closing_signals import ClosingSignals

ABOUT = """Stress waves in struck piles, rods and bars.

  python3 -m app                              open the window
  python3 -m app FILE.strike                  open it on a project
  python3 -m app solve FILE.strike --out DIR  solve every case and write results; needs no screen
  python3 -m app records FILE.strike --out DIR
                                              gauge records as CSV, XLSX or HDF5, in units and sign as chosen
  python3 -m app sheet FILE.strike --out DIR  what set to stop at, with what drop: table and page; needs no screen
  python3 -m app report FILE.strike --out FILE.pdf
                                              the report as PDF, or as HTML where the name ends in .html
  python3 -m app check FILE.strike ...        say whether projects are valid
"""


def main(argv: Sequence[str]) -> int:
    """Run with the arguments after the program's name; returns the exit status.

    0 solved, valid, or the window was closed; 1 a case failed; 2 a file or an argument is not usable; 3 no window can
    be opened here.
    """
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="replace")  # a console that lacks a letter must not end in a traceback
    try:
        if argv[:1] == ["solve"]:
            return _solve(_solve_parser().parse_args(argv[1:]))
        if argv[:1] == ["records"]:
            return _records(argv[1:])
        if argv[:1] == ["sheet"]:
            return _sheet(_sheet_parser().parse_args(argv[1:]))
        if argv[:1] == ["report"]:
            return _report(argv[1:])
        if argv[:1] == ["check"]:
            return _check(_check_parser().parse_args(argv[1:]))
        return _window(_window_parser().parse_args(argv))
    except SystemExit as end:  # argparse has said what is wrong, or has shown its help
        return end.code if isinstance(end.code, int) else UNUSABLE
    except KeyboardInterrupt:
        return complain("Stopped.", FAILED)
    except BrokenPipeError:  # whoever read the output has gone
        sys.stderr.close()
        return FAILED
    except OSError as error:
        if error.errno != ENOSPC:
            raise
        return complain(
            "What there is to say cannot be written: the disk behind standard output is full.", FAILED
        )


def _window_parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="striketrace", description=ABOUT, formatter_class=argparse.RawDescriptionHelpFormatter
    )
    parser.add_argument("file", nargs="?", metavar="FILE.strike", help="project to open")
    parser.add_argument("--version", action="version", version=f"Striketrace {__version__}")
    return parser


def _solve_parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="striketrace solve",
        description="Solve the cases of a project; write gauges.csv, envelope.csv and summary.json, a folder a case.",
    )
    parser.add_argument("file", metavar="FILE.strike", type=Path)
    parser.add_argument("--out", metavar="DIR", type=Path, required=True, help="folder for the results")
    parser.add_argument("--case", metavar="NAME", help="solve this case only")
    parser.add_argument("--element-length", metavar="M", type=_length, help="longest element, in metres")
    parser.add_argument("--quiet", action="store_true", help="say nothing but errors")
    parser.add_argument(
        "--compression-positive",
        action="store_true",
        help="write compression as positive (tension is otherwise)",
    )
    return parser


def _sheet_parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="striketrace sheet",
        description="Vary resistance and drop of one case; write sheet.csv, sheet.json and the page sheet.pdf.",
    )
    parser.add_argument("file", metavar="FILE.strike", type=Path)
    parser.add_argument("--out", metavar="DIR", type=Path, required=True, help="folder for the sheet")
    parser.add_argument("--case", metavar="NAME", help="of this case (the first one otherwise)")
    parser.add_argument("--samples", metavar="N", type=int, help="samples of what is not known, 50 to 5000")
    parser.add_argument(
        "--cluster", metavar="ADDRESS", help="solve on a Dask cluster (needs striketrace[cluster])"
    )
    parser.add_argument("--quiet", action="store_true", help="say nothing but errors")
    return parser


def _check_parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="striketrace check", description="Say whether projects are valid, and where they are not."
    )
    parser.add_argument("files", nargs="+", metavar="FILE.strike", type=Path)
    return parser


def _length(text: str) -> float:
    try:
        value = float(text)
    except ValueError:
        value = float("nan")
    if not (isfinite(value) and value > 0):
        raise argparse.ArgumentTypeError(f"'{text}' is no length: give metres above 0, such as 0.05")
    return value


def _window(arguments: argparse.Namespace) -> int:
    # before Qt, whose import takes longer than a person may take to change her mind
    signals = ClosingSignals()
    try:
        from PySide6 import QtGui, QtSvg, QtWidgets  # noqa: F401  (a system library that is missing shows here)
    except ImportError as error:
        from app.first_start.qt_needs import explain_qt_failure

        return complain(explain_qt_failure(error), NO_WINDOW)
    from app.first_start.qt_needs import explain_no_display

    reason = explain_no_display()
    if reason:
        return complain(reason, NO_WINDOW)
    from solver.warm_up import begin_beside

    begin_beside()
    from app.frame.main_loop import run_window

    return run_window(arguments.file, signals)


def _check(arguments: argparse.Namespace) -> int:
    from app.study_faults import study_faults
    from app.usable_project import load_usable
    from solver import ProjectError

    status = DONE
    for path in arguments.files:
        try:
            project = load_usable(path)
            faults = study_faults(project)
            if faults:
                raise ProjectError(faults, str(path))
        except ProjectError as error:
            status = complain(str(error), UNUSABLE)
        else:
            count = len(project.cases)
            print(f"{path}: valid, {count} case{'s' if count > 1 else ''}")
    return status


def _solve(arguments: argparse.Namespace) -> int:
    from app.solve_command import Choices, solve_file

    choices = Choices(
        case=arguments.case,
        element_length=arguments.element_length,
        compression_positive=arguments.compression_positive,
    )
    if arguments.quiet:
        choices = replace(choices, tell=None)
    return solve_file(arguments.file, arguments.out, choices)


def _records(argv: Sequence[str]) -> int:
    from app.export.records_options import records_parser, run_records

    return run_records(records_parser().parse_args(argv))


def _sheet(arguments: argparse.Namespace) -> int:
    from app.set_sheet.command import Choices, write_sheet

    choices = Choices(arguments.case, arguments.samples, arguments.quiet, arguments.cluster)
    return write_sheet(arguments.file, arguments.out, choices)


def _report(argv: Sequence[str]) -> int:
    from app.report.command import report_parser, run_report

    return run_report(report_parser().parse_args(argv))
