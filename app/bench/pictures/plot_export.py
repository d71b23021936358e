"""A picture as a file: its numbers as CSV, itself as PNG or SVG. Reached by the context menu of every picture."""

from __future__ import annotations

import csv
from collections.abc import Callable
from io import StringIO
from itertools import zip_longest
from pathlib import Path

from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QSaveFile, QSize
from PySide6.QtGui import QColor, QImage, QPainter
from PySide6.QtSvg import QSvgGenerator
from PySide6.QtWidgets import QFileDialog, QMenu, QMessageBox

from app.bench.pictures.layers import Layered, Table
from app.look.palette import palette

#: Pixels of a saved PNG for each pixel on the screen, so that it can be printed.
PNG_SCALE = 2


def add_export_actions(menu: QMenu, picture: Layered) -> None:
    """Three actions that save what the picture shows."""
    numbers = menu.addAction("Save the numbers as CSV…", lambda: _ask(picture, "csv"))
    numbers.setEnabled(picture.table() is not None)
    menu.addAction("Save the picture as PNG…", lambda: _ask(picture, "png"))
    menu.addAction("Save the picture as SVG…", lambda: _ask(picture, "svg"))


def save(picture: Layered, path: Path) -> None:
    """Write the picture in the format that the name's ending says. Raises `OSError` with a sentence."""
    table = picture.table()
    if path.suffix == ".csv":
        data = csv_of(table).encode() if table else b""
    else:
        data = svg_of(picture) if path.suffix == ".svg" else png_of(picture)
    file = QSaveFile(str(path))
    if not (file.open(QIODevice.OpenModeFlag.WriteOnly) and file.write(data) == len(data) and file.commit()):
        raise OSError(f"{path} could not be written: {file.errorString()}.")


def csv_of(table: Table) -> str:
    """One header row, then numbers that read back the same; columns of unequal length end in empty cells."""
    text = StringIO()
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow(table.headings)
    for row in zip_longest(*(column.tolist() for column in table.columns), fillvalue=""):
        writer.writerow([repr(v) if isinstance(v, float) else v for v in row])
    return text.getvalue()


def png_of(picture: Layered) -> bytes:
    image = QImage(picture.size() * PNG_SCALE, QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(PNG_SCALE)
    image.fill(QColor(palette().paper))
    painter = QPainter(image)
    picture.paint_whole(painter)
    painter.end()
    # the stubs want bytes for the format, the call itself wants text
    return _through_buffer(lambda buffer: image.save(buffer, "PNG"))  # type: ignore[call-overload]


def svg_of(picture: Layered) -> bytes:
    def write(buffer: QBuffer) -> None:
        generator = QSvgGenerator()
        generator.setOutputDevice(buffer)
        generator.setSize(QSize(picture.width(), picture.height()))
        generator.setViewBox(picture.rect())
        generator.setTitle(picture.accessibleName())
        painter = QPainter(generator)
        picture.paint_whole(painter)
        painter.end()

    return _through_buffer(write)


def _through_buffer(write: Callable[[QBuffer], object]) -> bytes:
    data = QByteArray()
    buffer = QBuffer(data)
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    write(buffer)
    buffer.close()
    return bytes(data.data())


def _ask(picture: Layered, ending: str) -> None:
    name = f"{picture.case.name} {picture.accessibleName().lower()}.{ending}"
    safe = "".join(c if c.isalnum() or c in " .-_" else "_" for c in name)
    chosen, _ = QFileDialog.getSaveFileName(picture, f"Save as {ending.upper()}", safe, f"*.{ending}")
    if not chosen:
        return
    try:
        save(picture, Path(chosen).with_suffix(f".{ending}"))
    except OSError as error:
        QMessageBox.warning(picture, "Not saved", str(error))
