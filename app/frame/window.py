"""The window: the three objects of the ring, the top bar, the Bench, and what a person does with files."""

from __future__ import annotations

import sys
from pathlib import Path

from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QCloseEvent, QCursor, QDragEnterEvent, QDropEvent, QIcon
from PySide6.QtWidgets import QApplication, QLineEdit, QMainWindow, QSplitter, QVBoxLayout, QWidget

from app import terms
from app.bench.bench import Bench
from app.bench.outline.outline import Outline
from app.bench.tables.tables import Tables
from app.document import Document
from app.explaining import explain
from app.frame.file_watch import FileWatch
from app.frame.files import Files
from app.frame.menus import Menus
from app.frame.notes_panel import NotesPanel
from app.frame.notices import Notices
from app.frame.panels_told import ABOUT, LIMITS, STEPS, tell
from app.frame.recovery import Autosave
from app.frame.top_bar import TopBar
from app.frame.workspaces import Workspaces
from app.look import apply_look, icon, pixmap
from app.look.fonts import widened
from app.look.spacing import GAP, OUTLINE_WIDTH, SPACE
from app.look.theme import Choice
from app.report.screen.workspace import ReportSpace
from app.set_sheet.workspace import SetSheet
from app.settings import Settings
from app.sight import Sight
from app.solving import Solution, Solve
from app.standing import standing_of
from solver import Project

#: Width and height in device-independent pixels: below the first the pictures cannot be read; the second is that of a
#: first start.
SMALLEST = (1000, 640)
USUAL = (1440, 900)
#: Key of the strip, and of the setting that remembers that it was closed.
FIRST_STEPS = "first_steps"


class Window(QMainWindow):
    """One project in one window. Everything it remembers between starts is in `settings`."""

    bench: Bench

    def __init__(self, settings: Settings, project: Project, solve: Solve | None = None) -> None:
        super().__init__()
        self.settings = settings
        self.document = Document(project, self)
        self.sight = Sight(self)
        self.solution = Solution(self.document, solve, self)
        self.autosave = Autosave(self.document, settings.recovery_folder, self)
        self.notices = Notices(self)
        self.files = Files(self, self)
        self.menus = Menus(self, self)
        self._unseen = True
        self._compose()
        self._connect()
        self._restore_layout()
        self.setAcceptDrops(True)
        self.bench.setAccessibleName("Pictures")
        self.bench.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.bench.setFocus()
        self._follow()

    # -- composing --------------------------------------------------------------------------------------------------

    def _compose(self) -> None:
        own_menus = sys.platform == "darwin"
        if own_menus:
            self.setMenuBar(self.menus.bar)
        icons = list(self.menus.icons.values())
        self.top_bar = TopBar(
            self.document, self.solution, icons, None if own_menus else self.menus.bar, self, self.sight
        )
        self.notes = NotesPanel(self.document, self)
        self._compose_bench()
        self._add_workspaces()
        middle = QWidget(self)
        column = QVBoxLayout(middle)
        column.setContentsMargins(SPACE, 0, SPACE, SPACE)
        column.setSpacing(GAP)
        for widget in (self.top_bar, self.notices, self.notes):
            column.addWidget(widget)
        column.addWidget(self.workspaces, 1)
        self.setCentralWidget(middle)
        self.setMinimumSize(*SMALLEST)
        self._draw_icons()

    def _compose_bench(self) -> None:
        """The outline beside the pictures, in a split that its user moves."""
        self.outline = Outline(self.document, self.sight, self)
        self.bench = Bench(self.document, self.sight, self.solution, self)
        self.tables = Tables(self.document, self.sight, self)
        self.outline.table_wanted.connect(self.tables.open_table)
        self.split = QSplitter(Qt.Orientation.Horizontal, self)
        self.split.setHandleWidth(SPACE)
        self.split.addWidget(self.outline)
        self.split.addWidget(self.bench)
        self.split.setStretchFactor(1, 1)
        self.split.setCollapsible(1, False)
        outline = widened(OUTLINE_WIDTH, most=1.2)  # the pictures need their room as well
        self.split.setSizes([outline, USUAL[0] - outline])

    def _add_workspaces(self) -> None:
        self.set_sheet = SetSheet(self.document, self)
        self.workspaces = Workspaces(self)
        bench_and_tables = QWidget(self)
        below = QVBoxLayout(bench_and_tables)
        below.setContentsMargins(0, 0, 0, 0)
        below.setSpacing(GAP)
        below.addWidget(self.split, 1)
        below.addWidget(self.tables)
        self.workspaces.add("Bench", "Describe one blow and watch its waves", bench_and_tables)
        self.workspaces.add(
            "Set sheet", "What set to stop at, with what drop, and whether it survives", self.set_sheet
        )
        self.report = ReportSpace(self.document, self)
        self.workspaces.add("Report", "What the client reads: as pages, PDF or HTML", self.report)
        self.top_bar.add_switch(self.workspaces.switch)

    def _connect(self) -> None:
        self.document.changed.connect(self._follow)
        self.document.refused.connect(lambda text: self.notices.show_notice("edit", text, "over"))
        undo = self.document.undo_stack.undo
        self.document.told.connect(
            lambda text: self.notices.show_notice("edit", text, "near", [("Undo", undo)])
        )
        self.document.undo_stack.indexChanged.connect(lambda _index: self.notices.drop("edit"))
        self.solution.changed.connect(self._follow)
        self.notes.closed.connect(self.menus.notes.trigger)
        self.notices.dismissed.connect(self._dismissed)
        self.menus.notes.triggered.connect(lambda on: self.settings.set_flag("notes", on))
        self.set_sheet.saving.told.connect(lambda text, state: self.notices.show_notice("sheet", text, state))
        self.report.told.connect(lambda text, state: self.notices.show_notice("report", text, state))
        self.bench.alone_changed.connect(self._give_room)
        self.workspaces.currentChanged.connect(lambda _number: self.show_notes())
        self.bench.grid.folding_changed.connect(self._tell_folded)
        self.autosave.failed.connect(lambda text: self.notices.show_notice("autosave", text, "over"))
        self.watch = FileWatch(self.document, self)
        self.watch.found.connect(self.files.tell_of_change)

    def _restore_layout(self) -> None:
        settings = self.settings
        geometry, split = settings.layout("window"), settings.layout("split")
        if geometry is None or not self.restoreGeometry(geometry):
            room = self.screen().availableGeometry().size()
            self.resize(min(USUAL[0], room.width()), min(USUAL[1], room.height()))
        if split is not None:
            self.split.restoreState(split)
        shares = settings.shares("bench")
        if shares is not None and [len(row) for row in shares] == [len(row) for row in self.bench.shares()]:
            self.bench.set_shares(*shares)
        for (upright, index), action in self.menus.panels.items():
            if settings.flag(f"folded_{action.text().partition(':')[0]}"):
                self.bench.grid.fold(upright, index, True)
        self._tell_folded()
        self.begin_looking()
        if settings.flag("arrivals_chosen"):
            self.sight.set(arrivals=settings.flag("arrivals"))
        self.menus.outline.setChecked(settings.flag("outline", usual=True))
        self.outline.setVisible(self.menus.outline.isChecked())
        for action in self.menus.looks.actions():
            action.setChecked(action.data() == settings.look)

    def _draw_icons(self) -> None:
        for name, action in self.menus.icons.items():
            action.setIcon(icon(name))
        self.setWindowIcon(QIcon(pixmap("pulse", 64)))

    # -- following --------------------------------------------------------------------------------------------------

    def _follow(self) -> None:
        document = self.document
        name = document.path.name if document.path else (document.project.title or "Untitled project")
        self.setWindowTitle(f"{' '.join(name.split())}[*] \u2013 Striketrace")
        self.setWindowModified(document.dirty)
        standing = standing_of(document, self.solution)
        if standing.kind in ("refused", "stopped"):
            self.notices.show_notice(
                "solution", standing.tells, "over" if standing.kind == "refused" else "near"
            )
        else:
            self.notices.drop("solution")
        result = self.solution.result
        if self._unseen and result is not None and self.solution.state == "fresh":
            self._unseen = False
            if self.sight.time == 0:
                # a moment at which there is something to see
                self.sight.set(time=result.peak_compression.time)
        self.menus.records.setEnabled(result is not None and bool(result.gauges))

    # -- files ------------------------------------------------------------------------------------------------------

    def ask_new(self) -> None:
        self.files.ask_new()

    def ask_open(self) -> None:
        self.files.ask_open()

    def open_path(self, path: Path) -> bool:
        return self.files.open_path(path)

    def open_demo(self, path: Path) -> bool:
        return self.files.open_demo(path)

    def save(self) -> bool:
        return self.files.save()

    def ask_save_as(self) -> bool:
        return self.files.ask_save_as()

    def ask_records(self) -> bool:
        return self.files.ask_records()

    def choose_records(self) -> None:
        """Open the dialog that says which records are saved, and how."""
        from app.frame.records_dialog import RecordsDialog  # with the libraries that write them

        self.commit_typing()
        RecordsDialog(self.document, self.solution, self.settings, self).open_for(self.notices)

    def commit_typing(self) -> None:
        """Hand over what stands in a field and has not been entered yet."""
        self.notes.commit()
        self.report.form.take_words()
        field = QApplication.focusWidget()
        if isinstance(field, QLineEdit) and self.isAncestorOf(field):
            field.clearFocus()
            field.setFocus()

    # -- view -------------------------------------------------------------------------------------------------------

    def begin_looking(self) -> None:
        """Look at a project anew: from its beginning, at all of it, with its notes where it has any."""
        self.sight.set(time=0.0, place=None, selection="load", time_range=None, distance_range=None)
        self.sight.set(pinned=None, pointed=(), peaks=(), laid_over=(), locked_in=False)
        self._unseen = True
        self.menus.notes.setChecked(
            bool(self.document.project.notes) and self.settings.flag("notes", usual=True)
        )
        self.show_notes()

    def show_notes(self) -> None:
        """Where they are wanted, and on the Bench, of which they tell. They wait while the first steps are told (one
        strip to read is enough) and while one panel has all the room."""
        wanted, on_bench = self.menus.notes.isChecked(), self.workspaces.currentIndex() == 0
        read = self.notices.text_of(FIRST_STEPS) is None
        self.notes.setVisible(wanted and on_bench and read and self.bench.grid.alone is None)

    def tell_first_steps(self) -> None:
        """How to begin, until it has been read once and closed."""
        self.notices.show_notice(FIRST_STEPS, STEPS)
        self.show_notes()

    def offer_first_steps(self) -> None:
        """Tell them to whoever has not closed them yet."""
        if self.settings.flag(FIRST_STEPS, usual=True):
            self.tell_first_steps()

    def _dismissed(self, key: str) -> None:
        if key == FIRST_STEPS:
            self.settings.set_flag(FIRST_STEPS, False)
            self.show_notes()

    def show_outline(self, on: bool) -> None:
        self.settings.set_flag("outline", on)
        self.outline.setVisible(on)

    def _give_room(self, alone: bool) -> None:
        """One panel of the Bench has all the room, or gives it back."""
        self.outline.setVisible(not alone and self.menus.outline.isChecked())
        self.show_notes()

    def _tell_folded(self) -> None:
        for (upright, index), action in self.menus.panels.items():
            action.setChecked(not self.bench.grid.folded(upright, index))

    def turn_full_screen(self) -> None:
        self.setWindowState(self.windowState() ^ Qt.WindowState.WindowFullScreen)

    def choose_look(self, choice: Choice) -> None:
        """Light, dark, or as the system; remembered."""
        self.settings.look = choice
        app = QApplication.instance()
        if isinstance(app, QApplication):
            apply_look(app, choice)

    def show_limits(self) -> None:
        tell(self, "What this program computes, and what not", LIMITS)

    def show_terms(self) -> None:
        tell(self, "Terms", terms.as_rich_text())

    def explain_at_hand(self) -> None:
        """Tell what the part with the focus is about, else the one under the pointer."""
        if not explain(QApplication.focusWidget()):
            explain(QApplication.widgetAt(QCursor.pos()))

    def show_about(self) -> None:
        tell(self, "About Striketrace", ABOUT)

    # -- events -----------------------------------------------------------------------------------------------------

    def changeEvent(self, event: QEvent) -> None:
        if event.type() == QEvent.Type.PaletteChange:
            self._draw_icons()
        elif event.type() == QEvent.Type.ActivationChange and self.isActiveWindow():
            self.watch.look()
        super().changeEvent(event)

    def dragEnterEvent(self, event: QDragEnterEvent) -> None:
        if self.files.dropped(event.mimeData()):
            event.acceptProposedAction()

    def dropEvent(self, event: QDropEvent) -> None:
        path = self.files.dropped(event.mimeData())
        if path:
            event.acceptProposedAction()
            self.open_path(path)

    def closeEvent(self, event: QCloseEvent) -> None:
        """Never asks: unsaved work is kept, and offered at the next start."""
        self.commit_typing()
        self.autosave.close()
        self.settings.set_layout("window", self.saveGeometry())
        self.settings.set_layout("split", self.split.saveState())
        self.settings.set_shares("bench", self.bench.shares())
        for (upright, index), action in self.menus.panels.items():
            name = f"folded_{action.text().partition(':')[0]}"
            self.settings.set_flag(name, self.bench.grid.folded(upright, index))
        if self.sight.arrivals is not None:
            self.settings.set_flag("arrivals_chosen", True)
            self.settings.set_flag("arrivals", self.sight.arrivals)
        self.settings.save()
        sheet_ended = self.set_sheet.close_down()
        bench_ended = self.bench.close_work()
        report_ended = self.report.close_down()
        self.ended_in_time = self.solution.close() and sheet_ended and bench_ended and report_ended
        event.accept()

    ended_in_time = True
