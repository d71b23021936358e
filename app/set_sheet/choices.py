"""The column beside the chart: what is varied, the questions and their answers, what is not known."""

from __future__ import annotations

from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtGui import QShowEvent
from PySide6.QtWidgets import QComboBox, QHBoxLayout, QLabel, QPushButton, QScrollArea, QVBoxLayout, QWidget

from app.document import Document
from app.look.fonts import widened
from app.look.spacing import GAP, SPACE, WIDE
from app.set_sheet.answer_words import largest_words, sampled_words, shown_words
from app.set_sheet.depth_choices import DepthChoices
from app.set_sheet.fields import NumbersField
from app.set_sheet.numbers_to_vary import numbers_to_vary
from app.set_sheet.ranges import Ranges
from app.set_sheet.sheet_solution import SheetSolution
from app.set_sheet.words import PER, beside_criterion, criterion, per_of
from app.units import Units, units_of
from solver.studies import resistance_of
from solver.studies.plan import blow_pointer
from solver.studies.settings import SheetSettings

#: The column's width; wide enough for a sentence.
WIDTH = 312
SAMPLES = (200, 1000, 2000, 5000)
VARY = {"all": "Shaft and toe together", "toe": "Toe alone"}


class Choices(QScrollArea):
    """Shows and edits `/studies/set_sheet`, and tells the answers."""

    def __init__(self, document: Document, solution: SheetSolution, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._solution = document, solution
        self.setAccessibleName("Choices of the set sheet")
        self.setFixedWidth(widened(WIDTH))
        self.setWidgetResizable(True)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.lowest = NumbersField(
            "Resistance from", "Lowest total resistance; empty = chosen from the case."
        )
        self.highest = NumbersField("to", "Highest total resistance; empty = chosen from the case.")
        self.vary = _list("What of the resistance is varied", list(VARY.items()))
        self.pointer = _list("What the lines differ in", [])
        self.values = NumbersField("Values", "Up to four values, one line each, apart by spaces.", most=4)
        self.per = _list("What blows are counted for", [(p, f"Blows per {p}") for p in PER])
        self.resistance = NumbersField("Resistance to reach", "Empty = that of the case.")
        self.value = NumbersField("with", "The blow to drive with; empty = that of the case.")
        self.largest, self.stop_at, self.beside, self.shown, self.samples_told = (
            _sentence() for _ in range(5)
        )
        self.stop_at.setProperty("role", "strong")
        self.measured = NumbersField("Measured set", "Mean set of the last blows, measured on site.")
        self.error = NumbersField("± reading error", "How far the mean set may be off.")
        self.samples = _list("How many samples", [(n, f"{n} samples") for n in SAMPLES])
        self.work_out = QPushButton("Work out")
        self.ranges = Ranges()
        self.to_depth = DepthChoices(document)
        self._compose()
        self._connect()
        document.changed.connect(self.follow)
        solution.changed.connect(self.follow)
        self.follow()

    def _compose(self) -> None:
        inside = QWidget()
        inside.setProperty("role", "clear")
        column = QVBoxLayout(inside)
        column.setContentsMargins(SPACE, GAP, WIDE, SPACE)
        column.setSpacing(GAP)
        run = QHBoxLayout()
        run.addWidget(self.samples, 1)
        run.addWidget(self.work_out)
        for title, parts in (
            ("What is varied", (self.lowest, self.highest, self.vary, self.pointer, self.values, self.per)),
            ("What set to stop at", (self.resistance, self.value, self.stop_at, self.beside, self.largest)),
            ("What a measured set shows", (self.measured, self.error, self.shown)),
            ("Down to depth", (self.to_depth,)),
            ("What is not known", (self.ranges, run, self.samples_told)),
        ):
            heading = QLabel(title)
            heading.setProperty("role", "title")
            column.addWidget(heading)
            for part in parts:
                if isinstance(part, QHBoxLayout):
                    column.addLayout(part)
                else:
                    column.addWidget(part)
            column.addSpacing(SPACE)
        column.addStretch(1)
        self.setWidget(inside)
        self.viewport().setAutoFillBackground(False)

    def _connect(self) -> None:
        for field, key in (
            (self.lowest, "lowest"),
            (self.highest, "highest"),
            (self.resistance, "asked_resistance"),
            (self.value, "asked_value"),
            (self.measured, "measured_set"),
        ):
            field.entered.connect(lambda given, key=key: self._set(key, given[0] if given else None))
        self.error.entered.connect(lambda given: self._set("reading_error", given[0] if given else None))
        self.values.entered.connect(lambda given: self._set("values", list(given) or None))
        self.vary.activated.connect(lambda _i: self._set("vary", self.vary.currentData()))
        self.per.activated.connect(lambda _i: self._set("per", self.per.currentData()))
        self.pointer.activated.connect(lambda _i: self._choose_pointer())
        self.samples.activated.connect(lambda _i: self._set("samples", self.samples.currentData()))
        self.ranges.edited.connect(lambda unknowns: self._set("unknowns", unknowns))
        self.work_out.clicked.connect(self._sample)

    # -- edits --------------------------------------------------------------------------------------------------------

    def _set(self, key: str, value: Any) -> None:
        self._edit({key: value})

    def _choose_pointer(self) -> None:
        chosen = self.pointer.currentData()
        own = blow_pointer(self._document.case)
        self._edit({"pointer": None if chosen == own else chosen, "values": None, "asked_value": None})

    def _edit(self, changes: dict[str, Any]) -> None:
        current = self._solution.settings.model_dump(mode="json")
        if all(current[key] == value for key, value in changes.items()):
            return

        def change(tree: dict[str, Any]) -> None:
            studies = tree.get("studies") or {}
            sheet = {**studies.get("set_sheet", {}), **changes}
            kept = {k: v for k, v in sheet.items() if v is not None}
            others = {k: v for k, v in studies.items() if k != "set_sheet"}
            tree["studies"] = ({**others, "set_sheet": kept} if kept else others) or None

        self._document.edit_tree("Change the set sheet", change)

    def _sample(self) -> None:
        if self._solution.samples_done is None:
            self._solution.sample()
        else:
            self._solution.stop_samples()

    # -- following ----------------------------------------------------------------------------------------------------

    def showEvent(self, event: QShowEvent) -> None:
        super().showEvent(event)
        self.follow()

    def follow(self) -> None:
        """Show what the project and the answers say; a field that is being typed in is left alone."""
        if not self.isVisible():
            return
        case, settings, plan = self._document.case, self._solution.settings, self._solution.plan
        units = units_of(self._document.project)
        ends = (plan.resistances[:1], plan.resistances[-1:]) if plan else ((), ())
        own = [resistance_of(case).total] if case.ground else []
        self.lowest.show_values(_one(settings.lowest), ends[0], "force", units)
        self.highest.show_values(_one(settings.highest), ends[1], "force", units)
        self.resistance.show_values(_one(settings.asked_resistance), own, "force", units)
        self.measured.show_values(_one(settings.measured_set), (), "small_length", units)
        usual_error = SheetSettings().reading_error
        error = settings.reading_error
        self.error.show_values(
            None if error == usual_error else (error,), (usual_error,), "small_length", units
        )
        _choose(self.vary, settings.vary)
        _choose(self.per, per_of(units, settings.per))
        _choose(self.samples, settings.samples)
        self.ranges.show_ranges(case, settings.unknowns)
        self._follow_pointer(settings.pointer or blow_pointer(case))
        if plan is not None:
            first = plan.own_level
            usual = sorted(level.value for level in plan.levels)
            self.values.show_values(settings.values, usual, first.dimension, units)
            self.value.label.setText(f"with a {first.label[:1].lower()}{first.label[1:]} of")
            self.value.show_values(_one(settings.asked_value), [first.value], first.dimension, units)
        self._answers(units)

    def _follow_pointer(self, pointer: str | None) -> None:
        wanted = numbers_to_vary(self._document.case)
        has = [(self.pointer.itemData(i), self.pointer.itemText(i)) for i in range(self.pointer.count())]
        if wanted != has:
            self.pointer.clear()
            for place, words in wanted:
                self.pointer.addItem(words, place)
        _choose(self.pointer, pointer)

    def _answers(self, units: Units) -> None:
        solution, answers = self._solution, self._solution.answers
        asking = solution.state in ("solving", "answering")
        _say(self.stop_at, criterion(answers.stop_at, units) if answers.stop_at else "…" if asking else "")
        _say(self.beside, beside_criterion(answers.stop_at, units) if answers.stop_at else "")
        largest = ""
        if answers.largest is not None and answers.stop_at is not None:
            largest = largest_words(answers.largest, answers.stop_at, units)
        _say(self.largest, largest or ("…" if asking else ""))
        asked = solution.settings.measured_set is not None
        shown = shown_words(answers.shown, units) if answers.shown else "…" if asking and asked else ""
        _say(self.shown, shown)
        sampled, done = solution.sampled, solution.samples_done
        self.work_out.setText("Work out" if done is None else "Stop")
        self.work_out.setEnabled(solution.plan is not None)
        if done is not None:
            _say(self.samples_told, f"{done} samples are solved …")
        elif sampled is not None:
            _say(self.samples_told, sampled_words(sampled, units))
        else:
            _say(
                self.samples_told,
                "Quakes, damping, energy, cushion and the toe's share, each in a wide range.",
            )


def _one(value: float | None) -> tuple[float, ...] | None:
    return None if value is None else (value,)


def _sentence() -> QLabel:
    label = QLabel()
    label.setWordWrap(True)
    label.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
    return label


def _say(label: QLabel, text: str) -> None:
    if label.text() != text:
        label.setText(text)
    label.setVisible(bool(text))


def _list(name: str, entries: list[tuple[Any, str]]) -> QComboBox:
    box = QComboBox()
    box.setAccessibleName(name)
    box.setToolTip(name)
    box.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
    for data, words in entries:
        box.addItem(words, data)
    return box


def _choose(box: QComboBox, data: Any) -> None:
    index = box.findData(data)
    if index >= 0 and index != box.currentIndex():
        box.setCurrentIndex(index)
