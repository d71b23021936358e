"""The drawer across the bottom: all segments, layers or gauges as a table that takes typing and pasting."""

from __future__ import annotations

from PySide6.QtCore import QModelIndex, QSize, Qt
from PySide6.QtGui import QGuiApplication, QKeyEvent, QKeySequence
from PySide6.QtWidgets import (
    QAbstractItemDelegate,
    QButtonGroup,
    QHBoxLayout,
    QLabel,
    QPushButton,
    QSizePolicy,
    QTableView,
    QVBoxLayout,
    QWidget,
)

from app.bench.icon_button import IconButton
from app.bench.outline import edits
from app.bench.tables.cells import CellEditors
from app.bench.tables.edits import Cell, block_cells
from app.bench.tables.model import TableModel
from app.bench.tables.pasted import cells_of, placed
from app.document import Document
from app.look.spacing import GAP, SPACE
from app.sight import Sight

#: Lists of the case that have a table, and the words on their tabs.
LISTS = (
    ("load/segments", "Striker"),
    ("load/ram/segments", "Ram"),
    ("member/segments", "Segments"),
    ("ground/layers", "Layers"),
    ("gauges", "Gauges"),
    ("member/attachments", "Attachments"),
    ("/materials", "Materials"),
)
#: Rows that the drawer has room for, without scrolling.
LEAST_ROWS, MOST_ROWS = 3, 7


class Tables(QWidget):
    """Hidden until a table is asked for with `open_table`."""

    def __init__(self, document: Document, sight: Sight, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._sight = document, sight
        self.setProperty("role", "paper")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self.setAccessibleName("Tables")
        self.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Maximum)
        self.model = TableModel(document)
        self.view = TableView(self)
        self.note = QLabel(self)
        self.note.setProperty("role", "small")
        self.tabs: dict[str, QPushButton] = {}
        self.buttons: dict[str, IconButton] = {}
        self._compose()
        self.hide()
        document.changed.connect(self._follow)
        sight.changed.connect(self._follow_sight)

    def open_table(self, list_pointer: str) -> None:
        """Show the table of a list of the case."""
        self.model.show_list(list_pointer)
        self.show()
        self._follow()
        self.view.resizeColumnsToContents()
        self._follow_sight()
        self.view.setFocus()

    def _compose(self) -> None:
        head = QHBoxLayout()
        head.setSpacing(GAP)
        group = QButtonGroup(self)
        for pointer, words in LISTS:
            tab = QPushButton(words, self)
            tab.setCheckable(True)
            tab.setProperty("role", "chip")
            tab.setToolTip(f"The table of all {words.lower()}.")
            tab.clicked.connect(lambda _on=False, p=pointer: self.open_table(p))
            group.addButton(tab)
            head.addWidget(tab)
            self.tabs[pointer] = tab
        head.addSpacing(2 * SPACE)
        for name, picture, words, act in (
            ("add", "add", "Add a row behind the selected one", self._add),
            ("remove", "remove", "Remove the selected rows", self._remove),
            ("up", "up", "Move the row up", lambda: self._move(-1)),
            ("down", "down", "Move the row down", lambda: self._move(1)),
            ("close", "close", "Close the table", self.hide),
        ):
            if name == "close":
                head.addStretch(1)
            button = IconButton(picture, words, self)
            button.clicked.connect(act)
            head.addWidget(button)
            self.buttons[name] = button
        self.view.setModel(self.model)
        self.view.selectionModel().currentChanged.connect(self._current_changed)
        column = QVBoxLayout(self)
        column.setContentsMargins(SPACE, GAP, SPACE, GAP)
        column.setSpacing(GAP)
        column.addLayout(head)
        column.addWidget(self.view, 1)
        column.addWidget(self.note)

    # -- showing ----------------------------------------------------------------------------------------------------

    def _follow(self) -> None:
        if self.isHidden():
            return
        case = self._document.case
        there = {
            "load/segments": case.load.kind == "striker",
            "load/ram/segments": case.load.kind == "drop" and bool(case.ram_segments),
            "ground/layers": case.ground is not None and case.ground.shaft_total is None,
        }
        current = self.view.currentIndex()
        if not there.get(self.model.content.list_pointer, True):
            self.model.show_list("member/segments")
        else:
            self.model.follow()
        for pointer, tab in self.tabs.items():
            tab.setVisible(there.get(pointer, True))
            tab.setChecked(pointer == self.model.content.list_pointer)
        if current.isValid() and not self.view.currentIndex().isValid():
            self._go_to(current.row(), current.column())
        self.view.updateGeometry()
        self._tell()

    def _follow_sight(self) -> None:
        """The row of what is selected elsewhere."""
        list_pointer, _, index = self._sight.selection.rpartition("/")
        fits = list_pointer == self.model.content.list_pointer and index.isdecimal()
        if not self.isHidden() and fits and int(index) != self.view.currentIndex().row():
            self._go_to(int(index), max(0, self.view.currentIndex().column()))

    def _go_to(self, row: int, column: int) -> None:
        row = min(row, self.model.rowCount() - 1)
        index = self.model.index(row, min(column, self.model.columnCount() - 1))
        self.view.setCurrentIndex(index)
        self._tell()

    def _current_changed(self, now: QModelIndex) -> None:
        if now.isValid():
            self._sight.set(selection=f"{self.model.content.list_pointer}/{now.row()}")
        self._tell()

    def _tell(self) -> None:
        """Under the table: why cells were not taken, or what the current column means."""
        index = self.view.currentIndex()
        problem = self.model.problem_at(index.row(), index.column()) if index.isValid() else None
        spec = self.model.spec_at(index)
        wrong = self.model.refusal or (problem.sentence if problem else self.model.faults_told())
        role = "problem" if wrong else "small"
        if self.note.property("role") != role:
            self.note.setProperty("role", role)
            self.note.style().unpolish(self.note)
            self.note.style().polish(self.note)
        word = edits.word_for(self.model.content.list_pointer)
        hint = (
            f"There is no {word} yet: + adds one."
            if not self.model.rowCount()
            else "Paste a block from a spreadsheet with the units of the columns; rows are added as needed."
        )
        self.note.setText(
            f"✕ {wrong}" if wrong else f"{spec.label}. {spec.tells}" if spec and spec.tells else hint
        )

    # -- acting -----------------------------------------------------------------------------------------------------

    def paste(self) -> None:
        """The block on the clipboard, its corner at the current cell; one value fills all selected cells."""
        current = self.view.currentIndex()
        rows = cells_of(QGuiApplication.clipboard().text())
        if not rows or not current.isValid():
            return
        headings = [column.heading for column in self.model.content.columns]
        try:
            block = placed(rows, headings, current.column())
        except ValueError as error:
            self.model.refusal = f"Nothing was pasted. {error}"
            self._tell()
            return
        chosen = self.view.selectionModel().selectedIndexes()
        if len(rows) == 1 and len(rows[0]) == 1 and len(chosen) > 1:
            cells = [Cell(i.row(), i.column(), rows[0][0]) for i in chosen]
        else:
            cells = block_cells(block, current.row(), self.model.columnCount())
        word = edits.word_for(self.model.content.list_pointer)
        self.model.fill(cells, f"Paste {len(cells)} cells into the {word}s")
        self._tell()

    def copy(self) -> None:
        """The selected cells as a block for a spreadsheet."""
        chosen = self.view.selectionModel().selectedIndexes()
        if not chosen:
            return
        rows = range(min(i.row() for i in chosen), max(i.row() for i in chosen) + 1)
        columns = range(min(i.column() for i in chosen), max(i.column() for i in chosen) + 1)
        texts = ["\t".join(self.model.copied_text(row, column) for column in columns) for row in rows]
        QGuiApplication.clipboard().setText("\n".join(texts))

    def clear_cells(self) -> None:
        """Empty the selected cells that may be empty."""
        chosen = self.view.selectionModel().selectedIndexes()
        cells = [Cell(i.row(), i.column(), "") for i in chosen if self.model.spec_at(i) is not None]
        if cells:
            self.model.fill(cells, f"Clear {len(cells)} cells")
            self._tell()

    def _rows(self) -> list[int]:
        chosen = {i.row() for i in self.view.selectionModel().selectedIndexes()}
        current = self.view.currentIndex()
        return sorted(chosen or ({current.row()} if current.isValid() else set()))

    def _add(self) -> None:
        rows = self._rows()
        self._do(edits.add(self.model.context, self.model.content.list_pointer, rows[-1] if rows else None))

    def _remove(self) -> None:
        rows = self._rows()
        if rows:
            self._do(edits.remove(self.model.context, self.model.content.list_pointer, rows))

    def _move(self, by: int) -> None:
        rows = self._rows()
        if rows:
            self._do(edits.move(self.model.context, self.model.content.list_pointer, rows[0], by))

    def _do(self, edit: edits.Edit | None) -> None:
        if edit is not None and self._document.edit_tree(edit.label, edit.change):
            self._sight.set(selection=edit.select)


class TableView(QTableView):
    """Typing begins to edit; copy, paste and delete act on the selected cells; Enter goes on downwards."""

    def __init__(self, drawer: Tables) -> None:
        super().__init__(drawer)
        self._drawer = drawer
        self.setAccessibleName("Table")
        self.setToolTip(
            "Type, or paste a block from a spreadsheet; Enter goes on downwards, Escape closes the table."
        )
        self.setTabKeyNavigation(False)  # Tab goes on to the buttons; arrows and Enter move in the table
        self.setItemDelegate(CellEditors(self))
        self.setEditTriggers(
            QTableView.EditTrigger.AnyKeyPressed
            | QTableView.EditTrigger.DoubleClicked
            | QTableView.EditTrigger.EditKeyPressed
        )
        self.setHorizontalScrollMode(QTableView.ScrollMode.ScrollPerPixel)
        self.setAlternatingRowColors(True)
        self.setCornerButtonEnabled(False)
        self.horizontalHeader().setDefaultAlignment(
            Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
        )

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.matches(QKeySequence.StandardKey.Paste):
            self._drawer.paste()
        elif event.matches(QKeySequence.StandardKey.Copy):
            self._drawer.copy()
        elif event.key() in (Qt.Key.Key_Delete, Qt.Key.Key_Backspace):
            self._drawer.clear_cells()
        elif event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            if self.state() != QTableView.State.EditingState:
                self._go_down()
        elif event.key() == Qt.Key.Key_Escape:
            self._drawer.hide()
        else:
            super().keyPressEvent(event)

    def sizeHint(self) -> QSize:
        """As many rows as there are, within bounds: the pictures above keep their room."""
        shown = max(LEAST_ROWS, min(self.model().rowCount() + 1, MOST_ROWS)) if self.model() else LEAST_ROWS
        row = self.verticalHeader().defaultSectionSize()
        return QSize(400, self.horizontalHeader().sizeHint().height() + shown * row + 2 * self.frameWidth())

    def closeEditor(self, editor: QWidget, hint: QAbstractItemDelegate.EndEditHint) -> None:
        """After Enter in a cell, on to the one below."""
        super().closeEditor(editor, hint)
        entered = hint == QAbstractItemDelegate.EndEditHint.SubmitModelCache
        if entered and len(self.selectionModel().selectedIndexes()) == 1:
            self._go_down()

    def _go_down(self) -> None:
        below = self.currentIndex().siblingAtRow(self.currentIndex().row() + 1)
        if below.isValid():
            self.setCurrentIndex(below)
