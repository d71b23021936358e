"""How many pictures a second follow a drag in the member drawing, alone and with two cases laid over."""

from __future__ import annotations

import copy
import time
from collections.abc import Iterator
from math import sin
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QEventLoop, QObject, QPointF, Qt, QTimer
from PySide6.QtGui import QMouseEvent
from PySide6.QtWidgets import QApplication

from app.bench.member.drawing import MemberDrawing
from app.frame.window import Window
from tests.bench.measure import Row, calibration, spread_of
from tests.bench.window import _Shown, _wait

#: How long it drags, s, and the time between two moves of the mouse, ms.
LASTS, MOVES = 3.0, 12


class _Pictures(QObject):
    """Counts for each picture the results that it was painted with."""

    def __init__(self, window: Window) -> None:
        super().__init__()
        bench, self._solution = window.bench, window.solution
        pictures = (bench.member, bench.xt, bench.profile, *bench.strips.shown())
        self._last: dict[QObject, object] = dict.fromkeys(pictures)
        self.counts: dict[QObject, int] = dict.fromkeys(pictures, 0)
        for picture in pictures:
            picture.installEventFilter(self)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if event.type() == QEvent.Type.Paint and self._last[watched] is not self._solution.result:
            self._last[watched] = self._solution.result
            self.counts[watched] += 1
        return False


def dragging(short: bool) -> Iterator[Row]:
    """The ground surface of the default pile, to and fro; every picture has to show every result that is counted."""
    for over in (0, 2):
        rates, beats = [], []
        with _Shown() as (app, window):
            names = _lay_over(app, window, over)
            for _ in range(3):
                beats.append(calibration())
                rates.append(_rate(app, window))
        words = f" with {len(names)} cases laid over" if names else ""
        yield Row(
            "dragging" if not over else f"dragging over {over}",
            f"pictures a second of all panels while the ground surface is dragged{words}, default pile",
            float(np.median(rates)),
            20.0,
            unit="1/s",
            spread=spread_of(rates),
            repetitions=len(rates),
            noise=spread_of(beats),
        )


def _lay_over(app: QApplication, window: Window, count: int) -> list[str]:
    names = [f"Other {number}" for number in range(count)]

    def add(tree: dict[str, Any]) -> None:
        for number, name in enumerate(names):
            other = copy.deepcopy(tree["cases"][0])
            other["name"] = name
            other["load"]["drop_height"] *= 0.8 - 0.2 * number
            tree["cases"].append(other)

    if names:
        assert window.document.edit_tree("Others", add)
        window.sight.set(laid_over=tuple(names))
        _wait(app, lambda: len(window.bench.laid_over.results()) == count)
    return names


def _rate(app: QApplication, window: Window) -> float:
    member = window.bench.member
    scene = member.scene()
    ground = window.document.case.ground
    assert ground is not None
    x, y = scene.plot.right() - 8, scene.axis.at(ground.surface)
    _mouse(app, member, QEvent.Type.MouseButtonPress, QPointF(x, y))
    pictures, began = _Pictures(window), time.perf_counter()

    def move() -> None:
        passed = time.perf_counter() - began
        _mouse(app, member, QEvent.Type.MouseMove, QPointF(x, y + 25 + 25 * sin(2.5 * passed)))

    hand = QTimer()
    hand.timeout.connect(move)
    hand.start(MOVES)
    while time.perf_counter() - began < LASTS:
        # to spin would keep the lock from the thread that solves
        app.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
    hand.stop()
    rate = min(pictures.counts.values()) / (time.perf_counter() - began)
    _mouse(app, member, QEvent.Type.MouseButtonRelease, QPointF(x, y))
    _wait(app, lambda: window.solution.state == "fresh")
    return rate


def _mouse(app: QApplication, member: MemberDrawing, kind: QEvent.Type, at: QPointF) -> None:
    none, left = Qt.MouseButton.NoButton, Qt.MouseButton.LeftButton
    button = none if kind == QEvent.Type.MouseMove else left
    held = none if kind == QEvent.Type.MouseButtonRelease else left
    where = member.mapToGlobal(at)
    app.sendEvent(member, QMouseEvent(kind, at, where, button, held, Qt.KeyboardModifier.NoModifier))
