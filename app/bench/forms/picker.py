"""The picker of the parts library: a list with a search line, beside the field that it serves. Nothing modal."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QEvent, QModelIndex, QObject, QPoint, Qt
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import (
    QFrame,
    QLabel,
    QLineEdit,
    QListWidget,
    QListWidgetItem,
    QPushButton,
    QVBoxLayout,
    QWidget,
)

from app.bench.forms.use_part import use_part
from app.document import Document
from app.look.spacing import GAP, SPACE
from app.own_parts import forget_part, keep_part, own_parts, part_from
from app.parts_library import Part, PartKind, parts_of_kind
from app.settings import user_settings

TITLES: dict[PartKind, str] = {
    "material": "Materials",
    "cushion": "Cushion materials",
    "ram": "Rams",
    "section": "Sections",
    "layer": "Ground along the shaft",
    "toe": "Ground under the toe",
}
#: Size of the picker in characters and rows.
WIDE, ROWS = 58, 9


class PartPicker(QFrame):
    """Search by any words; Enter or a click takes the part into the project, marked as typical with its source."""

    def __init__(self, document: Document, kind: PartKind, pointer: str, parent: QWidget) -> None:
        super().__init__(parent, Qt.WindowType.Popup)
        self.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        self.setProperty("role", "popup")  # with an edge: it lies on panels of its own colour
        self.setFrameShape(QFrame.Shape.StyledPanel)
        self._document, self._kind, self._pointer = document, kind, pointer
        self._folder = user_settings().folder
        column = QVBoxLayout(self)
        column.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        column.setSpacing(GAP)
        title = QLabel(TITLES[kind], self)
        title.setProperty("role", "strong")
        self.search = QLineEdit(self)
        self.search.setPlaceholderText("Search name, figure or source")
        self.search.setAccessibleName(f"Search {TITLES[kind].lower()}")
        self.search.setToolTip(
            "Words that an entry's name, figures or source begin with. Enter takes the first."
        )
        self.list = QListWidget(self)
        self.list.setToolTip(
            "Typical values with their sources. Enter or a click takes one into the project."
        )
        self.list.setAccessibleName(TITLES[kind])
        self.list.setWordWrap(True)
        self.list.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        note = QLabel("Typical values: they stay marked in the project until you confirm them.", self)
        note.setProperty("role", "small")
        note.setWordWrap(True)
        self.keep = QPushButton(self)
        self.keep.setProperty("role", "link")
        self.keep.clicked.connect(self._keep)
        for widget in (title, self.search, self.list, self.keep, note):
            column.addWidget(widget)
        self.search.textChanged.connect(self._fill)
        self.search.installEventFilter(self)
        self.list.installEventFilter(self)
        self.list.itemClicked.connect(self._take)
        self.list.itemActivated.connect(self._take)
        self._fill("")

    def open_at(self, field: QWidget) -> None:
        """Show below a field, within the screen."""
        metrics = self.fontMetrics()
        width, height = metrics.averageCharWidth() * WIDE, metrics.lineSpacing() * (3 * ROWS)
        self.resize(width, height)
        place = field.mapToGlobal(QPoint(0, field.height() + GAP))
        room = field.screen().availableGeometry()
        place.setX(max(room.left(), min(place.x(), room.right() - width)))
        place.setY(max(room.top(), min(place.y(), room.bottom() - height)))
        self.move(place)
        self.show()
        self.search.setFocus()

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """Up, down and Enter in the search line act on the list; Delete in the list drops an own part."""
        pressed = isinstance(event, QKeyEvent) and event.type() == QEvent.Type.KeyPress
        if isinstance(event, QKeyEvent) and pressed and watched is self.list:
            if event.key() in (Qt.Key.Key_Delete, Qt.Key.Key_Backspace):
                self._forget()
                return True
        elif isinstance(event, QKeyEvent) and pressed:
            step = {Qt.Key.Key_Down: 1, Qt.Key.Key_Up: -1}.get(Qt.Key(event.key()))
            if step is not None:
                self.list.setCurrentRow(max(0, min(self.list.currentRow() + step, self.list.count() - 1)))
                return True
            if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
                if self.list.currentItem() is not None:
                    self._take(self.list.currentItem())
                return True
        return super().eventFilter(watched, event)

    def _fill(self, text: str) -> None:
        self.list.clear()
        own = [part for part in own_parts(self._folder) if part.kind == self._kind and part.matches(text)]
        for part in (*own, *parts_of_kind(self._kind, text)):
            lines = [part.name, *([part.tells] if part.tells else []), part.source]
            item = QListWidgetItem("\n".join(lines), self.list)
            item.setData(Qt.ItemDataRole.UserRole, part)
            if part.own:
                item.setToolTip("Kept by you for all projects. Delete drops it; projects keep their copy.")
        self.list.setCurrentRow(0)
        name = " ".join(text.split())
        here = part_from(self._document.tree, self._kind, self._pointer, name)
        self.keep.setEnabled(bool(name) and here is not None)
        self.keep.setText(
            f"Keep what is here as '{name}'" if name else "To keep what is here, type a name above"
        )

    def _keep(self) -> None:
        """Keep the part that the project has at this place, for all projects of this user."""
        part = part_from(self._document.tree, self._kind, self._pointer, " ".join(self.search.text().split()))
        if part is not None:
            self._change(lambda: keep_part(self._folder, part))

    def _forget(self) -> None:
        item = self.list.currentItem()
        part: Part | None = item.data(Qt.ItemDataRole.UserRole) if item else None
        if part is not None and part.own:
            self._change(lambda: forget_part(self._folder, part))

    def _change(self, write: Callable[[], None]) -> None:
        try:
            write()
        except OSError as error:
            self.keep.setText(f"Own parts cannot be kept in {self._folder}: {error.strerror or error}.")
        else:
            self._fill(self.search.text())

    def _take(self, item: QListWidgetItem | QModelIndex) -> None:
        part: Part = item.data(Qt.ItemDataRole.UserRole)
        self.close()
        self._document.edit_tree(
            f"Take {part.name} from the parts library",
            lambda tree: use_part(tree, part, self._pointer),
        )
