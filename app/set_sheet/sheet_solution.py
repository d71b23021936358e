"""The sheet that belongs to the case and the choices at hand: solved again at every change, while it is looked at."""

from __future__ import annotations

import os
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any, Literal

from PySide6.QtCore import QObject, QTimer, Signal

from app.aside import Aside, Cancel
from app.document import Document
from app.set_sheet.words import told_in, unit_of
from app.units import units_of
from solver import Case
from solver.studies import Cell, Level, Plan, Sheet, StudyError, cells_of
from solver.studies.largest_blow import LargestBlow, largest_blow
from solver.studies.plan import at_value
from solver.studies.questions import Cancelled, ShownResistance, point, shown_by
from solver.studies.settings import SheetSettings, settings_of
from solver.studies.uncertainty import FEWEST, Sampled, sampled

#: What a sheet belongs to; the units, because ranges that the program chooses are round in them.
Key = tuple[Case, SheetSettings, str]
State = Literal["waiting", "solving", "answering", "fresh", "stopped", "refused"]
#: Changes that follow each other faster than this are solved once, ms.
SETTLE = 60
#: One processor is left to the window, so that it never waits for the solver.
WORKERS = max(1, (os.cpu_count() or 1) - 1)
#: Points that arrive are shown together so often, ms: painting each one would take the time of the window.
SHOWN_EVERY = 80


@dataclass(frozen=True)
class Answers:
    """To the questions of the settings: the largest blow, the point that shows the resistance, what a set shows."""

    largest: LargestBlow | None = None
    stop_at: Cell | None = None
    shown: ShownResistance | None = None


class SheetSolution(QObject):
    """`sheet` (partial while it fills), `answers` and `sampled` belong to `plan`; `state` and `message` say how they
    stand to the document. Works only between `look(True)` and `look(False)`."""

    changed = Signal()

    def __init__(self, document: Document, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._looked = False
        self._key: Key | None = None
        self.plan: Plan | None = None
        self.cells: dict[tuple[int, int], Cell] = {}
        self._sheet: Sheet | None = None
        self.answers = Answers()
        self.sampled: Sampled | None = None
        self._sampled_for: tuple[object, ...] = ()
        self.samples_done: int | None = None
        self._asked: tuple[object, ...] | None = None
        self.state: State = "waiting"
        self.message = ""
        self._aside = Aside(self)
        self._aside.found.connect(self._take)
        self._aside.ended.connect(self._end)
        self._samples = Aside(self)
        self._samples.found.connect(self._take_samples)
        self._samples.ended.connect(self._end_samples)
        self._timer = QTimer(self)
        self._timer.setSingleShot(True)
        self._timer.setInterval(SETTLE)
        self._timer.timeout.connect(self._begin)
        self._showing = QTimer(self)
        self._showing.setSingleShot(True)
        self._showing.setInterval(SHOWN_EVERY)
        self._showing.timeout.connect(self.changed)
        document.changed.connect(self._follow)

    @property
    def sheet(self) -> Sheet | None:
        """What is solved so far; the same object as long as nothing more is."""
        if self.plan is None:
            return None
        if (
            self._sheet is None
            or self._sheet.plan is not self.plan
            or len(self._sheet.cells) != len(self.cells)
        ):
            ordered = sorted(self.cells.items(), key=lambda item: item[0])
            self._sheet = Sheet(self.plan, tuple(cell for _place, cell in ordered))
        return self._sheet

    @property
    def fraction(self) -> float:
        if self.plan is None:
            return 0.0
        return len(self.cells) / (len(self.plan.resistances) * len(self.plan.levels))

    @property
    def settings(self) -> SheetSettings:
        """The choices in the project; those of the program where they are not valid."""
        try:
            return settings_of(self._document.project)
        except StudyError:
            return SheetSettings()

    def look(self, on: bool) -> None:
        """Whether the sheet is on the screen. What is under way when it goes is finished, unless the project
        changes."""
        self._looked = on
        if on:
            self._follow()

    def stop(self) -> None:
        """Break off; what is solved stays."""
        if self.state in ("solving", "answering"):
            self._timer.stop()
            self._aside.drop()
            self.state, self.message = "stopped", "Stopped: the picture shows what was solved until then."
        self.stop_samples()
        self.changed.emit()

    def solve_again(self) -> None:
        self._key = None
        self._follow()

    def close(self) -> bool:
        """End all work within a second."""
        self._timer.stop()
        self._showing.stop()
        first, second = self._aside.close(0.5), self._samples.close(0.3)
        return first and second

    def sample(self) -> None:
        """Work out the bands for what is not known, beside the sheet."""
        plan, settings = self.plan, self.settings
        if plan is None:
            return
        self.samples_done, self._asked, self._sampled_for = 0, _sampling(settings), _lines_of(plan)
        unknowns, samples, seed = settings.unknown_inputs(plan.case), settings.samples, settings.seed
        asked = asked_point(plan, settings)

        def work(cancel: Cancel) -> Iterator[Any]:
            told = 0

            def progress(done: int) -> None:
                nonlocal told
                if done - told >= samples // 50 and not cancel():
                    told = done
                    self._samples.tell(done)

            found = sampled(
                plan,
                unknowns,
                asked=asked,
                samples=samples,
                seed=seed,
                progress=progress,
                cancel=cancel,
                workers=WORKERS,
            )
            if found is not None:
                yield found

        self._samples.start(work)
        self.changed.emit()

    def stop_samples(self) -> None:
        """Break off the samples under way."""
        if self.samples_done is not None:
            self._samples.drop()
            self.samples_done = None
            self.changed.emit()

    def _follow(self) -> None:
        if not self._looked:
            self._let_go()
            return
        try:
            project = self._document.project
            key = (self._document.case, settings_of(project), units_of(project).system)
        except StudyError as error:
            self._refuse(str(error))
            return
        self._forget_samples_of_others(key[1])
        if self._key is None or not _same(key, self._key):
            self._aside.drop()
            self.state, self.message = "solving", ""
            self._timer.start()
        self._key = key
        self.changed.emit()

    def _let_go(self) -> None:
        """An edit that nobody watches from here: end what is under way, and begin again when the sheet is looked at."""
        if self.state in ("solving", "answering"):
            self._timer.stop()
            self._aside.drop()
            self._key, self.state = None, "waiting"
        if self.samples_done is not None:
            self._samples.drop()
            self.samples_done = None

    def _forget_samples_of_others(self, settings: SheetSettings) -> None:
        """Drop the bands, or stop the samples, that were asked for with other ranges."""
        asked = _sampling(settings)
        if self._asked is not None and asked != self._asked:
            self._asked, self.sampled = None, None
            self.stop_samples()

    def _refuse(self, sentence: str) -> None:
        self._aside.drop()
        self._key = None
        self.state, self.message = "refused", sentence
        self.changed.emit()

    def _begin(self) -> None:
        if self._key is None:
            return
        case, settings, _system = self._key
        self.stop_samples()
        self.state, self.message = "solving", ""

        units = units_of(self._document.project)

        def work(cancel: Cancel) -> Iterator[Any]:
            with told_in(units):
                plan = settings.plan(case, unit_of(units))
                yield plan
                yield from cells_of(plan, cancel=cancel, workers=WORKERS)
                if not cancel():
                    yield "cells"
                    yield from _answers(plan, settings, cancel)

        self._aside.start(work)
        self.changed.emit()

    def _take(self, found: object) -> None:
        if isinstance(found, Plan):
            same = self.plan is not None and self.plan.case == found.case
            self.plan, self.cells = found, {}
            self.answers = Answers()
            if not same or self._sampled_for != _lines_of(found):
                self.sampled = None
        elif isinstance(found, Cell):
            self.cells[found.line, found.row] = found
            if not self._showing.isActive():
                self._showing.start()
            return
        elif isinstance(found, Answers):
            self.answers = found
        elif found == "cells":
            self.state = "answering"
        self.changed.emit()

    def _end(self, sentence: str) -> None:
        self.state, self.message = ("refused", sentence) if sentence else ("fresh", "")
        if sentence and self.cells:
            self.plan, self.cells = None, {}
        self.changed.emit()

    def _take_samples(self, found: object) -> None:
        if isinstance(found, Sampled):
            self.sampled = found
        elif isinstance(found, int):
            self.samples_done = found
        self.changed.emit()

    def _end_samples(self, sentence: str) -> None:
        self.samples_done = None
        self.message = sentence
        self.changed.emit()


def asked_point(plan: Plan, settings: SheetSettings) -> tuple[float, Level]:
    """The resistance (N) and the blow that are asked for; those of the case where nothing is."""
    level = plan.own_level
    if settings.asked_value is not None:
        level = at_value(level, settings.asked_value)
    return settings.asked_resistance or plan.own_total, level


def _lines_of(plan: Plan) -> tuple[object, ...]:
    return plan.levels, plan.resistances, plan.vary


def _sampling(settings: SheetSettings) -> tuple[object, ...]:
    return settings.unknowns, settings.samples, settings.seed


def _same(one: Key, other: Key) -> bool:
    """Whether both give the same sheet and answers: ranges of samples and the way blows are counted play no part."""
    without = {"unknowns": None, "samples": FEWEST, "seed": 1, "per": None}
    settings = [key[1].model_copy(update=without) for key in (one, other)]
    return one[0] == other[0] and one[2] == other[2] and settings[0] == settings[1]


def _answers(plan: Plan, settings: SheetSettings, cancel: Cancel) -> Iterator[Answers]:
    """The questions one after the other, each answer as soon as it is found."""
    resistance, level = asked_point(plan, settings)
    try:
        stop_at = point(plan, resistance, level, cancel)
        yield Answers(None, stop_at)
        largest = largest_blow(plan, resistance, cancel=cancel, workers=WORKERS)
        yield Answers(largest, stop_at)
        if settings.measured_set is not None:
            shown = shown_by(plan, level, settings.measured_set, settings.reading_error, cancel=cancel)
            yield Answers(largest, stop_at, shown)
    except Cancelled:
        return
