"""Points of a history from the clipboard or from a file, into the project or linked to it."""

from __future__ import annotations

import os
from pathlib import Path

from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QFileDialog, QWidget

from app.bench.tables.pasted import cells_of
from app.document import Document
from app.tree import value_at
from app.unit_text import UnitError, value_of
from solver.model.history import Samples, read_history

Columns = tuple[list[float], list[float]]


def points_of_text(text: str) -> Columns:
    """Times (s) and values (N or m/s) from two columns of text; a first row of words is taken as a header.

    Raises `ValueError` with a sentence.
    """
    times: list[float] = []
    values: list[float] = []
    for number, row in enumerate(cells_of(text), start=1):
        if not any(cell.strip() for cell in row):
            continue
        try:
            time, value = (value_of(cell, "none", "") for cell in row[:2])
        except (UnitError, ValueError):
            if number == 1:
                continue
            raise ValueError(f"Line {number} needs two numbers: the time in s, and the value.") from None
        times.append(time)
        values.append(value)
    try:
        Samples.checked(times, values)
    except ValueError as error:
        raise ValueError(_sentence(error)) from None
    return times, values


def paste_points(document: Document, pointer: str) -> None:
    """Take the points that the clipboard holds."""
    try:
        points = points_of_text(QGuiApplication.clipboard().text())
    except ValueError as error:
        document.reject(pointer, "", str(error))
        return
    _put(document, pointer, points, f"Paste {len(points[0])} points of the history")


def ask_for_points(document: Document, pointer: str, parent: QWidget) -> None:
    """Let the user choose a CSV file, and copy its points into the project."""
    name = _ask(parent, "Copy points from a file")
    if name:
        copy_points(document, pointer, Path(name))


def copy_points(document: Document, pointer: str, path: Path) -> None:
    """Copy the points of a CSV file into the project."""
    try:
        samples = read_history(str(path.absolute()), None)
    except ValueError as error:
        document.reject(pointer, str(path), _sentence(error))
        return
    points = samples.times.tolist(), samples.values.tolist()
    _put(document, pointer, points, f"Read {len(points[0])} points from {path.name}")


def link_points(document: Document, pointer: str, parent: QWidget) -> None:
    """Let the user choose a CSV file, and name it in the project, relative to the project's own file."""
    name = _ask(parent, "Link a file")
    if not name:
        return
    if document.path is None:
        document.reject(pointer, name, "Save the project first: a link is relative to the project's folder.")
        return
    try:
        linked = Path(os.path.relpath(name, document.path.parent)).as_posix()
    except ValueError:  # another drive, on Windows
        linked = Path(name).as_posix()
    load = pointer.rpartition("/")[0]
    document.edit_tree(
        f"Link the history to {Path(name).name}",
        lambda tree: value_at(tree, load).update(times=None, values=None, file=linked),
        pointer=pointer,
    )


def _put(document: Document, pointer: str, points: Columns, label: str) -> None:
    load = pointer.rpartition("/")[0]
    times, values = points
    document.edit_tree(
        label,
        lambda tree: value_at(tree, load).update(times=times, values=values, file=None),
        pointer=pointer,
    )


def _ask(parent: QWidget, title: str) -> str:
    name, _filter = QFileDialog.getOpenFileName(parent, title, "", "CSV files (*.csv *.txt);;All files (*)")
    return name


def _sentence(error: ValueError) -> str:
    text = str(error)
    return text[:1].upper() + text[1:] + ("" if text.endswith(".") else ".")
