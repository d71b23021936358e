"""The palette in force on the screen: light or dark, as the user or the system says."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication

from app.look.colours import DARK, LIGHT, Palette

__all__ = ["CHOICE", "DARK", "LIGHT", "Palette", "palette"]

#: Name of the property of the application that holds the user's choice: "system", "light" or "dark".
CHOICE = "striketrace_look"


def palette() -> Palette:
    """The palette in force: the user's choice, or else the system's."""
    app = QGuiApplication.instance()
    choice = app.property(CHOICE) if app else None
    if choice in ("light", "dark"):
        return DARK if choice == "dark" else LIGHT
    dark = app is not None and QGuiApplication.styleHints().colorScheme() == Qt.ColorScheme.Dark
    return DARK if dark else LIGHT
