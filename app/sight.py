"""What is looked at: the cursor, what is selected, the quantity and strips shown. Never saved in the project."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any, Literal

from PySide6.QtCore import QObject, Signal

ShownQuantity = Literal["stress", "force", "velocity", "displacement"]
#: What the strips under the x-t diagram may show.
STRIPS = ("force_pair", "velocity", "stress", "displacement", "waves", "energy")


@dataclass(frozen=True)
class _Looked:
    time: float = 0.0
    place: float | None = None
    selection: str = "load"
    also: tuple[str, ...] = ()
    quantity: ShownQuantity = "stress"
    strips: tuple[str, ...] = ("force_pair", "velocity")
    time_range: tuple[float, float] | None = None
    distance_range: tuple[float, float] | None = None
    pinned: tuple[float, float | None] | None = None
    arrivals: bool | None = None
    pointed: tuple[int, ...] = ()
    peaks: tuple[str, ...] = ()
    laid_over: tuple[str, ...] = ()
    locked_in: bool = False


class Sight(QObject):
    """`time` (s) and `place` (m, `None` = nowhere) of the cursor; `selection`, a pointer relative to the case such as
    "member/segments/1", "gauges/0", "ground", "far_end", "load" or "run"; `quantity` of all pictures; `strips` shown,
    of `STRIPS`; shared zoom as `time_range` (s) and `distance_range` (m), `None` = all.

    `also`: further entries of the list that `selection` is of; they go when something else is selected.
    `pinned`: the second cursor (s, m). `arrivals`: whether predicted arrivals are drawn, `None` = where they are few;
    `pointed`: numbers of those that the mouse is on. `peaks`: curves whose peaks are labelled, as "strip/curve".
    `laid_over`: names of the cases drawn over this one. `locked_in`: the profile shows the force left by the blows."""

    changed = Signal()

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._looked = _Looked()

    def set(self, **what: Any) -> None:
        """Change several at once; one signal, and only where something differs. An unknown name is a `TypeError`."""
        if "selection" in what:
            what.setdefault("also", ())
        looked = replace(self._looked, **what)
        if looked != self._looked:
            self._looked = looked
            self.changed.emit()

    @property
    def time(self) -> float:
        return self._looked.time

    @property
    def place(self) -> float | None:
        return self._looked.place

    @property
    def selection(self) -> str:
        return self._looked.selection

    @property
    def also(self) -> tuple[str, ...]:
        return self._looked.also

    @property
    def quantity(self) -> ShownQuantity:
        return self._looked.quantity

    @property
    def strips(self) -> tuple[str, ...]:
        return self._looked.strips

    @property
    def time_range(self) -> tuple[float, float] | None:
        return self._looked.time_range

    @property
    def distance_range(self) -> tuple[float, float] | None:
        return self._looked.distance_range

    @property
    def pinned(self) -> tuple[float, float | None] | None:
        return self._looked.pinned

    @property
    def arrivals(self) -> bool | None:
        return self._looked.arrivals

    @property
    def pointed(self) -> tuple[int, ...]:
        return self._looked.pointed

    @property
    def peaks(self) -> tuple[str, ...]:
        return self._looked.peaks

    @property
    def laid_over(self) -> tuple[str, ...]:
        return self._looked.laid_over

    @property
    def locked_in(self) -> bool:
        return self._looked.locked_in
