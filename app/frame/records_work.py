"""Records of several cases solved and written in a thread of their own."""

from __future__ import annotations

import logging
from collections.abc import Sequence
from pathlib import Path
from threading import Event, Thread

from PySide6.QtCore import QObject, Signal

from app.export.record_choices import RecordChoices
from app.export.record_files import write_records
from solver import Case, Project, Result


class RecordsWork(QObject):
    """`told` says what is being done; `ended` brings the sentence for the end, and whether all went well."""

    told = Signal(str)
    ended = Signal(str, bool)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._stop = Event()
        self._thread: Thread | None = None

    @property
    def busy(self) -> bool:
        return self._thread is not None and self._thread.is_alive()

    def start(
        self,
        project: Project,
        cases: Sequence[Case],
        known: Result | None,
        choices: RecordChoices,
        folder: Path,
    ) -> None:
        """Begin; a case that `known` is the result of is not solved again."""
        self._stop.clear()
        self._thread = Thread(
            target=self._work, args=(project, cases, known, choices, folder), name="records", daemon=True
        )
        self._thread.start()

    def stop(self) -> None:
        """End what is under way; nothing is written of a case that has not ended."""
        self._stop.set()
        if self._thread is not None:
            self._thread.join(0.7)

    def _work(
        self,
        project: Project,
        cases: Sequence[Case],
        known: Result | None,
        choices: RecordChoices,
        folder: Path,
    ) -> None:
        from solver import SolveError, solve

        written, name = 0, ""
        try:
            for case in cases:
                name = case.name
                if known is not None and known.finished and known.case == case:
                    result = known
                else:
                    self.told.emit(f"Solving {name} …")
                    result = solve(case, cancel=self._stop.is_set)
                if self._stop.is_set():
                    return
                self.told.emit(f"Writing {name} …")
                written += len(write_records(project, [result], choices, folder))
            self.ended.emit(f"{written} file{'s' if written != 1 else ''} of records in {folder}.", True)
        except (SolveError, ValueError) as error:
            self.ended.emit(f"Case '{name}': {error}", False)
        except OSError as error:
            self.ended.emit(f"The records of '{name}' cannot be written to {folder}. {error}", False)
        except Exception as error:
            logging.getLogger(__name__).exception("The records could not be made")
            self.ended.emit(f"The records of '{name}' failed ({type(error).__name__}: {error}).", False)
