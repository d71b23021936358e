"""`solve` on the command line: every case of a file, a folder of results each. Imports no Qt."""

from __future__ import annotations

import os
import sys
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from app.exit_status import DONE, FAILED, UNUSABLE, complain
from app.export import folder_names, write_case
from app.units import NO_BREAK, Units
from app.usable_project import load_usable
from app.words import verdict
from solver import Case, Project, ProjectError, Result
from solver.answer.findings import findings_of


def _print(text: str) -> None:
    """Say it. Results are what was asked for: a reader who has gone, or a disk that is full, must not stop them."""
    try:
        print(text, flush=True)
    except OSError:
        with open(os.devnull, "w") as nowhere:
            os.dup2(nowhere.fileno(), sys.stdout.fileno())


@dataclass(frozen=True)
class Choices:
    """What the command line asks for. `tell` takes what is said on standard output, `None` = say nothing."""

    case: str | None = None
    element_length: float | None = None
    compression_positive: bool = False
    tell: Callable[[str], None] | None = _print


def solve_file(path: Path, out: Path, choices: Choices) -> int:
    """Solve and write; returns the exit status. A file that is not usable, or a folder that cannot be made, leaves
    nothing written (2); a case that fails leaves the others written (1)."""
    try:
        project = load_usable(path)
    except ProjectError as error:
        return complain(str(error), UNUSABLE)
    names = [case.name for case in project.cases]
    if choices.case is not None and choices.case not in names:
        known = ", ".join(f"'{name}'" for name in names)
        return complain(
            f"{path}: /cases: there is no case named '{choices.case}' (there are: {known})", UNUSABLE
        )
    try:
        out.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        return complain(f"The folder {out} cannot be made: {error.strerror or error}.", UNUSABLE)
    status = DONE
    for case, folder in zip(project.cases, folder_names(names), strict=True):
        if choices.case in (None, case.name):
            status = max(status, _one(project, case, out / folder, choices))
    return status


def _one(project: Project, case: Case, folder: Path, choices: Choices) -> int:
    from solver import SolveError, solve  # the kernels take their time, and a bad file must not wait for them

    try:
        result = solve(_with_length(case, choices.element_length), progress=_progress(case, choices))
    except SolveError as error:
        return complain(f"Case '{case.name}' cannot be solved: {error}{_older(folder)}", FAILED)
    except MemoryError:
        return complain(f"Case '{case.name}' needs more memory than there is: use longer elements.", FAILED)
    except Exception as error:
        return complain(
            f"Case '{case.name}' failed unexpectedly ({type(error).__name__}: {error}): please report this.",
            FAILED,
        )
    try:
        write_case(result, project.title, folder, compression_positive=choices.compression_positive)
    except OSError as error:
        return complain(f"The results of case '{case.name}' cannot be written to {folder}: {error}.", FAILED)
    if choices.tell:
        choices.tell(_told(result, folder))
    return DONE


def _with_length(case: Case, length: float | None) -> Case:
    if length is None:
        return case
    return case.model_copy(update={"run": case.run.model_copy(update={"element_length": length})})


def _progress(case: Case, choices: Choices) -> Callable[[Any], None] | None:
    """Percents on standard error, for a person who waits at a terminal."""
    if choices.tell is None or sys.stderr is None or not sys.stderr.isatty():
        return None

    def show(step: Any) -> None:
        print(f"\r{case.name}: {step.fraction:4.0%} ", end="", file=sys.stderr, flush=True)
        if step.fraction >= 1:
            print("\r\033[K", end="", file=sys.stderr, flush=True)

    return show


def _told(result: Result, folder: Path) -> str:
    lines = [
        f"{result.case.name}: {result.elements} elements, solved in {result.solve_seconds:.2f} s -> {folder}"
    ]
    for line in verdict(findings_of(result), Units()):
        lines.append(f"  {line.name} {line.figure}: {line.detail.replace(chr(10), '; ')}")
    return "\n".join(lines).replace(NO_BREAK, " ")


def _older(folder: Path) -> str:
    return f" The results in {folder} are those of an earlier run." if folder.exists() else ""
