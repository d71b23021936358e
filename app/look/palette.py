"""The palette in force on the screen: light or dark, as the user or the system says."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager

from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication

from app.look.colours import DARK, LIGHT, PRINT, Palette

__all__ = ["CHOICE", "DARK", "LIGHT", "Palette", "in_print", "palette"]

#: Name of the property of the application that holds the user's choice: "system", "light" or "dark".
CHOICE = "striketrace_look"


_printing: list[bool] = []


@contextmanager
def in_print(on: bool = True) -> Iterator[None]:
    """While it lasts, what is painted is painted for white paper. `on` False leaves the screen's palette in force."""
    _printing.append(on)
    try:
        yield
    finally:
        _printing.pop()


def palette() -> Palette:
    """The palette in force: for paper while something is printed, else the user's choice, or else the system's."""
    if _printing and _printing[-1]:
        return PRINT
    app = QGuiApplication.instance()
    choice = app.property(CHOICE) if app else None
    if choice in ("light", "dark"):
        return DARK if choice == "dark" else LIGHT
    dark = app is not None and QGuiApplication.styleHints().colorScheme() == Qt.ColorScheme.Dark
    return DARK if dark else LIGHT
