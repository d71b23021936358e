"""Rows for what is not known: each input with the factors between which it lies."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from PySide6.QtCore import Signal
from PySide6.QtWidgets import QComboBox, QLabel, QVBoxLayout, QWidget

from app.look.fonts import widened
from app.look.spacing import GAP
from app.set_sheet.fields import NumbersField
from app.units import Units
from solver import Case
from solver.studies.unknowns import INPUTS, Unknown, What, usual_unknowns

SPREADS = {"uniform": "all of each range alike", "likely": "nine of ten in it, most in the middle"}


class Ranges(QWidget):
    """`edited` carries the unknowns as plain entries of the project, `None` = the usual ones."""

    edited = Signal(object)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._case: Case | None = None
        self._given: tuple[Unknown, ...] | None = None
        lead = QLabel("Each input times a factor between two; 1 alone = it is known.")
        lead.setProperty("role", "small")
        lead.setWordWrap(True)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(GAP)
        column.addWidget(lead)
        self.rows: dict[What, NumbersField] = {}
        for what, entry in INPUTS.items():
            row = NumbersField(
                entry.label.capitalize(),
                "Two factors, 1 = as the case says; empty = the usual range.",
                most=2,
            )
            row.field.setFixedWidth(widened(96))
            row.entered.connect(lambda values, what=what: self._enter(what, values))
            self.rows[what] = row
            column.addWidget(row)
        self.spread = QComboBox()
        self.spread.setAccessibleName("How values are spread over a range")
        for key, words in SPREADS.items():
            self.spread.addItem(words, key)
        self.spread.activated.connect(lambda _i: self._tell(self._now(), self.spread.currentData()))
        column.addWidget(self.spread)

    def show_ranges(self, case: Case, given: tuple[Unknown, ...] | None) -> None:
        """Ranges of the project, or the usual ones of the case as pale text."""
        self._case, self._given = case, given
        usual = {u.what: u for u in usual_unknowns(case)}
        chosen = {u.what: u for u in given or ()}
        for what, row in self.rows.items():
            row.setVisible(INPUTS[what].present(case))
            values: tuple[float, ...] | None = None
            if given is not None:
                values = (chosen[what].low, chosen[what].high) if what in chosen else (1.0,)
            pale = (usual[what].low, usual[what].high) if what in usual else ()
            row.show_values(values, pale, "none", Units())
        spread = given[0].spread if given else "uniform"
        index = self.spread.findData(spread)
        if index != self.spread.currentIndex():
            self.spread.setCurrentIndex(index)

    def _now(self) -> dict[What, tuple[float, float]]:
        assert self._case is not None
        shown: Sequence[Unknown] = usual_unknowns(self._case) if self._given is None else self._given
        return {u.what: (u.low, u.high) for u in shown}

    def _enter(self, what: What, values: tuple[float, ...]) -> None:
        assert self._case is not None
        ranges = self._now()
        usual = {u.what: (u.low, u.high) for u in usual_unknowns(self._case)}
        if not values:
            ranges[what] = usual[what]
        elif len(values) == 1 and values[0] == 1:
            ranges.pop(what, None)
        elif len(values) == 2 and 0 < values[0] < values[1]:
            ranges[what] = (values[0], values[1])
        else:
            self.rows[what].refuse(
                "Give two factors above 0, the smaller first, such as 0.7 1.5; or 1 alone."
            )
            return
        if not ranges:
            self.rows[what].refuse("At least one input must have a range.")
            return
        self._tell(ranges, self.spread.currentData())

    def _tell(self, ranges: dict[What, tuple[float, float]], spread: str) -> None:
        assert self._case is not None
        usual = {u.what: (u.low, u.high) for u in usual_unknowns(self._case)}
        if ranges == usual and spread == "uniform":
            self.edited.emit(None)
            return
        entries: list[dict[str, Any]] = [
            {"what": what, "low": ranges[what][0], "high": ranges[what][1], "spread": spread}
            for what in INPUTS
            if what in ranges
        ]
        self.edited.emit(entries)
