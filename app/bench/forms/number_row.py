"""A field for a number: in the shown unit or with its own, tried while it is typed, kept as typed while it is wrong."""

from __future__ import annotations

from math import isclose

from PySide6.QtCore import Qt, QTimer
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QLabel, QLineEdit, QWidget

from app.bench.forms.bounds import breach_of
from app.bench.forms.commit import put_number
from app.bench.forms.field_row import FieldRow
from app.bench.forms.spec import NumberSpec
from app.document import Document
from app.look import font
from app.unit_text import UnitError, value_of
from app.units import Units

#: Pause in typing after which a number is tried, ms.
PAUSE = 250


class NumberEdit(QLineEdit):
    """Digits of equal width at the right; Escape gives the number back that the project has."""

    def __init__(self, row: NumberRow) -> None:
        super().__init__(row)
        self._row = row
        self.setFont(font())
        self.setAlignment(Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Escape and self._row.give_back():
            event.accept()
        else:
            super().keyPressEvent(event)


class NumberRow(FieldRow):
    """A number with its unit beside it."""

    def __init__(self, document: Document, spec: NumberSpec, parent: QWidget | None = None) -> None:
        super().__init__(document, spec, parent)
        self.spec: NumberSpec = spec
        self._units = Units()
        self._unit = ""
        self.edit = NumberEdit(self)
        self.put_editor(self.edit)
        self._unit_label = QLabel(self)
        self._unit_label.setProperty("role", "soft")
        self.put_beside(self._unit_label)
        self._pause = QTimer(self)
        self._pause.setSingleShot(True)
        self._pause.setInterval(PAUSE)
        self._pause.timeout.connect(self._try)
        self.edit.textEdited.connect(self._pause.start)
        self.edit.editingFinished.connect(self._enter)

    def show_value(self, units: Units, refused: bool) -> None:
        unit = "" if self.spec.whole else units.unit(self.spec.dimension, self.spec.value)
        new_units = units != self._units
        self._units = units
        self.edit.setPlaceholderText(self.spec.empty or "")
        typing = self.edit.hasFocus() and self.edit.isModified() and not new_units
        if refused:
            if not typing and self.edit.text() == "":
                self._show_text(self._given_text())
        elif not typing or not (self._pause.isActive() or self._means_the_value()):
            self._unit = unit
            self._show_text(self._text())
        self._unit_label.setText(self._unit)
        self._mark_invalid(refused)

    def give_back(self) -> bool:
        """Drop what was typed and not taken; False where there is nothing to drop."""
        self._pause.stop()
        refused = self.document.problem_at(self.spec.pointer) is not None
        if not refused and self.edit.text() == self._text():
            return False
        self.edit.setModified(False)
        if refused:
            put_number(self.document, self.spec, self.spec.value, self._units, live=False)
        self._show_text(self._text())
        return True

    def _try(self) -> None:
        """While typing: take the number if it is one; what is not complete yet is no fault."""
        try:
            value = self._read()
        except UnitError:
            return
        if not breach_of(self.spec, value, self._units):
            self._put(value, live=True)

    def _enter(self) -> None:
        """On Enter and on leaving: take the number, or say why not."""
        self._pause.stop()
        refused = self.document.problem_at(self.spec.pointer) is not None
        if not self.edit.isModified() and not refused:
            return
        text = self.edit.text()
        try:
            value = self._read()
        except UnitError as error:
            self.document.reject(self.spec.pointer, text, str(error))
            return
        breach = breach_of(self.spec, value, self._units)
        if breach:
            self.document.reject(self.spec.pointer, text, breach)
        elif self._put(value, live=False):
            self.edit.setModified(False)
            self._unit = "" if self.spec.whole else self._units.unit(self.spec.dimension, self.spec.value)
            self._show_text(self._text())
            self._unit_label.setText(self._unit)

    def _put(self, value: float | None, live: bool) -> bool:
        refused = self.document.problem_at(self.spec.pointer) is not None
        shown = [spec.value for spec in (self.spec, *self.spec.twins) if isinstance(spec, NumberSpec)]
        if not refused and all(_same(value, one) for one in shown):
            return True
        return put_number(self.document, self.spec, value, self._units, live)

    def _read(self) -> float | None:
        """SI value of the text, `None` where it may be empty and is. Raises `UnitError`."""
        text = self.edit.text().strip()
        if not text and self.spec.empty is not None:
            return None
        if self.spec.whole:
            if not text.isdecimal():
                raise UnitError("A whole number is needed here.")
            return int(text)
        return value_of(text, self.spec.dimension, self._unit)

    def _means_the_value(self) -> bool:
        try:
            return _same(self._read(), self.spec.value)
        except UnitError:
            return False

    def _text(self) -> str:
        value = self.spec.value
        if value is None:
            return ""
        if self.spec.whole:
            return str(int(value))
        return self._units.text(value, self.spec.dimension, value, typed=not self._typical)

    def _given_text(self) -> str:
        entry = self.document.rejected.get(self.document.full_pointer(self.spec.pointer))
        given = entry.given if entry else None
        if isinstance(given, int | float):
            return self._units.text(given, self.spec.dimension, self.spec.value)
        return str(given) if given is not None else ""

    def _show_text(self, text: str) -> None:
        if self.edit.text() != text:
            self.edit.setText(text)
        self.edit.setModified(False)

    def _mark_invalid(self, invalid: bool) -> None:
        if bool(self.edit.property("invalid")) != invalid:
            self.edit.setProperty("invalid", invalid)
            self.edit.style().unpolish(self.edit)
            self.edit.style().polish(self.edit)


def _same(one: float | None, other: float | None) -> bool:
    if one is None or other is None:
        return one is other
    return isclose(one, other, rel_tol=1e-12)
