"""The table of a list of parts for Qt's view: shows what the project has, and what was entered and not taken."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QPersistentModelIndex, Qt
from PySide6.QtGui import QColor

from app.bench.forms.field_row import tooltip_of
from app.bench.forms.spec import ChoiceSpec, Context, NumberSpec, Spec
from app.bench.tables.content import Content, content_of, text_of
from app.bench.tables.edits import Cell, fill_cells
from app.document import Document, Rejected
from app.look import font
from app.look.palette import palette
from app.units import Units, units_of

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole


class TableModel(QAbstractTableModel):
    """Derived from the document at each change; typing goes straight into the document."""

    def __init__(self, document: Document) -> None:
        super().__init__()
        self._document = document
        self._list_pointer = "member/segments"
        self._units = Units()
        self._content = Content(self._list_pointer, (), ())
        #: Why the last cells were not taken as a whole, "" where they were.
        self.refusal = ""
        self.follow()

    @property
    def content(self) -> Content:
        return self._content

    @property
    def context(self) -> Context:
        document = self._document
        return Context(document.tree, document.case, f"/cases/{document.case_index}")

    def show_list(self, list_pointer: str) -> None:
        """Show another list of the case."""
        self._list_pointer = list_pointer
        self.refusal = ""
        self.follow()

    def follow(self) -> None:
        """Show what the project has now."""
        units = units_of(self._document.project)
        content = content_of(self.context, self._list_pointer, units)
        same_shape = len(content.rows) == len(self._content.rows) and [
            (c.key, c.heading, c.unit) for c in content.columns
        ] == [(c.key, c.heading, c.unit) for c in self._content.columns]
        if not same_shape:
            self.beginResetModel()
        self._content, self._units = content, units
        if not same_shape:
            self.endResetModel()
        elif content.rows:
            self.dataChanged.emit(
                self.index(0, 0), self.index(len(content.rows) - 1, len(content.columns) - 1)
            )

    def fill(self, cells: Sequence[Cell], label: str = "") -> bool:
        """Put texts into cells as one step of undo; False where nothing was taken, with the reason in `refusal`."""
        if len(cells) > 1:  # a block tells anew what is wrong with its cells
            self._document.forget_rejected(self._list_pointer)
        sentence = fill_cells(self._document, self.context, self._content, cells, self._units, label)
        self.refusal = sentence or ""
        self.follow()
        return sentence is None

    def problem_at(self, row: int, column: int) -> Rejected | None:
        """What was entered in a cell and not taken."""
        spec = self._content.spec_at(row, column)
        return self._document.rejected.get(self._document.full_pointer(spec.pointer)) if spec else None

    def faults_told(self) -> str:
        """How many cells were not taken, and why the first was not; "" where there are none."""
        wrong = [
            (row, column, problem.sentence)
            for row in range(len(self._content.rows))
            for column in range(len(self._content.columns))
            if (problem := self.problem_at(row, column))
        ]
        if not wrong:
            return ""
        row, column, sentence = wrong[0]
        count = "One cell was" if len(wrong) == 1 else f"{len(wrong)} cells were"
        return f"{count} not taken. {self._content.columns[column].heading}, row {row + 1}: {sentence}"

    def spec_at(self, index: Index) -> Spec | None:
        """The field of a cell."""
        return self._content.spec_at(index.row(), index.column()) if index.isValid() else None

    def rowCount(self, parent: Index | None = None) -> int:
        return 0 if parent is not None and parent.isValid() else len(self._content.rows)

    def columnCount(self, parent: Index | None = None) -> int:
        return 0 if parent is not None and parent.isValid() else len(self._content.columns)

    def headerData(self, section: int, orientation: Qt.Orientation, role: int = Role.DisplayRole) -> Any:
        if orientation == Qt.Orientation.Vertical:
            return str(section + 1) if role == Role.DisplayRole else None
        column = self._content.columns[section]
        if role == Role.DisplayRole:
            return f"{column.heading}\n{column.unit}" if column.unit else f"{column.heading}\n"
        if role == Role.TextAlignmentRole:
            return _alignment(column.spec)
        return tooltip_of(column.spec) if role == Role.ToolTipRole else None

    def flags(self, index: Index) -> Qt.ItemFlag:
        if self.spec_at(index) is None:
            return Qt.ItemFlag.ItemIsSelectable
        return Qt.ItemFlag.ItemIsSelectable | Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsEditable

    def data(self, index: Index, role: int = Role.DisplayRole) -> Any:
        spec = self.spec_at(index)
        if spec is None:
            return None
        problem = self.problem_at(index.row(), index.column())
        match role:
            case Role.DisplayRole | Role.EditRole:
                return self._shown(spec, problem, role == Role.DisplayRole)
            case Role.TextAlignmentRole:
                across = (
                    Qt.AlignmentFlag.AlignRight
                    if isinstance(spec, NumberSpec)
                    else Qt.AlignmentFlag.AlignLeft
                )
                return across | Qt.AlignmentFlag.AlignVCenter
            case Role.ToolTipRole:
                return problem.sentence if problem else tooltip_of(spec)
            case Role.ForegroundRole:
                return QColor(palette().over) if problem else None
            case Role.FontRole:
                return font()
            case Role.AccessibleTextRole:
                heading = self._content.columns[index.column()].heading
                return f"{heading}: {self._shown(spec, problem, True)}"
            case _:
                return None

    def setData(self, index: Index, value: Any, role: int = Role.EditRole) -> bool:
        if role != Role.EditRole or self.spec_at(index) is None:
            return False
        return self.fill([Cell(index.row(), index.column(), str(value))])

    def copied_text(self, row: int, column: int) -> str:
        """A cell for the clipboard: numbers with all their digits."""
        spec = self._content.spec_at(row, column)
        return text_of(spec, self._units, exact=True) if spec is not None else ""

    def choices_at(self, index: Index) -> list[str]:
        """The words of a choice, none for other cells."""
        spec = self.spec_at(index)
        return [option.word for option in spec.options] if isinstance(spec, ChoiceSpec) else []

    def _shown(self, spec: Spec, problem: Rejected | None, marked: bool) -> str:
        if problem is None:
            return text_of(spec, self._units)
        given = problem.given
        numeric = isinstance(given, int | float) and isinstance(spec, NumberSpec)
        text = self._units.text(given, spec.dimension) if numeric else str(given or "")  # type: ignore[attr-defined]
        return f"✕ {text}" if marked else text


def _alignment(spec: Spec) -> Qt.AlignmentFlag:
    across = Qt.AlignmentFlag.AlignRight if isinstance(spec, NumberSpec) else Qt.AlignmentFlag.AlignLeft
    return across | Qt.AlignmentFlag.AlignVCenter
