"""An outline as it is used, for tests that type into its forms and click on its rows."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QWidget

from app.bench.forms.field_row import FieldRow
from app.bench.forms.number_row import NumberRow
from app.bench.forms.other_rows import ChoiceRow
from app.bench.outline.outline import Outline
from app.document import Document
from app.sight import Sight

Tree = dict


@dataclass
class Desk:
    """An outline on screen, with the three objects that it is made from."""

    document: Document
    sight: Sight
    outline: Outline
    qtbot: object
    window: QWidget

    def select(self, pointer: str) -> None:
        self.sight.set(selection=pointer)

    def row(self, label: str, kind: type[FieldRow] = FieldRow) -> FieldRow:
        return next(r for r in self.outline.form.rows if r.spec.label == label and isinstance(r, kind))

    def type_into(self, label: str, text: str, enter: bool = True) -> NumberRow:
        row = self.row(label, NumberRow)
        row.edit.setFocus()
        row.edit.selectAll()
        self.qtbot.keyClicks(row.edit, text)
        if enter:
            self.qtbot.keyClick(row.edit, Qt.Key.Key_Return)
        return row

    def choose(self, label: str, word: str) -> ChoiceRow:
        row = self.row(label, ChoiceRow)
        index = row.box.findText(word)
        assert index >= 0
        row.box.setCurrentIndex(index)
        row.box.activated.emit(index)
        return row

    def button(self, name: str) -> QWidget:
        return next(b for b in self.outline.buttons if b.row.name == name)

    @property
    def case(self):
        return self.document.case
