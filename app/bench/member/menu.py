"""What can be done with a part where it is drawn: the outline's actions, and those that need a place on the member."""

from __future__ import annotations

from dataclasses import replace

from PySide6.QtCore import Qt
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QMenu

from app.bench.forms.spec import Context, Tree
from app.bench.member.handles import tidy
from app.bench.outline import edits
from app.bench.outline.part_actions import PartActions, action_of, can_split
from app.bench.outline.rows import Row, row_for, rows_of
from app.document import Document
from app.sight import Sight
from app.tree import value_at
from app.units import units_of


class MemberMenu:
    """Knows the document and what is selected; the drawing tells what lies where it was clicked, and at what place."""

    def __init__(self, document: Document, sight: Sight) -> None:
        self._document, self._sight = document, sight
        self._actions = PartActions(document, sight, self._context)

    def fill(self, menu: QMenu, part: str | None, place: float) -> None:
        """Actions on the part, and on the member at the place (m)."""
        case, units = self._document.case, units_of(self._document.project)
        row = self._row(part) if part else None
        if row is not None:
            self._actions.fill(menu, row)
            if can_split(row) and row.list_pointer != "load/segments":
                start, size = self._stretch(row)
                if start < place < start + size:
                    words = f"Split at {units.show(place, 'length')}"
                    menu.addAction(words, lambda: self._split(row, (place - start) / size))
        if 0 <= place <= case.member.length:
            menu.addAction(f"Add a gauge at {units.show(place, 'length')}", lambda: self._add_gauge(place))
        if not menu.isEmpty():
            menu.addSeparator()

    def key(self, event: QKeyEvent) -> bool:
        """Do what a key asks for with the part that is selected; False where it asks for nothing."""
        way = {Qt.Key.Key_Up: -1, Qt.Key.Key_Down: 1}.get(Qt.Key(event.key()), 0)
        if way and not event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier:
            self._step(way)
            return True
        action, row = action_of(event), self._row(self._sight.selection)
        if action and row is not None and row.index >= 0:
            self._actions.do(action, row)
            return True
        return False

    def _step(self, way: int) -> None:
        """Select the part before or behind the selected one, in the order in which the blow passes them."""
        document, chosen = self._document, self._sight.selection
        rows = rows_of(document.project, document.case, units_of(document.project), chosen)
        row = row_for(rows, chosen)
        at = rows.index(row) if row is not None else 0
        self._sight.set(selection=rows[min(max(at + way, 0), len(rows) - 1)].pointer)

    def _context(self) -> Context:
        document = self._document
        return Context(document.tree, document.case, f"/cases/{document.case_index}")

    def _row(self, part: str) -> Row | None:
        document = self._document
        return row_for(rows_of(document.project, document.case, units_of(document.project), part), part)

    def _stretch(self, row: Row) -> tuple[float, float]:
        """Where a segment or layer begins, and how long it is, m."""
        case = self._document.case
        if row.list_pointer == "ground/layers" and case.ground:
            sizes = [layer.thickness for layer in case.ground.layers]
            return case.ground.surface + sum(sizes[: row.index]), sizes[row.index]
        if row.list_pointer == "member/segments":
            sizes = [segment.length for segment in case.member.segments]
            return sum(sizes[: row.index]), sizes[row.index]
        return 0.0, 0.0

    def _split(self, row: Row, share: float) -> None:
        context, at = self._context(), row.list_pointer
        edit = edits.split(context, at, row.index, share)
        size = "length" if at.endswith("segments") else "thickness"

        def change(tree: Tree) -> None:
            edit.change(tree)
            for index in (row.index, row.index + 1):
                part = value_at(tree, f"{context.full(at)}/{index}")
                part[size] = tidy(part[size])

        self._actions.take(replace(edit, change=change))

    def _add_gauge(self, place: float) -> None:
        context = self._context()
        edit = edits.add(context, "gauges")

        def change(tree: Tree) -> None:
            edit.change(tree)
            value_at(tree, context.full("gauges"))[-1]["position"] = tidy(place)

        self._actions.take(replace(edit, change=change))
