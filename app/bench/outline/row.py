"""One row of the outline on screen: icon, name, key figure; drawn by itself so that long texts are elided."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QRect, QSize, Qt, Signal
from PySide6.QtGui import QColor, QFontMetrics, QKeyEvent, QPainter, QPaintEvent, QPen
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.bench.outline.part_actions import action_of
from app.bench.outline.rows import Row
from app.look import font, pixmap
from app.look.palette import palette
from app.look.spacing import GAP, ICON, RADIUS, ROW, SPACE

#: Width of the bar beside the selected row, and how far an entry of a group stands in.
BAR, STEP = 3, 16
#: Share of a row's room up to which a figure is never cut.
SHORT = 0.4
KEYS = {
    Qt.Key.Key_Up: "up",
    Qt.Key.Key_Down: "down",
    Qt.Key.Key_Home: "first",
    Qt.Key.Key_End: "last",
    Qt.Key.Key_Return: "enter",
    Qt.Key.Key_Enter: "enter",
}


class RowButton(QAbstractButton):
    """Pressing it selects its part. `asked` names what a key asks for: "up", "down", "enter", "remove" ..."""

    asked = Signal(str)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setCheckable(True)
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)
        self.setAttribute(Qt.WidgetAttribute.WA_Hover)
        self.setCursor(Qt.CursorShape.PointingHandCursor)
        self._row = Row("", "none", "")
        self._wrong = False

    @property
    def row(self) -> Row:
        return self._row

    def show_row(self, row: Row, selected: bool, wrong: bool, also: bool = False) -> None:
        """Show a row; `wrong`: something entered in its form was not taken; `also`: selected with the one unfolded."""
        figure = "✕ not valid" if wrong else row.figure
        if (row, wrong) != (self._row, self._wrong):
            self._row, self._wrong = row, wrong
            self.setAccessibleName(f"{row.name}, {figure}" if figure else row.name)
            self.setToolTip(f"{row.name}: {figure}" if figure else row.name)
            self.update()
        self.setChecked(selected or also)
        policy = Qt.FocusPolicy.StrongFocus if selected else Qt.FocusPolicy.ClickFocus
        if self.focusPolicy() != policy:
            self.setFocusPolicy(policy)

    def nextCheckState(self) -> None:
        """What is selected is told by `Sight`, not by the press."""

    def sizeHint(self) -> QSize:
        return QSize(160, max(ROW, QFontMetrics(font()).height() + SPACE))

    def minimumSizeHint(self) -> QSize:
        return QSize(80, self.sizeHint().height())

    def keyPressEvent(self, event: QKeyEvent) -> None:
        key, keys = Qt.Key(event.key()), event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier
        action = action_of(event)
        if action:
            self.asked.emit(action)
        elif keys == Qt.KeyboardModifier.ShiftModifier and key in (Qt.Key.Key_Up, Qt.Key.Key_Down):
            self.asked.emit("also up" if key == Qt.Key.Key_Up else "also down")
        elif key in KEYS and not keys:
            self.asked.emit(KEYS[key])
        else:
            super().keyPressEvent(event)

    def changeEvent(self, event: QEvent) -> None:
        if event.type() in (QEvent.Type.PaletteChange, QEvent.Type.FontChange):
            self.updateGeometry()
            self.update()
        super().changeEvent(event)

    def paintEvent(self, event: QPaintEvent) -> None:
        with QPainter(self) as painter:  # ended also where something raises: Qt crashes otherwise
            self._paint(painter)

    def _paint(self, painter: QPainter) -> None:
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        colours = palette()
        whole = self.rect()
        if self.isChecked():
            painter.fillRect(whole, QColor(colours.accent_soft))
            painter.fillRect(QRect(0, 0, BAR, whole.height()), QColor(colours.accent))
        elif self.underMouse():
            painter.fillRect(whole, QColor(colours.pressed))
        left = BAR + SPACE + self._row.level * STEP
        picture = pixmap(
            self._row.icon,
            ICON,
            colours.accent if self.isChecked() else colours.soft_ink,
            self.devicePixelRatioF(),
        )
        painter.drawPixmap(left, (whole.height() - ICON) // 2, picture)
        self._paint_texts(painter, whole.adjusted(left + ICON + SPACE, 0, -SPACE, 0))
        if self.hasFocus():
            painter.setPen(QPen(QColor(colours.accent), 1.5))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(whole.adjusted(1, 1, -2, -2), RADIUS, RADIUS)

    def _paint_texts(self, painter: QPainter, room: QRect) -> None:
        colours = palette()
        name_font = font("strong" if self.isChecked() else "body")
        texts = (self._row.name, "✕ not valid" if self._wrong else self._row.figure)
        name, figure = texts_in(room.width(), *texts, QFontMetrics(name_font), QFontMetrics(font()))
        side = Qt.AlignmentFlag.AlignVCenter
        painter.setFont(name_font)
        painter.setPen(QColor(colours.ink))
        painter.drawText(room, side | Qt.AlignmentFlag.AlignLeft, name)
        painter.setFont(font())
        painter.setPen(QColor(colours.over if self._wrong else colours.soft_ink))
        painter.drawText(room, side | Qt.AlignmentFlag.AlignRight, figure)


def texts_in(
    room: int, name: str, figure: str, name_metrics: QFontMetrics, figure_metrics: QFontMetrics
) -> tuple[str, str]:
    """Name and figure as so many pixels have room for them: a figure that is short stays whole, as half a number says
    nothing; of a longer one the end goes first, and the name keeps its length up to two thirds of the room."""
    gap = SPACE + GAP
    name_wants, figure_wants = name_metrics.horizontalAdvance(name), figure_metrics.horizontalAdvance(figure)
    name_room = room - figure_wants - gap
    if figure_wants > SHORT * room:
        name_room = max(name_room, min(name_wants + 2, room * 2 // 3))
    dots = Qt.TextElideMode.ElideRight
    figure_room = max(0, room - min(name_wants, name_room) - gap)
    return name_metrics.elidedText(name, dots, name_room), figure_metrics.elidedText(
        figure, dots, figure_room
    )
