"""One row of a form: label, editor, unit, and under them what is wrong or where the value came from."""

from __future__ import annotations

from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtGui import QContextMenuEvent
from PySide6.QtWidgets import QGridLayout, QHBoxLayout, QLabel, QMenu, QPushButton, QSizePolicy, QWidget

from app.bench.forms.commit import confirm_mark
from app.bench.forms.kinds import NO_SOURCE
from app.bench.forms.spec import Spec
from app.document import Document
from app.explaining import explain
from app.look.fonts import USUAL_LINE
from app.look.spacing import FIELD, GAP, SPACE
from app.units import Units

#: Texts that the columns of labels and of units have room for, and in large type; longer labels wrap.
LABEL_ROOM, UNIT_ROOM = ("Outer diameter", "Drop height"), ("kN·s/m", "kg/m³")
#: What an editor has room for at least: a number that cannot be read is edited blindly.
LEAST_ROOM = "00.00"


class FieldRow(QWidget):
    """Holds the label and the notes; subclasses put their editor in and say what it shows.

    `show_spec` is called after each change of the project: a row keeps no value of its own, it compares what it
    shows with what it is given.
    """

    def __init__(self, document: Document, spec: Spec, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.document = document
        self._editor: QWidget = self
        self.spec = spec
        self._typical = False
        self._grid = QGridLayout(self)
        self._grid.setContentsMargins(0, 0, 0, 0)
        self._grid.setHorizontalSpacing(GAP + 2)
        self._grid.setVerticalSpacing(1)
        metrics = self.fontMetrics()
        large = metrics.height() > 1.2 * USUAL_LINE
        self.label = QLabel(spec.label, self)
        self.label.setWordWrap(True)
        self.label.setFixedWidth(metrics.horizontalAdvance(LABEL_ROOM[large]) + GAP)
        self.label.setMinimumHeight(FIELD)
        self._grid.addWidget(self.label, 0, 0)
        self._grid.setColumnMinimumWidth(2, metrics.horizontalAdvance(UNIT_ROOM[large]))
        self._grid.setColumnStretch(1, 1)
        self._problem = _note_label(self, "problem")
        self._grid.addWidget(self._problem, 1, 0, 1, 3)
        self._mark = MarkLine(self)
        self._mark.confirm.clicked.connect(lambda: confirm_mark(self.document, self.spec))
        begins = 0 if large else 1  # in large type it needs the whole row
        self._grid.addWidget(self._mark, 2, begins, 1, 3 - begins)

    def put_editor(self, editor: QWidget) -> None:
        """Place the editor, name it for those who hear the screen, and lead the label to it."""
        editor.setAccessibleName(self.spec.label)
        editor.setToolTip(tooltip_of(self.spec))
        self.label.setToolTip(tooltip_of(self.spec))
        self.label.setBuddy(editor)
        editor.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)
        editor.setMinimumWidth(self.fontMetrics().horizontalAdvance(LEAST_ROOM) + 2 * SPACE)
        self._grid.addWidget(editor, 0, 1, Qt.AlignmentFlag.AlignVCenter)
        self._editor = editor

    def setFocus(self, reason: Qt.FocusReason = Qt.FocusReason.OtherFocusReason) -> None:
        """To the editor. A focus proxy would do that too, but Tab takes a row for its proxy and goes round in the form
        for ever."""
        if self._editor is not self:
            self._editor.setFocus(reason)

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        menu = QMenu(self)
        menu.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        menu.addAction("What is this?", lambda: explain(self.label))
        menu.popup(event.globalPos())

    @property
    def stops(self) -> list[QWidget]:
        """What the Tab key stops at, in order: the editor, what is beside it, the mark."""
        last = self._mark.confirm
        inside = [w for w in self.findChildren(QWidget) if w is not last and w.window() is self.window()]
        return [w for w in (*inside, last) if w.focusPolicy() & Qt.FocusPolicy.TabFocus]

    def put_beside(self, widget: QWidget) -> None:
        """Place what stands behind the editor: a unit, a button."""
        self._grid.addWidget(widget, 0, 2, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft)

    def show_spec(self, spec: Any, units: Units, mark: dict[str, str] | None) -> None:
        """Show the project's value, what is wrong with what was entered, and the mark of a typical value."""
        self.spec = spec
        problem = self.document.problem_at(spec.pointer)
        self.show_problem(problem)
        self._show_mark(mark)
        self.show_value(units, problem is not None)

    def show_problem(self, sentence: str | None) -> None:
        """Say under the field what is wrong, or nothing."""
        self._problem.setText(f"✕ {sentence}" if sentence else "")
        self._problem.setVisible(bool(sentence))

    def show_value(self, units: Units, refused: bool) -> None:
        """Show the value in the editor. `refused`: what was entered last was not taken."""
        raise NotImplementedError

    def _show_mark(self, mark: dict[str, str] | None) -> None:
        self._typical = typical = mark is not None and mark["state"] == "typical"
        self._mark.setVisible(typical)
        if typical and mark is not None:
            begun = mark["source"] == NO_SOURCE
            word = "starting value" if begun else "typical value"
            where = "a number to begin with, of no source" if begun else f"from {mark['source']}"
            tells = f"A {word}, {where}. Type your own, or confirm it once you stand by it."
            self._mark.tell(word, tells, f"Confirm {self.spec.label}: {word}, {where}")


class MarkLine(QWidget):
    """ "typical value · Confirm", hidden where there is nothing to confirm."""

    def __init__(self, parent: QWidget) -> None:
        super().__init__(parent)
        self.words = QLabel(self)
        self.words.setProperty("role", "small")
        self.confirm = QPushButton("Confirm", self)
        self.confirm.setProperty("role", "link")
        self.confirm.setProperty("level", "small")
        self.confirm.setCursor(Qt.CursorShape.PointingHandCursor)
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(0)
        row.addWidget(self.words)
        row.addWidget(self.confirm)
        row.addStretch(1)
        self.hide()

    def tell(self, word: str, tells: str, name: str) -> None:
        """Show a word, what it means, and the name of the button for those who hear it."""
        self.words.setText(f"{word} ·")
        for widget in (self.words, self.confirm):
            widget.setToolTip(tells)
        self.confirm.setAccessibleName(name)


def _note_label(parent: QWidget, role: str) -> QLabel:
    label = QLabel(parent)
    label.setProperty("role", role)
    label.setWordWrap(True)
    label.setTextFormat(Qt.TextFormat.PlainText)
    label.hide()
    return label


def tooltip_of(spec: Spec) -> str:
    """Definition and source of a field."""
    lines = [line for line in (spec.tells, f"Source: {spec.source}." if spec.source else "") if line]
    return "\n".join(lines) or spec.label
