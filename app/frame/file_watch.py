"""Notices when another program changes the file of the document."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtCore import QFileSystemWatcher, QObject, QTimer, Signal

from app.document import Document

#: Other programs write in several steps; they are given so long to end, ms.
SETTLED = 300


class FileWatch(QObject):
    """Emits `found` once for each change of the file by another program."""

    found = Signal()

    def __init__(self, document: Document, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._watcher = QFileSystemWatcher(self)
        self._timer = QTimer(self, singleShot=True, interval=SETTLED)
        self._timer.timeout.connect(self.look)
        self._watcher.fileChanged.connect(lambda _path: self._timer.start())
        self._watcher.directoryChanged.connect(lambda _path: self._timer.start())
        self._told_of: Path | None = None
        document.changed.connect(self._follow)
        self._follow()

    def look(self) -> None:
        """Compare with the disk now; network drives do not always tell."""
        if self._document.changed_on_disk():
            if self._told_of != self._document.path:
                self._told_of = self._document.path
                self.found.emit()
        else:
            self._told_of = None
        self._follow()

    def _follow(self) -> None:
        path = self._document.path
        wanted = {str(path), str(path.parent)} if path else set()
        watched = {*self._watcher.files(), *self._watcher.directories()}
        if watched - wanted:
            self._watcher.removePaths(list(watched - wanted))
        new = [p for p in wanted - watched if Path(p).exists()]
        if new:
            self._watcher.addPaths(new)
