"""The top bar: menus, title, undo and redo, cases, state, sign, units."""

from __future__ import annotations

from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QAction, QKeyEvent, QPaintEvent
from PySide6.QtWidgets import (
    QHBoxLayout,
    QLineEdit,
    QPushButton,
    QSizePolicy,
    QStyle,
    QStyleOptionFrame,
    QStylePainter,
    QToolButton,
    QWidget,
)

from app.document import Document
from app.frame.case_row import CaseRow
from app.frame.state_view import StateView
from app.frame.units_menu import SYSTEM_WORDS, UnitsMenu
from app.look.spacing import GAP, ROW, SPACE
from app.sight import Sight
from app.solving import Solution
from app.units import units_of

#: Pixels that the title keeps at all sizes, and beside cases that need the room.
LEAST_TITLE, USUAL_TITLE = 80, 170


class TitleField(QLineEdit):
    """The project's title, typed in place."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self.setProperty("role", "title")
        self.setPlaceholderText("Untitled project")
        self.setAccessibleName("Title of the project")
        self.setToolTip("Title of the project; click to change it")
        self.editingFinished.connect(self._commit)
        document.changed.connect(self._follow)
        self._follow()

    def paintEvent(self, event: QPaintEvent) -> None:
        """While nothing is typed, a title that is too long ends in dots instead of being cut."""
        room = self.rect().adjusted(SPACE, 0, -SPACE, 0)
        shown = self.fontMetrics().elidedText(self.text(), Qt.TextElideMode.ElideRight, room.width())
        if self.hasFocus() or shown == self.text():
            super().paintEvent(event)
            return
        option = QStyleOptionFrame()
        self.initStyleOption(option)
        painter = QStylePainter(self)
        with painter:
            painter.drawPrimitive(QStyle.PrimitiveElement.PE_PanelLineEdit, option)
            painter.setPen(self.palette().text().color())
            painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, shown)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Escape:
            self.setText(self._document.project.title)
            self.clearFocus()
        else:
            super().keyPressEvent(event)

    def _commit(self) -> None:
        text = self.text().strip()
        if text != self._document.project.title:
            self._document.edit("Change the title", "/title", text)

    def _follow(self) -> None:
        if not self.isModified() or not self.hasFocus():
            shown = " ".join(self._document.project.title.split())
            if self.text() != shown:
                self.setText(shown)
                self.setCursorPosition(0)

    def wanted(self) -> int:
        """Pixels for the whole title, within reason."""
        text = self.text() or self.placeholderText()
        return min(max(self.fontMetrics().horizontalAdvance(text) + 34, 120), 320)


class TopBar(QWidget):
    """One row; `menus` is a widget with the menus, shown first, where the system has no bar of its own for them."""

    def __init__(
        self,
        document: Document,
        solution: Solution,
        actions: list[QAction],
        menus: QWidget | None = None,
        parent: QWidget | None = None,
        sight: Sight | None = None,
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._menus = menus
        self.setFixedHeight(max(ROW, self.fontMetrics().height() + SPACE) + 2 * SPACE)
        row = QHBoxLayout(self)
        row.setContentsMargins(SPACE, GAP, SPACE, GAP)
        row.setSpacing(GAP)
        if menus is not None:
            menus.setFixedHeight(max(ROW, self.fontMetrics().height() + SPACE))
            menus.setSizePolicy(QSizePolicy.Policy.Maximum, QSizePolicy.Policy.Fixed)
            row.addWidget(menus, 0, Qt.AlignmentFlag.AlignVCenter)
        self.title = TitleField(document, self)
        self.title.textChanged.connect(self._fit)
        row.addWidget(self.title)
        self._icons: list[QToolButton] = []
        for action in actions:
            button = QToolButton(self)
            button.setProperty("role", "quiet")
            button.setDefaultAction(action)
            row.addWidget(button)
            self._icons.append(button)
        self.cases = CaseRow(document, self, sight)
        row.addWidget(self.cases, 1)
        self.state = StateView(document, solution, self)
        row.addWidget(self.state)
        row.addSpacing(SPACE)
        self._add_sign_and_units(row)
        document.changed.connect(self._follow)
        self._follow()

    def _add_sign_and_units(self, row: QHBoxLayout) -> None:
        self.sign = QPushButton(self)
        self.sign.setToolTip("What is positive in every picture, finding and report. Click to change it.")
        self.sign.clicked.connect(self._turn_sign)
        row.addWidget(self.sign)
        self.units = QPushButton(self)
        self.units.setToolTip(
            "Units of every picture, field and report. Fields take any unit that is typed with them."
        )
        self.units.setMenu(UnitsMenu(self._document, self.units))
        row.addWidget(self.units)

    def add_switch(self, switch: QWidget) -> None:
        """Put the switch of the workspaces before the cases."""
        row = self.layout()
        assert isinstance(row, QHBoxLayout)
        row.insertWidget(row.indexOf(self.cases), switch)

    def event(self, event: QEvent) -> bool:
        if event.type() in (QEvent.Type.LayoutRequest, QEvent.Type.Resize):
            self._fit()
        return super().event(event)

    def _fit(self) -> None:
        """Where there is little room the title goes short first, then the icons go, whose actions are in the menus,
        last the title, which the window's own bar has too."""
        row = self.layout()
        if not isinstance(row, QHBoxLayout) or not hasattr(self, "units"):
            return
        if self._menus is not None:
            self._menus.setMinimumWidth(self._menus.sizeHint().width())
        flexible = (self.title, self.cases, *self._icons)
        parts = self.findChildren(QWidget, options=Qt.FindChildOption.FindDirectChildrenOnly)
        fixed = [w for w in parts if w not in flexible and row.indexOf(w) >= 0 and not w.isHidden()]
        gaps = row.spacing() * row.count() + 3 * SPACE
        icons = sum(button.sizeHint().width() for button in self._icons)
        room = self.width() - sum(w.sizeHint().width() for w in fixed) - gaps - icons
        squeezed = room - self.cases.least() < LEAST_TITLE
        room += icons if squeezed else 0
        for button in self._icons:
            button.setVisible(not squeezed)
        self.title.setVisible(room - self.cases.least() >= LEAST_TITLE)
        most = max(LEAST_TITLE, min(room - self.cases.least(), max(USUAL_TITLE, room - self.cases.wanted())))
        self.title.setFixedWidth(min(self.title.wanted(), most))

    def _follow(self) -> None:
        units = units_of(self._document.project)
        words = SYSTEM_WORDS[units.system] + (", mixed" if units.own else "")
        if self.sign.text() != units.sign_word:
            self.sign.setText(units.sign_word)
            self.sign.setAccessibleName(f"Sign: {units.sign_word.removesuffix(' +')} positive")
        if self.units.text() != words:
            self.units.setText(words)
            self.units.setAccessibleName(f"Units: {words}")

    def _turn_sign(self) -> None:
        turn_sign(self._document)


def turn_sign(document: Document) -> None:
    """Show the other of compression and tension as positive."""
    other = "compression" if document.project.display_sign == "tension" else "tension"
    document.edit(f"Show {other} as positive", "/display_sign", other)
