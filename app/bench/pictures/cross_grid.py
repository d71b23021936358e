"""Panels in two rows whose columns have common edges: what keeps distance and time shared to the pixel.

Two splitters inside a splitter would each settle their own widths; here one set of fractions rules both rows. The
boundaries are dragged by handles, or moved with the arrow keys while a handle has the focus. Outer columns and rows can
be folded away, and one panel can have all the room.
"""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QEvent, QPoint, QRect, QSize, Qt, Signal
from PySide6.QtGui import QKeyEvent, QMouseEvent, QResizeEvent
from PySide6.QtWidgets import QFrame, QWidget

#: Pixels between panels, in which the handles lie, and how far an arrow key moves one.
HANDLE, KEY_STEP = 7, 16


class CrossGrid(QWidget):
    """`panels`: rows of equally many widgets. `columns` and `rows` are the shares of width and height.

    `title_clicked`: a panel whose title was clicked twice. `folding_changed`: something was folded or opened."""

    title_clicked = Signal(QWidget)
    folding_changed = Signal()

    def __init__(
        self, panels: Sequence[Sequence[QWidget]], columns: Sequence[float], rows: Sequence[float]
    ) -> None:
        super().__init__()
        self._panels = [list(row) for row in panels]
        self._shares = {True: list(columns), False: list(rows)}
        self._folded: set[tuple[bool, int]] = set()
        self._alone: QWidget | None = None
        for row in self._panels:
            for panel in row:
                panel.setParent(self)
        self._handles = [
            _Handle(self, upright, index)
            for upright, shares in self._shares.items()
            for index in range(len(shares) - 1)
        ]

    def shares(self) -> tuple[tuple[float, ...], tuple[float, ...]]:
        """Shares of the columns and of the rows, to be remembered."""
        return tuple(self._shares[True]), tuple(self._shares[False])

    def set_shares(self, columns: Sequence[float], rows: Sequence[float]) -> None:
        """Take remembered shares; those that do not fit the panels are left aside."""
        for upright, given in ((True, columns), (False, rows)):
            if len(given) == len(self._shares[upright]) and all(share > 0 for share in given):
                self._shares[upright] = [share / sum(given) for share in given]
        self._lay_out()

    # Folding ----------------------------------------------------------------------------------------------------

    @property
    def alone(self) -> QWidget | None:
        """The panel that has all the room."""
        return self._alone

    def show_alone(self, panel: QWidget | None) -> None:
        """Give one panel all the room; with `None` each has its own again."""
        self._alone = panel
        self._lay_out()
        if panel is not None:
            panel.setFocus()

    def folded(self, upright: bool, index: int) -> bool:
        return (upright, index) in self._folded

    def fold(self, upright: bool, index: int, away: bool) -> None:
        """Fold a column (`upright`) or a row away, or open it; the last one that is open stays."""
        open_ones = [i for i in range(len(self._shares[upright])) if not self.folded(upright, i)]
        if away and open_ones != [index]:
            self._folded.add((upright, index))
        elif not away:
            self._folded.discard((upright, index))
        self._lay_out()
        self.folding_changed.emit()

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        """A panel leaves a double click on its title to the grid."""
        where = event.position().toPoint()
        for panel in (p for row in self._panels for p in row if not p.isHidden()):
            title = QRect(panel.geometry())
            title.setHeight(round(1.9 * self.fontMetrics().height()))
            if title.contains(where):
                self.title_clicked.emit(panel)
                return

    def minimumSizeHint(self) -> QSize:
        return QSize(
            sum(self._least(True)) + HANDLE * (len(self._shares[True]) - 1),
            sum(self._least(False)) + HANDLE * (len(self._shares[False]) - 1),
        )

    def move_boundary(self, upright: bool, index: int, pixels: int) -> None:
        """Move the boundary after a column (`upright`) or a row by so many pixels, as far as the panels allow."""
        if self.folded(upright, index) or self.folded(upright, index + 1):
            return
        sizes, least = self._sizes(upright), self._least(upright)
        pixels = max(pixels, least[index] - sizes[index])
        pixels = min(pixels, sizes[index + 1] - least[index + 1])
        sizes[index] += pixels
        sizes[index + 1] -= pixels
        # those that are folded away keep their share for when they are opened again
        shares, whole = self._shares[upright], sum(sizes)
        there = sum(share for i, share in enumerate(shares) if not self.folded(upright, i))
        self._shares[upright] = [
            share if self.folded(upright, i) else there * size / whole
            for i, (share, size) in enumerate(zip(shares, sizes, strict=True))
        ]
        self._lay_out()

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._lay_out()

    def event(self, event: QEvent) -> bool:
        """A panel that needs more or less room than before says so by a request for layout."""
        if event.type() == QEvent.Type.LayoutRequest:
            self._lay_out()
        return super().event(event)

    def _least(self, upright: bool) -> list[int]:
        def least(panel: QWidget) -> int:
            hint = panel.minimumSizeHint().expandedTo(panel.minimumSize())
            return hint.width() if upright else hint.height()

        lines = list(zip(*self._panels, strict=True)) if upright else self._panels
        return [
            0 if self.folded(upright, i) else max((least(panel) for panel in line), default=0)
            for i, line in enumerate(lines)
        ]

    def _sizes(self, upright: bool) -> list[int]:
        """Whole pixels by share, none below what its panels need as long as the others can give."""
        least = self._least(upright)
        shares = [0.0 if self.folded(upright, i) else s for i, s in enumerate(self._shares[upright])]
        shares = [share / sum(shares) for share in shares]
        whole = (self.width() if upright else self.height()) - HANDLE * (len(shares) - 1)
        sizes = [max(round(share * whole), floor) for share, floor in zip(shares, least, strict=True)]
        surplus = sum(sizes) - whole
        while surplus != 0:
            spare = [
                size - floor if share else -1 for size, floor, share in zip(sizes, least, shares, strict=True)
            ]
            index = spare.index(max(spare))
            change = min(surplus, max(spare[index], 0)) if surplus > 0 else surplus
            if change == 0:  # everything is at its least: the last one goes over the edge
                break
            sizes[index] -= change
            surplus -= change
        return sizes

    def _lay_out(self) -> None:
        if self._alone is not None:
            for panel in (p for row in self._panels for p in row):
                panel.setVisible(panel is self._alone)
            self._alone.setGeometry(self.rect())
            for handle in self._handles:
                handle.hide()
            return
        widths, heights = self._sizes(True), self._sizes(False)
        top = 0
        for row, height in zip(self._panels, heights, strict=True):
            left = 0
            for panel, width in zip(row, widths, strict=True):
                panel.setGeometry(QRect(left, top, width, height))
                panel.setVisible(width > 0 and height > 0)
                left += width + HANDLE
            top += height + HANDLE
        for handle in self._handles:
            sizes = widths if handle.upright else heights
            at = sum(sizes[: handle.index + 1]) + HANDLE * handle.index
            box = QRect(at, 0, HANDLE, self.height())
            handle.setGeometry(box if handle.upright else QRect(0, at, self.width(), HANDLE))
            handle.setVisible(True)
            handle.raise_()


class _Handle(QFrame):
    """One boundary between columns (`upright`) or rows."""

    def __init__(self, grid: CrossGrid, upright: bool, index: int) -> None:
        super().__init__(grid)
        self.upright, self.index = upright, index
        self._grid, self._from = grid, QPoint()
        self.setCursor(Qt.CursorShape.SplitHCursor if upright else Qt.CursorShape.SplitVCursor)
        self.setAccessibleName("Boundary between columns" if upright else "Boundary between rows")
        self.setProperty("role", "handle")
        self.setToolTip("Drag to move; double-click to fold away or open")

    def mousePressEvent(self, event: QMouseEvent) -> None:
        self._from = event.globalPosition().toPoint()

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        now = event.globalPosition().toPoint()
        moved = now - self._from
        self._from = now
        self._grid.move_boundary(self.upright, self.index, moved.x() if self.upright else moved.y())

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        """Folds what lies outside of the boundary: the first column at its left, or what is right of it or below."""
        outside = self.index if self.upright and self.index == 0 else self.index + 1
        self._grid.fold(self.upright, outside, not self._grid.folded(self.upright, outside))

    def keyPressEvent(self, event: QKeyEvent) -> None:
        back = Qt.Key.Key_Left if self.upright else Qt.Key.Key_Up
        on = Qt.Key.Key_Right if self.upright else Qt.Key.Key_Down
        if event.key() in (back, on):
            step = -KEY_STEP if event.key() == back else KEY_STEP
            self._grid.move_boundary(self.upright, self.index, step)
        else:
            super().keyPressEvent(event)
