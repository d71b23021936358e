"""The time of the cursor: play in slow motion, step, drag; and how much of the run the pictures show."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from time import perf_counter

from PySide6.QtCore import Qt, QTimer
from PySide6.QtWidgets import QHBoxLayout, QLabel, QMenu, QToolButton, QWidget

from app.bench.pictures.time_shown import (
    all_of_it,
    opening_time,
    shown_time,
    shows_all,
    whole_time,
    with_moment_shown,
)
from app.bench.time_slider import TimeSlider
from app.document import Document
from app.look.icons import icon
from app.look.palette import palette
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.solving import Solution
from app.units import units_of
from solver import Case, Result

#: What one second of play shows, s, offered at choice; the one taken at first is the nearest to the run in 20 s.
PACES = (10e-6, 20e-6, 50e-6, 100e-6, 200e-6, 500e-6, 1e-3, 2e-3, 5e-3, 10e-3, 20e-3, 50e-3)
USUAL_PLAY = 20.0
#: Steps of the slider, and of the arrow keys over the whole run.
FINE, COARSE = 10_000, 400
#: Pause between two pictures of play-back, ms: the pace of most screens.
BEAT = 16
WHOLE_TIP = "Show the whole run; or, off, its first passages, in which waves can be told apart (Home)"


class TimeBar(QWidget):
    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._document, self._sight, self._solution = document, sight, solution
        self._pace: float | None = None
        self._last_beat = 0.0
        self._icons_for: tuple[object, ...] = ()
        self._timer = QTimer(self)
        self._timer.setTimerType(Qt.TimerType.PreciseTimer)
        self._timer.setInterval(BEAT)
        self._timer.timeout.connect(self._beat)
        self._back = self._button("Step back (Left arrow)", lambda: self.step(-1))
        self._play = self._button("Play or pause (Space)", self.toggle)
        self._on = self._button("Step on (Right arrow)", lambda: self.step(1))
        self._slider = self._make_slider()
        self._clock = QLabel()
        self._clock.setAlignment(Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter)
        self._paces = self._make_paces()
        self.whole_run = self._button(WHOLE_TIP, self._turn_whole)
        self.whole_run.setText("Whole run")
        self.whole_run.setAccessibleName("Whole run")
        self.whole_run.setProperty("role", "chip")
        self.whole_run.setCheckable(True)
        row = QHBoxLayout(self)
        row.setContentsMargins(SPACE, GAP, SPACE, GAP)
        row.setSpacing(SPACE)
        for widget in (self._back, self._play, self._on):
            row.addWidget(widget)
        row.addWidget(self._slider, 1)
        row.addWidget(self.whole_run)
        row.addWidget(self._clock)
        row.addWidget(self._paces)
        for source in (document, sight, solution):
            source.changed.connect(self._look_again)
        self._look_again()

    # What others may ask ----------------------------------------------------------------------------------------

    @property
    def playing(self) -> bool:
        return self._timer.isActive()

    def toggle(self) -> None:
        """Play from the cursor on, from the beginning where it stands at the end; or pause."""
        if self.playing:
            self.pause()
            return
        start, end = self._shown_time()
        if not start <= self._sight.time < end:
            self._sight.set(time=start)
        self._last_beat = perf_counter()
        self._timer.start()
        self._look_again()

    def pause(self) -> None:
        self._timer.stop()
        self._look_again()

    def step(self, steps: int) -> None:
        """Move by so many four-hundredths of the times shown."""
        self.pause()
        start, end = self._shown_time()
        self._go(self._sight.time + steps * (end - start) / COARSE)

    # Inside -----------------------------------------------------------------------------------------------------

    def _make_slider(self) -> TimeSlider:
        slider = TimeSlider()
        slider.setRange(0, FINE)
        slider.setSingleStep(FINE // COARSE)
        slider.setPageStep(FINE // 20)
        slider.setAccessibleName("Time of the cursor")
        slider.valueChanged.connect(self._dragged)
        return slider

    def _make_paces(self) -> QToolButton:
        paces = QToolButton()
        paces.setProperty("role", "quiet")
        paces.setToolTip("How much of the run one second of play shows.")
        paces.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(paces)
        menu.aboutToShow.connect(lambda: self._fill_paces(menu))
        paces.setMenu(menu)
        return paces

    def _button(self, words: str, act: Callable[[], None]) -> QToolButton:
        button = QToolButton()
        button.setProperty("role", "quiet")
        button.setAccessibleName(words)
        button.setToolTip(words)
        button.clicked.connect(lambda: act())
        return button

    def _whole(self) -> tuple[float, float]:
        return whole_time(*self._of())

    def _of(self) -> tuple[Case, Result | None]:
        return self._document.case, self._solution.result

    def _shown_time(self) -> tuple[float, float]:
        """The times that the pictures show: play stays within them."""
        return shown_time(self._sight, *self._of())

    def _turn_whole(self) -> None:
        shown = shows_all(self._sight, *self._of())
        self._sight.set(time_range=None if shown else all_of_it(*self._of()))
        self._look_again()  # a click has turned the button whatever it did

    def _pace_now(self) -> float:
        if self._pace is not None:
            return self._pace
        low, high = opening_time(*self._of())
        wanted = (high - low) / USUAL_PLAY
        return min(PACES, key=lambda p: abs(p - wanted) / p)

    def _beat(self) -> None:
        now = perf_counter()
        passed, self._last_beat = now - self._last_beat, now
        time = self._sight.time + passed * self._pace_now()
        end = self._shown_time()[1]
        if time >= end:
            self._timer.stop()
        self._go(min(time, end))
        self._look_again()

    def _go(self, time: float) -> None:
        low, high = self._whole()
        self._sight.set(**with_moment_shown(self._sight, *self._of(), min(max(time, low), high)))

    def _dragged(self, value: int) -> None:
        low, high = self._whole()
        if value != self._place_on_slider():
            self.pause()
            self._go(low + value / FINE * (high - low))

    def _place_on_slider(self) -> int:
        low, high = self._whole()
        share = (self._sight.time - low) / (high - low)
        return round(min(max(share, 0.0), 1.0) * FINE)

    def _fill_paces(self, menu: QMenu) -> None:
        menu.clear()
        for pace in PACES:
            menu.addAction(self._pace_text(pace), partial(self._choose_pace, pace))

    def _pace_text(self, pace: float) -> str:
        return f"1 s of play = {units_of(self._document.project).show(pace, 'time', 1)}"

    def _choose_pace(self, pace: float) -> None:
        self._pace = pace
        self._look_again()

    def _look_again(self) -> None:
        place = self._place_on_slider()
        if self._slider.value() != place:
            self._slider.setValue(place)
        self._show_part()
        units = units_of(self._document.project)
        end = self._whole()[1]
        unit = units.unit("time", end)
        digits = max(float(units.number(end, "time", end)), 1e-9)
        decimals = 2 if digits < 100 else 1
        text = f"{float(units.number(self._sight.time, 'time', end)):.{decimals}f} {unit}"
        if self._clock.text() != text:
            self._clock.setText(text)
            widest = f"{digits:.{decimals}f} {unit}"
            self._clock.setMinimumWidth(self._clock.fontMetrics().horizontalAdvance(widest) + 4)
        shown = (units, palette(), self.playing)
        if shown != self._icons_for:
            self._icons_for = shown
            self._dress()
        pace = f"{self._pace_text(self._pace_now())} ▾"
        if self._paces.text() != pace:
            self._paces.setText(pace)

    def _show_part(self) -> None:
        """How much of the run the pictures show, and the button to change it where the run is long."""
        (start, end), (low, high) = self._whole(), self._shown_time()
        self._slider.show_part((low - start) / (end - start), (high - start) / (end - start))
        self.whole_run.setVisible(opening_time(*self._of()) != (start, end) or (low, high) != (start, end))
        self.whole_run.setChecked((low, high) == (start, end))

    def _dress(self) -> None:
        """Icons in the colours of the palette."""
        self._back.setIcon(icon("step_back"))
        self._on.setIcon(icon("step_forward"))
        self._play.setIcon(icon("pause" if self.playing else "play"))
