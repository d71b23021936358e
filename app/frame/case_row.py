"""The cases of the project in the top bar: one is looked at; a menu for each renames, copies, moves and removes it."""

from __future__ import annotations

from functools import partial
from typing import Any

from PySide6.QtCore import QEvent, QPoint, QSize, Qt
from PySide6.QtGui import QResizeEvent
from PySide6.QtWidgets import (
    QFrame,
    QHBoxLayout,
    QInputDialog,
    QMenu,
    QScrollArea,
    QToolButton,
    QWidget,
)

from app.document import Document
from app.frame.case_chip import CaseChip
from app.laid_over import fill_over_menu
from app.look import icon
from app.look.spacing import GAP, ROW, SPACE
from app.provenance import rearrange
from app.sight import Sight
from app.tree import copied

Tree = dict[str, Any]
ELIDE = Qt.TextElideMode.ElideRight
#: Pixels of a case's button around its words, and to which the one looked at is cut where all else is cut.
ROUND_TEXT, LEAST_CHIP = 22, 90
#: Pixels by which a text may be wider than told without being elided: its advance is a fraction, rounded.
SPARE = 2


class CaseRow(QWidget):
    """A button for each case, a list of all where they do not fit, and "+" for a copy of the one looked at."""

    def __init__(self, document: Document, parent: QWidget | None = None, sight: Sight | None = None) -> None:
        super().__init__(parent)
        self._document, self._sight = document, sight
        self._names: list[str] = []
        self._buttons: list[CaseChip] = []
        self._scroll = QScrollArea(self)
        self._scroll.setFrameShape(QFrame.Shape.NoFrame)
        self._scroll.setWidgetResizable(True)
        self._scroll.setFixedHeight(max(ROW, self.fontMetrics().height() + SPACE) + 2 * GAP)
        self._scroll.setVerticalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self._scroll.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self._scroll.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        inside = QWidget(self._scroll)
        inside.setProperty("role", "clear")
        self._row = QHBoxLayout(inside)
        self._row.setContentsMargins(GAP, 0, 0, 0)
        self._row.setSpacing(GAP)
        self._row.addStretch(1)
        self._scroll.setWidget(inside)
        self._mark = QFrame(inside)
        self._mark.setProperty("role", "mark")
        self._mark.hide()
        self._all = self._quiet_button("All cases", "fold")
        self._all.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(self._all)
        menu.aboutToShow.connect(lambda: self._fill_all(menu))
        self._all.setMenu(menu)
        self._add = self._quiet_button("Add a case: a copy of this one", "add")
        self._add.clicked.connect(lambda: add_case(self._document))
        whole = QHBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(0)
        whole.addWidget(self._scroll, 100)
        whole.addWidget(self._all)
        whole.addWidget(self._add)
        whole.addStretch(1)
        document.changed.connect(self._follow)
        self._follow()

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit()

    def changeEvent(self, event: QEvent) -> None:
        if event.type() == QEvent.Type.PaletteChange:
            self._all.setIcon(icon("fold"))
            self._add.setIcon(icon("add"))
        super().changeEvent(event)

    def _quiet_button(self, words: str, drawn: str) -> QToolButton:
        button = QToolButton(self)
        button.setProperty("role", "quiet")
        button.setIcon(icon(drawn))
        button.setToolTip(words)
        button.setAccessibleName(words)
        return button

    def _follow(self) -> None:
        names = [case.name for case in self._document.project.cases]
        if names != self._names:
            self._follow_names(names)
            self._names = names
            self._rebuild()
        for index, button in enumerate(self._buttons):
            button.setChecked(index == self._document.case_index)
        self._fit()

    def wanted(self) -> int:
        """Pixels at which all cases are shown."""
        return sum(self._widths()) + 2 * GAP + self._add.sizeHint().width()

    def least(self) -> int:
        """Pixels for the case looked at, the list of all, and the button for another."""
        widths = self._widths()
        if not widths:
            return self.wanted()
        listed = self._all.sizeHint().width() if len(widths) > 1 else 0
        return (
            min(widths[self._document.case_index], LEAST_CHIP) + GAP + listed + self._add.sizeHint().width()
        )

    def minimumSizeHint(self) -> QSize:
        return QSize(self.least(), super().minimumSizeHint().height())

    def _widths(self) -> list[int]:
        metrics = self.fontMetrics()
        return [metrics.horizontalAdvance(_short(name)) + ROUND_TEXT + GAP for name in self._names]

    def _fit(self) -> None:
        """As many cases as there is room for, whole ones, and the one looked at among them."""
        widths, at = self._widths(), self._document.case_index
        fits = self.wanted() <= self.width()
        room = self.width() - self.least() - max(widths[at] - LEAST_CHIP, 0)
        first, last = (0, len(widths)) if fits else (at, at + 1)
        while not fits and last < len(widths) and widths[last] <= room:
            room, last = room - widths[last], last + 1
        while not fits and first > 0 and widths[first - 1] <= room:
            room, first = room - widths[first - 1], first - 1
        for index, button in enumerate(self._buttons):
            button.setVisible(first <= index < last)
            text = (
                widths[index] - ROUND_TEXT - GAP + SPARE + (min(room, 0) if index == at and not fits else 0)
            )
            button.setText(self.fontMetrics().elidedText(_short(self._names[index]), ELIDE, text))
        self._all.setVisible(not fits and len(widths) > 1)
        self._scroll.setMaximumWidth(sum(widths[first:last]) + 2 * GAP)

    def _rebuild(self) -> None:
        for button in self._buttons:
            self._row.removeWidget(button)
            button.hide()
            button.deleteLater()
        self._buttons = []
        for index, name in enumerate(self._names):
            button = CaseChip(name, self._scroll.widget())
            button.dragged.connect(self._mark_place)
            button.dropped.connect(lambda x, i=index: self._move_to(i, self._place_at(x)))
            button.shifted.connect(lambda by, i=index: self._move_to(i, i + by + (by > 0)))
            button.clicked.connect(lambda _on=False, i=index: self._choose(i))
            button.setContextMenuPolicy(Qt.ContextMenuPolicy.CustomContextMenu)
            button.customContextMenuRequested.connect(lambda at, i=index: self._menu(i, at))
            self._row.insertWidget(index, button)
            self._buttons.append(button)

    def _place_at(self, x: int) -> int:
        """Before which case something let go at this x comes to stand."""
        shown = [i for i, button in enumerate(self._buttons) if not button.isHidden()]
        return next((i for i in shown if x < self._buttons[i].geometry().center().x()), shown[-1] + 1)

    def _mark_place(self, x: int | None) -> None:
        """A stroke where what is dragged would come to stand."""
        self._mark.setVisible(x is not None)
        if x is not None:
            place = self._place_at(x)
            before = self._buttons[place - 1].geometry().right() if place else -GAP
            self._mark.setGeometry(before + 1 + GAP // 2, 2, 2, self._scroll.viewport().height() - 4)
            self._mark.raise_()

    def _move_to(self, index: int, place: int) -> None:
        """Put a case before another one, or at the end."""
        to = place - 1 if place > index else place
        if not 0 <= to < len(self._names):
            return
        self._document.choose_case(index)
        if to != index and move_case(self._document, to - index):
            self._buttons[to].setFocus()

    def _follow_names(self, names: list[str]) -> None:
        """A case that is laid over another one and gets a new name stays laid over it."""
        renamed = [(old, new) for old, new in zip(self._names, names, strict=False) if old != new]
        if self._sight is not None and len(names) == len(self._names) and len(renamed) == 1:
            ((old, new),) = renamed
            over = self._sight.laid_over
            if old in over:
                self._sight.set(laid_over=tuple(new if name == old else name for name in over))

    def _choose(self, index: int) -> None:
        self._document.choose_case(index)
        self._buttons[index].setChecked(True)  # a second click must not leave none chosen

    def _fill_all(self, menu: QMenu) -> None:
        menu.clear()
        for index, name in enumerate(self._names):
            menu.addAction(name.replace("&", "&&"), partial(self._choose, index))

    def _menu(self, index: int, at: QPoint) -> None:
        self._document.choose_case(index)
        menu = QMenu(self)
        menu.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        fill_case_menu(menu, self._document, self, self._sight)
        menu.popup(self._buttons[index].mapToGlobal(at))


def fill_case_menu(menu: QMenu, document: Document, parent: QWidget, sight: Sight | None = None) -> None:
    """What can be done with the case that is looked at; with a `sight`, other cases can be laid over it."""
    count, index = len(document.project.cases), document.case_index
    menu.addAction("Rename…", lambda: _ask_name(document, parent))
    menu.addAction(icon("duplicate"), "Add a copy", lambda: add_case(document))
    menu.addSeparator()
    menu.addAction("Move to the left", lambda: move_case(document, -1)).setEnabled(index > 0)
    menu.addAction("Move to the right", lambda: move_case(document, 1)).setEnabled(index < count - 1)
    menu.addSeparator()
    if sight is not None and count > 1:
        fill_over_menu(menu.addMenu("Lay over this case"), document, sight)
        menu.addSeparator()
    menu.addAction("Remove", lambda: remove_case(document)).setEnabled(count > 1)


def add_case(document: Document) -> bool:
    """Add a copy of the case looked at, and look at the copy."""
    names = [case.name for case in document.project.cases]
    name, at = _free_name(document.case.name, names), document.case_index + 1

    def change(tree: Tree) -> None:
        tree["cases"].insert(at, copied(tree["cases"][at - 1]) | {"name": name})
        rearrange(tree, "/cases", [*range(at), at - 1, *range(at, len(names))])

    return _done(document, document.edit_tree(f"Add case {name}", change), at)


def remove_case(document: Document) -> bool:
    """Remove the case looked at, unless it is the only one."""
    index, order = document.case_index, list(range(len(document.project.cases)))
    order.pop(index)
    done = document.edit_tree(f"Remove case {document.case.name}", lambda tree: _arrange(tree, order))
    return _done(document, done, max(0, index - 1))


def move_case(document: Document, by: int) -> bool:
    """Move the case looked at among the others."""
    index, order = document.case_index, list(range(len(document.project.cases)))
    order.insert(index + by, order.pop(index))
    done = document.edit_tree(f"Move case {document.case.name}", lambda tree: _arrange(tree, order))
    return _done(document, done, index + by)


def _arrange(tree: Tree, order: list[int]) -> None:
    tree["cases"] = [tree["cases"][i] for i in order]
    rearrange(tree, "/cases", order)


def rename_case(document: Document, name: str) -> bool:
    """Give the case looked at another name."""

    def change(tree: Tree) -> None:
        tree["cases"][document.case_index]["name"] = name.strip()

    return document.edit_tree(f"Rename case {document.case.name} to {name.strip()}", change)


def _done(document: Document, done: bool, index: int) -> bool:
    if done:
        document.choose_case(index)
    return done


def _ask_name(document: Document, parent: QWidget) -> None:
    name, given = QInputDialog.getText(parent, "Rename the case", "Name", text=document.case.name)
    if given:
        rename_case(document, name)


def _free_name(name: str, names: list[str]) -> str:
    number = 2
    while f"{name} ({number})" in names:
        number += 1
    return f"{name} ({number})"


def _short(name: str) -> str:
    return (name if len(name) <= 22 else f"{name[:20]}…").replace("&", "&&")
