"""Fields of the set sheet: one number, or a row of numbers, in the shown unit or with their own."""

from __future__ import annotations

import re
from collections.abc import Sequence

from PySide6.QtCore import Signal
from PySide6.QtWidgets import QHBoxLayout, QLabel, QLineEdit, QVBoxLayout, QWidget

from app.look.fonts import widened
from app.look.spacing import GAP
from app.units import UnitError, Units


class NumbersField(QWidget):
    """A label, a field and a line for what is wrong with it. `entered` carries SI numbers, none where it was emptied:
    then the program chooses, and shows what it chose as a pale text."""

    entered = Signal(tuple)

    def __init__(self, label: str, tells: str, most: int = 1, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._most, self._dimension, self._units = most, "none", Units()
        self._shown: tuple[float, ...] = ()
        self.label = QLabel(label)
        self.label.setWordWrap(True)
        self.field = QLineEdit()
        self.field.setAccessibleName(label)
        self.field.setToolTip(tells)
        self.field.setFixedWidth(widened(124 if most > 1 else 96))
        self.label.setBuddy(self.field)
        self.unit = QLabel()
        self.unit.setProperty("role", "soft")
        self.unit.setFixedWidth(widened(34))
        self.problem = QLabel()
        self.problem.setProperty("role", "problem")
        self.problem.setWordWrap(True)
        self.problem.hide()
        row = QHBoxLayout()
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(GAP)
        row.addWidget(self.label, 1)
        row.addWidget(self.field)
        row.addWidget(self.unit)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addLayout(row)
        column.addWidget(self.problem)
        self.field.editingFinished.connect(self._enter)

    def show_values(
        self,
        values: Sequence[float] | None,
        usual: Sequence[float],
        dimension: str,
        units: Units,
        pale: str | None = None,
    ) -> None:
        """What is chosen (SI), or `None` and what the program takes, in words of its own where `pale` gives them; a
        text that is being typed stays."""
        self._dimension, self._units = dimension, units
        self._shown = tuple(values or ())
        self.unit.setText(units.unit(dimension))
        text = self._text(values or ())
        pale = self._text(usual, typed=False) if pale is None else pale
        if self.field.placeholderText() != pale:
            self.field.setPlaceholderText(pale)
        if not self.field.hasFocus() and self.field.text() != text and not self.problem.isVisibleTo(self):
            self.field.setText(text)

    def refuse(self, sentence: str) -> None:
        """Say under the field what is wrong with what was entered."""
        self._tell(sentence)

    def _text(self, values: Sequence[float], typed: bool = True) -> str:
        return "  ".join(self._units.plain(value, self._dimension, typed=typed) for value in values)

    def _enter(self) -> None:
        text = self.field.text().strip()
        if text == self._text(self._shown):
            return self._tell("")
        try:
            values = tuple(self._units.parse(part, self._dimension) for part in parts_of(text))
        except UnitError as error:
            return self._tell(str(error))
        if len(values) > self._most:
            return self._tell(f"Up to {self._most} numbers, not {len(values)}.")
        self._tell("")
        self.entered.emit(values)

    def _tell(self, sentence: str) -> None:
        self.problem.setText(sentence)
        self.problem.setVisible(bool(sentence))


def parts_of(text: str) -> list[str]:
    """Numbers with or without units, apart by spaces, semicolons, or a comma with a space after it."""
    return [p for p in re.split(r"\s*;\s*|,\s+|\s{1,}(?=[-+\d.,])", text.strip()) if p]
