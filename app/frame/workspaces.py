"""The workspaces of the window, one on top of the other, and the switch between them in the top bar."""

from __future__ import annotations

from functools import partial

from PySide6.QtGui import QKeySequence, QShortcut
from PySide6.QtWidgets import QButtonGroup, QHBoxLayout, QPushButton, QSizePolicy, QStackedWidget, QWidget

from app.look.spacing import GAP


class Workspaces(QStackedWidget):
    """Shows one workspace; `switch` is the row of their names. Ctrl with the number of a workspace shows it."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.switch = QWidget(parent)
        self.switch.setSizePolicy(QSizePolicy.Policy.Maximum, QSizePolicy.Policy.Fixed)
        self._row = QHBoxLayout(self.switch)
        self._row.setContentsMargins(0, 0, 0, 0)
        self._row.setSpacing(GAP)
        self._group = QButtonGroup(self.switch)
        self._group.setExclusive(True)

    def add(self, name: str, tells: str, workspace: QWidget) -> None:
        """Put a workspace behind those that are there; `tells` is a sentence on what it is for."""
        number = self.addWidget(workspace)
        button = QPushButton(name)
        button.setProperty("role", "chip")
        button.setCheckable(True)
        button.setChecked(number == 0)
        keys = QKeySequence(f"Ctrl+{number + 1}")
        button.setToolTip(f"{tells} ({keys.toString(QKeySequence.SequenceFormat.NativeText)})")
        self._row.addWidget(button)
        self._group.addButton(button, number)
        button.clicked.connect(partial(self.show_number, number))
        QShortcut(keys, self).activated.connect(partial(self.show_number, number))

    def show_number(self, number: int) -> None:
        """Show the workspace with a number, from 0 on."""
        self._group.button(number).setChecked(True)
        self.setCurrentIndex(number)
