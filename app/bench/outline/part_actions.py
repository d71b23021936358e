"""What can be done with a part of the case, wherever it is selected: as a menu, by keys, by name."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtGui import QAction, QKeyEvent
from PySide6.QtWidgets import QMenu

from app.bench.forms.spec import Context
from app.bench.outline import edits
from app.bench.outline.rows import Row
from app.document import Document
from app.look import icon
from app.sight import Sight

#: Name, icon, words and key of each action on an entry of a list.
ACTIONS = (
    ("add", "add", "Add another", "Insert"),
    ("duplicate", "duplicate", "Duplicate", "Ctrl+D"),
    ("split", "split", "Split in two", "Ctrl+Shift+D"),
    ("move up", "up", "Move up", "Alt+Up"),
    ("move down", "down", "Move down", "Alt+Down"),
    ("remove", "remove", "Remove", "Del"),
)
CAN_BE_SPLIT = ("segments", "layers")
KEYS = {Qt.Key.Key_Delete: "remove", Qt.Key.Key_Backspace: "remove", Qt.Key.Key_Insert: "add"}


def action_of(event: QKeyEvent) -> str:
    """Name of the action that a key asks for, "" for none."""
    key, keys = Qt.Key(event.key()), event.modifiers()
    if keys & Qt.KeyboardModifier.AltModifier and key in (Qt.Key.Key_Up, Qt.Key.Key_Down):
        return "move up" if key == Qt.Key.Key_Up else "move down"
    if keys & Qt.KeyboardModifier.ControlModifier and key == Qt.Key.Key_D:
        return "split" if keys & Qt.KeyboardModifier.ShiftModifier else "duplicate"
    return KEYS.get(key, "") if not keys & ~Qt.KeyboardModifier.KeypadModifier else ""


class PartActions:
    """Does them: each is one step of undo, and what it made is selected after it."""

    def __init__(self, document: Document, sight: Sight, context: Callable[[], Context]) -> None:
        self._document, self._sight, self._context = document, sight, context

    def chosen(self, row: Row) -> list[int]:
        """Indices of all entries that are selected, where the row is one of them; else of the row alone."""
        selected = (self._sight.selection, *self._sight.also)
        if row.pointer not in selected:
            return [row.index]
        count = len(edits.entries_of(self._context(), row.list_pointer))
        places = {f"{row.list_pointer}/{index}": index for index in range(count)}
        return sorted(places[pointer] for pointer in selected if pointer in places)

    def able(self, row: Row) -> list[str]:
        """Names of the actions that can be done with a row now."""
        if row.index < 0:
            return ["add"] if row.adds_to else []
        chosen = self.chosen(row)
        count = len(edits.entries_of(self._context(), row.list_pointer))
        found = ["add", "duplicate"]
        found += ["split"] if can_split(row) and len(chosen) == 1 else []
        found += ["move up"] if chosen[0] > 0 else []
        found += ["move down"] if chosen[-1] < count - 1 else []
        keeps_one = row.list_pointer.endswith(("segments", "materials"))
        return found + (["remove"] if count > len(chosen) or not keeps_one else [])

    def why_kept(self, row: Row) -> str:
        """Why an entry cannot be removed, "" where it can."""
        if row.index < 0 or "remove" in self.able(row):
            return ""
        word = edits.word_for(row.list_pointer)
        holder = "A project" if word == "material" else "A rod"
        return f"{holder} keeps at least one {word}: add another one first."

    def fill(self, menu: QMenu, row: Row) -> None:
        """Put the actions of a row into a menu."""
        able, several = self.able(row), len(self.chosen(row)) if row.index >= 0 else 1
        if row.adds_to:
            menu.addAction(f"Add {edits.word_for(row.adds_to)}", lambda: self.do("add", row))
        elif row.index >= 0:
            for name, picture, words, key in ACTIONS:
                if name == "split" and not can_split(row):
                    continue
                all_of_them = f" all {several}" if several > 1 and name not in ("add", "split") else ""
                action = QAction(icon(picture), f"{words}{all_of_them}\t{key}", menu)
                action.triggered.connect(lambda _on=False, n=name: self.do(n, row))
                action.setEnabled(name in able)
                menu.addAction(action)

    def do(self, name: str, row: Row) -> bool:
        """Do an action by its name, where it can be done."""
        if name not in self.able(row):
            if name == "remove" and self.why_kept(row):
                self._document.refused.emit(f"Not done: remove {row.name}. {self.why_kept(row)}")
            return False
        return self.take(self._edit(name, row))

    def take(self, edit: edits.Edit | None) -> bool:
        """Make an edit, and select what it tells."""
        if edit is None or not self._document.edit_tree(edit.label, edit.change):
            return False
        self._sight.set(selection=edit.select, also=edit.also)
        return True

    def _edit(self, name: str, row: Row) -> edits.Edit | None:
        context, at, index = self._context(), row.list_pointer, row.index
        chosen = self.chosen(row) if index >= 0 else []
        match name:
            case "add":
                return edits.add(context, at, index) if index >= 0 else edits.add(context, row.adds_to)
            case "split":
                return edits.split(context, at, index)
            case "remove":
                return edits.remove(context, at, chosen)
            case "duplicate":
                several = len(chosen) > 1
                return (
                    edits.duplicate_all(context, at, chosen)
                    if several
                    else edits.duplicate(context, at, index)
                )
            case _:
                by = -1 if name == "move up" else 1
                if len(chosen) > 1:
                    return edits.move_all(context, at, chosen, by)
                return edits.move(context, at, index, by)


def can_split(row: Row) -> bool:
    """Whether a row stands for something with a length."""
    return row.list_pointer.endswith(CAN_BE_SPLIT)
