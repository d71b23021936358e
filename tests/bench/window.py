"""The window, without a screen: from a keystroke to its pictures, while a long run solves, and while it plays."""

from __future__ import annotations

import os
import tempfile
import time
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import numpy as np

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

from PySide6.QtCore import QEvent, QEventLoop, QObject, Qt, QTimer
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QWidget

from app.bench.forms.number_row import NumberRow
from app.frame.window import Window
from app.look import apply_look
from app.settings import Settings
from app.starting_points import driven_pile
from solver import project_from_tree
from tests.bench.measure import Row, calibration, spread_of

#: Longest that anything here is waited for, s.
PATIENCE = 60.0
BEAT = 0.005


class Paints(QObject):
    """Counts paint events of some widgets, and knows which were painted since `forget` while `when` held."""

    def __init__(self, widgets: list[QWidget], when: Callable[[], bool] = lambda: True) -> None:
        super().__init__()
        self.widgets, self.count, self._when = widgets, 0, when
        self.painted: set[int] = set()
        for widget in widgets:
            widget.installEventFilter(self)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if event.type() == QEvent.Type.Paint and self._when():
            self.count += 1
            self.painted.add(id(watched))
        return False

    def forget(self) -> None:
        self.painted.clear()

    @property
    def all_painted(self) -> bool:
        return len(self.painted) == len(self.widgets)


def _application() -> QApplication:
    app = QApplication.instance() or QApplication(["bench"])
    assert isinstance(app, QApplication)
    apply_look(app, "light")
    return app


def _wait(app: QApplication, until: Callable[[], bool]) -> float:
    """Handle events until something holds; returns the time at which it did."""
    end = time.perf_counter() + PATIENCE
    while not until():
        if time.perf_counter() > end:
            raise TimeoutError("the window did not get there in a minute")
        app.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
    return time.perf_counter()


class _Shown:
    """A window on the default pile, solved and painted, closed at the end."""

    def __init__(self, size: tuple[int, int] = (1440, 900)) -> None:
        self._size = size

    def __enter__(self) -> tuple[QApplication, Window]:
        self.app = _application()
        self._folder = tempfile.TemporaryDirectory()
        self.window = Window(Settings(Path(self._folder.name)), project_from_tree(driven_pile()))
        self.window.resize(*self._size)
        self.window.show()
        self._awake = QTimer()
        self._awake.start(50)  # so that waiting for events always ends
        _wait(self.app, lambda: self.window.solution.state == "fresh")
        QTest.qWait(200)
        return self.app, self.window

    def __exit__(self, *error: object) -> None:
        self._awake.stop()
        self.window.close()
        self.window.deleteLater()
        self.app.sendPostedEvents(None, QEvent.Type.DeferredDelete)
        self._folder.cleanup()


def edit_to_picture(short: bool) -> Iterator[Row]:
    """Return in the field of the drop height, until x-t diagram and strips show the new answer."""
    repetitions, times, beats = 40, [], []
    with _Shown() as (app, window):
        window.sight.set(selection="load")
        row = next(
            r
            for r in window.outline.form.rows
            if isinstance(r, NumberRow) and r.spec.pointer.endswith("drop_height")
        )
        solution, document = window.solution, window.document

        def shows_the_edit() -> bool:
            return solution.state == "fresh" and solution.result.case == document.case

        paints = Paints([window.bench.xt, *window.bench.strips.shown()], shows_the_edit)
        for i in range(repetitions):
            beats.append(calibration())
            row.edit.setFocus()
            row.edit.selectAll()
            QTest.keyClicks(row.edit, f"{1.01 + 0.01 * i:.2f}")
            paints.forget()
            began = time.perf_counter()
            QTest.keyClick(row.edit, Qt.Key.Key_Return)
            times.append(_wait(app, lambda: paints.all_painted) - began)
            QTest.qWait(20)
    median, late = float(np.median(times)), float(np.percentile(times, 95))
    compared = (
        "ms from Return in a field to x-t diagram and strips repainted with the new answer, default pile"
    )
    yield _timed("edit_to_picture", compared + ", median", median * 1e3, 50.0, times, beats)
    yield _timed("edit_to_picture 95 %", compared + ", 95th percentile", late * 1e3, 100.0, times, beats)


def _timed(
    name: str, compared: str, value: float, reach: float, all_of_it: list[float], beats: list[float]
) -> Row:
    return Row(
        name,
        compared,
        value,
        reach,
        at_most=True,
        unit="ms",
        spread=spread_of(all_of_it),
        repetitions=len(all_of_it),
        noise=spread_of(beats),
    )


def stall(short: bool) -> Iterator[Row]:
    """Longest gap of a heartbeat in the window's thread, from the edit to the picture of a run of some seconds."""
    longest, beats, lasted = [], [], []
    with _Shown() as (app, window):
        for i in range(5):
            beats.append(calibration())
            marks: list[float] = []
            heart = QTimer()
            heart.setTimerType(Qt.TimerType.PreciseTimer)
            heart.setInterval(round(BEAT * 1000))
            heart.timeout.connect(lambda marks=marks: marks.append(time.perf_counter()))
            heart.start()
            began = time.perf_counter()

            def long_run(tree: dict[str, Any], i: int = i) -> None:
                tree["cases"][0]["run"] |= {"element_length": 0.004, "duration": 0.15 + 0.001 * i}

            assert window.document.edit_tree("Longer", long_run)
            _wait(app, lambda: window.solution.state == "fresh")
            lasted.append(time.perf_counter() - began)
            QTest.qWait(100)
            heart.stop()
            longest.append(float(np.max(np.diff(marks))))
    row = _timed(
        "stall",
        "ms, longest gap of a heartbeat of 5 ms while a long case solves and is shown",
        float(np.median(longest)) * 1e3,
        50.0,
        longest,
        beats,
    )
    row.more = {"longest_of_all_ms": max(longest) * 1e3, "solve_lasted_s": float(np.median(lasted))}
    yield row


def playback(short: bool) -> Iterator[Row]:
    """Pictures a second while it plays; the timer asks for 62 at most."""
    rates, beats = [], []
    with _Shown((1920, 1080)) as (_, window):
        paints = Paints([window.bench.xt])
        for _ in range(3):
            beats.append(calibration())
            window.sight.set(time=0.0)
            QTest.qWait(100)
            window.bench.time_bar.toggle()
            before, began = paints.count, time.perf_counter()
            QTest.qWait(2_000)
            rates.append((paints.count - before) / (time.perf_counter() - began))
            window.bench.time_bar.pause()
    row = Row(
        "playback",
        "frames a second while playing at 1920x1080, default pile",
        float(np.median(rates)),
        30.0,
        unit="1/s",
        spread=spread_of(rates),
        repetitions=len(rates),
        noise=spread_of(beats),
    )
    yield row
