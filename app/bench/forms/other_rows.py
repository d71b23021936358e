"""Fields for texts, choices, switches and the points of a history."""

from __future__ import annotations

from PySide6.QtCore import QPoint, QPointF, QRectF, Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QPainter, QPaintEvent, QPen, QWheelEvent
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QHBoxLayout,
    QLineEdit,
    QPushButton,
    QStyle,
    QStyleOptionComboBox,
    QStylePainter,
    QToolButton,
    QWidget,
)

from app.bench.forms.commit import put_check, put_choice, put_text
from app.bench.forms.field_row import FieldRow
from app.bench.forms.picker import PartPicker
from app.bench.forms.points import ask_for_points, link_points, paste_points
from app.bench.forms.spec import CheckSpec, ChoiceSpec, PointsSpec, TextSpec
from app.document import Document
from app.look import icon, pixmap
from app.look.palette import palette
from app.look.spacing import FIELD, GAP, ICON, SPACE
from app.units import Units


class TextEdit(QLineEdit):
    """Escape gives the text back that the project has."""

    def __init__(self, row: TextRow) -> None:
        super().__init__(row)
        self._row = row

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Escape and self._row.give_back():
            event.accept()
        else:
            super().keyPressEvent(event)


class TextRow(FieldRow):
    """A line of text, taken on Enter and on leaving."""

    def __init__(self, document: Document, spec: TextSpec, parent: QWidget | None = None) -> None:
        super().__init__(document, spec, parent)
        self.spec: TextSpec = spec
        self.edit = TextEdit(self)
        self.put_editor(self.edit)
        self._grid.addWidget(self.edit, 0, 1, 1, 2)
        self.edit.editingFinished.connect(self._enter)

    def show_value(self, units: Units, refused: bool) -> None:
        typing = self.edit.hasFocus() and self.edit.isModified()
        value = self.spec.value or ""
        if not refused and not typing and self.edit.text() != value:
            self.edit.setText(value)
            self.edit.setCursorPosition(0)
        if bool(self.edit.property("invalid")) != refused:
            self.edit.setProperty("invalid", refused)
            self.edit.style().unpolish(self.edit)
            self.edit.style().polish(self.edit)

    def give_back(self) -> bool:
        """Drop what was typed; False where there is nothing to drop."""
        refused = self.document.problem_at(self.spec.pointer) is not None
        if not refused and self.edit.text() == (self.spec.value or ""):
            return False
        self.edit.setText(self.spec.value or "")
        if refused:
            put_text(self.document, self.spec, self.spec.value or "")
        return True

    def _enter(self) -> None:
        if self.edit.isModified() and put_text(self.document, self.spec, self.edit.text()):
            self.edit.setModified(False)


class ChoiceBox(QComboBox):
    """Does not change when the wheel turns over it: the outline scrolls instead."""

    def wheelEvent(self, event: QWheelEvent) -> None:
        event.ignore()

    def showPopup(self) -> None:
        """The list is as wide as its words, also where the box is not."""
        room = self.view().sizeHintForColumn(0) + 2 * SPACE
        self.view().setMinimumWidth(max(self.width(), room))
        super().showPopup()

    def paintEvent(self, event: QPaintEvent) -> None:
        """As drawn by the style, with a word that is too long elided instead of cut."""
        option = QStyleOptionComboBox()
        self.initStyleOption(option)
        room = self.style().subControlRect(
            QStyle.ComplexControl.CC_ComboBox, option, QStyle.SubControl.SC_ComboBoxEditField, self
        )
        word = self.fontMetrics().elidedText(
            option.currentText, Qt.TextElideMode.ElideRight, room.width() - GAP
        )
        painter = QStylePainter(self)
        with painter:  # ended also where something raises: Qt crashes otherwise
            painter.drawComplexControl(QStyle.ComplexControl.CC_ComboBox, option)
            option.currentText = word
            painter.drawControl(QStyle.ControlElement.CE_ComboBoxLabel, option)


class ChoiceRow(FieldRow):
    """A choice, with a button for parts of the library where there are any for it."""

    def __init__(self, document: Document, spec: ChoiceSpec, parent: QWidget | None = None) -> None:
        super().__init__(document, spec, parent)
        self.spec: ChoiceSpec = spec
        self.box = ChoiceBox(self)
        self.box.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        self.box.setMinimumContentsLength(4)
        self.put_editor(self.box)
        for option in spec.options:
            self.box.addItem(option.word, option.key)
            self.box.setItemData(
                self.box.count() - 1, option.tells or option.word, Qt.ItemDataRole.ToolTipRole
            )
        holder = QHBoxLayout()
        holder.setSpacing(GAP)
        holder.addWidget(self.box, 1)
        if spec.pick:
            holder.addWidget(self._pick_button())
        self._grid.addLayout(holder, 0, 1, 1, 2)
        self.box.activated.connect(self._chosen)

    #: A choice that changes only what the form shows: its name and the key chosen.
    view_chosen = Signal(str, str)

    def show_value(self, units: Units, refused: bool) -> None:
        index = self.box.findData(self.spec.value)
        if index != self.box.currentIndex():
            self.box.setCurrentIndex(index)

    def _chosen(self, index: int) -> None:
        key = self.box.itemData(index)
        if self.spec.view:
            self.view_chosen.emit(self.spec.view, key)
        elif key != self.spec.value:
            fault = put_choice(self.document, self.spec, key)
            if fault:
                self.box.setCurrentIndex(self.box.findData(self.spec.value))
                self.show_problem(fault)

    def _pick_button(self) -> QToolButton:
        button = QToolButton(self)
        button.setProperty("role", "quiet")
        button.setIcon(icon("more"))
        button.setFixedHeight(FIELD)
        button.setToolTip("Choose from the parts library")
        button.setAccessibleName(f"{self.spec.label}: choose from the parts library")
        button.clicked.connect(self._pick)
        return button

    def _pick(self) -> None:
        assert self.spec.pick is not None
        PartPicker(self.document, self.spec.pick, self.spec.pick_at, self).open_at(self.box)


class SwitchBox(QCheckBox):
    """A box whose frame can be seen on light and on dark paper."""

    def paintEvent(self, event: QPaintEvent) -> None:
        colours = palette()
        box = QRectF(1, (self.height() - ICON) / 2, ICON, ICON)
        frame = QPen(QColor(colours.accent if self.hasFocus() else colours.line), 2 if self.hasFocus() else 1)
        tick = pixmap("within", ICON - 4, colours.ink, self.devicePixelRatioF())
        with QPainter(self) as painter:
            painter.setRenderHint(QPainter.RenderHint.Antialiasing)
            painter.setPen(frame)
            painter.setBrush(QColor(colours.raised))
            painter.drawRoundedRect(box, 3, 3)
            if self.isChecked():
                painter.drawPixmap(QPointF(box.x() + 2, box.y() + 2), tick)

    def hitButton(self, pos: QPoint) -> bool:
        """Anywhere in the field, as there is no word beside the box."""
        return self.rect().contains(pos)


class CheckRow(FieldRow):
    """Yes or no."""

    def __init__(self, document: Document, spec: CheckSpec, parent: QWidget | None = None) -> None:
        super().__init__(document, spec, parent)
        self.spec: CheckSpec = spec
        self.box = SwitchBox(self)
        self.box.setMinimumHeight(FIELD)
        self.put_editor(self.box)
        self.box.clicked.connect(lambda on: put_check(document, self.spec, on))

    def show_value(self, units: Units, refused: bool) -> None:
        if self.box.isChecked() != self.spec.value:
            self.box.setChecked(self.spec.value)


class PointsRow(FieldRow):
    """How many points a history has; paste from the clipboard, copy from a file, or link a file."""

    def __init__(self, document: Document, spec: PointsSpec, parent: QWidget | None = None) -> None:
        super().__init__(document, spec, parent)
        self.spec: PointsSpec = spec
        holder = QWidget(self)
        row = QHBoxLayout(holder)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(GAP)
        self.paste = QPushButton("Paste", holder)
        self.paste.setToolTip(f"Paste two columns. {spec.tells}")
        self.paste.clicked.connect(lambda: paste_points(document, self.spec.pointer))
        self.read = QPushButton("File…", holder)
        self.read.setToolTip(f"Copy the points of a CSV file into the project. {spec.tells}")
        self.read.clicked.connect(lambda: ask_for_points(document, self.spec.pointer, self))
        self.link = QPushButton("Link…", holder)
        self.link.setToolTip("Keep the points in their CSV file, and name it in the project.")
        self.link.clicked.connect(lambda: link_points(document, self.spec.pointer, self))
        for button in (self.paste, self.read, self.link):
            button.setAccessibleName(f"{spec.label}: {button.text().rstrip('…').lower()}")
            row.addWidget(button)
        self.put_editor(holder)
        self._grid.addWidget(holder, 0, 1, 1, 2)
        self._editor = self.paste

    def show_value(self, units: Units, refused: bool) -> None:
        self.label.setText(f"{self.spec.count} points")
