"""The outline: the parts in the order in which the blow passes them; the selected one unfolds into its form."""

from __future__ import annotations

from itertools import pairwise

from PySide6.QtCore import QPoint, Qt, QTimer, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import (
    QApplication,
    QFrame,
    QHBoxLayout,
    QPushButton,
    QScrollArea,
    QVBoxLayout,
    QWidget,
)

from app.bench.derived_text import caution_lines, derived_lines
from app.bench.forms.form import Form
from app.bench.forms.part_forms import differing, form_of_all
from app.bench.forms.spec import Context, Spec
from app.bench.outline.actions import Actions
from app.bench.outline.edits import word_for
from app.bench.outline.part_actions import PartActions
from app.bench.outline.row import BAR, RowButton
from app.bench.outline.rows import Row, row_for, rows_of
from app.bench.outline.several import extended, reaching, toggled
from app.document import Document
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.units import units_of

#: The table that goes with a selection, by how the selection begins; segments for all others.
TABLES = (("ground", "ground/layers", "layers"), ("gauges", "gauges", "gauges"))


class Outline(QWidget):
    """Rows and, under the selected one, its form. `table_wanted` asks for the table of a list of the case."""

    table_wanted = Signal(str)

    def __init__(self, document: Document, sight: Sight, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._sight = document, sight
        self._material_way = "modulus_density"
        self._rows: list[Row] = []
        self._shown = ""
        self._stops: list[QWidget] = []
        self.buttons: list[RowButton] = []
        self.setProperty("role", "paper")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self.setAccessibleName("Outline")
        self.setMinimumWidth(220)
        self._compose()
        document.changed.connect(self._follow)
        sight.changed.connect(self._follow)
        self._follow()

    @property
    def context(self) -> Context:
        """What forms and edits are made from."""
        document = self._document
        at = f"/cases/{document.case_index}"
        return Context(document.tree, document.case, at, self._material_way)

    @property
    def selected(self) -> Row | None:
        """The row that the selection means."""
        return row_for(self._rows, self._sight.selection)

    def _compose(self) -> None:
        self._inside = QWidget(self)
        self._column = QVBoxLayout(self._inside)
        self._column.setContentsMargins(0, GAP, 0, SPACE)
        self._column.setSpacing(0)
        self.folded_out = QWidget(self._inside)
        below = QVBoxLayout(self.folded_out)
        below.setContentsMargins(BAR + SPACE, 0, SPACE, SPACE)
        below.setSpacing(GAP)
        self.form = Form(self._document, self.folded_out)
        self.form.view_chosen.connect(self._choose_view)
        self.doing = Actions(PartActions(self._document, self._sight, lambda: self.context), self.folded_out)
        below.addWidget(self.form)
        below.addWidget(self.doing)
        self._column.addWidget(self.folded_out)
        self._column.addStretch(1)
        self.area = QScrollArea(self)
        self.area.setFrameShape(QFrame.Shape.NoFrame)
        self.area.setWidgetResizable(True)
        self.area.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.area.setWidget(self._inside)
        for widget in (self._inside, self.area.viewport()):
            widget.setAutoFillBackground(False)
        self.area.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        self.table_link = QPushButton(self)
        self.table_link.setProperty("role", "link")
        self.table_link.setToolTip(
            "Opens them all below, for typing in columns and pasting from a spreadsheet."
        )
        self.table_link.setCursor(Qt.CursorShape.PointingHandCursor)
        self.table_link.clicked.connect(lambda: self.table_wanted.emit(self._table()[1]))
        foot = QHBoxLayout()
        foot.setContentsMargins(SPACE, 0, SPACE, GAP)
        foot.addWidget(self.table_link)
        foot.addStretch(1)
        outer = QVBoxLayout(self)
        outer.setContentsMargins(0, 0, 0, 0)
        outer.setSpacing(0)
        outer.addWidget(self.area, 1)
        outer.addLayout(foot)

    # -- showing ----------------------------------------------------------------------------------------------------

    def _follow(self) -> None:
        document, selection = self._document, self._sight.selection
        project, case = document.project, document.case
        units = units_of(project)
        self._rows = rows_of(project, case, units, selection)
        selected = self.selected
        self._fit_buttons(len(self._rows))
        wrong = [p for p in document.rejected if p]
        context = self.context
        for button, row in zip(self.buttons, self._rows, strict=True):
            place = context.full(row.pointer)
            inside = any(p.startswith(place + "/") or p.split("#")[0] == place for p in wrong)
            also = row.pointer in self._sight.also
            button.show_row(row, row is selected, inside and row is not selected, also)
        self._place_form(selected)
        if selected is not None:
            specs = form_of_all(context, selected.pointer, self._sight.also)
            self.form.show_form(
                specs,
                units,
                self._told_of_several(selected, specs)
                or derived_lines(project, case, units, selected.pointer),
                caution_lines(case, units, selected.pointer),
            )
            self.doing.show_for(selected)
            self._order_tabs(self.buttons[self._rows.index(selected)])
        if self.window().focusWidget() in self.buttons:
            self.focus_row()  # the keys stay with the selection, wherever it was made
        self.table_link.setText(f"All {self._table()[2]} as a table")
        if selected is not None and selected.pointer != self._shown:
            self._shown = selected.pointer
            QTimer.singleShot(0, self, self._bring_into_view)

    def _told_of_several(self, selected: Row, specs: list[Spec]) -> list[str]:
        count = 1 + len(self._sight.also)
        if count == 1:
            return []
        differs = differing(specs)
        word = word_for(selected.list_pointer)
        lines = [f"{count} {word}s are selected: what is changed here is changed in all of them."]
        return lines + ([f"They differ in: {', '.join(differs).lower()}."] if differs else [])

    def _fit_buttons(self, count: int) -> None:
        while len(self.buttons) < count:
            button = RowButton(self._inside)
            button.clicked.connect(lambda _on=False, b=button: self._clicked(b.row))
            button.asked.connect(lambda what, b=button: self._asked(what, b.row))
            button.setContextMenuPolicy(Qt.ContextMenuPolicy.CustomContextMenu)
            button.customContextMenuRequested.connect(lambda at, b=button: self._open_menu(b, at))
            self._column.insertWidget(self._column.count() - 1, button)
            self.buttons.append(button)
            button.show()
        while len(self.buttons) > count:
            button = self.buttons.pop()
            self._column.removeWidget(button)
            button.hide()
            button.deleteLater()

    def _place_form(self, selected: Row | None) -> None:
        """The form directly under its row."""
        self.folded_out.setVisible(selected is not None)
        if selected is None:
            return
        wanted = self._rows.index(selected) + 1
        if self._column.indexOf(self.folded_out) != wanted:
            self._column.removeWidget(self.folded_out)
            self._column.insertWidget(wanted, self.folded_out)

    def _order_tabs(self, button: RowButton) -> None:
        """Tab leads from the selected row through its form to what can be done with it, and to the table."""
        stops = [button, *self.form.stops, *self.doing.stops, self.table_link]
        if stops != self._stops:
            self._stops = stops
            for first, second in pairwise(stops):
                QWidget.setTabOrder(first, second)

    def _bring_into_view(self) -> None:
        """The selected row with as much of its form as there is room for."""
        selected = self.selected
        if selected is None:
            return
        self._column.activate()
        button = self.buttons[self._rows.index(selected)]
        bottom = self.folded_out.geometry().bottom()
        self.area.ensureVisible(0, bottom, 0, 0)
        self.area.ensureVisible(0, button.geometry().top(), 0, 0)

    def _table(self) -> tuple[str, str, str]:
        selection = self._sight.selection
        has_layers = self._document.case.ground is not None
        for begins, pointer, word in TABLES:
            if selection.startswith(begins) and (pointer != "ground/layers" or has_layers):
                return begins, pointer, word
        return "", "member/segments", "segments"

    def _choose_view(self, name: str, key: str) -> None:
        assert name == "material_way"
        self._material_way = key
        self._follow()

    # -- acting -----------------------------------------------------------------------------------------------------

    def select(self, row: Row) -> None:
        """Select the part of a row."""
        self._sight.set(selection=row.pointer)

    def _clicked(self, row: Row) -> None:
        """With Control one entry more or less of the same list, with Shift all from the selected one to it."""
        keys = QApplication.keyboardModifiers()
        if keys & Qt.KeyboardModifier.ControlModifier:
            self._sight.set(**toggled(self._sight, row.pointer))
        elif keys & Qt.KeyboardModifier.ShiftModifier:
            self._sight.set(**reaching(self._sight, row.pointer))
        else:
            self.select(row)

    def _asked(self, what: str, row: Row) -> None:
        if what in ("also up", "also down"):
            self._sight.set(**extended(self._sight, -1 if what == "also up" else 1, self._pointers()))
            return
        index = self._rows.index(row)
        to = {"up": index - 1, "down": index + 1, "first": 0, "last": len(self._rows) - 1}.get(what)
        if to is not None:
            self.select(self._rows[max(0, min(to, len(self._rows) - 1))])
            self.focus_row()
        elif what == "enter":
            self.select(row)
            if self.form.rows:
                self.form.rows[0].setFocus(Qt.FocusReason.TabFocusReason)
        else:
            self.doing.parts.do(what, row)
            self.focus_row()

    def _pointers(self) -> list[str]:
        return [row.pointer for row in self._rows if row.index >= 0]

    def focus_row(self) -> None:
        """Let the keys act on the selected row."""
        selected = self.selected
        if selected is not None:
            self.buttons[self._rows.index(selected)].setFocus(Qt.FocusReason.OtherFocusReason)

    def _open_menu(self, button: RowButton, at: QPoint) -> None:
        if button.row.pointer not in self._sight.also:
            self.select(button.row)
        row = self.selected
        if row is not None:
            self.doing.menu(row, self).popup(button.mapToGlobal(at))

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Escape in a form leads back to its row."""
        focus = self.window().focusWidget()
        if event.key() == Qt.Key.Key_Escape and focus is not None and self.folded_out.isAncestorOf(focus):
            self.focus_row()
        else:
            super().keyPressEvent(event)
