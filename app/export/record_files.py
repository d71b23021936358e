"""Gauge records as files: CSV, XLSX and HDF5, each whole or not at all."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from datetime import datetime
from pathlib import Path

from app.disk import why_not, write_whole
from app.export.case_folder import folder_names
from app.export.fingerprint import input_hash
from app.export.record_choices import ENDINGS, Format, RecordChoices
from app.export.record_csv import record_csv
from app.export.record_hdf5 import record_hdf5
from app.export.record_table import Origin, RecordTable, record_table
from app.export.record_xlsx import record_xlsx
from app.units import units_of
from solver import Project, Result

WRITERS: dict[Format, Callable[[RecordTable, RecordChoices], bytes]] = {
    "csv": record_csv,
    "xlsx": record_xlsx,
    "hdf5": record_hdf5,
}


def origin_of(project: Project, date: datetime | None = None) -> Origin:
    """What records of a project say of where they come from."""
    return Origin(project.title, input_hash(project), date or datetime.now().astimezone(), units_of(project))


def record_names(project: Project, case: str, choices: RecordChoices) -> list[str]:
    """Names of the files of one case, one for each format."""
    names = [c.name for c in project.cases]
    folder = dict(zip(names, folder_names(names), strict=True))[case]
    return [f"{folder}-records{ENDINGS[kind]}" for kind in choices.formats]


class NotWritten(OSError):
    """A file that could not be written; its text is a sentence that names it and says why."""


def _left_behind(written: Sequence[Path]) -> str:
    return f" Written before it: {', '.join(path.name for path in written)}." if written else ""


def write_records(
    project: Project,
    results: Sequence[Result],
    choices: RecordChoices,
    folder: Path,
    date: datetime | None = None,
) -> list[Path]:
    """Write the records of every result; returns the files.

    Raises `NotWritten` for what cannot be written, and `ValueError` with a sentence for choices that cannot be
    fulfilled; nothing is written before every case has been found possible.
    """
    origin = origin_of(project, date)
    for result in results:
        if result.gauges:
            record_table(result, origin, choices)
    try:
        folder.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        raise NotWritten(f"The folder {folder} cannot be made: {why_not(error, folder)}.") from error
    written: list[Path] = []
    for result in results:
        if not result.gauges:
            continue
        table = record_table(result, origin, choices)
        for kind, name in zip(choices.formats, record_names(project, result.case.name, choices), strict=True):
            path = folder / name
            try:
                write_whole(path, WRITERS[kind](table, choices))
            except OSError as error:
                raise NotWritten(
                    f"{name} was not written: {why_not(error, path)}.{_left_behind(written)}"
                ) from error
            written.append(path)
    return written
