"""Cases laid over the one looked at: solved beside the window, kept as long as they are as they were."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass
from functools import partial
from typing import Any

from PySide6.QtCore import QObject, Signal
from PySide6.QtWidgets import QMenu

from app.aside import Aside, Cancel
from app.document import Document
from app.sight import Sight
from solver import Case, Result

#: More than so many curves over each other cannot be told apart.
MOST = 3


@dataclass(frozen=True, eq=False)
class Over:
    """One case laid over: its name, its number (0, 1, ...: the line style), and its result. Without one, `tells`
    says why."""

    name: str
    number: int
    result: Result | None
    tells: str = ""


@dataclass(frozen=True, eq=False)
class _Known:
    case: Case
    result: Result | None
    tells: str


class LaidOver(QObject):
    """`shown`: the cases that `sight.laid_over` names, without the one looked at."""

    changed = Signal()

    def __init__(
        self,
        document: Document,
        sight: Sight,
        parent: QObject | None = None,
        solve_many: Callable[..., Iterable[Any]] | None = None,
    ) -> None:
        super().__init__(parent)
        self._document, self._sight, self._solve_many = document, sight, solve_many
        self._known: list[_Known] = []
        self._asked: list[Case] = []
        self._shown: tuple[Over, ...] = ()
        self._aside = Aside(self)
        self._aside.found.connect(self._take)
        self._aside.ended.connect(self._end)
        document.changed.connect(self._follow)
        sight.changed.connect(self._follow)

    @property
    def shown(self) -> tuple[Over, ...]:
        return self._shown

    def results(self) -> tuple[Over, ...]:
        """Those of `shown` that are solved."""
        return tuple(one for one in self._shown if one.result is not None)

    def drop(self) -> None:
        """Break off what is being solved."""
        self._aside.drop()

    def close(self) -> bool:
        return self._aside.close()

    def _wanted(self) -> list[Case]:
        names = self._sight.laid_over
        if not names:
            return []
        project, current = self._document.project, self._document.case_index
        by_name = {c.name: c for i, c in enumerate(project.cases) if i != current}
        return [by_name[name] for name in names if name in by_name]

    def _follow(self) -> None:
        if not self._sight.laid_over and not self._shown and not self._known:
            return
        wanted = self._wanted()
        # what has changed or is not looked at any more is forgotten
        self._known = [k for k in self._known if any(k.case == case for case in wanted)]
        missing = [case for case in wanted if not any(k.case == case for k in self._known)]
        if missing != self._asked:
            self._asked = missing
            if missing:
                self._aside.start(partial(_solved, missing, self._solve_many))
            else:
                self._aside.drop()
        self._tell(wanted)

    def _take(self, known: _Known) -> None:
        self._known.append(known)
        self._asked = [case for case in self._asked if case != known.case]
        self._tell(self._wanted())

    def _end(self, sentence: str) -> None:
        if sentence:
            self._known += [_Known(case, None, sentence) for case in self._asked]
            self._asked = []
            self._tell(self._wanted())

    def _tell(self, wanted: list[Case]) -> None:
        shown = []
        for number, case in enumerate(wanted):
            known = next((k for k in self._known if k.case == case), None)
            result, tells = (known.result, known.tells) if known else (None, "being solved")
            shown.append(Over(case.name, number, result, tells))
        before = [(o.name, o.result, o.tells) for o in self._shown]
        if before != [(o.name, o.result, o.tells) for o in shown]:
            self._shown = tuple(shown)
            self.changed.emit()


def fill_over_menu(menu: QMenu, document: Document, sight: Sight) -> None:
    """The other cases of the project, each to be laid over the one looked at or taken away again."""
    menu.clear()
    for index, case in enumerate(document.project.cases):
        if index == document.case_index:
            continue
        action = menu.addAction(case.name.replace("&", "&&"), partial(turn_over, sight, case.name))
        action.setCheckable(True)
        action.setChecked(case.name in sight.laid_over)
    menu.addSeparator()
    none = menu.addAction("None", lambda: sight.set(laid_over=()))
    none.setEnabled(bool(sight.laid_over))


def turn_over(sight: Sight, name: str) -> None:
    """Lay a case over the one looked at, or take it away; with more than can be told apart, the oldest goes."""
    over = sight.laid_over
    after = tuple(n for n in over if n != name) if name in over else (*over, name)[-MOST:]
    sight.set(laid_over=after)


def _solved(
    cases: list[Case], solve_many: Callable[..., Iterable[Any]] | None, cancel: Cancel
) -> Iterator[_Known]:
    """One at a time: the case that is looked at needs a processor too."""
    from solver import solve_many as usual

    for outcome in (solve_many or usual)(cases, workers=1, cancel=cancel):
        tells = "" if outcome.error is None else str(outcome.error)
        yield _Known(cases[outcome.index], outcome.result, tells)
