"""Editors inside a table: a line of text, or a choice; what is typed goes into all selected cells of the column."""

from __future__ import annotations

from typing import cast

from PySide6.QtCore import QAbstractItemModel, QModelIndex, QPersistentModelIndex, Qt
from PySide6.QtWidgets import (
    QComboBox,
    QLineEdit,
    QStyledItemDelegate,
    QStyleOptionViewItem,
    QTableView,
    QWidget,
)

from app.bench.tables.edits import Cell
from app.bench.tables.model import TableModel

Index = QModelIndex | QPersistentModelIndex


class CellEditors(QStyledItemDelegate):
    """Makes editors for the cells of a `TableModel`."""

    def __init__(self, view: QTableView) -> None:
        super().__init__(view)
        self._view = view

    def createEditor(self, parent: QWidget, option: QStyleOptionViewItem, index: Index) -> QWidget:
        model = cast(TableModel, index.model())
        heading = model.content.columns[index.column()].heading
        words = model.choices_at(index)
        if not words:
            line = QLineEdit(parent)
            line.setFrame(False)
            line.setAlignment(Qt.AlignmentFlag(index.data(Qt.ItemDataRole.TextAlignmentRole)))
            line.setAccessibleName(f"{heading}, row {index.row() + 1}")
            return line
        box = QComboBox(parent)
        box.addItems(words)
        box.setAccessibleName(f"{heading}, row {index.row() + 1}")
        box.activated.connect(lambda _index: self._done(box))
        return box

    def setEditorData(self, editor: QWidget, index: Index) -> None:
        if isinstance(editor, QComboBox):
            editor.setCurrentIndex(editor.findText(str(index.data(Qt.ItemDataRole.EditRole))))
        elif isinstance(editor, QLineEdit):
            editor.setText(str(index.data(Qt.ItemDataRole.EditRole)))

    def setModelData(self, editor: QWidget, model: QAbstractItemModel, index: Index) -> None:
        text = editor.currentText() if isinstance(editor, QComboBox) else cast(QLineEdit, editor).text()
        if text == index.data(Qt.ItemDataRole.EditRole):
            return
        chosen = self._view.selectionModel().selectedIndexes()
        rows = {i.row() for i in chosen if i.column() == index.column()} | {index.row()}
        table = cast(TableModel, model)
        cells = [Cell(row, index.column(), text) for row in sorted(rows)]
        table.fill([c for c in cells if table.content.spec_at(c.row, c.column) is not None])

    def updateEditorGeometry(self, editor: QWidget, option: QStyleOptionViewItem, index: Index) -> None:
        editor.setGeometry(option.rect)

    def _done(self, box: QComboBox) -> None:
        self.commitData.emit(box)
        self.closeEditor.emit(box)
