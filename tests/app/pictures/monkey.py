"""Random events on the whole window, as of somebody who does not look: mouse, keys, typing, sizes, menus, dialogs.

By hand, longer and with other seeds than in the suite:
`python -m tests.app.pictures.monkey --seed 7 --events 5000`
"""

from __future__ import annotations

import argparse
import faulthandler
import os
import random
import sys
import tempfile
from dataclasses import dataclass, field
from pathlib import Path
from time import perf_counter

from PySide6.QtCore import QEvent, QPoint, QPointF, Qt, QTimer, qInstallMessageHandler
from PySide6.QtGui import QContextMenuEvent, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QFileDialog, QMenu, QWidget

Key = Qt.Key
KEYS = [
    *(Key.Key_Left, Key.Key_Right, Key.Key_Up, Key.Key_Down, Key.Key_Tab, Key.Key_Backtab, Key.Key_Space),
    *(Key.Key_Return, Key.Key_Escape, Key.Key_Home, Key.Key_End, Key.Key_PageDown, Key.Key_Delete),
    *(Key.Key_Backspace, Key.Key_F2, Key.Key_F9, Key.Key_F11, Key.Key_Plus, Key.Key_Minus, Key.Key_0),
]
WITH_CONTROL = [Key.Key_Z, Key.Key_Y, Key.Key_0, Key.Key_A, Key.Key_C, Key.Key_V, Key.Key_D, Key.Key_PageDown]
TYPED = ["1", "12,5", "-3", "0", "40 ft", "250 kN", "1e9", "abc", "", "1e-12", "7.5", "nan", "½", "  3 "]
NONE = Qt.KeyboardModifier.NoModifier
MODIFIERS = [NONE, NONE, NONE, Qt.KeyboardModifier.ShiftModifier, Qt.KeyboardModifier.ControlModifier]


@dataclass
class Monkey:
    """Plays on a window; `longest` is the time of its longest event in s, `slow` names those above a second."""

    window: QWidget
    random: random.Random
    longest: float = 0.0
    longest_was: str = ""
    events: int = 0
    slow: list[str] = field(default_factory=list)

    def play(self, count: int) -> None:
        """So many events. Menus and dialogs that open are answered or closed by a timer of its own."""
        answers = QTimer()
        answers.setInterval(5)
        answers.timeout.connect(self._answer)
        answers.start()
        acts = [self._click, self._drag, self._wheel, self._key, self._type, self._context, self._double]
        weights = [5, 3, 3, 5, 2, 1, 1]
        for _ in range(count):
            act = self.random.choices(acts, weights)[0]
            if self.random.random() < 0.01:
                act = self._resize
            began = perf_counter()
            what = act()
            QApplication.processEvents()
            took = perf_counter() - began
            self.events += 1
            if took > self.longest:
                self.longest, self.longest_was = took, what
            if took > 1:
                self.slow.append(f"{took:.2f} s: {what}")
            if not self.window.isVisible():
                break
        answers.stop()
        self._close_all()

    # What it does -----------------------------------------------------------------------------------------------

    def _spot(self) -> tuple[QWidget, QPoint]:
        """A widget and a place in it, anywhere in the window."""
        at = QPoint(self.random.randrange(self.window.width()), self.random.randrange(self.window.height()))
        widget = self.window.childAt(at) or self.window
        return widget, widget.mapFrom(self.window, at)

    def _click(self) -> str:
        widget, at = self._spot()
        button = self.random.choice([Qt.MouseButton.LeftButton] * 6 + [Qt.MouseButton.MiddleButton])
        QTest.mouseClick(widget, button, self.random.choice(MODIFIERS), at)
        return f"click on {_name(widget)}"

    def _double(self) -> str:
        widget, at = self._spot()
        QTest.mouseDClick(widget, Qt.MouseButton.LeftButton, NONE, at)
        return f"double click on {_name(widget)}"

    def _drag(self) -> str:
        widget, at = self._spot()
        name, modifiers = _name(widget), self.random.choice(MODIFIERS)
        QTest.mousePress(widget, Qt.MouseButton.LeftButton, modifiers, at)
        for _ in range(self.random.randrange(1, 6)):
            at += QPoint(self.random.randint(-60, 60), self.random.randint(-60, 60))
            if not _alive(widget):
                return f"drag on {name}"
            QTest.mouseMove(widget, at)
            QApplication.processEvents()
        if _alive(widget):
            QTest.mouseRelease(widget, Qt.MouseButton.LeftButton, modifiers, at)
        return f"drag on {name}"

    def _wheel(self) -> str:
        widget, at = self._spot()
        event = QWheelEvent(
            QPointF(at),
            QPointF(widget.mapToGlobal(at)),
            QPoint(),
            QPoint(0, 120 * self.random.choice([-3, -1, 1, 2])),
            Qt.MouseButton.NoButton,
            self.random.choice(MODIFIERS),
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(widget, event)
        return f"wheel on {_name(widget)}"

    def _key(self) -> str:
        widget = QApplication.focusWidget() or self.window
        if self.random.random() < 0.25:
            key, modifiers = self.random.choice(WITH_CONTROL), Qt.KeyboardModifier.ControlModifier
        else:
            key = self.random.choice(KEYS)
            modifiers = self.random.choice([NONE, NONE, Qt.KeyboardModifier.ShiftModifier])
        name = _name(widget)
        QTest.keyClick(widget, key, modifiers)
        return f"{key.name} on {name}"

    def _type(self) -> str:
        widget = QApplication.focusWidget() or self.window
        text, name = self.random.choice(TYPED), _name(widget)
        for letter in text:
            if not _alive(widget):
                break
            QTest.keyClick(widget, letter)
        return f"'{text}' typed on {name}"

    def _context(self) -> str:
        widget, at = self._spot()
        name = _name(widget)
        QApplication.sendEvent(
            widget, QContextMenuEvent(QContextMenuEvent.Reason.Mouse, at, widget.mapToGlobal(at))
        )
        return f"context menu of {name}"

    def _resize(self) -> str:
        size = self.random.randrange(1000, 1700), self.random.randrange(640, 1000)
        self.window.resize(*size)
        return f"size {size}"

    # What opens -------------------------------------------------------------------------------------------------

    def _answer(self) -> None:
        """A menu: one of its entries or none. A dialog: closed."""
        popup = QApplication.activePopupWidget()
        if isinstance(popup, QMenu) and self.random.random() < 0.5:
            actions = [a for a in popup.actions() if a.isEnabled() and not a.isSeparator() and not a.menu()]
            actions = [a for a in actions if a.text().replace("&", "") != "Close"]
            if actions:
                popup.setActiveAction(self.random.choice(actions))
                # not from here: while a dialog that it opens is there, this timer would stand still
                QTimer.singleShot(0, popup, lambda: QTest.keyClick(popup, Key.Key_Return))
        elif popup is not None:
            popup.close()
        dialog = QApplication.activeModalWidget()
        if dialog is not None and popup is None:
            dialog.close()

    def _close_all(self) -> None:
        for _ in range(20):
            top = QApplication.activePopupWidget() or QApplication.activeModalWidget()
            if top is None:
                return
            top.close()


#: What the platform without a screen says of itself.
OF_THE_PLATFORM = "This plugin does not support"


class Messages:
    """Everything that Qt has to say meanwhile."""

    def __init__(self) -> None:
        self.told: list[str] = []

    def __enter__(self) -> Messages:
        self._before = qInstallMessageHandler(self._hear)
        return self

    def __exit__(self, *_what: object) -> None:
        qInstallMessageHandler(self._before)

    def _hear(self, _kind: object, _where: object, text: str) -> None:
        if not text.startswith(OF_THE_PLATFORM):
            self.told.append(text)


def nothing_chosen(*_arguments: object, **_named: object) -> tuple[str, str]:
    """In the place of dialogs for files, which are the system's own."""
    return "", ""


def _name(widget: QWidget) -> str:
    return f"{type(widget).__name__} {widget.accessibleName() or getattr(widget, 'text', str)()}".strip()


def _alive(widget: QWidget) -> bool:
    from shiboken6 import isValid

    return bool(isValid(widget)) and widget.isVisible()


def main() -> int:
    reader = argparse.ArgumentParser()
    reader.add_argument("--seed", type=int, default=1)
    reader.add_argument("--events", type=int, default=5000)
    wanted = reader.parse_args()
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    faulthandler.enable()
    from app.frame.window import Window
    from app.settings import Settings
    from solver import load_project, solve

    app = QApplication([])
    QFileDialog.getOpenFileName = QFileDialog.getSaveFileName = nothing_chosen
    errors: list[str] = []
    sys.excepthook = lambda kind, error, trace: (
        errors.append(f"{kind.__name__}: {error}"),
        sys.__excepthook__(kind, error, trace),
    )
    demos = sorted((Path(__file__).resolve().parents[3] / "demo_projects").glob("*.strike"))
    for path in demos:
        solve(load_project(path).cases[0])  # kernels are compiled before, as they are at a second start
    done, turn, worst = 0, 0, (0.0, "")
    with tempfile.TemporaryDirectory() as folder, Messages() as messages:
        while done < wanted.events:
            chance = random.Random(1000 * wanted.seed + turn)
            window = Window(Settings(Path(folder) / str(turn)), load_project(chance.choice(demos)))
            window.resize(1280, 800)
            window.show()
            monkey = Monkey(window, chance)
            # where it hangs is told with its place in the code
            faulthandler.dump_traceback_later(300, exit=True)
            monkey.play(min(wanted.events - done, 1000))
            window.close()
            # as the program itself ends: nothing of Qt lives longer than its window
            window.deleteLater()
            app.sendPostedEvents(None, QEvent.Type.DeferredDelete)
            faulthandler.cancel_dump_traceback_later()
            done, turn = done + monkey.events, turn + 1
            worst = max(worst, (monkey.longest, monkey.longest_was))
            print(
                f"{done} events, longest {monkey.longest:.2f} s ({monkey.longest_was})",
                *monkey.slow,
                sep="\n  ",
            )
    app.processEvents()
    app.clipboard().clear()  # without a screen it outlives Python
    for message in sorted(set(messages.told)):
        print("message:", message)
    print(f"seed {wanted.seed}: {done} events, {len(errors)} errors, longest {worst[0]:.2f} s ({worst[1]})")
    return 1 if errors or messages.told or worst[0] > 1 else 0


if __name__ == "__main__":
    sys.exit(main())
