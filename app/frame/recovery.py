"""Unsaved work, kept beside the settings within 3 s of an edit and offered at the next start."""

from __future__ import annotations

import json
import uuid
from dataclasses import dataclass
from datetime import datetime
from pathlib import Path
from typing import Any

from PySide6.QtCore import QElapsedTimer, QIODevice, QLockFile, QObject, QSaveFile, QTimer, Signal

from app.document import Document
from solver import Project, ProjectError, parse_project, project_to_text

#: Work is written so long after the first edit that is not yet kept, ms. An edit must be safe within 3 s, also on a
#: machine so busy that this window gets no turn for two of them.
DELAY = 750
FORMAT = "striketrace-recovery"


@dataclass(frozen=True)
class Kept:
    """Unsaved work found on disk: when it was kept, of which file, and when that file was last saved."""

    place: Path
    project: Project
    kept: datetime
    path: Path | None
    folder: Path | None
    saved: datetime | None


class Autosave(QObject):
    """Keeps the unsaved work of one document in a file of its own, and drops it once the document is saved."""

    failed = Signal(str)

    def __init__(self, document: Document, folder: Path, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._place = folder / f"{uuid.uuid4().hex}.json"
        self._lock = QLockFile(str(self._place.with_suffix(".lock")))
        self._lock.setStaleLockTime(0)
        self._written: Project | None = None
        self._told = False
        self._since = QElapsedTimer()
        self._timer = QTimer(self, singleShot=True, interval=DELAY)
        self._timer.timeout.connect(self.keep_now)
        document.changed.connect(self._follow)

    def _follow(self) -> None:
        if not self._document.dirty:
            self.drop()
        elif self._document.project is not self._written:
            if not self._timer.isActive():
                self._since.start()
                self._timer.start()
            elif self._since.hasExpired(DELAY):
                self.keep_now()  # so many events wait that the timer does not get its turn

    def keep_now(self) -> None:
        """Write what is not saved. Where the disk refuses, says so once and goes on trying."""
        self._timer.stop()
        document = self._document
        if not document.dirty or document.project is self._written:
            return
        kept = {
            "format": FORMAT,
            "kept": datetime.now().astimezone().isoformat(),
            "path": str(document.path) if document.path else None,
            "folder": str(document.folder) if document.folder else None,
            "project": project_to_text(document.project),
        }
        try:
            self._place.parent.mkdir(parents=True, exist_ok=True)
            self._lock.tryLock(0)
            _write(self._place, json.dumps(kept))
        except OSError as error:
            if not self._told:
                self._told = True
                self.failed.emit(
                    f"Unsaved work cannot be kept in {self._place.parent}: {error}. Save it yourself."
                )
            self._timer.start()  # a virus scanner or a network drive may let go of it soon
            return
        self._written, self._told = document.project, False

    def drop(self) -> None:
        """Forget what was kept: it is saved, or the user does not want it."""
        self._timer.stop()
        if self._written is not None:
            self._written = None
            _remove(self._place)
        self._lock.unlock()

    def close(self) -> None:
        """Keep what is not saved, and leave it to the next start."""
        self.keep_now()
        self._lock.unlock()


def _write(path: Path, text: str) -> None:
    file = QSaveFile(str(path))
    data = text.encode()
    if not (file.open(QIODevice.OpenModeFlag.WriteOnly) and file.write(data) == len(data) and file.commit()):
        raise OSError(file.errorString())


def kept_work(folder: Path) -> list[Kept]:
    """Unsaved work that no running program holds, the latest first. What cannot be read is left where it is."""
    found = []
    for place in folder.glob("*.json") if folder.is_dir() else ():
        lock = QLockFile(str(place.with_suffix(".lock")))
        lock.setStaleLockTime(0)
        if lock.tryLock(0):
            lock.unlock()
            kept = _read(place)
            if kept is not None:
                found.append(kept)
    return sorted(found, key=lambda kept: kept.kept, reverse=True)


def discard(kept: Kept) -> None:
    """Delete kept work that the user does not want, or has taken over."""
    _remove(kept.place)


def _read(place: Path) -> Kept | None:
    try:
        entry: dict[str, Any] = json.loads(place.read_bytes())
        path = Path(entry["path"]) if entry["path"] else None
        folder = Path(entry["folder"]) if entry["folder"] else None
        project = parse_project(entry["project"], folder)
        return Kept(place, project, datetime.fromisoformat(entry["kept"]), path, folder, _saved(path))
    except (OSError, ValueError, KeyError, TypeError, ProjectError):
        return None


def _saved(path: Path | None) -> datetime | None:
    try:
        return datetime.fromtimestamp(path.stat().st_mtime).astimezone() if path else None
    except OSError:
        return None


def _remove(place: Path) -> None:
    try:
        place.unlink(missing_ok=True)
    except OSError:
        return  # held open by a virus scanner, say: it is offered once more, which does no harm
