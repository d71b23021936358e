"""A picture of the Bench as a file: its numbers as CSV, itself with all its axes. Reached by its context menu."""

from __future__ import annotations

import csv
from io import StringIO
from itertools import zip_longest
from pathlib import Path

from PySide6.QtCore import QRectF
from PySide6.QtGui import QColor, QFontMetricsF, QPainter
from PySide6.QtWidgets import QFileDialog, QMenu, QMessageBox

from app.bench.pictures.axis_drawing import distance_ticks, horizontal_ticks, in_units
from app.bench.pictures.layers import Layered, Table
from app.bench.pictures.lettering import CENTRE, put
from app.disk import why_not, write_whole
from app.look.palette import palette
from app.picture_dialog import add_picture_actions
from app.picture_files import Drawing


def add_export_actions(menu: QMenu, picture: Layered) -> None:
    """What can be done with what the picture shows."""
    numbers = menu.addAction("Save the numbers as CSV…", lambda: _ask_for_csv(picture))
    numbers.setEnabled(picture.table() is not None)
    add_picture_actions(menu, lambda: drawing_of(picture), picture)


def drawing_of(picture: Layered) -> Drawing:
    """The picture with the axes that it shares with its neighbours on the screen, so that it can stand alone."""
    line = QFontMetricsF(picture.font()).height()
    over = _missing(picture)
    left = 3.8 * line if "distance" in over else 0.0
    below = max(2.9 * line - picture.margins().bottom, 0.0) if "time" in over else 0.0
    name = f"{' '.join(picture.case.name.split())} {picture.accessibleName().lower()}"

    def paint(painter: QPainter) -> None:
        painter.fillRect(
            QRectF(0, 0, picture.width() + left, picture.height() + below), QColor(palette().paper)
        )
        painter.translate(left, 0)
        picture.paint_whole(painter)
        _draw_axes(painter, picture, over)

    return Drawing(name, picture.width() + left, picture.height() + below, paint)


def _missing(picture: Layered) -> set[str]:
    """The axes whose numbers stand at a neighbour: of time at the lowest strip, of distance at the member."""
    has = {"time": picture.has_time, "distance": picture.has_distance}
    return {axis for axis in has if has[axis] and picture.numbers != axis and not picture.lacks_numbers(axis)}


def _draw_axes(painter: QPainter, picture: Layered, which: set[str]) -> None:
    plot, units = picture.plot(), picture.units
    line = QFontMetricsF(painter.font()).height()
    if "time" in which:
        time = picture.time_axis()
        span = time.high - time.low
        horizontal_ticks(painter, in_units(time, float(units.number(1.0, "time", span))), plot.bottom(), True)
        words = f"Time, {units.unit('time', span)}"
        put(painter, plot.center().x(), plot.bottom() + 2.0 * line, words, palette().soft_ink, CENTRE)
    if "distance" in which:
        metres = float(units.number(1.0, "length"))
        least = -sum(s.length for s in picture.case.ram_segments)
        distance_ticks(painter, in_units(picture.distance_axis(), metres), plot.left(), True, least * metres)
        words = f"Distance, {units.unit('length')}"
        painter.save()
        painter.translate(plot.left() - 3.9 * line, plot.center().y())
        painter.rotate(-90)
        put(painter, 0.0, 0.0, words, palette().soft_ink, CENTRE)
        painter.restore()


def csv_of(table: Table) -> str:
    """One header row, then numbers that read back the same; columns of unequal length end in empty cells."""
    text = StringIO()
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow(table.headings)
    for row in zip_longest(*(column.tolist() for column in table.columns), fillvalue=""):
        writer.writerow([repr(v) if isinstance(v, float) else v for v in row])
    return text.getvalue()


def _ask_for_csv(picture: Layered) -> None:
    table = picture.table()
    name = f"{picture.case.name} {picture.accessibleName().lower()}.csv"
    safe = "".join(c if c.isalnum() or c in " .-_" else "_" for c in name)
    chosen, _ = QFileDialog.getSaveFileName(picture, "Save the numbers", safe, "CSV (*.csv)")
    if not chosen or table is None:
        return
    path = Path(chosen).with_suffix(".csv")
    try:
        write_whole(path, csv_of(table))
    except OSError as error:
        QMessageBox.warning(picture, "Not saved", f"{path.name} was not saved: {why_not(error, path)}.")
