"""What can be done with the selected part: as buttons under its form, as a menu, and by keys."""

from __future__ import annotations

from typing import Protocol

from PySide6.QtCore import QEvent
from PySide6.QtGui import QAction
from PySide6.QtWidgets import QHBoxLayout, QMenu, QPushButton, QToolButton, QWidget

from app.bench import outline_edits as edits
from app.bench.forms.spec import Context
from app.bench.outline_rows import Row
from app.document import Document
from app.look import icon
from app.look.spacing import FIELD, GAP
from app.sight import Sight

#: Name, icon, words and key of each action on an entry of a list.
ACTIONS = (
    ("add", "add", "Add another", "Insert"),
    ("duplicate", "duplicate", "Duplicate", "Ctrl+D"),
    ("split", "split", "Split in two", ""),
    ("move up", "up", "Move up", "Alt+Up"),
    ("move down", "down", "Move down", "Alt+Down"),
    ("remove", "remove", "Remove", "Del"),
)
CAN_BE_SPLIT = ("segments", "layers")


class HasContext(Protocol):
    """Gives what edits are made from."""

    @property
    def context(self) -> Context: ...


class Actions(QWidget):
    """Buttons for an entry of a list, or one that adds an entry to a group."""

    def __init__(self, document: Document, sight: Sight, source: HasContext, parent: QWidget) -> None:
        super().__init__(parent)
        self.buttons: dict[str, QToolButton] = {}
        self._document, self._sight, self._source = document, sight, source
        self._row = Row("", "none", "")
        line = QHBoxLayout(self)
        line.setContentsMargins(0, 0, 0, 0)
        line.setSpacing(GAP)
        for name, picture, words, key in ACTIONS:
            button = QToolButton(self)
            button.setProperty("role", "quiet")
            button.setFixedHeight(FIELD)
            button.setProperty("picture", picture)
            button.setAccessibleName(words)
            button.setToolTip(f"{words}  ({key})" if key else words)
            button.clicked.connect(lambda _on=False, n=name: self.do(n, self._row))
            line.addWidget(button)
            self.buttons[name] = button
        self._draw_icons()
        self.add_button = QPushButton(self)
        self.add_button.setProperty("role", "link")
        self.add_button.clicked.connect(lambda: self.do("add", self._row))
        line.addWidget(self.add_button)
        line.addStretch(1)

    def changeEvent(self, event: QEvent) -> None:
        if event.type() == QEvent.Type.PaletteChange:
            self._draw_icons()
        super().changeEvent(event)

    def _draw_icons(self) -> None:
        for button in self.buttons.values():
            button.setIcon(icon(button.property("picture")))

    @property
    def stops(self) -> list[QWidget]:
        """What the Tab key stops at, in order."""
        return [*self.buttons.values(), self.add_button]

    def show_for(self, row: Row) -> None:
        """Offer what fits the row."""
        self._row = row
        able = self.able(row)
        entry = row.index >= 0
        for name, button in self.buttons.items():
            button.setVisible(entry and (name != "split" or self._can_split(row)))
            button.setEnabled(name in able)
        self.add_button.setVisible(bool(row.adds_to))
        if row.adds_to:
            self.add_button.setText(f"+ Add {edits.word_for(row.adds_to)}")
        self.setVisible(entry or bool(row.adds_to))

    def able(self, row: Row) -> list[str]:
        """Names of the actions that can be done with a row now."""
        if row.index < 0:
            return ["add"] if row.adds_to else []
        count = len(edits.entries_of(self._source.context, row.list_pointer))
        found = ["add", "duplicate"]
        found += ["split"] if self._can_split(row) else []
        found += ["move up"] if row.index > 0 else []
        found += ["move down"] if row.index < count - 1 else []
        keeps_one = row.list_pointer.endswith(("segments", "materials"))
        return found + (["remove"] if count > 1 or not keeps_one else [])

    def menu(self, row: Row, parent: QWidget) -> QMenu:
        """The same as a menu."""
        menu = QMenu(parent)
        able = self.able(row)
        if row.adds_to:
            menu.addAction(f"Add {edits.word_for(row.adds_to)}", lambda: self.do("add", row))
        elif row.index >= 0:
            for name, picture, words, key in ACTIONS:
                if name == "split" and not self._can_split(row):
                    continue
                action = QAction(icon(picture), f"{words}\t{key}", menu)
                action.triggered.connect(lambda _on=False, n=name: self.do(n, row))
                action.setEnabled(name in able)
                menu.addAction(action)
        if menu.isEmpty():
            nothing = QAction("Nothing can be added or removed here", menu)
            nothing.setEnabled(False)
            menu.addAction(nothing)
        return menu

    def do(self, name: str, row: Row) -> None:
        """Do an action by its name, where it can be done."""
        if name not in self.able(row):
            return
        edit = self._edit(name, row)
        if edit is not None and self._document.edit_tree(edit.label, edit.change):
            self._sight.set(selection=edit.select)

    def _edit(self, name: str, row: Row) -> edits.Edit | None:
        context, at, index = self._source.context, row.list_pointer, row.index
        match name:
            case "add":
                return edits.add(context, at, index) if index >= 0 else edits.add(context, row.adds_to)
            case "duplicate":
                return edits.duplicate(context, at, index)
            case "split":
                return edits.split(context, at, index)
            case "remove":
                return edits.remove(context, at, [index])
            case _:
                return edits.move(context, at, index, -1 if name == "move up" else 1)

    @staticmethod
    def _can_split(row: Row) -> bool:
        return row.list_pointer.endswith(CAN_BE_SPLIT)
