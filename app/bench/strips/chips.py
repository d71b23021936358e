"""The chips that choose the strips. Those for which there is no room wait in a menu at the end of the row."""

from __future__ import annotations

from functools import partial

from PySide6.QtCore import QEvent, QSize
from PySide6.QtGui import QResizeEvent
from PySide6.QtWidgets import QMenu, QToolButton, QWidget

from app.bench.pictures.axes import margins_of
from app.bench.strips.contents import CHIPS, OF_ONE_GAUGE, gauge_of
from app.document import Document
from app.laid_over import fill_over_menu
from app.look.spacing import GAP, SPACE
from app.sight import STRIPS, Sight

#: Strips at once; choosing another takes the oldest away.
MOST = 3


class StripChips(QWidget):
    def __init__(self, document: Document, sight: Sight, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._sight = document, sight
        self._long = dict(CHIPS)
        self._chips = {kind: self._make_chip(kind) for kind in STRIPS}
        self._gauge_menus = {kind: self._make_gauge_menu(kind) for kind in OF_ONE_GAUGE}
        self._over = self._make_menu("Lay over ▾", "Draw other cases of the project over this one.")
        self._over.setAccessibleName("Lay other cases over this one")
        over_menu = self._over.menu()
        over_menu.aboutToShow.connect(lambda: fill_over_menu(over_menu, document, sight))
        self._more = self._make_menu("More ▾", "Strips for which there is no room in this row.")
        self._more.setAccessibleName("More strips")
        menu = self._more.menu()
        menu.aboutToShow.connect(lambda: self._fill_more(menu))
        for source in (document, sight):
            source.changed.connect(self._look_again)
        self._look_again()

    def minimumSizeHint(self) -> QSize:
        return QSize(self._more.sizeHint().width() + 2 * GAP, self._more.sizeHint().height() + 2 * GAP)

    sizeHint = minimumSizeHint

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._lay_out()

    def event(self, event: QEvent) -> bool:
        if event.type() == QEvent.Type.LayoutRequest:
            self._lay_out()
        return super().event(event)

    # Making -----------------------------------------------------------------------------------------------------

    def _make_chip(self, kind: str) -> QToolButton:
        chip = QToolButton(self)
        chip.setProperty("role", "chip")
        chip.setCheckable(True)
        chip.setToolTip(TOOLTIPS[kind])
        chip.clicked.connect(lambda: self._toggle(kind))
        return chip

    def _make_gauge_menu(self, kind: str) -> QToolButton:
        button = self._make_menu("▾", "Choose the gauge that this strip is about.")
        button.setAccessibleName(f"Gauge of {CHIPS[kind].lower()}")
        button.setStyleSheet("QToolButton { padding: 2px 0px; }")
        menu = button.menu()
        menu.aboutToShow.connect(lambda: self._fill_gauges(menu, kind))
        return button

    def _make_menu(self, text: str, tip: str) -> QToolButton:
        button = QToolButton(self)
        button.setText(text)
        button.setToolTip(tip)
        button.setProperty("role", "quiet")
        button.setMenu(QMenu(button))
        button.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        return button

    # Choosing ---------------------------------------------------------------------------------------------------

    def _fill_gauges(self, menu: QMenu, kind: str) -> None:
        menu.clear()
        for gauge in self._document.case.gauges:
            menu.addAction(gauge.name, partial(self._show_gauge, kind, gauge.name))

    def _fill_more(self, menu: QMenu) -> None:
        menu.clear()
        for kind, chip in self._chips.items():
            if chip.isHidden():
                menu.addAction(CHIPS[kind], partial(self._toggle, kind))

    def _show_gauge(self, kind: str, gauge: str) -> None:
        name, shown = f"{kind}:{gauge}", self._sight.strips
        if any(kind_of(s) == kind for s in shown):
            self._sight.set(strips=tuple(name if kind_of(s) == kind else s for s in shown))
        else:
            self._sight.set(strips=(*shown, name)[-MOST:])

    def _toggle(self, kind: str) -> None:
        shown = self._sight.strips
        after = tuple(s for s in shown if kind_of(s) != kind)
        if len(after) == len(shown):
            after = (*shown, kind)[-MOST:]
        self._sight.set(strips=after or shown)
        self._look_again()  # a click has changed the chip even where the last strip stays

    # Showing ----------------------------------------------------------------------------------------------------

    def _look_again(self) -> None:
        case, wanted = self._document.case, self._sight.strips
        for kind, chip in self._chips.items():
            name = next((s for s in wanted if kind_of(s) == kind), kind)
            gauge = gauge_of(name, case) if kind in OF_ONE_GAUGE else None
            shown = any(kind_of(s) == kind for s in wanted)
            self._long[kind] = f"{CHIPS[kind]}, {gauge}" if gauge and shown else CHIPS[kind]
            chip.setChecked(shown)
        count = sum(c.name in self._sight.laid_over for c in self._document.project.cases if c is not case)
        over = f"Laid over: {count} ▾" if count else "Lay over ▾"
        if self._over.text() != over:
            self._over.setText(over)
        self._lay_out()

    def _lay_out(self) -> None:
        """From the left edge of the plots on where all fit, else from the panel's; shown strips first, and where not
        even those fit, without gauges."""
        shown = [self._long[kind] for kind, chip in self._chips.items() if chip.isChecked()]
        needed = sum(self.fontMetrics().horizontalAdvance(text) + 6 * GAP for text in shown)
        short = needed + 2 * self._over.sizeHint().width() + self._more.sizeHint().width() > self.width()
        for kind, chip in self._chips.items():
            text = CHIPS[kind] if short else self._long[kind]
            if chip.text() != text:
                chip.setText(text)
        self._more.setText("▾" if short else "More ▾")
        several = len(self._document.case.gauges) > 1 and not short
        parts: dict[str, list[tuple[QToolButton, int]]] = {}
        for kind, chip in self._chips.items():
            parts[kind] = [(chip, chip.sizeHint().width())]
            if kind in self._gauge_menus and chip.isChecked() and several:
                arrow = self._gauge_menus[kind]
                parts[kind].append((arrow, arrow.fontMetrics().horizontalAdvance("▾") + 2 * GAP))
        widths = {kind: sum(w + GAP for _, w in row) for kind, row in parts.items()}
        cases = len(self._document.project.cases) > 1
        end = self._over.sizeHint().width() + GAP if cases else 0
        self._over.setVisible(cases)
        self._over.setGeometry(self.width() - end, GAP, max(end - GAP, 0), self._more.sizeHint().height())
        gutter, whole = int(margins_of(self.font()).gutter), sum(widths.values())
        left = max(min(gutter, self.width() - end - whole), SPACE)
        room = self.width() - end - left
        fitting = set(parts)
        if whole > room:
            room -= self._more.sizeHint().width() + GAP
            for kind in sorted(parts, key=lambda k: self._chips[k].isChecked()):
                if sum(widths[k] for k in fitting) > room:
                    fitting.discard(kind)
        self._place(parts, fitting, left)

    def _place(self, parts: dict[str, list[tuple[QToolButton, int]]], fitting: set[str], left: int) -> None:
        height = self._more.sizeHint().height()
        placed = set()
        for kind, row in parts.items():
            for button, width in row if kind in fitting else ():
                button.setGeometry(left, GAP, width, height)
                placed.add(button)
                left += width + GAP
        if len(fitting) < len(parts):
            self._more.setGeometry(left, GAP, self._more.sizeHint().width(), height)
            placed.add(self._more)
        for button in (*self._chips.values(), *self._gauge_menus.values(), self._more):
            if button.isHidden() == (button in placed):
                button.setVisible(button in placed)


TOOLTIPS = {
    "force_pair": "Force at a gauge and impedance times velocity there. In a wave that runs down the member the two "
    "are equal; the area between them is twice the up-going wave (d'Alembert).",
    "velocity": "Velocity at every gauge, positive towards the far end.",
    "stress": "Stress at every gauge.",
    "displacement": "Displacement of every gauge from its place before the blow, positive towards the far end.",
    "waves": "The force at a gauge as the sum of a down-going and an up-going wave: (F ∓ Z v)/2 (d'Alembert).",
    "energy": "Energy put in, in motion, elastic and lost, over time; and what has passed the first gauge.",
}


def kind_of(strip: str) -> str:
    """What a strip shows, without the gauge that it is about."""
    return strip.partition(":")[0]
