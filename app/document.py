"""What is described: one valid project, its undo stack and its file. Every change is an edit of the whole project."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from time import monotonic
from typing import Any
from weakref import ref

from PySide6.QtCore import QIODevice, QObject, QSaveFile, QThread, Signal
from PySide6.QtGui import QUndoCommand, QUndoStack

from app import tree as trees
from app.carried_along import Moved, carried_along, sentence_of
from app.disk import DiskState, disk_state
from app.faults import sentence_for
from app.units import units_of
from solver import Case, Project, ProjectError, load_project, project_from_tree, project_to_text

#: Edits with the same `merge` key become one step of undo while no longer than this lies between them, s.
BURST = 2.0
#: Pauses before a file that could not be replaced is tried again, ms: on Windows virus scanners and programs that
#: carry files to a cloud hold a file for a moment after each writing.
AGAIN = (60, 150)


class DocumentError(Exception):
    """A file that cannot be opened or saved; its text is a sentence for the user."""


@dataclass(frozen=True)
class Rejected:
    """What was entered and not taken. `waiting`: a value that is tried again when something else has changed."""

    given: Any
    sentence: str
    waiting: bool = True


def why_not_opened(path: Path, error: ProjectError) -> str:
    """Sentences for the user; what the solver says of a file as a whole has the file's name for its subject."""
    lines = [
        f"It {p.sentence}." if not p.pointer and p.sentence.startswith(("is ", "cannot ")) else f"{p}."
        for p in error.problems[:8]
    ]
    return "\n".join([f"'{path.name}' cannot be opened.", *lines])


class Document(QObject):
    """Holds a valid project at all times; what is not valid stays outside of it, in `rejected`.

    Pointers are JSON pointers; one without "/" in front is relative to the case that is looked at. The last part may
    be "-" to append to a list.
    """

    changed = Signal()
    #: An edit without a field to show its fault at was refused; carries what was not done, and why.
    refused = Signal(str)
    #: An edit was taken and has changed more than was asked for; carries the sentence on it.
    told = Signal(str)

    def __init__(self, project: Project, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.undo_stack = QUndoStack(self)
        self.undo_stack.setUndoLimit(1000)
        self.undo_stack.cleanChanged.connect(self.changed)
        self._project = project
        self._tree: dict[str, Any] = project.model_dump(mode="json")
        self._path: Path | None = None
        self._folder: Path | None = None
        self._disk: DiskState | None = None
        self._case_index = 0
        self._rejected: dict[str, Rejected] = {}

    @property
    def project(self) -> Project:
        return self._project

    @property
    def case(self) -> Case:
        """The case that is looked at."""
        return self._project.cases[self.case_index]

    @property
    def case_index(self) -> int:
        return min(self._case_index, len(self._project.cases) - 1)

    @property
    def path(self) -> Path | None:
        return self._path

    @property
    def folder(self) -> Path | None:
        """Where relative history files are looked for."""
        return self._folder

    @property
    def dirty(self) -> bool:
        """Whether the project differs from what is on disk."""
        return not self.undo_stack.isClean()

    @property
    def rejected(self) -> dict[str, Rejected]:
        """By full pointer, what was entered and not taken. A copy."""
        return dict(self._rejected)

    @property
    def tree(self) -> dict[str, Any]:
        """The project as plain dicts, lists and numbers. A copy."""
        return trees.copied(self._tree)

    def choose_case(self, index: int) -> None:
        """Look at another case. No edit: nothing of the project changes."""
        if index != self._case_index and 0 <= index < len(self._project.cases):
            self._case_index = index
            self.changed.emit()

    def full_pointer(self, pointer: str) -> str:
        """A pointer into the project, from one that may be relative to the case."""
        return pointer if pointer.startswith("/") else f"/cases/{self.case_index}/{pointer}"

    def value_at(self, pointer: str) -> Any:
        """The value in the project at a pointer, `None` where there is none."""
        return trees.copied(trees.value_at(self._tree, self.full_pointer(pointer)))

    def problem_at(self, pointer: str) -> str | None:
        """The sentence on what was entered there and not taken."""
        entry = self._rejected.get(self.full_pointer(pointer))
        return entry.sentence if entry else None

    def edit(self, label: str, pointer: str, value: Any, merge: str | None = None) -> bool:
        """Set one value as one step of undo named `label`. False, and an entry in `rejected`, where it is not valid.

        Values that were rejected before are tried again with it: two fields that fit only together can be changed
        one after the other. What a shorter rod has no place for moves with its end, which is told. While a burst of
        typing (`merge`) goes on, what is refused or would move something is left without a word: 1 of 15 is not meant.
        """
        pointer = self.full_pointer(pointer)
        waiting = {p: r.given for p, r in self._rejected.items() if r.waiting and p != pointer}
        attempts = [{**waiting, pointer: value}, {pointer: value}] if waiting else [{pointer: value}]
        sentence = ""
        for attempt in attempts:
            after = self._tree
            try:
                after = trees.with_values(self._tree, attempt)
                project, moved = self._fitted(after)
            except LookupError:
                sentence = "This part is no longer in the project."
            except ProjectError as error:
                sentence = sentence_for(pointer, error.problems, after, units_of(self._project))
            else:
                if moved and merge is not None:
                    return False
                self._rejected = {p: r for p, r in self._rejected.items() if p not in attempt}
                self._push(label, project, merge, moved)
                return True
        if pointer.endswith("/-"):
            self.refused.emit(_not_done(label, sentence))  # what was not appended has no field to show it at
        elif merge is None:
            self.reject(pointer, value, sentence, waiting=True)
        return False

    def edit_tree(
        self,
        label: str,
        change: Callable[[dict[str, Any]], None],
        merge: str | None = None,
        pointer: str = "",
    ) -> bool:
        """Change a copy of the whole tree as one step. Where that is not valid, the sentence goes to `rejected` at
        `pointer`, or without one to the signal `refused`. Bursts as for `edit`."""
        after = self.tree
        change(after)
        where = self.full_pointer(pointer) if pointer else ""
        try:
            project, moved = self._fitted(after)
        except ProjectError as error:
            sentence = sentence_for(where, error.problems, after, units_of(self._project))
            if where and merge is None:
                self.reject(where, trees.value_at(after, where), sentence, waiting=False)
            elif not where:
                self.refused.emit(_not_done(label, sentence))
            return False
        if moved and merge is not None:
            return False
        self._rejected = {
            p: r for p, r in self._rejected.items() if p != where and trees.same_place(self._tree, after, p)
        }
        self._push(label, project, merge, moved)
        return True

    def reject(self, pointer: str, given: Any, sentence: str, waiting: bool = False) -> None:
        """Note something entered that cannot be taken, such as text that is no number."""
        pointer = self.full_pointer(pointer)
        entry = Rejected(given, sentence, waiting)
        if self._rejected.get(pointer) != entry:
            self._rejected[pointer] = entry
            self.changed.emit()

    def forget_rejected(self, under: str = "") -> None:
        """Drop what was entered and not taken, all of it or that below a pointer; fields show the project's values."""
        place = self.full_pointer(under) if under else ""
        kept = {p: r for p, r in self._rejected.items() if not p.startswith(f"{place}/")}
        if kept != self._rejected:
            self._rejected = kept
            self.changed.emit()

    def new(
        self, project: Project, path: Path | None = None, saved: bool = True, folder: Path | None = None
    ) -> None:
        """Begin with a project. `path` is its file, if any; `saved` False where it differs from that file; `folder`
        is where its history files lie while it has none of its own."""
        self._project, self._tree = project, project.model_dump(mode="json")
        self._path = path
        self._folder = path.parent if path else folder
        self._disk = disk_state(path) if path else None
        self._case_index = 0
        self._rejected = {}
        blocked = self.blockSignals(True)
        self.undo_stack.clear()
        if saved:
            self.undo_stack.setClean()
        else:
            self.undo_stack.resetClean()
        self.blockSignals(blocked)
        self.changed.emit()

    def open(self, path: Path | str) -> None:
        """Read a project file. Raises `DocumentError`; the project at hand then stays."""
        path = Path(path).absolute()
        self.new(self.read(path), path)

    @staticmethod
    def read(path: Path) -> Project:
        """The project in a file. Raises `DocumentError`."""
        try:
            return load_project(path)
        except ProjectError as error:
            raise DocumentError(why_not_opened(path, error)) from None

    def save(self) -> None:
        """Write to the project's own file, whole or not at all. Raises `DocumentError`."""
        if self._path is None:
            raise DocumentError("The project has no file yet: save it under a name.")
        self.save_as(self._path)

    def save_as(self, path: Path | str) -> None:
        """Write to a file, whole or not at all, and go on with it. Raises `DocumentError`; nothing is lost then."""
        path = Path(path).absolute()
        project = self._project
        if self._folder is not None and path.parent != self._folder:
            project = self._moved(path.parent)
        _write(path, project_to_text(project))
        self._project, self._tree = project, project.model_dump(mode="json")
        self._path, self._folder = path, path.parent
        self._disk = disk_state(path)
        self.undo_stack.setClean()
        self.changed.emit()

    def changed_on_disk(self) -> bool:
        """Whether another program has changed or removed the file since it was read or written here."""
        return self._path is not None and self._disk is not None and disk_state(self._path) != self._disk

    def accept_disk(self) -> None:
        """Take note of what another program did to the file, and keep the project as it is here."""
        if self._path is not None:
            self._disk = disk_state(self._path)
            self.undo_stack.resetClean()
            self.changed.emit()

    def _validated(self, tree: dict[str, Any]) -> Project:
        return project_from_tree(tree, self._folder)

    def _fitted(self, after: dict[str, Any]) -> tuple[Project, list[Moved]]:
        """The project of a tree after an edit, with what moved along because its rod has become shorter."""
        try:
            return self._validated(after), []
        except ProjectError as error:
            carried = carried_along(self._tree, after, error.problems)
            if carried is None:
                raise
        return self._validated(carried[0]), carried[1]  # raises for what else is wrong

    def _moved(self, folder: Path) -> Project:
        """The project as it must be written in another folder, so that its history files are still found."""
        assert self._folder is not None
        try:
            return project_from_tree(trees.with_files_moved(self._tree, self._folder, folder), folder)
        except ProjectError as error:
            raise DocumentError(f"The project cannot be saved in {folder}: {error}") from None

    def _push(self, label: str, project: Project, merge: str | None, moved: Sequence[Moved] = ()) -> None:
        if project == self._project:
            self.changed.emit()  # a rejected entry may have gone
        else:
            self.undo_stack.push(_Edit(self, label, self._project, project, merge))
        if moved:
            self.told.emit(sentence_of(moved, units_of(project)))

    def _show(self, project: Project, keep_rejected: bool) -> None:
        self._project, self._tree = project, project.model_dump(mode="json")
        if not keep_rejected:
            self._rejected = {}
        self.changed.emit()


class _Edit(QUndoCommand):
    """From one project to another. Both are immutable, so holding them is cheap and undo cannot go wrong."""

    def __init__(
        self, document: Document, label: str, before: Project, after: Project, merge: str | None
    ) -> None:
        super().__init__(label)
        # a circle through Qt's own objects is taken apart in an order that may crash
        self._document = ref(document)
        self._before, self._after, self._merge = before, after, merge
        self._time = monotonic()
        self._done_once = False

    def id(self) -> int:
        return -1 if self._merge is None else 1

    def mergeWith(self, other: QUndoCommand) -> bool:
        if not isinstance(other, _Edit) or other._merge != self._merge or other._time - self._time > BURST:
            return False
        self._after, self._time = other._after, other._time
        self.setText(other.text())
        if self._after == self._before:
            self.setObsolete(True)
        return True

    def redo(self) -> None:
        self._show(self._after, keep_rejected=not self._done_once)
        self._done_once = True

    def undo(self) -> None:
        self._show(self._before, keep_rejected=False)

    def _show(self, project: Project, keep_rejected: bool) -> None:
        document = self._document()
        if document is not None:
            document._show(project, keep_rejected)


def _not_done(label: str, sentence: str) -> str:
    return f"Not done: {label[:1].lower()}{label[1:]}. {sentence}"


def _write(path: Path, text: str) -> None:
    # half of a surrogate pair: the escape that JSON has for it
    data = text.encode("utf-8", errors="backslashreplace")
    reason = ""
    for pause in (*AGAIN, 0):
        file = QSaveFile(str(path))
        if file.open(QIODevice.OpenModeFlag.WriteOnly) and file.write(data) == len(data) and file.commit():
            return
        reason = file.errorString().strip().rstrip(".")
        if path.exists():
            QThread.msleep(pause)
    raise DocumentError(
        f"'{path.name}' could not be saved in {path.parent}: {reason}. Your work is kept here; save it elsewhere."
    )
