"""The chart on the screen: paints the scene, and reads out the point nearest to the pointer."""

from __future__ import annotations

from functools import lru_cache

from PySide6.QtCore import QPointF, QRectF, QSize, Qt, Signal
from PySide6.QtGui import (
    QColor,
    QContextMenuEvent,
    QFont,
    QFontMetricsF,
    QMouseEvent,
    QPainter,
    QPaintEvent,
    QPen,
    QPolygonF,
)
from PySide6.QtWidgets import QMenu, QSizePolicy, QWidget

from app.look.fonts import base_size, font
from app.look.palette import Palette, palette
from app.picture_dialog import add_picture_actions
from app.picture_files import Drawing
from app.set_sheet.chart import chart
from app.set_sheet.frame import Frame, frame_of
from app.set_sheet.scene import Area, Letters, Level, Line, Mark, Scene, Words, outline_of
from app.units import Units
from solver.studies import Cell, Sheet
from solver.studies.uncertainty import Sampled


class ChartView(QWidget):
    """Shows a sheet; `pointed` tells the cell that is pointed at, or `None`."""

    pointed = Signal(object)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setMouseTracking(True)
        self.setMinimumSize(QSize(560, 320))
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Expanding)
        self.setAccessibleName("Set, stresses and energy over the total resistance")
        self._shown: tuple[Sheet, Units, str, Sampled | None] | None = None
        self._pale = False
        self._cell: Cell | None = None
        self._made: tuple[tuple[object, ...], Scene, Frame] | None = None
        self._changes = 0

    def show_sheet(
        self, sheet: Sheet | None, units: Units, per: str, sampled: Sampled | None, pale: bool
    ) -> None:
        """What to show; `pale` while it belongs to an older input."""
        before, shown = self._shown, None if sheet is None else (sheet, units, per, sampled)
        same = before is shown or (
            before is not None
            and shown is not None
            and all(one is other for one, other in zip(before, shown, strict=True))
        )
        if not same or pale != self._pale:
            self._shown, self._pale = shown, pale
            self._changes += 1
            self.update()

    def scene(self) -> Scene:
        """What is painted at the present size."""
        return self._picture()[0] if self._shown is not None else []

    def frame(self) -> Frame:
        """Where it lies. Only while there is a sheet."""
        return self._picture()[1]

    def _picture(self) -> tuple[Scene, Frame]:
        """Made once for what is shown: the pointer moves more often than anything else changes."""
        assert self._shown is not None
        sheet, units, per, sampled = self._shown
        line = self._cell.line if self._cell is not None else 0
        size = float(self.width()), float(self.height())
        key = (self._changes, line, size, base_size())
        if self._made is None or self._made[0] != key:
            letters = letters_here()
            made = chart(sheet, units, per, *size, letters, sampled, line)
            self._made = key, made, frame_of(sheet, units, *size, letters, sampled)
        return self._made[1], self._made[2]

    def paintEvent(self, event: QPaintEvent) -> None:
        colours = palette()
        painter = QPainter(self)
        painter.fillRect(event.rect(), QColor(colours.paper))
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        if self._pale:
            painter.setOpacity(0.35)
        paint(painter, self.scene(), colours)
        self._paint_pointed(painter, colours)

    def _paint_pointed(self, painter: QPainter, colours: Palette) -> None:
        if self._cell is None or self._shown is None:
            return
        frame = self.frame()
        y = frame.resistance.at(self._cell.resistance)
        painter.setPen(QPen(QColor(colours.accent), 1.0))
        painter.drawLine(QPointF(frame.set.start, y), QPointF(frame.energy.stop, y))
        x = frame.set.at(max(self._cell.set or 0.0, 0.0) if self._cell.moves else 0.0)
        painter.setPen(QPen(QColor(colours.accent), 2.0))
        painter.drawEllipse(QPointF(x, y), 7, 7)

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        if self._shown is None:
            return
        menu = QMenu(self)
        menu.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        add_picture_actions(menu, self.drawing, self)
        menu.popup(event.globalPos())

    def drawing(self) -> Drawing:
        """The chart as a picture of its own, without what the pointer shows."""

        def on(painter: QPainter) -> None:
            painter.fillRect(self.rect(), QColor(palette().paper))
            painter.setRenderHint(QPainter.RenderHint.Antialiasing)
            paint(painter, self.scene(), palette())

        return Drawing(self.accessibleName(), self.width(), self.height(), on)

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        self._point(self._nearest(event.position()))

    def leaveEvent(self, event: object) -> None:
        self._point(None)

    def _nearest(self, at: QPointF) -> Cell | None:
        if self._shown is None:
            return None
        frame = self.frame()
        cells = [c for c in self._shown[0].cells if c.set is not None]
        if not cells:
            return None
        row = min({c.resistance for c in cells}, key=lambda r: abs(frame.resistance.at(r) - at.y()))
        same = [c for c in cells if c.resistance == row]
        return min(same, key=lambda c: abs(frame.set.at(max(c.set or 0.0, 0.0)) - at.x()))

    def _point(self, cell: Cell | None) -> None:
        if cell is not self._cell:
            self._cell = cell
            self.pointed.emit(cell)
            self.update()


def letters_here() -> Letters:
    """The letters of the screen."""
    return Letters(measure, _metrics("small", base_size()).height())


def measure(text: str, level: Level) -> float:
    """Width of a text, in pixels."""
    return _metrics(level, base_size()).horizontalAdvance(text)


@lru_cache(maxsize=16)
def _metrics(level: Level, size: float) -> QFontMetricsF:
    """Metrics of a level; `size` only tells apart what they were made for."""
    return QFontMetricsF(font(level))


@lru_cache(maxsize=16)
def _font(level: Level, size: float) -> QFont:
    return font(level)


def paint(painter: QPainter, scene: Scene, colours: Palette) -> None:
    """Paint a scene in the colours of a palette."""
    for item in scene:
        colour = QColor(getattr(colours, item.ink))
        if isinstance(item, Area):
            colour.setAlphaF(item.strength)
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(colour)
            painter.drawPolygon(QPolygonF([QPointF(x, y) for x, y in item.points]))
        elif isinstance(item, Line):
            pen = QPen(colour, item.width)
            if item.dash:
                pen.setDashPattern([d / item.width for d in item.dash])
                pen.setCapStyle(Qt.PenCapStyle.FlatCap)
            painter.setPen(pen)
            painter.drawPolyline(QPolygonF([QPointF(x, y) for x, y in item.points]))
        elif isinstance(item, Mark):
            _mark(painter, item, colour, QColor(colours.paper))
        else:
            _words(painter, item, colour)


def _mark(painter: QPainter, mark: Mark, colour: QColor, paper: QColor) -> None:
    painter.setPen(QPen(colour, 1.4))
    painter.setBrush(colour if mark.filled else paper)
    corners = outline_of(mark)
    if corners is None:
        painter.drawEllipse(QPointF(*mark.at), mark.size, mark.size)
    else:
        painter.drawPolygon(QPolygonF([QPointF(x, y) for x, y in corners]))


def _words(painter: QPainter, words: Words, colour: QColor) -> None:
    painter.setFont(_font(words.level, base_size()))
    painter.setPen(colour)
    width = 0.0 if words.anchor == "left" and not words.turned else measure(words.text, words.level)
    shift = {"left": 0.0, "middle": -width / 2, "right": -width}[words.anchor]
    x, y = words.at
    if words.turned:
        painter.save()
        painter.translate(x, y)
        painter.rotate(-90)
        half = _metrics(words.level, base_size()).height() / 2
        painter.drawText(QRectF(shift, -half, width + 2, 2 * half), Qt.AlignmentFlag.AlignVCenter, words.text)
        painter.restore()
    else:
        painter.drawText(QPointF(x + shift, y), words.text)
