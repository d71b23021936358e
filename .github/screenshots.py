"""Make the pictures of the README anew: `python3 .github/screenshots.py`, from the checkout, with its own .venv.

Opens the real window on demos, without a screen, lets them solve, and saves what it shows.
"""

from __future__ import annotations

import os
import sys
import tempfile
from dataclasses import dataclass, field
from pathlib import Path
from time import monotonic, sleep
from typing import Any

ROOT = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(ROOT))
os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

PATIENCE = 300.0  # s; the first start compiles the kernels


@dataclass(frozen=True)
class Shot:
    """One picture: a demo and its case, the workspace, the look, the size of the window, and what is looked at."""

    name: str
    demo: str
    look: str
    case: int = 0
    workspace: int = 0
    size: tuple[int, int] = (1440, 900)
    sight: dict[str, Any] = field(default_factory=dict)


SHOTS = (
    Shot("pile", "01", "light", sight={"time": 0.0044, "place": 16.0}),
    Shot("set-sheet", "02", "dark", case=1, workspace=1, size=(1280, 800)),
    Shot("bar", "05", "light", size=(1280, 800), sight={"time": 0.00061, "selection": "member/segments/0"}),
)


def main(folder: Path) -> int:
    from PySide6.QtWidgets import QApplication

    app = QApplication(sys.argv[:1])
    with tempfile.TemporaryDirectory() as settings:
        for shot in SHOTS:
            take(app, shot, Path(settings), folder)
    return 0


def take(app: Any, shot: Shot, settings: Path, folder: Path) -> None:
    from PySide6.QtCore import QEvent

    from app.demo_files import demo_paths
    from app.frame.window import Window
    from app.look import apply_look
    from app.settings import Settings
    from solver import load_project

    apply_look(app, shot.look)
    path = next(path for path in demo_paths() if path.name.startswith(shot.demo))
    window = Window(Settings(settings), load_project(path))
    window.begin_looking()
    window.document.choose_case(shot.case)
    window.resize(*shot.size)
    window.show()
    solved(app, window, window.solution)
    window.sight.set(**shot.sight)
    if shot.workspace:
        window.workspaces.show_number(shot.workspace)
        settle(app)
        solved(app, window, window.set_sheet.solution)
        if focused := app.focusWidget():
            focused.clearFocus()
            settle(app)
    settle(app)
    target = folder / f"{shot.name}.png"
    window.grab().save(str(target))
    print(target)
    window.close()
    window.deleteLater()
    app.sendPostedEvents(None, QEvent.Type.DeferredDelete)


def solved(app: Any, window: Any, solution: Any) -> None:
    """Wait for the picture that belongs to the input."""
    end = monotonic() + PATIENCE
    while solution.state != "fresh":
        if monotonic() > end:
            raise SystemExit(f"{window.windowTitle()} is not solved after {PATIENCE:.0f} s.")
        app.processEvents()
        sleep(0.01)
    settle(app)


def settle(app: Any) -> None:
    """Let everything be drawn that has been asked for."""
    end = monotonic() + 0.5
    while monotonic() < end:
        app.processEvents()
        sleep(0.01)


if __name__ == "__main__":
    raise SystemExit(main(Path(sys.argv[1]) if sys.argv[1:] else ROOT / ".github" / "screenshots"))
