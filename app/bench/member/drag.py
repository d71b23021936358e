"""A drag in the member drawing: follows the pointer in tidy steps, edits the project as it goes, can be taken back."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import count

from PySide6.QtCore import QPointF

from app.bench.member.handles import (
    DROP_PER_PIXEL,
    DROP_STEP,
    Handle,
    change_to,
    gauges_along,
    handles_of,
    told,
    within_all,
)
from app.bench.pictures.axes import Axis, tidy_step
from app.carried_along import moved_between, sentence_of
from app.document import Document
from app.units import Units, units_of

#: Pixels that the pointer must move before a press becomes a drag.
DEAD = 3.0
_numbers = count(1)


class MemberDrag:
    """One drag of one handle, from the press on. `told`: what it does, empty while nothing has moved.

    Places are reckoned on the axis as it was at the press: the axis may change with what is dragged. Of several gauges
    that are selected (`chosen`) all go along, as far as each of them can.
    """

    def __init__(
        self, document: Document, handle: Handle, axis: Axis, at: QPointF, chosen: Sequence[str] = ()
    ) -> None:
        self.handle, self.told = handle, ""
        self._along = gauges_along(document.case, handle, chosen)
        self._document, self._axis, self._from = document, axis, at
        self._case, self._case_index = document.case, document.case_index
        self._tree = document.tree["cases"][document.case_index]
        self._steps_before = document.undo_stack.index()
        self._merge = f"drag {next(_numbers)}"
        self._place = handle.place

    def move(self, to: QPointF, free: bool) -> bool:
        """Follow the pointer, in tidy steps of the unit shown unless `free`. True where something is being dragged."""
        down = to.y() - self._from.y()
        if not self.told and abs(down) < DEAD:
            return False
        place = self._snapped(self._wanted(down), free)
        place = min(max(place, self.handle.low), self.handle.high)
        place = within_all(place, self.handle, self._along)
        if place != self._place or not self.told:
            self._place = place
            self.told = told(self.handle, place, self._case, units_of(self._document.project), self._along)
            self._edit()
        return True

    def take_back(self) -> None:
        """As if it had never begun."""
        stack = self._document.undo_stack
        while stack.index() > self._steps_before:
            stack.undo()

    def end(self) -> None:
        """One drag is one step of undo, however slow it was."""
        if self._document.undo_stack.index() > self._steps_before + 1:
            self.take_back()
            self._edit()
        if self.told and self.handle.kind == "segment":
            moved = moved_between(self._tree, self._document.tree["cases"][self._case_index])
            if moved:
                self._document.told.emit(sentence_of(moved, units_of(self._document.project)))

    def _edit(self) -> None:
        change = change_to(self.handle, self._place, self._case_index, self._tree, self._along)
        self._document.edit_tree(self.told, change, merge=self._merge)

    def _wanted(self, down: float) -> float:
        if self.handle.kind == "drop":
            return self.handle.place - down * DROP_PER_PIXEL
        return self.handle.place + down * (self._axis.high - self._axis.low) / self._axis.length

    def _snapped(self, place: float, free: bool) -> float:
        if free:
            return place
        step = step_of(self.handle, self._axis, units_of(self._document.project))
        return round(place / step) * step


def step_of(handle: Handle, axis: Axis, units: Units) -> float:
    """The tidy step (m) of a drag: of the unit shown, and about a pixel high."""
    one = float(units.number(1.0, "length"))
    span = (axis.high - axis.low) * one
    return DROP_STEP if handle.kind == "drop" else tidy_step(span, int(axis.length)) / one


def nudge(document: Document, chosen: Sequence[str], way: int, axis: Axis) -> bool:
    """Move what is selected by one tidy step, down the member (`way` 1) or up; False where it cannot be moved. The ram
    goes the other way: up is higher."""
    handle = next((h for h in handles_of(document.case) if h.pointer == chosen[0]), None)
    if handle is None:
        return False
    along, units = gauges_along(document.case, handle, chosen), units_of(document.project)
    way = -way if handle.kind == "drop" else way
    step = step_of(handle, axis, units)
    place = round(handle.place / step + way) * step
    place = within_all(min(max(place, handle.low), handle.high), handle, along)
    if place != handle.place:
        words = told(handle, place, document.case, units, along)
        index = document.case_index
        change = change_to(handle, place, index, document.tree["cases"][index], along)
        document.edit_tree(words, change, merge=f"nudge {','.join(chosen)}")
    return True
