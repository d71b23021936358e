"""A person who edits and saves in the real window, and a hand that kills the process at a random moment.

`python3 -m tests.app.killing 50` kills fifty times and prints what was lost. What must hold, always: the saved file
loads, and every edit made 3 s or more before the kill is in the file or in what the next start offers.
"""

from __future__ import annotations

import os
import random
import subprocess
import sys
import tempfile
from dataclasses import dataclass
from pathlib import Path
from time import monotonic, sleep

ROOT = Path(__file__).resolve().parents[2]
FIELD = "/cases/0/gauges/0/position"
#: The n-th edit puts the gauge so far down, m: the number of the edit is read back from the project.
START, STEP = 1.5, 0.001
#: Seconds of work that may be lost.
MAY_BE_LOST = 3.0


@dataclass(frozen=True)
class Killed:
    """What one kill left: edits made, saved and kept; the age at the kill of the oldest edit that is gone, s; and what
    that age would be without the kept work, which tells whether the kill tried it at all."""

    made: int
    saves: int
    in_file: int
    in_recovery: int
    lost_since: float
    unsaved_since: float
    fault: str = ""

    @property
    def holds(self) -> bool:
        return not self.fault and self.lost_since <= MAY_BE_LOST


def work(folder: Path, seed: int, share_of_saves: float) -> None:
    """Edit by typing, save by the menu, and say each on standard output; until killed."""
    from PySide6.QtCore import Qt, QTimer
    from PySide6.QtTest import QTest
    from PySide6.QtWidgets import QApplication

    from app.frame.window import Window
    from app.look import apply_look
    from app.settings import Settings
    from app.starting_points import driven_pile
    from solver import project_from_tree

    chance = random.Random(seed)
    app = QApplication([])
    apply_look(app, "light")
    window = Window(Settings(folder / "settings"), project_from_tree(driven_pile()))
    window.show()
    window.sight.set(selection="gauges/0")
    done = 0

    def tell(word: str) -> None:
        os.write(1, f"{word} {done} {monotonic()}\n".encode())

    def edit() -> None:
        nonlocal done
        row = window.outline.form.row_at(FIELD)
        row.edit.selectAll()
        QTest.keyClicks(row.edit, f"{START + (done + 1) * STEP:.3f}")
        QTest.keyClick(row.edit, Qt.Key.Key_Return)
        done += 1
        assert number_of(window.document.project) == done
        tell("edit")

    def save() -> None:
        window.menus.save.trigger()
        assert not window.document.dirty
        tell("save")

    def step() -> None:
        (save if chance.random() < share_of_saves else edit)()
        QTimer.singleShot(round(1000 * min(chance.expovariate(8.0), 2.5)), step)

    assert window.files.save_to(folder / "pile.strike")
    tell("ready")
    QTimer.singleShot(0, step)
    app.exec()


def number_of(project: object) -> int:
    """How many edits a project holds."""
    position = project.cases[0].gauges[0].position
    return round((position - START) / STEP)


def kill_once(folder: Path, seed: int, after: float, share_of_saves: float = 0.05) -> Killed:
    """Start the person, kill her `after` so many seconds of work, and look at what is left on disk."""
    from app.frame.recovery import kept_work
    from solver import ProjectError, load_project

    process = subprocess.Popen(
        [sys.executable, "-m", "tests.app.killing", "--work", str(folder), str(seed), str(share_of_saves)],
        cwd=ROOT,
        env=os.environ | {"QT_QPA_PLATFORM": "offscreen"},
        stdout=subprocess.PIPE,
    )
    assert process.stdout is not None
    with process:
        first = process.stdout.readline()
        sleep(after)
        moment = monotonic()
        ended_by_itself = process.poll() is not None
        process.kill()  # SIGKILL; on Windows its like
        lines = [line.split() for line in (first + process.stdout.read()).decode().splitlines()]
    made = {int(n): float(t) for word, n, t in lines if word == "edit"}
    saves = [int(n) for word, n, _t in lines if word == "save"]
    kept = kept_work(folder / "settings" / "recovery")
    recovered = max((number_of(one.project) for one in kept), default=0)
    try:
        in_file, fault = number_of(load_project(folder / "pile.strike")), ""
    except ProjectError as error:
        in_file, fault = 0, f"the file does not load: {error}"
    if ended_by_itself:
        fault = "the process ended by itself"
    elif not fault and in_file < max(saves, default=0):
        fault = f"save {max(saves)} was told, the file holds {in_file}"
    lost, unsaved = (
        max((moment - time for number, time in made.items() if number > last), default=0.0)
        for last in (max(in_file, recovered), in_file)
    )
    return Killed(len(made), len(saves), in_file, recovered, lost, unsaved, fault)


def kill_often(times: int, seed: int, longest: float) -> list[Killed]:
    """Kill at so many moments, the first within `longest` seconds of work; each process with a folder of its own."""
    chance, found = random.Random(seed), []
    for number in range(times):
        with tempfile.TemporaryDirectory() as folder:
            found.append(kill_once(Path(folder), seed + number, chance.uniform(0.1, longest)))
    return found


def main(arguments: list[str]) -> int:
    if arguments[:1] == ["--work"]:
        work(Path(arguments[1]), int(arguments[2]), float(arguments[3]))
        return 0
    times = int(arguments[0]) if arguments else 50
    found = kill_often(times, seed=1, longest=8.0)
    for one in found:
        print(f"{'holds' if one.holds else 'FAILS'}: {one}")
    made, kept = sum(one.made for one in found), sum(one.saves for one in found)
    worst = max(one.lost_since for one in found)
    failed = sum(not one.holds for one in found)
    alone = max(one.unsaved_since for one in found)
    print(
        f"{times} kills, {made} edits, {kept} saves: at most the last {worst:.2f} s lost "
        f"({alone:.2f} s without the kept work), {failed} failed"
    )
    return 1 if failed else 0


if __name__ == "__main__":
    raise SystemExit(main(sys.argv[1:]))
