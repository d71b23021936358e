"""The fields of the dialog of gauge records."""

from __future__ import annotations

from collections.abc import Callable, Iterable

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QFormLayout,
    QFrame,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QListWidget,
    QListWidgetItem,
    QScrollArea,
    QVBoxLayout,
    QWidget,
)

from app.document import Document
from app.export.record_choices import COLUMNS, ENDINGS, RecordChoices
from app.look.fonts import widened
from app.look.spacing import GAP, SPACE
from app.units import UnitError, Units, units_of
from solver import Case

UNITS = {"si": "SI (N, Pa, m)", "project": "As on the screen", "metric": "Metric", "us": "US"}
FORMATS = {"csv": "CSV", "xlsx": "XLSX", "hdf5": "HDF5"}
#: What each choice means, for its tooltip and for "What is this?".
TELLS = {
    "Units": "SI for further computation, or those of the screen. The file names them in every heading.",
    "Sign": "Which of compression and tension is positive in force, stress, strain and waves. The file says it.",
    "Samples, kHz": "Empty: every step of the solver. With a rate, a filter against aliasing comes first, and the file "
    "names it.",
    "From": "Beginning of the window, after the blow; with a unit of its own if you like (2 ms).",
    "To": "End of the window, after the blow.",
    "Time zero": "The moment that the file calls 0.",
    "Digits": "Digits that count, 1 to 17. Empty: as many as read back to the same number.",
    "CSV": "Text, one row a sample; the lines that begin with # say what it is.",
    "XLSX": "A workbook: numbers on one sheet, what they are on another. Numbers have 16 digits.",
    "HDF5": "An open format for measurement series, read by Python, MATLAB and others; exact.",
    "Decimal comma, semicolon between columns": "As spreadsheets in many languages want it.",
    "Byte order mark for spreadsheets": "Three bytes that tell a spreadsheet that the text is UTF-8.",
}
TICKS = {
    "Cases": "Each case goes into a file of its own; it is solved first if it has to be.",
    "Gauges": "Gauges whose records are written.",
    "Columns": "What is written of each gauge, beside the time.",
}
KEY = Qt.ItemDataRole.UserRole


class _Ticks(QListWidget):
    """Names that can be ticked."""

    def __init__(self, words: Iterable[tuple[str, str]], ticked: Iterable[str] | None, name: str) -> None:
        super().__init__()
        self.setAccessibleName(name)
        chosen = None if ticked is None else set(ticked)
        for key, word in words:
            item = QListWidgetItem(" ".join(word.split())[:120], self)
            item.setData(KEY, key)
            item.setFlags(item.flags() | Qt.ItemFlag.ItemIsUserCheckable)
            on = chosen is None or key in chosen
            item.setCheckState(Qt.CheckState.Checked if on else Qt.CheckState.Unchecked)
        self.setToolTip(TICKS.get(name, ""))
        row = max(self.sizeHintForRow(0), 17)
        self.setFixedHeight(row * min(max(self.count(), 1), 6) + 10)

    def ticked(self) -> tuple[str, ...]:
        items = [self.item(row) for row in range(self.count())]
        return tuple(i.data(KEY) for i in items if i.checkState() == Qt.CheckState.Checked)

    def all_or_ticked(self) -> tuple[str, ...] | None:
        ticked = self.ticked()
        return None if len(ticked) == self.count() else ticked


class RecordsFields(QScrollArea):
    """`choices` are what the fields say; `problem` is a sentence where one of them makes no sense."""

    changed = Signal()

    def __init__(self, document: Document, kept: RecordChoices, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self.setWidgetResizable(True)
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setFixedWidth(widened(330))
        self.setFocusPolicy(Qt.FocusPolicy.NoFocus)  # what lies in it can be reached one by one
        project = document.project
        gauges = dict.fromkeys(g.name for case in project.cases for g in case.gauges)
        self.cases = _Ticks(((c.name, c.name) for c in project.cases), [document.case.name], "Cases")
        self.gauges = _Ticks(((name, name) for name in gauges), None, "Gauges")
        self.columns = _Ticks(((k, c.word.capitalize()) for k, c in COLUMNS.items()), kept.columns, "Columns")
        self.formats = {key: QCheckBox(word) for key, word in FORMATS.items()}
        for key, box in self.formats.items():
            box.setChecked(key in kept.formats)
        self.units = QComboBox()
        for key, word in UNITS.items():
            self.units.addItem(word, key)
        self.units.setCurrentIndex(self.units.findData(kept.units))
        self.sign = QComboBox()
        self.sign.addItems(["Tension positive", "Compression positive"])
        self.sign.setCurrentIndex(int(project.display_sign == "compression"))
        self.rate = QLineEdit("" if kept.rate is None else f"{kept.rate / 1000:g}")
        self.rate.setPlaceholderText("every step of the solver")
        times = units_of(project)
        self.start = QLineEdit(_time(kept.start, times))
        self.end = QLineEdit(_time(kept.end, times))
        self.zero = QLineEdit(_time(kept.zero or None, times))
        self.digits = QLineEdit("" if kept.digits is None else str(kept.digits))
        self.start.setPlaceholderText("the blow")
        self.end.setPlaceholderText("the end of the run")
        self.zero.setPlaceholderText("the blow")
        self.digits.setPlaceholderText("all that count")
        self.commas = QCheckBox("Decimal comma, semicolon between columns")
        self.commas.setChecked(kept.decimal_comma)
        self.mark = QCheckBox("Byte order mark for spreadsheets")
        self.mark.setChecked(kept.byte_order_mark)
        self.setAccessibleName("Choices of the records")
        self._explain()
        self._compose()
        self._connect()

    def _explain(self) -> None:
        for widget, meaning in (
            (self.cases, "The cases whose records are saved, each to its own file."),
            (self.gauges, "The gauges whose records are saved."),
            (self.columns, "What is written of each gauge, beside the time."),
            (self.units, "The units of all columns; each heading names its own."),
            (self.sign, "What forces, stresses, strains and waves are positive in."),
            (self.start, "The first moment that is written; empty for the blow."),
            (self.end, "The last moment that is written; empty for the end of the run."),
            (self.zero, "The moment that is written as time 0; empty for the blow."),
            (self.digits, "Digits of each number, 1 to 17; empty for all that count."),
            (self.commas, "As spreadsheets of many countries expect it."),
            (self.mark, "Three bytes at the head of a CSV by which some spreadsheets know UTF-8."),
            *((box, "A kind of file that is written.") for box in self.formats.values()),
        ):
            widget.setToolTip(meaning)

    @property
    def choices(self) -> RecordChoices:
        return self._read()[0]

    @property
    def problem(self) -> str:
        return self._read()[1]

    def chosen_cases(self) -> list[Case]:
        """Cases of the project as it is now."""
        wanted = self.cases.ticked()
        return [case for case in self._document.project.cases if case.name in wanted]

    def _read(self) -> tuple[RecordChoices, str]:
        problems: list[str] = []

        def number(field: QLineEdit, what: str, read: Callable[[str], float]) -> float | None:
            text = field.text().strip()
            try:
                return read(text) if text else None
            except (ValueError, UnitError) as error:
                told = str(error) if isinstance(error, UnitError) else f"'{text}' is no number."
                problems.append(f"{what}: {told}")
                return None

        units = units_of(self._document.project)
        rate = number(self.rate, "Sampling", lambda text: 1000 * float(text.replace(",", ".")))
        start = number(self.start, "From", lambda text: units.parse(text, "time"))
        end = number(self.end, "To", lambda text: units.parse(text, "time"))
        zero = number(self.zero, "Time zero", lambda text: units.parse(text, "time"))
        digits = number(self.digits, "Digits", lambda text: int(text))
        if digits is not None and not 1 <= digits <= 17:
            problems.append("Digits: give 1 to 17, or nothing for all that count.")
            digits = None
        columns = self.columns.ticked()
        formats = tuple(key for key, box in self.formats.items() if box.isChecked())
        for what, there in (
            ("case", self.cases.ticked()),
            ("gauge", self.gauges.ticked()),
            ("column", columns),
        ):
            if not there:
                problems.append(f"Tick at least one {what}.")
        if not formats:
            problems.append("Tick at least one kind of file.")
        choices = RecordChoices(
            cases=self.cases.all_or_ticked(),
            gauges=self.gauges.all_or_ticked(),
            columns=columns or tuple(COLUMNS),
            units=self.units.currentData(),
            compression_positive=self.sign.currentIndex() == 1,
            rate=rate,
            start=start,
            end=end,
            zero=zero or 0.0,
            digits=None if digits is None else int(digits),
            decimal_comma=self.commas.isChecked(),
            byte_order_mark=self.mark.isChecked(),
            formats=tuple(key for key in ENDINGS if key in formats) or ("csv",),
        )
        return choices, problems[0] if problems else ""

    def _compose(self) -> None:
        inside = QWidget()
        column = QVBoxLayout(inside)
        column.setContentsMargins(0, 0, SPACE, 0)
        column.setSpacing(GAP)
        for word, part in (("Cases", self.cases), ("Gauges", self.gauges), ("Columns", self.columns)):
            label = QLabel(word)
            label.setProperty("role", "strong")
            column.addWidget(label)
            column.addWidget(part)
        form = QFormLayout()
        form.setSpacing(GAP)
        self._name_rows(form)
        column.addLayout(form)
        kinds = QHBoxLayout()
        kinds.addWidget(QLabel("Files"))
        for box in self.formats.values():
            kinds.addWidget(box)
        kinds.addStretch(1)
        column.addLayout(kinds)
        column.addWidget(self.commas)
        column.addWidget(self.mark)
        column.addStretch(1)
        self.setWidget(inside)

    def _name_rows(self, form: QFormLayout) -> None:
        named: tuple[tuple[str, QWidget], ...] = (
            ("Units", self.units),
            ("Sign", self.sign),
            ("Samples, kHz", self.rate),
            ("From", self.start),
            ("To", self.end),
            ("Time zero", self.zero),
            ("Digits", self.digits),
        )
        time = units_of(self._document.project).unit("time")
        for word, field in named:
            field.setAccessibleName(word)
            field.setToolTip(TELLS[word])
            label = QLabel(f"{word}, {time}" if field in (self.start, self.end, self.zero) else word)
            label.setBuddy(field)
            label.setToolTip(TELLS[word])
            form.addRow(label, field)
        for box in (*self.formats.values(), self.commas, self.mark):
            box.setToolTip(TELLS[box.text()])

    def _connect(self) -> None:
        for ticks in (self.cases, self.gauges, self.columns):
            ticks.itemChanged.connect(lambda _item: self.changed.emit())
        for box in (*self.formats.values(), self.commas, self.mark):
            box.clicked.connect(lambda _on: self.changed.emit())
        for choice in (self.units, self.sign):
            choice.activated.connect(lambda _i: self.changed.emit())
        for field in (self.rate, self.start, self.end, self.zero, self.digits):
            field.textEdited.connect(lambda _t: self.changed.emit())


def _time(value: float | None, units: Units) -> str:
    return "" if value is None else f"{units.text(value, 'time')} {units.unit('time')}"
