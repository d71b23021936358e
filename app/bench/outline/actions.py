"""What can be done with the selected part, as buttons under its form."""

from __future__ import annotations

from PySide6.QtWidgets import QHBoxLayout, QMenu, QPushButton, QWidget

from app.bench.icon_button import IconButton
from app.bench.outline import edits
from app.bench.outline.part_actions import ACTIONS, PartActions, can_split
from app.bench.outline.rows import Row
from app.look.spacing import GAP


class Actions(QWidget):
    """Buttons for an entry of a list, or one that adds an entry to a group."""

    def __init__(self, actions: PartActions, parent: QWidget) -> None:
        super().__init__(parent)
        self.buttons: dict[str, IconButton] = {}
        self.parts = actions
        self._row = Row("", "none", "")
        line = QHBoxLayout(self)
        line.setContentsMargins(0, 0, 0, 0)
        line.setSpacing(GAP)
        for name, picture, words, key in ACTIONS:
            button = IconButton(picture, words, self)
            button.setToolTip(f"{words}  ({key})" if key else words)
            button.clicked.connect(lambda _on=False, n=name: self.parts.do(n, self._row))
            line.addWidget(button)
            self.buttons[name] = button
        self.add_button = QPushButton(self)
        self.add_button.setProperty("role", "link")
        self.add_button.clicked.connect(lambda: self.parts.do("add", self._row))
        line.addWidget(self.add_button)
        line.addStretch(1)

    @property
    def stops(self) -> list[QWidget]:
        """What the Tab key stops at, in order."""
        return [*self.buttons.values(), self.add_button]

    def show_for(self, row: Row) -> None:
        """Offer what fits the row."""
        self._row = row
        able = self.parts.able(row)
        entry = row.index >= 0
        for name, button in self.buttons.items():
            button.setVisible(entry and (name != "split" or can_split(row)))
            button.setEnabled(name in able)
        words = next(f"{words}  ({key})" for name, _, words, key in ACTIONS if name == "remove")
        self.buttons["remove"].setToolTip(self.parts.why_kept(row) or words)
        self.add_button.setVisible(bool(row.adds_to))
        if row.adds_to:
            self.add_button.setText(f"+ Add {edits.word_for(row.adds_to)}")
            self.add_button.setToolTip("Puts one behind the last, with values to begin with.")
        self.setVisible(entry or bool(row.adds_to))

    def menu(self, row: Row, parent: QWidget) -> QMenu:
        """The same as a menu."""
        menu = QMenu(parent)
        self.parts.fill(menu, row)
        if menu.isEmpty():
            menu.addAction("Nothing can be added or removed here").setEnabled(False)
        return menu
