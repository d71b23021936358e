"""What the report holds, as fields: everything typed here is an edit of the project, with undo."""

from __future__ import annotations

from dataclasses import replace
from datetime import datetime
from pathlib import Path
from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtGui import QFocusEvent
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QFileDialog,
    QFormLayout,
    QFrame,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QPlainTextEdit,
    QPushButton,
    QScrollArea,
    QVBoxLayout,
    QWidget,
)

from app.document import Document
from app.look.fonts import widened
from app.look.spacing import GAP, OUTLINE_WIDTH, SPACE
from app.report.choices import (
    DATES,
    FIGURES,
    KEY,
    PARTICULARS,
    SECTIONS,
    ReportChoices,
    report_choices,
    written_date,
)
from app.report.screen.ordered_list import OrderedList

#: What the choices are for.
MEANINGS = {
    "Paper": "Size of the pages of the PDF.",
    "Dates": "How dates are written.",
    "Section of the own paragraph": "The section that begins with a paragraph of your own.",
    "Own paragraph": "A paragraph of your own, at the head of the section chosen above.",
    "Logo": "A picture for the title page, by its name beside the project's file.",
}


class _OwnWords(QPlainTextEdit):
    """Takes a paragraph; hands it over when it is left."""

    def __init__(self, form: ChoicesForm) -> None:
        super().__init__(form)
        self._form = form
        self.setFixedHeight(84)
        self.setTabChangesFocus(True)

    def focusOutEvent(self, event: QFocusEvent) -> None:
        super().focusOutEvent(event)
        self._form.take_words()


class ChoicesForm(QScrollArea):
    """Derived from the project; keeps nothing."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self.setAccessibleName("Choices of the report")
        self.setWidgetResizable(True)
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setFixedWidth(widened(OUTLINE_WIDTH + 24))
        self.sections = OrderedList(SECTIONS, "Sections", self)
        self.figures = OrderedList(FIGURES, "Figures", self)
        self.particulars = {key: QLineEdit(self) for key in PARTICULARS}
        self.logo = QLineEdit(self)
        self.logo.setPlaceholderText("PNG or JPEG, beside the project")
        self.choose = QPushButton("Choose…", self)
        self.choose.setAccessibleName("Choose a logo")
        self.choose.setToolTip("A PNG or JPEG file for the title page; kept by its name, not copied.")
        self.paper = QComboBox(self)
        self.paper.addItems(["A4", "Letter"])
        self.dates = QComboBox(self)
        self.commas = QCheckBox("Decimal comma", self)
        self.mesh_check = QCheckBox("Check on a finer mesh", self)
        self.mesh_check.setToolTip(
            "Solves every case once more, on elements half as long: about four times the work"
        )
        self.opens = QComboBox(self)
        self.words = _OwnWords(self)
        self._fill()
        self._compose()
        self._connect()
        self.follow()

    @property
    def choices(self) -> ReportChoices:
        return report_choices(self._document.project.studies)

    def _fill(self) -> None:
        for way in DATES:
            self.dates.addItem(written_date(datetime(2026, 12, 1), way), way)
        for key, word in SECTIONS.items():
            self.opens.addItem(word, key)
        named: tuple[tuple[QWidget, str], ...] = (
            (self.paper, "Paper"),
            (self.dates, "Dates"),
            (self.opens, "Section of the own paragraph"),
            (self.words, "Own paragraph"),
            (self.logo, "Logo"),
        )
        for widget, name in named:
            widget.setAccessibleName(name)
            widget.setToolTip(MEANINGS[name])
        for key, field in self.particulars.items():
            field.setAccessibleName(PARTICULARS[key])
            field.setToolTip("Stands on the title page, where it is given.")
        self.commas.setToolTip("Numbers are written as 12,5 instead of 12.5.")

    def _compose(self) -> None:
        inside = QWidget()
        inside.setProperty("role", "paper")
        column = QVBoxLayout(inside)
        column.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        column.setSpacing(GAP)

        def part(text: str) -> None:
            label = QLabel(text)
            label.setProperty("role", "strong")
            label.setContentsMargins(0, SPACE, 0, 0)
            column.addWidget(label)

        part("Title page")
        form = QFormLayout()
        form.setSpacing(GAP)
        for key, field in self.particulars.items():
            form.addRow(PARTICULARS[key], field)
        logo = QHBoxLayout()
        logo.setSpacing(GAP)
        logo.addWidget(self.logo, 1)
        logo.addWidget(self.choose)
        form.addRow("Logo", logo)
        column.addLayout(form)
        part("Sections")
        column.addWidget(self.sections)
        part("Figures")
        column.addWidget(self.figures)
        part("Own paragraph at the head of")
        column.addWidget(self.opens)
        column.addWidget(self.words)
        part("Pages")
        pages = QFormLayout()
        pages.setSpacing(GAP)
        pages.addRow("Paper", self.paper)
        pages.addRow("Dates", self.dates)
        column.addLayout(pages)
        column.addWidget(self.commas)
        column.addWidget(self.mesh_check)
        column.addStretch(1)
        self.setWidget(inside)

    def _connect(self) -> None:
        for key, field in self.particulars.items():
            field.editingFinished.connect(lambda key=key: self._take_particular(key))
        self.choose.clicked.connect(self._choose_logo)
        self.logo.editingFinished.connect(lambda: self._change("the logo", logo=self.logo.text().strip()))
        self.sections.chosen_changed.connect(
            lambda: self._change("the sections", sections=self.sections.chosen)
        )
        self.figures.chosen_changed.connect(lambda: self._change("the figures", figures=self.figures.chosen))
        self.paper.activated.connect(lambda _i: self._change("the paper", paper=self.paper.currentText()))
        self.dates.activated.connect(lambda _i: self._change("the dates", dates=self.dates.currentData()))
        self.commas.clicked.connect(lambda on: self._change("the decimals", decimal_comma=on))
        self.mesh_check.clicked.connect(lambda on: self._change("the mesh check", mesh_check=on))
        self.opens.activated.connect(lambda _i: self.follow())
        self._document.changed.connect(self.follow)

    def _choose_logo(self) -> None:
        start = self._document.folder or Path.home()
        chosen, _ = QFileDialog.getOpenFileName(self, "Logo", str(start), "Pictures (*.png *.jpg *.jpeg)")
        if chosen:
            self.take_logo(Path(chosen))

    def take_logo(self, path: Path) -> None:
        """The picture, by its name beside the project where it lies there."""
        folder = self._document.folder
        inside = folder is not None and path.is_relative_to(folder)
        name = path.relative_to(folder).as_posix() if inside and folder else str(path)
        self._change("the logo", logo=name)

    def take_words(self) -> None:
        """Hand over the own paragraph, where it has changed."""
        key = self.opens.currentData()
        text = self.words.toPlainText().strip()
        if text != self.choices.words.get(key, ""):
            self._change("an own paragraph", words={**self.choices.words, key: text})

    def _take_particular(self, key: str) -> None:
        self.particulars[key].setModified(False)
        text = self.particulars[key].text().strip()
        self._change(PARTICULARS[key].lower(), particulars={**self.choices.particulars, key: text})

    def _change(self, what: str, **changes: Any) -> None:
        before = self.choices
        tree = replace(before, **changes).to_tree()
        if tree == before.to_tree():
            return

        def put(whole: dict[str, Any]) -> None:
            studies = {k: v for k, v in (whole.get("studies") or {}).items() if k != KEY}
            if tree:
                studies[KEY] = tree
            if studies:
                whole["studies"] = studies
            else:
                whole.pop("studies", None)

        self._document.edit_tree(f"Change {what} of the report", put)

    def follow(self) -> None:
        """Show what the project says."""
        choices = self.choices
        self.sections.show_chosen(choices.sections)
        self.figures.show_chosen(choices.figures)
        for key, field in self.particulars.items():
            _show(field, choices.particulars.get(key, ""))
        _show(self.logo, choices.logo)
        self.paper.setCurrentText(choices.paper)
        self.dates.setCurrentIndex(self.dates.findData(choices.dates))
        self.commas.setChecked(choices.decimal_comma)
        self.mesh_check.setChecked(choices.mesh_check)
        own = choices.words.get(self.opens.currentData(), "")
        if not self.words.hasFocus() and self.words.toPlainText() != own:
            self.words.setPlainText(own)


def _show(field: QLineEdit, text: str) -> None:
    if field.text() != text and not (field.hasFocus() and field.isModified()):
        field.setText(text)
