"""The menus and their keys. Every action of the window is here, so that it can be reached without a mouse."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from pathlib import Path
from typing import Any, Protocol

from PySide6.QtGui import QAction, QActionGroup, QKeySequence
from PySide6.QtWidgets import QMenu, QMenuBar, QWidget

from app.bench.bench import Bench
from app.demo_files import demo_paths
from app.document import Document
from app.frame.case_row import fill_case_menu
from app.frame.top_bar import turn_sign
from app.look.theme import Choice
from app.settings import Settings
from app.sight import Sight

Key = QKeySequence.StandardKey
LOOKS: dict[Choice, str] = {"system": "As the system", "light": "Light", "dark": "Dark"}

#: Columns (True) and rows of the Bench that can be folded away, and their words.
PANELS: dict[tuple[bool, int], str] = {
    (True, 0): "Left column: member, at the cursor",
    (True, 2): "Right column: along the member, findings",
    (False, 0): "Upper row: member, x-t diagram, along the member",
    (False, 1): "Lower row: at the cursor, strips, findings",
}


class Around(Protocol):
    """What the window has and does that the menus reach."""

    document: Document
    sight: Sight
    settings: Settings
    bench: Bench

    def ask_new(self) -> None: ...
    def ask_open(self) -> None: ...
    def open_path(self, path: Path) -> bool: ...
    def open_demo(self, path: Path) -> bool: ...
    def save(self) -> bool: ...
    def ask_save_as(self) -> bool: ...
    def ask_records(self) -> bool: ...
    def choose_records(self) -> None: ...
    def close(self) -> bool: ...
    def show_notes(self) -> None: ...
    def show_outline(self, on: bool) -> None: ...
    def turn_full_screen(self) -> None: ...
    def choose_look(self, choice: Choice) -> None: ...
    def tell_first_steps(self) -> None: ...
    def show_limits(self) -> None: ...
    def show_terms(self) -> None: ...
    def explain_at_hand(self) -> None: ...
    def show_about(self) -> None: ...


class Menus:
    """Holds the actions that change with the document; `bar` is the bar with all menus."""

    def __init__(self, window: Around, parent: QWidget) -> None:
        self._window, self._parent = window, parent
        self.bar = QMenuBar(parent)
        self.save = self._action("Save", window.save, Key.Save)
        self.undo = window.document.undo_stack.createUndoAction(parent, "Undo")
        self.undo.setShortcut(Key.Undo)
        self.redo = window.document.undo_stack.createRedoAction(parent, "Redo")
        usual, also = QKeySequence.keyBindings(Key.Redo), QKeySequence("Ctrl+Y")
        self.redo.setShortcuts(usual if also in usual else [*usual, also])  # one given twice does nothing
        self.records = self._action("Save gauge records…", window.ask_records, QKeySequence("Ctrl+E"))
        self.records_as = self._action(
            "Choose what records are saved…", window.choose_records, QKeySequence("Ctrl+Shift+E")
        )
        self.notes = self._action("Notes", window.show_notes, QKeySequence("Ctrl+Shift+N"), checkable=True)
        self.outline = self._action("Outline", window.show_outline, QKeySequence("F9"), checkable=True)
        self.looks = QActionGroup(parent)
        self._file()
        self._edit()
        self._case()
        self._view()
        self._help()

    @property
    def icons(self) -> dict[str, QAction]:
        """Actions that are shown as icons in the top bar."""
        return {"save": self.save, "undo": self.undo, "redo": self.redo}

    def _action(
        self,
        text: str,
        do: Callable[..., Any],
        key: QKeySequence | QKeySequence.StandardKey | None = None,
        checkable: bool = False,
    ) -> QAction:
        action = QAction(text, self._parent, checkable=checkable)
        if key is not None:
            action.setShortcut(key)
        if checkable:
            action.triggered.connect(do)
        else:
            action.triggered.connect(lambda _checked=False: do())
        self._parent.addAction(action)
        return action

    def _file(self) -> None:
        window, menu = self._window, self.bar.addMenu("&File")
        menu.addAction(self._action("New…", window.ask_new, Key.New))
        menu.addAction(self._action("Open…", window.ask_open, Key.Open))
        self.recent = menu.addMenu("Open recent")
        self.recent.aboutToShow.connect(self._fill_recent)
        demos = menu.addMenu("Open a demo")
        for path in demo_paths():
            name = path.stem.lstrip("0123456789-_").replace("-", " ").replace("_", " ")
            demos.addAction(name.capitalize(), partial(window.open_demo, path))
        demos.setEnabled(bool(demos.actions()))
        menu.addSeparator()
        menu.addAction(self.save)
        menu.addAction(self._action("Save as…", window.ask_save_as, QKeySequence("Ctrl+Shift+S")))
        menu.addSeparator()
        menu.addAction(self.records)
        menu.addAction(self.records_as)
        menu.addSeparator()
        menu.addAction(self._action("Close", window.close, QKeySequence("Ctrl+Q")))

    def _fill_recent(self) -> None:
        self.recent.clear()
        for path in self._window.settings.recent:
            text = f"{path.name}  –  {path.parent}".replace("&", "&&")
            self.recent.addAction(text, partial(self._window.open_path, path))
        if not self.recent.actions():
            self.recent.addAction("None yet").setEnabled(False)

    def _edit(self) -> None:
        document, menu = self._window.document, self.bar.addMenu("&Edit")
        menu.addAction(self.undo)
        menu.addAction(self.redo)
        menu.addSeparator()
        menu.addAction(self._action("Drop entries that are not valid", document.forget_rejected))
        menu.addAction(
            self._action("Turn the sign", lambda: turn_sign(document), QKeySequence("Ctrl+Shift+T"))
        )

    def _case(self) -> None:
        window, document = self._window, self._window.document
        menu = self.bar.addMenu("&Case")

        def fill() -> None:
            menu.clear()
            fill_case_menu(menu, document, self._parent, window.sight)
            menu.addSeparator()
            menu.addAction(following)
            menu.addAction(previous)

        following = self._action("Next case", lambda: self._step_case(1), QKeySequence("Ctrl+PgDown"))
        previous = self._action("Previous case", lambda: self._step_case(-1), QKeySequence("Ctrl+PgUp"))
        menu.aboutToShow.connect(fill)
        fill()

    def _step_case(self, by: int) -> None:
        document = self._window.document
        document.choose_case((document.case_index + by) % len(document.project.cases))

    def _view(self) -> None:
        window, menu = self._window, self.bar.addMenu("&View")
        menu.addAction(self.outline)
        menu.addAction(self.notes)
        menu.addSeparator()
        menu.addAction(
            self._action("One panel alone", lambda: window.bench.turn_alone(), QKeySequence("F11"))
        )
        self.panels = {place: self._panel_action(words, place) for place, words in PANELS.items()}
        for action in self.panels.values():
            menu.addAction(action)
        menu.addSeparator()
        menu.addAction(self._action("Full screen", window.turn_full_screen, QKeySequence("Shift+F11")))
        menu.addSeparator()
        for choice, words in LOOKS.items():
            action = self._look_action(words, choice)
            action.setData(choice)
            self.looks.addAction(action)
            menu.addAction(action)

    def _panel_action(self, words: str, place: tuple[bool, int]) -> QAction:
        def fold(on: bool) -> None:
            self._window.bench.grid.fold(*place, not on)

        return self._action(words, fold, checkable=True)

    def _look_action(self, words: str, choice: Choice) -> QAction:
        def choose(on: bool) -> None:  # not a partial: Qt would call that without its argument
            if on:
                self._window.choose_look(choice)

        return self._action(words, choose, checkable=True)

    def _help(self) -> None:
        menu: QMenu = self.bar.addMenu("&Help")
        menu.addAction(self._action("First steps", self._window.tell_first_steps))
        menu.addAction(self._action("What this program computes, and what not", self._window.show_limits))
        menu.addAction(self._action("Terms", self._window.show_terms, Key.HelpContents))
        menu.addAction(self._action("What is this?", self._window.explain_at_hand, QKeySequence("Shift+F1")))
        menu.addAction(self._action("About Striketrace", self._window.show_about))
