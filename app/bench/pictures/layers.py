"""The two layers of a picture, and the axes that it shares with the others.

A picture is painted in two layers. The resting layer (fields, curves, axes) is kept as a pixmap and painted anew only
where something it shows has changed; the moving layer (cursor, what holds at its time) is painted over it each time.
That is what lets play-back run at the screen's pace.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QRectF, Qt
from PySide6.QtGui import QColor, QFocusEvent, QFontMetricsF, QPainter, QPaintEvent, QPen, QPixmap, QRegion
from PySide6.QtWidgets import QWidget

from app.bench.pictures.axes import Axis, Margins, inside, margins_of, whole_distance
from app.bench.pictures.lettering import RIGHT, put
from app.bench.pictures.time_shown import shown_time
from app.bench.pictures.turns import turns
from app.document import Document
from app.look.palette import palette
from app.look.spacing import RADIUS
from app.sight import Sight
from app.solving import Solution
from app.units import Units, units_of
from solver import Case, Result

#: Opacity of a picture that does not belong to what is entered.
GREYED = 0.3
#: Ways in which a picture gets the focus without the mouse.
BY_KEYS = (
    Qt.FocusReason.TabFocusReason,
    Qt.FocusReason.BacktabFocusReason,
    Qt.FocusReason.ShortcutFocusReason,
)


@dataclass(frozen=True)
class Table:
    """What a plot shows, as columns for a file: headings with units, and arrays of shape (n,) of one length."""

    headings: Sequence[str]
    columns: Sequence[np.ndarray]


class Layered(QWidget):
    """Each picture says which axes it has, what its resting layer depends on, and how to draw both."""

    has_time = False
    has_distance = False
    #: The axis whose numbers it carries for all pictures: "time" or "distance".
    numbers = ""
    #: When a new result comes, it is painted after the pictures with a lower number.
    turn = 2

    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.document, self.sight, self.solution = document, sight, solution
        self._bare: frozenset[str] = frozenset()
        self._kept = QPixmap()
        self._kept_key: tuple[Any, ...] | None = None
        self._kept_result: Result | None = None
        self._shown_moving: tuple[Any, ...] | None = None
        self._shown_region = QRegion()
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self._framed = False
        for source in (document, sight, solution):
            source.changed.connect(self.look_again)

    # What each picture gives ------------------------------------------------------------------------------------

    def resting_key(self) -> tuple[Any, ...]:
        """Everything besides size, colours, axes and result that the resting layer depends on."""
        return ()

    def described(self) -> tuple[Any, ...]:
        """What the resting layer takes from the case at hand, and not from the result: no more than it shows, so that
        an edit is not painted twice, once for the edit and once for its result."""
        has = (shown_time(self.sight, self.case, self.result),) if self.has_time else ()
        return (*has, whole_distance(self.case), self.case.gauges) if self.has_distance else has

    def moving_key(self) -> tuple[Any, ...]:
        """Everything that the moving layer depends on."""
        return (self.sight.time, self.sight.place, self.sight.pinned)

    def draw_resting(self, painter: QPainter) -> None:
        raise NotImplementedError

    def draw_moving(self, painter: QPainter) -> None:
        """Nothing moves unless a picture says so."""

    def moving_region(self) -> QRegion:
        """Pixels that the moving layer touches."""
        return QRegion(self.rect())

    def table(self) -> Table | None:
        """What the picture shows, as numbers; `None` where there are none."""
        return None

    def margins(self) -> Margins:
        return margins_of(self.font())

    # What pictures share ----------------------------------------------------------------------------------------

    @property
    def case(self) -> Case:
        return self.document.case

    @property
    def result(self) -> Result | None:
        return self.solution.result

    @property
    def units(self) -> Units:
        return units_of(self.document.project)

    def plot(self) -> QRectF:
        return self.margins().plot(self.width(), self.height())

    def distance_axis(self) -> Axis:
        low, high = inside(self.sight.distance_range, whole_distance(self.case))
        plot = self.plot()
        return Axis(low, high, plot.top(), plot.height())

    def time_axis(self) -> Axis:
        low, high = shown_time(self.sight, self.case, self.result)
        plot = self.plot()
        return Axis(low, high, plot.left(), plot.width())

    def lacks_numbers(self, axis: str) -> bool:
        """Whether no picture in sight carries the numbers of its axis: it has all the room, say."""
        return axis in self._bare and self.numbers != axis

    def set_bare(self, axes: frozenset[str]) -> None:
        """Tell it the axes whose numbers no picture beside it carries now."""
        if axes != self._bare:
            self._bare = axes
            self.update()

    def name_axes(self, painter: QPainter, of_time: str = "") -> None:
        """The units of axes whose numbers it carries only now: left of the first number, and above it."""
        plot, line = self.plot(), QFontMetricsF(painter.font()).height()
        x, soft = plot.left() - 6, palette().soft_ink
        if of_time and self.lacks_numbers("time"):
            put(painter, x - 8, plot.bottom() + 0.75 * line, of_time, soft, RIGHT)
        if self.lacks_numbers("distance"):
            put(painter, x, plot.top() + 0.5 * line, self.units.unit("length"), soft, RIGHT)

    def greyed(self) -> str:
        """Why the picture does not belong to what is entered, in a few words; empty where it does."""
        if self.document.rejected:
            return "an entry is not valid"
        return {"stale": "not solved", "refused": "cannot be solved"}.get(self.solution.state, "")

    # Painting ---------------------------------------------------------------------------------------------------

    def look_again(self) -> None:
        """Something changed somewhere: repaint what looks different now, and nothing else."""
        if not self.isVisible():
            return
        if self._whole_key() != self._kept_key:
            if self.result is self._kept_result or self.result is None:
                self.update()
            else:
                turns().take(self, self.turn)
        elif self.moving_key() != self._shown_moving:
            self.update(self._shown_region.united(self.moving_region()))

    def paintEvent(self, event: QPaintEvent) -> None:
        key = self._whole_key()
        if key != self._kept_key:
            self._kept, self._kept_key, self._kept_result = self._painted_resting(), key, self.result
        painter = QPainter(self)
        painter.drawPixmap(0, 0, self._kept)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        if self.greyed():
            painter.setOpacity(GREYED)
        self.draw_moving(painter)
        if self._framed:
            painter.setOpacity(1.0)
            painter.setPen(QPen(QColor(palette().accent), 2))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(QRectF(self.rect()).adjusted(1, 1, -1, -1), RADIUS, RADIUS)
        self._shown_moving, self._shown_region = self.moving_key(), self.moving_region()

    def paint_whole(self, painter: QPainter) -> None:
        """Both layers onto any painter, for export."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self.font())
        painter.fillRect(self.rect(), QColor(palette().paper))
        self.draw_resting(painter)
        self.draw_moving(painter)

    def _painted_resting(self) -> QPixmap:
        ratio = self.devicePixelRatioF()
        kept = QPixmap(round(self.width() * ratio), round(self.height() * ratio))
        kept.setDevicePixelRatio(ratio)
        kept.fill(QColor(palette().paper))
        painter = QPainter(kept)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self.font())
        if self.greyed():
            painter.setOpacity(GREYED)
        self.draw_resting(painter)
        painter.end()
        return kept

    def _whole_key(self) -> tuple[Any, ...]:
        sight, ratio = self.sight, self.devicePixelRatioF()
        looks = (self.size(), ratio, self.font(), palette(), self.units, self.greyed())
        shared = (self.result, sight.time_range, sight.distance_range, self.described())
        return (*looks, self._bare, *shared, *self.resting_key())

    def changeEvent(self, event: QEvent) -> None:
        super().changeEvent(event)
        self.update()

    def focusInEvent(self, event: QFocusEvent) -> None:
        """A frame for who comes by the keyboard; the mouse shows by itself where it is."""
        self._framed = event.reason() in BY_KEYS
        self.update()

    def focusOutEvent(self, event: QFocusEvent) -> None:
        self._framed = False
        self.update()
