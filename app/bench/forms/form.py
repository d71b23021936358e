"""The form under the selected row: made anew only when other rows are needed, else the same rows show new values."""

from __future__ import annotations

from PySide6.QtCore import Signal
from PySide6.QtWidgets import QLabel, QVBoxLayout, QWidget

from app.bench.forms.field_row import FieldRow
from app.bench.forms.number_row import NumberRow
from app.bench.forms.other_rows import CheckRow, ChoiceRow, PointsRow, TextRow
from app.bench.forms.spec import CheckSpec, ChoiceSpec, NumberSpec, PointsSpec, Spec, TextSpec, shape_of
from app.document import Document
from app.look.spacing import GAP
from app.provenance import mark_at
from app.units import Units

ROWS: dict[type[Spec], type[FieldRow]] = {
    NumberSpec: NumberRow,
    TextSpec: TextRow,
    ChoiceSpec: ChoiceRow,
    CheckSpec: CheckRow,
    PointsSpec: PointsRow,
}


class Form(QWidget):
    """Rows of fields, and lines of what follows from them."""

    #: A choice that changes only what the form shows: its name and the key chosen.
    view_chosen = Signal(str, str)

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._shape: list[tuple[object, ...]] = []
        self.rows: list[FieldRow] = []
        self._column = QVBoxLayout(self)
        self._column.setContentsMargins(0, GAP, 0, GAP)
        self._column.setSpacing(GAP)
        self._fields = QVBoxLayout()
        self._fields.setSpacing(GAP)
        self._column.addLayout(self._fields)
        self.lines = QLabel(self)
        self.cautions = QLabel(self)
        for label in (self.lines, self.cautions):
            label.setProperty("role", "small")
            label.setWordWrap(True)
            self._column.addWidget(label)

    def show_form(self, specs: list[Spec], units: Units, lines: list[str], cautions: list[str]) -> None:
        """Show these rows with the values that they carry."""
        shape = shape_of(specs)
        if shape != self._shape:
            self._make_rows(specs)
            self._shape = shape
        tree = self._document.tree
        for row, spec in zip(self.rows, specs, strict=True):
            row.show_spec(spec, units, mark_at(tree, spec.pointer))
        _set_text(self.lines, "\n".join(lines))
        _set_text(self.cautions, "\n".join(f"! {caution}" for caution in cautions))

    @property
    def stops(self) -> list[QWidget]:
        """What the Tab key stops at, in order."""
        return [stop for row in self.rows for stop in row.stops]

    def row_at(self, pointer: str, label: str = "") -> FieldRow | None:
        """The row of a place in the project, of several there the one with a label."""
        fitting = [row for row in self.rows if row.spec.pointer == pointer]
        return next((row for row in fitting if not label or row.spec.label == label), None)

    def _make_rows(self, specs: list[Spec]) -> None:
        """Rows for the specs; those whose kind and place are the same stay, and with them what is being typed."""
        old = {row.spec.key: row for row in self.rows}
        made: list[FieldRow] = []
        for spec in specs:
            row = old.pop(spec.key, None) or self._new_row(spec)
            made.append(row)
        for row in old.values():
            self._fields.removeWidget(row)
            row.hide()
            row.deleteLater()
        for index, row in enumerate(made):
            if self._fields.indexOf(row) != index:
                self._fields.removeWidget(row)
                self._fields.insertWidget(index, row)
                row.show()  # at once, so that the Tab key finds it
        self.rows = made

    def _new_row(self, spec: Spec) -> FieldRow:
        row = ROWS[type(spec)](self._document, spec, self)
        if isinstance(row, ChoiceRow):
            row.view_chosen.connect(self.view_chosen)
        return row


def _set_text(label: QLabel, text: str) -> None:
    if label.text() != text:
        label.setText(text)
    label.setVisible(bool(text))
