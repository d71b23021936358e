"""Puts the look on: light or dark as the system says, or as the user has chosen."""

from __future__ import annotations

from typing import Literal

from PySide6.QtGui import QColor, QPalette
from PySide6.QtWidgets import QApplication

from app.look.fonts import base_size
from app.look.palette import CHOICE, Palette, palette
from app.look.stylesheet import stylesheet

Choice = Literal["system", "light", "dark"]


def apply_look(app: QApplication, choice: Choice = "system") -> None:
    """Set style, colours and stylesheet. Widgets that draw for themselves hear of it as a change of palette
    (`QEvent.Type.PaletteChange`) and ask `palette()` again."""
    app.setProperty(CHOICE, choice)
    app.setStyle("Fusion")  # the only style that draws alike on Windows, macOS and Linux
    app.setPalette(_qt_palette(palette()))
    app.setStyleSheet(stylesheet(palette(), base_size()))


def follow_system(app: QApplication) -> None:
    """Change with the system from light to dark and back, where the user leaves it to the system."""

    def changed() -> None:
        choice = app.property(CHOICE) or "system"
        if choice == "system":
            apply_look(app, "system")

    app.styleHints().colorSchemeChanged.connect(changed)


def _qt_palette(colours: Palette) -> QPalette:
    made = QPalette()
    roles = {
        QPalette.ColorRole.Window: colours.window,
        QPalette.ColorRole.WindowText: colours.ink,
        QPalette.ColorRole.Base: colours.paper,
        QPalette.ColorRole.AlternateBase: colours.window,
        QPalette.ColorRole.Text: colours.ink,
        QPalette.ColorRole.Button: colours.raised,
        QPalette.ColorRole.ButtonText: colours.ink,
        QPalette.ColorRole.BrightText: colours.on_accent,
        QPalette.ColorRole.Highlight: colours.accent,
        QPalette.ColorRole.HighlightedText: colours.on_accent,
        QPalette.ColorRole.ToolTipBase: colours.raised,
        QPalette.ColorRole.ToolTipText: colours.ink,
        QPalette.ColorRole.PlaceholderText: colours.soft_ink,
        QPalette.ColorRole.Link: colours.accent,
        QPalette.ColorRole.Accent: colours.accent,
        QPalette.ColorRole.Mid: colours.line,
        QPalette.ColorRole.Dark: colours.line,
        QPalette.ColorRole.Light: colours.raised,
    }
    for role, colour in roles.items():
        made.setColor(role, QColor(colour))
    for role in (QPalette.ColorRole.WindowText, QPalette.ColorRole.Text, QPalette.ColorRole.ButtonText):
        made.setColor(QPalette.ColorGroup.Disabled, role, QColor(colours.line))
    return made
