"""Down to depth on the screen: solved for the case at hand while it is looked at."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from PySide6.QtCore import QSize, QTimer
from PySide6.QtGui import QColor, QHideEvent, QPainter, QPaintEvent, QShowEvent
from PySide6.QtWidgets import QWidget

from app.aside import Aside, Cancel
from app.document import Document
from app.look.palette import palette
from app.set_sheet.chart_view import measure, paint
from app.set_sheet.depth_chart import depth_chart, depth_summary
from app.set_sheet.frame import case_limits
from app.set_sheet.scene import Scene
from app.set_sheet.sheet_solution import SETTLE, WORKERS
from app.set_sheet.words import told_in
from app.units import units_of
from solver import Case
from solver.studies import StudyError
from solver.studies.depth import Depths
from solver.studies.settings import DepthSettings, depth_settings_of


class DepthView(QWidget):
    """Set, stresses and driving time over the penetration. `told` is the line to show below it."""

    def __init__(self, document: Document, told: Any, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._tell = document, told
        self.setMinimumSize(QSize(560, 320))
        self.setAccessibleName("Resistance, set, stresses and driving time over the penetration")
        self._key: tuple[Case, DepthSettings] | None = None
        self.depths: Depths | None = None
        self.problem = ""
        self._aside = Aside(self)
        self._aside.found.connect(self._take)
        self._aside.ended.connect(self._end)
        self._timer = QTimer(self)
        self._timer.setSingleShot(True)
        self._timer.setInterval(SETTLE)
        self._timer.timeout.connect(self._begin)
        document.changed.connect(self._follow)

    @property
    def text(self) -> str:
        if self.problem:
            return f"✕ {self.problem}"
        if self.depths is None:
            return "Solving …"
        return depth_summary(self.depths, units_of(self._document.project))

    def close_down(self) -> bool:
        self._timer.stop()
        return self._aside.close(0.3)

    def showEvent(self, event: QShowEvent) -> None:
        self._follow()
        super().showEvent(event)

    def hideEvent(self, event: QHideEvent) -> None:
        self._aside.drop()
        if self.depths is None:
            self._key = None
        super().hideEvent(event)

    def _follow(self) -> None:
        if not self.isVisible():
            return
        try:
            key = (self._document.case, depth_settings_of(self._document.project))
        except StudyError as error:
            self._key, self.depths, self.problem = None, None, str(error)
        else:
            if key != self._key:
                self._key = key
                self._timer.start()
        self._tell()
        self.update()

    def _begin(self) -> None:
        if self._key is None:
            return
        case, settings = self._key
        self.problem = ""
        units = units_of(self._document.project)

        def work(cancel: Cancel) -> Iterator[Any]:
            with told_in(units):
                found = settings.study(case, cancel=cancel, workers=WORKERS)
            if found is not None:
                yield found

        self._aside.start(work)

    def _take(self, found: object) -> None:
        if isinstance(found, Depths):
            self.depths = found
            self._tell()
            self.update()

    def _end(self, sentence: str) -> None:
        self.problem = sentence
        if sentence:
            self.depths = None
        self._tell()
        self.update()

    def scene(self) -> Scene:
        """What is painted at the present size."""
        if self.depths is None or self._key is None:
            return []
        case = self._key[0]
        return depth_chart(
            self.depths,
            layers_of(case),
            case_limits(case),
            units_of(self._document.project),
            float(self.width()),
            float(self.height()),
            measure,
        )

    def paintEvent(self, event: QPaintEvent) -> None:
        colours = palette()
        painter = QPainter(self)
        painter.fillRect(event.rect(), QColor(colours.paper))
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        paint(painter, self.scene(), colours)


def layers_of(case: Case) -> tuple[tuple[str, float, float], ...]:
    """Name, top and bottom of each layer as depths below the surface of the ground, m."""
    found, top = [], 0.0
    for layer in case.ground.layers if case.ground else ():
        found.append((layer.name, top, top + layer.thickness))
        top += layer.thickness
    return tuple(found)
