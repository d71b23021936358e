"""The strips under the x-t diagram, and the chips that choose them."""

from __future__ import annotations

from functools import partial

from PySide6.QtCore import QSize
from PySide6.QtGui import QResizeEvent
from PySide6.QtWidgets import QHBoxLayout, QMenu, QToolButton, QVBoxLayout, QWidget

from app.bench.axes import margins_of
from app.bench.strip import Strip
from app.bench.strip_contents import CHIPS, OF_ONE_GAUGE, gauge_of
from app.document import Document
from app.look.spacing import GAP, WIDE
from app.sight import STRIPS, Sight
from app.solving import Solution

#: Strips at once; choosing another takes the oldest away.
MOST = 3
#: Pixels in height below which strips cannot be read.
LEAST_ROOM = 150


class Strips(QWidget):
    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._document, self._sight, self._solution = document, sight, solution
        self._shown: list[Strip] = []
        self._chips: dict[str, QToolButton] = {}
        self._gauge_menus: dict[str, QToolButton] = {}
        whole = self._whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(0)
        row = QHBoxLayout()
        row.setContentsMargins(WIDE, GAP, GAP, GAP)
        row.setSpacing(GAP)
        for kind in STRIPS:
            row.addWidget(self._make_chip(kind))
            if kind in OF_ONE_GAUGE:
                row.addWidget(self._make_gauge_menu(kind))
        row.addStretch(1)
        whole.addLayout(row)
        self._row = row
        self._room = QWidget()
        self._room.setMinimumHeight(LEAST_ROOM)
        whole.addWidget(self._room, 1)
        for source in (document, sight):
            source.changed.connect(self._look_again)
        self._look_again()

    def shown(self) -> tuple[Strip, ...]:
        """The strips, from top to bottom."""
        return tuple(self._shown)

    def _make_chip(self, kind: str) -> QToolButton:
        chip = QToolButton()
        chip.setProperty("role", "chip")
        chip.setCheckable(True)
        chip.setToolTip(TOOLTIPS[kind])
        chip.clicked.connect(lambda: self._toggle(kind))
        self._chips[kind] = chip
        return chip

    def _make_gauge_menu(self, kind: str) -> QToolButton:
        button = QToolButton()
        button.setText("▾")
        button.setAccessibleName(f"Gauge of {CHIPS[kind].lower()}")
        button.setToolTip("Choose the gauge that this strip is about.")
        button.setProperty("role", "quiet")
        button.setStyleSheet("QToolButton { padding: 2px 0px; }")
        menu = QMenu(button)
        menu.aboutToShow.connect(lambda: self._fill_menu(menu, kind))
        button.setMenu(menu)
        button.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        button.setFixedWidth(button.fontMetrics().horizontalAdvance("▾") + 2 * GAP)
        self._gauge_menus[kind] = button
        return button

    def _fill_menu(self, menu: QMenu, kind: str) -> None:
        menu.clear()
        for gauge in self._document.case.gauges:
            menu.addAction(gauge.name, partial(self._show_gauge, kind, gauge.name))

    def _show_gauge(self, kind: str, gauge: str) -> None:
        name = f"{kind}:{gauge}"
        shown = self._sight.strips
        if any(_kind(s) == kind for s in shown):
            self._sight.set(strips=tuple(name if _kind(s) == kind else s for s in shown))
        else:
            self._sight.set(strips=(*shown, name)[-MOST:])

    def _toggle(self, kind: str) -> None:
        shown = self._sight.strips
        without = tuple(s for s in shown if _kind(s) != kind)
        if len(without) == len(shown):
            without = (*shown, kind)[-MOST:]
        self._sight.set(strips=without or shown)
        self._look_again()  # a click has changed the chip even where the last strip stays

    def _look_again(self) -> None:
        case, wanted = self._document.case, self._sight.strips
        for kind, chip in self._chips.items():
            name = next((s for s in wanted if _kind(s) == kind), kind)
            gauge = gauge_of(name, case) if kind in OF_ONE_GAUGE else None
            shown = any(_kind(s) == kind for s in wanted)
            text = f"{CHIPS[kind]}, {gauge}" if gauge and shown else CHIPS[kind]
            if chip.text() != text:
                chip.setText(text)
            chip.setChecked(shown)
            if kind in self._gauge_menus:
                self._gauge_menus[kind].setVisible(shown and len(case.gauges) > 1)
        if tuple(s.name for s in self._shown) != wanted:
            self._rebuild(wanted)

    def _rebuild(self, wanted: tuple[str, ...]) -> None:
        for strip in self._shown:
            strip.hide()
            strip.deleteLater()
        self._shown = [
            Strip(name, name == wanted[-1], self._document, self._sight, self._solution, self._room)
            for name in wanted
        ]
        self._lay_out()
        for strip in self._shown:
            strip.show()

    def minimumSizeHint(self) -> QSize:
        """The chips, moved left as far as they go."""
        chips = self._row.sizeHint().width() - self._row.contentsMargins().left() + WIDE
        return QSize(chips, self._row.sizeHint().height() + LEAST_ROOM)

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._lay_out()

    def _lay_out(self) -> None:
        """Plots of equal height whatever their margins, and chips above the plot where they fit there."""
        spare = self.width() - self._row.sizeHint().width() + self._row.contentsMargins().left()
        gutter = int(margins_of(self.font()).gutter)
        self._row.setContentsMargins(max(min(gutter, spare), WIDE), GAP, GAP, GAP)
        self._whole.activate()
        margins = [strip.margins() for strip in self._shown]
        free = self._room.height() - sum(m.header + m.bottom for m in margins)
        top = 0.0
        for strip, margin in zip(self._shown, margins, strict=True):
            height = margin.header + margin.bottom + free / len(self._shown)
            strip.setGeometry(0, round(top), self._room.width(), round(top + height) - round(top))
            top += height


TOOLTIPS = {
    "force_pair": "Force at a gauge and impedance times velocity there. In a wave that runs down the member the two "
    "are equal; the area between them is twice the up-going wave (d'Alembert).",
    "velocity": "Velocity at every gauge, positive towards the far end.",
    "stress": "Stress at every gauge.",
    "displacement": "Displacement of every gauge from its place before the blow, positive towards the far end.",
    "waves": "The force at a gauge as the sum of a down-going and an up-going wave: (F ∓ Z v)/2 (d'Alembert).",
    "energy": "Energy put in, in motion, elastic and lost, over time; and what has passed the first gauge.",
}


def _kind(strip: str) -> str:
    return strip.partition(":")[0]
