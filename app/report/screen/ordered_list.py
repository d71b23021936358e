"""A list of parts that can be ticked and moved: what is shown, and in what order."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from PySide6.QtCore import QItemSelectionModel, QSignalBlocker, Qt, Signal
from PySide6.QtGui import QKeyEvent, QShowEvent
from PySide6.QtWidgets import QAbstractItemView, QListWidget, QListWidgetItem, QWidget

KEY = Qt.ItemDataRole.UserRole


class OrderedList(QListWidget):
    """`chosen` are the keys that are ticked, in the order of the list. Alt with an arrow moves the part at hand."""

    chosen_changed = Signal()

    def __init__(self, words: Mapping[str, str], name: str, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._words = words
        self.setAccessibleName(name)
        self.setToolTip("Tick what is to be shown; drag, or Alt with an arrow, to change the order")
        self.setDragDropMode(QAbstractItemView.DragDropMode.InternalMove)
        self.itemChanged.connect(lambda _item: self.chosen_changed.emit())
        self.model().rowsMoved.connect(lambda *_: self.chosen_changed.emit())
        self.show_chosen(tuple(words))
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setVerticalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setTextElideMode(Qt.TextElideMode.ElideRight)

    def showEvent(self, event: QShowEvent) -> None:
        """As high as its rows, now that the look has said how high they are."""
        self.setFixedHeight(self.sizeHintForRow(0) * self.count() + 2 * self.frameWidth() + 8)
        super().showEvent(event)

    @property
    def chosen(self) -> tuple[str, ...]:
        items = [self.item(row) for row in range(self.count())]
        return tuple(item.data(KEY) for item in items if item.checkState() == Qt.CheckState.Checked)

    def show_chosen(self, chosen: Sequence[str]) -> None:
        """Show these as ticked, in this order, the others after them."""
        if self.count() and self.chosen == tuple(chosen):
            return
        with QSignalBlocker(self):
            self.clear()
            for key in (*chosen, *(k for k in self._words if k not in chosen)):
                item = QListWidgetItem(self._words[key], self)
                item.setData(KEY, key)
                item.setFlags(item.flags() | Qt.ItemFlag.ItemIsUserCheckable)
                item.setCheckState(Qt.CheckState.Checked if key in chosen else Qt.CheckState.Unchecked)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        by = {Qt.Key.Key_Up: -1, Qt.Key.Key_Down: 1}.get(Qt.Key(event.key()), 0)
        row = self.currentRow()
        if by and event.modifiers() & Qt.KeyboardModifier.AltModifier and 0 <= row + by < self.count():
            with QSignalBlocker(self):
                self.insertItem(row + by, self.takeItem(row))
            self.setCurrentRow(row + by, QItemSelectionModel.SelectionFlag.ClearAndSelect)
            self.chosen_changed.emit()
        else:
            super().keyPressEvent(event)
