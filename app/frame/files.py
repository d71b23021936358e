"""What a person does with files in the window: new, open, save, export, recover."""

from __future__ import annotations

from collections.abc import Callable
from datetime import datetime
from functools import partial
from pathlib import Path
from typing import Protocol

from PySide6.QtCore import QMimeData
from PySide6.QtWidgets import QFileDialog, QMessageBox, QWidget

from app.differences import differences
from app.disk import write_whole
from app.document import Document, DocumentError
from app.export import folder_names, gauge_csv
from app.frame.notices import Notices
from app.frame.panels_told import offer_starting_points
from app.frame.recovery import Autosave, Kept, discard
from app.settings import Settings
from app.solving import Solution
from app.starting_points import StartingPoint
from app.units import unknown_units
from solver import Project, ProjectError, load_project, project_from_tree

ENDING = ".strike"
FILTER = f"Striketrace projects (*{ENDING})"


class Around(Protocol):
    """What the window has that files need."""

    document: Document
    solution: Solution
    settings: Settings
    notices: Notices
    autosave: Autosave

    def commit_typing(self) -> None:
        """Hand over what stands in a field and has not been entered yet."""

    def begin_looking(self) -> None:
        """Look at a project anew."""


class Files:
    """The file side of one window; `parent` is what its dialogs belong to."""

    def __init__(self, window: Around, parent: QWidget) -> None:
        self._window, self._parent = window, parent

    # -- beginning with a project -----------------------------------------------------------------------------------

    def ask_new(self) -> None:
        """Offer the starting points."""
        offer_starting_points(self._parent, self.new_from)

    def new_from(self, point: StartingPoint) -> bool:
        """Begin with a starting point, once the work at hand is safe."""
        return self._begin(lambda: self._window.document.new(project_from_tree(point.make())))

    def ask_open(self) -> bool:
        """Ask for a file and open it."""
        name, _ = QFileDialog.getOpenFileName(self._parent, "Open a project", self._folder(), FILTER)
        return bool(name) and self.open_path(Path(name))

    def open_path(self, path: Path) -> bool:
        """Open a project file, once the work at hand is safe."""
        path = Path(path).absolute()
        done = self._begin(
            lambda: self._window.document.open(path), readable=lambda: self._window.document.read(path)
        )
        if done:
            self._window.settings.add_recent(path)
        elif not path.exists():
            self._window.settings.forget_recent(path)
        return done

    def open_demo(self, path: Path) -> bool:
        """Open a demo as a project without a file of its own, so that saving does not change the demo."""
        return self._begin(
            lambda: self._window.document.new(load_project(path), folder=path.parent),
            readable=lambda: load_project(path),
        )

    def recover(self, kept: Kept) -> bool:
        """Go on with unsaved work of an earlier start."""
        document = self._window.document
        done = self._begin(lambda: document.new(kept.project, kept.path, saved=False, folder=kept.folder))
        if done:
            self._window.autosave.keep_now()
            discard(kept)
        return done

    def offer_recovery(self, found: list[Kept]) -> None:
        """Tell of unsaved work, with both times and what differs, and offer to go on with it."""
        for kept in [one for one in found if _is_saved(one)]:
            discard(kept)  # killed between saving and dropping it: nothing is lost, and nothing to ask
        for number, kept in enumerate([one for one in found if not _is_saved(one)][:3]):
            name = f"'{kept.path.name}'" if kept.path else f"the project '{kept.project.title}'"
            saved = f" (the file was saved {_when(kept.saved)})" if kept.saved else ""
            text = f"Unsaved work on {name}, kept {_when(kept.kept)}{saved}. {_against_file(kept)}"
            choices: list[tuple[str, Callable[[], object]]] = [
                ("Go on with it", partial(self.recover, kept)),
                ("Discard it", partial(discard, kept)),
            ]
            self._window.notices.show_notice(f"recovery{number}", text, "near", choices)

    def _begin(self, begin: Callable[[], object], readable: Callable[[], object] = lambda: None) -> bool:
        """Nothing is asked about the work at hand before the other file is known to be readable; it is read again
        after that, as it may be the file that has just been saved."""
        window = self._window
        window.commit_typing()
        try:
            readable()
            if not self._may_leave():
                return False
            begin()
        except DocumentError as error:
            window.notices.show_notice("file", str(error), "over")
            return False
        except ProjectError as error:
            window.notices.show_notice("file", f"This cannot be opened.\n{error}", "over")
            return False
        for key in ("file", "disk", "edit", "saving", "units"):
            window.notices.drop(key)
        for sentence in unknown_units(window.document.project)[:1]:
            window.notices.show_notice("units", sentence, "near")
        window.begin_looking()
        return True

    def _may_leave(self) -> bool:
        """Whether the work at hand is saved, or not wanted."""
        window = self._window
        if not window.document.dirty:
            return True
        ask = QMessageBox.StandardButton
        title = window.document.project.title or "This project"
        answer = QMessageBox.question(
            self._parent,
            "Unsaved changes",
            f"'{title}' has changes that are not saved. Save them first?",
            ask.Save | ask.Discard | ask.Cancel,
            ask.Save,
        )
        if answer == ask.Save:
            return self.save()
        if answer == ask.Discard:
            window.autosave.drop()
            return True
        return False

    # -- saving -----------------------------------------------------------------------------------------------------

    def save(self) -> bool:
        """Save to the project's file; ask for one where it has none, or where another program has changed it."""
        window = self._window
        window.commit_typing()
        if window.document.path is None:
            return self.ask_save_as()
        if window.document.changed_on_disk():
            window.notices.show_notice(
                "saving",
                f"'{window.document.path.name}' was changed by another program since it was read: "
                "saving over it would lose that.",
                "near",
                [("Save over it", self._save_over), ("Save under another name…", self.ask_save_as)],
            )
            return False
        return self.save_to(window.document.path)

    def _save_over(self) -> bool:
        path = self._window.document.path
        return path is not None and self.save_to(path)

    def ask_save_as(self) -> bool:
        """Ask for a file and save to it."""
        window = self._window
        window.commit_typing()
        title = folder_names([window.document.project.title or "project"])[0]
        start = window.document.path or Path(self._folder()) / f"{title}{ENDING}"
        name, _ = QFileDialog.getSaveFileName(self._parent, "Save the project", str(start), FILTER)
        if not name:
            return False
        typed = Path(name)
        if typed.suffix.casefold() == ENDING:
            return self.save_to(typed)
        path = typed.with_name(typed.name + ENDING)  # which the system's dialog has not asked about
        if path.exists() and path != window.document.path:
            window.notices.show_notice(
                "saving",
                f"'{path.name}' is in {path.parent} already, and was not replaced.",
                "near",
                [
                    ("Save over it", partial(self.save_to, path)),
                    ("Save under another name…", self.ask_save_as),
                ],
            )
            return False
        return self.save_to(path)

    def save_to(self, path: Path) -> bool:
        """Save to a file and tell where that does not work."""
        window = self._window
        try:
            window.document.save_as(path)
        except DocumentError as error:
            window.notices.show_notice("file", str(error), "over")
            return False
        for key in ("file", "disk", "saving"):
            window.notices.drop(key)
        window.settings.add_recent(path)
        return True

    def tell_of_change(self) -> None:
        """Another program has changed the file: offer what it wrote, or to keep what is here."""
        window, path = self._window, self._window.document.path
        if path is None:
            return
        if not path.exists():
            window.notices.show_notice(
                "disk", f"'{path.name}' is gone from {path.parent}. Saving brings it back."
            )
            window.document.accept_disk()
            return
        try:
            differs = differences(window.document.project, load_project(path))
        except ProjectError as error:
            differs = f"It is no valid project now: {error.problems[0]}."
        choices: list[tuple[str, Callable[[], object]]] = [
            ("Load it again", lambda: self._load_again(path)),
            ("Keep what is here", window.document.accept_disk),
        ]
        window.notices.show_notice(
            "disk", f"'{path.name}' was changed by another program. {differs}", "near", choices
        )

    def _load_again(self, path: Path) -> None:
        try:
            self._window.document.open(path)
        except DocumentError as error:
            self._window.notices.show_notice("file", str(error), "over")

    # -- export -----------------------------------------------------------------------------------------------------

    def ask_records(self) -> bool:
        """Ask for a file and write the records of all gauges to it."""
        window = self._window
        name = f"{folder_names([window.document.case.name])[0]}-gauges.csv"
        asked, _ = QFileDialog.getSaveFileName(
            self._parent, "Save the gauge records", str(Path(self._folder()) / name), "CSV (*.csv)"
        )
        return bool(asked) and self.save_records(Path(asked))

    def save_records(self, path: Path) -> bool:
        """Write the records of all gauges, in the sign of the screen, and say where they are."""
        window, result = self._window, self._window.solution.result
        if result is None:
            return False
        project: Project = window.document.project
        text = gauge_csv(result, project.title, compression_positive=project.display_sign == "compression")
        try:
            write_whole(path, text)
        except OSError as error:
            reason = error.strerror or str(error)
            window.notices.show_notice(
                "records", f"The records cannot be written to {path}: {reason}.", "over"
            )
            return False
        stale = "" if window.solution.state == "fresh" else " They are of the input before the last change."
        window.notices.show_notice(
            "records", f"The records of {len(result.gauges)} gauges are in {path}.{stale}"
        )
        return True

    # -- paths ------------------------------------------------------------------------------------------------------

    @staticmethod
    def dropped(data: QMimeData) -> Path | None:
        """The project file that is being dropped on the window, if it is one."""
        names = [url.toLocalFile() for url in data.urls()]
        return next((Path(name) for name in names if name.casefold().endswith(ENDING)), None)

    def _folder(self) -> str:
        path = self._window.document.path
        recent = self._window.settings.recent
        return str(path.parent if path else recent[0].parent if recent else Path.home())


def _when(time: datetime | None) -> str:
    if time is None:
        return "at an unknown time"
    today = time.date() == datetime.now().astimezone().date()
    return f"at {time:%H:%M} today" if today else f"on {time:%d %b %Y, %H:%M}"


def _is_saved(kept: Kept) -> bool:
    """Whether the file holds just what was kept."""
    try:
        return kept.path is not None and load_project(kept.path) == kept.project
    except ProjectError:
        return False


def _against_file(kept: Kept) -> str:
    if kept.path is None:
        return "It was never saved."
    try:
        return differences(load_project(kept.path), kept.project)
    except ProjectError:
        return "The file itself cannot be read."
