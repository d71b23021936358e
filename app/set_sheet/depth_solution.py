"""The study of depths that belongs to the case at hand: solved beside the window, once somebody wants it."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from PySide6.QtCore import QObject, Signal

from app.aside import Aside, Cancel
from app.document import Document
from app.set_sheet.sheet_solution import WORKERS
from app.set_sheet.words import told_in
from app.units import units_of
from solver import Case
from solver.studies import StudyError
from solver.studies.depth import Depths
from solver.studies.settings import DepthSettings, depth_settings_of


class DepthSolution(QObject):
    """`depths` belong to `case`; `problem` says why there are none."""

    changed = Signal()

    def __init__(self, document: Document, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._key: tuple[Case, DepthSettings] | None = None
        self._busy = False
        self.depths: Depths | None = None
        self.problem = ""
        self._aside = Aside(self)
        self._aside.found.connect(self._take)
        self._aside.ended.connect(self._end)
        document.changed.connect(self.let_go)

    @property
    def case(self) -> Case:
        """The case that the depths were solved for."""
        return self._document.case if self._key is None else self._key[0]

    @property
    def fresh(self) -> Depths | None:
        """The depths, where they belong to the project as it is now."""
        return self.depths if not self._busy and self._key == self._wanted() else None

    def solve(self) -> None:
        """Solve for the case and the choices at hand, unless that is done or under way."""
        key = self._wanted()
        if key is None or key == self._key:
            return
        self._key, self._busy, self.problem = key, True, ""
        (case, settings), units = key, units_of(self._document.project)

        def work(cancel: Cancel) -> Iterator[Any]:
            with told_in(units):
                found = settings.study(case, cancel=cancel, workers=WORKERS)
            if found is not None:
                yield found

        self._aside.start(work)

    def let_go(self) -> None:
        """Break off what is under way: it belongs to an older project."""
        if self._busy:
            self._aside.drop()
            self._key, self._busy = None, False

    def close(self) -> bool:
        return self._aside.close(0.3)

    def _wanted(self) -> tuple[Case, DepthSettings] | None:
        try:
            return self._document.case, depth_settings_of(self._document.project)
        except StudyError as error:
            self._key, self.depths, self.problem = None, None, str(error)
            return None

    def _take(self, found: Depths) -> None:
        self.depths = found

    def _end(self, sentence: str) -> None:
        self._busy, self.problem = False, sentence
        if sentence:
            self.depths = None
        self.changed.emit()
