"""The pictures of the Bench, laid out so that distance and time are shared to the pixel.

member drawing | x-t diagram | profile        one distance axis, downwards
at the cursor  | strips      | findings       one time axis, to the right, with the x-t diagram
"""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QSize, Qt, Signal
from PySide6.QtGui import QColor, QFontMetricsF, QKeyEvent, QKeySequence, QPainter, QPaintEvent, QShortcut
from PySide6.QtWidgets import QAbstractButton, QApplication, QComboBox, QVBoxLayout, QWidget

from app.bench.at_cursor import AtCursor
from app.bench.findings_panel import FindingsPanel
from app.bench.member.drawing import MemberDrawing
from app.bench.pictures.cross_grid import CrossGrid
from app.bench.profile import Profile
from app.bench.strips.strips import Strips
from app.bench.time_bar import TimeBar
from app.bench.xt_diagram import XtDiagram
from app.document import Document
from app.laid_over import LaidOver
from app.look.fonts import font
from app.look.palette import palette
from app.sight import Sight
from app.solving import Solution

COLUMNS, ROWS = (0.18, 0.59, 0.23), (0.53, 0.47)


class Bench(QWidget):
    """All pictures and the time bar. `shares` and `set_shares` let the window remember how they are divided.

    `alone_changed`: one panel has taken all the room, or given it back."""

    alone_changed = Signal(bool)

    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.member = MemberDrawing(document, sight, solution)
        self.xt = XtDiagram(document, sight, solution)
        self.laid_over = LaidOver(document, sight, self)
        self.profile = Profile(document, sight, solution, laid_over=self.laid_over)
        self.at_cursor = AtCursor(document, sight, solution)
        self.strips = Strips(document, sight, solution, laid_over=self.laid_over)
        self.findings = FindingsPanel(document, sight, solution, laid_over=self.laid_over)
        self.time_bar = TimeBar(document, sight, solution)
        self._sight = sight
        line = QFontMetricsF(font()).height()
        for picture, size in ((self.member, max(150, 10 * line)), (self.xt, 280), (self.profile, 170)):
            picture.setMinimumSize(QSize(round(size), 160))
        self.grid = CrossGrid(
            [[self.member, self.xt, self.profile], [self.at_cursor, self.strips, self.findings]],
            COLUMNS,
            ROWS,
        )
        self.grid.title_clicked.connect(self.turn_alone)
        self.grid.folding_changed.connect(self._tell_bare)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(0)
        whole.addWidget(self.grid, 1)
        whole.addWidget(self.time_bar)
        self._shortcuts()

    def shares(self) -> tuple[tuple[float, ...], tuple[float, ...]]:
        return self.grid.shares()

    def set_shares(self, columns: Sequence[float], rows: Sequence[float]) -> None:
        self.grid.set_shares(columns, rows)

    def turn_alone(self, panel: QWidget | None = None) -> None:
        """Give a panel all the room, that with the focus or under the mouse where none is named; or take it back."""
        if not self.isVisible():
            return
        if self.grid.alone is not None:
            panel = None
        elif panel is None:
            panel = self._panel_looked_at()
        self.grid.show_alone(panel)
        self._tell_bare()
        self.alone_changed.emit(panel is not None)

    def _tell_bare(self) -> None:
        """The member carries the numbers of distance for all pictures, and the lowest strip those of time."""
        carriers = {"distance": self.member, "time": self.strips}
        bare = frozenset(axis for axis, carrier in carriers.items() if carrier.isHidden())
        for picture in (self.xt, self.profile):
            picture.set_bare(bare)

    def _panel_looked_at(self) -> QWidget:
        panels = (self.member, self.xt, self.profile, self.at_cursor, self.strips, self.findings)
        focus = QApplication.focusWidget()
        held = [p for p in panels if focus is not None and (p is focus or p.isAncestorOf(focus))]
        return next((p for p in (*held, *panels) if p in held or p.underMouse()), self.xt)

    def paintEvent(self, event: QPaintEvent) -> None:
        QPainter(self).fillRect(event.rect(), QColor(palette().paper))

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Keys that no picture has taken: the arrows step through time, with Shift ten steps at once."""
        way = {Qt.Key.Key_Left: -1, Qt.Key.Key_Right: 1}.get(Qt.Key(event.key()), 0)
        if way:
            self.time_bar.step(way * (10 if event.modifiers() & Qt.KeyboardModifier.ShiftModifier else 1))
        elif event.key() == Qt.Key.Key_Home:
            self._show_all()
        elif event.key() == Qt.Key.Key_Escape and self.grid.alone is not None:
            self.turn_alone()
        elif event.key() == Qt.Key.Key_Escape and self._sight.pinned is not None:
            self._sight.set(pinned=None)
        else:
            super().keyPressEvent(event)

    def close_work(self) -> bool:
        """End what goes on beside the window; False where it would not end in time."""
        self.laid_over.drop()  # both are told to end before either is waited for
        self.findings.mesh.drop()
        over, mesh = self.laid_over.close(), self.findings.mesh.close_work()
        return over and mesh

    def _show_all(self) -> None:
        self.xt.show_all()

    def _shortcuts(self) -> None:
        space = QShortcut(QKeySequence("Space"), self)
        space.activated.connect(self._space)
        home = QShortcut(QKeySequence("Ctrl+0"), self)
        home.activated.connect(self._show_all)

    def _space(self) -> None:
        """Play or pause; a button or a list that has the focus is worked by the space bar as everywhere."""
        focus = QApplication.focusWidget()
        if isinstance(focus, QAbstractButton) and focus.isEnabled():
            focus.click()
        elif isinstance(focus, QComboBox):
            focus.showPopup()
        else:
            self.time_bar.toggle()
