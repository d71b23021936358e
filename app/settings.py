"""What the program remembers between starts: layout, look, recent files. Never anything of a project."""

from __future__ import annotations

import json
import os
from collections.abc import Sequence
from pathlib import Path
from typing import Any, get_args

from platformdirs import user_config_dir
from PySide6.QtCore import QByteArray, QSettings

from app.look.theme import Choice

#: Folder that takes the place of the user's own, for tests and for trying things out.
FOLDER_VARIABLE = "STRIKETRACE_SETTINGS"
MOST_RECENT = 10


class Settings:
    """Settings in a folder; everything in it can be deleted without loss but the work kept for recovery."""

    def __init__(self, folder: Path) -> None:
        self.folder = folder
        self.recovery_folder = folder / "recovery"
        self._stored = QSettings(str(folder / "settings.ini"), QSettings.Format.IniFormat)

    @property
    def look(self) -> Choice:
        """Light, dark, or as the system says."""
        stored = self._stored.value("look")
        return stored if stored in get_args(Choice) else "system"

    @look.setter
    def look(self, choice: Choice) -> None:
        self._stored.setValue("look", choice)

    @property
    def recent(self) -> list[Path]:
        """Files opened or saved lately, the latest first."""
        stored = self._stored.value("recent") or []
        return [Path(p) for p in ([stored] if isinstance(stored, str) else stored)]

    def add_recent(self, path: Path) -> None:
        self._set_recent([path, *(p for p in self.recent if p != path)])

    def forget_recent(self, path: Path) -> None:
        self._set_recent([p for p in self.recent if p != path])

    def _set_recent(self, paths: Sequence[Path]) -> None:
        self._stored.setValue("recent", [str(p) for p in paths[:MOST_RECENT]])

    def flag(self, name: str, usual: bool = False) -> bool:
        """Whether something has been switched on, or done once."""
        return str(self._stored.value(f"flags/{name}", usual)).casefold() == "true"

    def set_flag(self, name: str, on: bool) -> None:
        self._stored.setValue(f"flags/{name}", on)

    def kept(self, name: str) -> Any:
        """Plain values that a dialog was left with, `None` where nothing (or nonsense) is remembered."""
        try:
            return json.loads(str(self._stored.value(f"kept/{name}", "null")))
        except ValueError:
            return None

    def keep(self, name: str, tree: Any) -> None:
        self._stored.setValue(f"kept/{name}", json.dumps(tree))

    def layout(self, name: str) -> QByteArray | None:
        """State of a window or a splitter as Qt saved it."""
        stored: Any = self._stored.value(f"layout/{name}")
        return stored if isinstance(stored, QByteArray) else None

    def set_layout(self, name: str, state: QByteArray) -> None:
        self._stored.setValue(f"layout/{name}", state)

    def shares(self, name: str) -> list[list[float]] | None:
        """How a grid was divided, `None` where nothing (or nonsense) is remembered."""
        try:
            stored = json.loads(str(self._stored.value(f"layout/{name}", "null")))
            return [[float(share) for share in row] for row in stored]
        except (ValueError, TypeError):
            return None

    def set_shares(self, name: str, shares: Sequence[Sequence[float]]) -> None:
        self._stored.setValue(f"layout/{name}", json.dumps([list(row) for row in shares]))

    def save(self) -> None:
        """Write to disk now. A folder that cannot be written costs the settings, nothing else."""
        self._stored.sync()


def user_settings() -> Settings:
    """The settings of whoever runs the program."""
    chosen = os.environ.get(FOLDER_VARIABLE)
    return Settings(Path(chosen) if chosen else Path(user_config_dir("Striketrace", appauthor=False)))
