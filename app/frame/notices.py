"""Strips under the top bar that tell something and offer what to do about it. Nothing in them is modal."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Literal

from PySide6.QtCore import QEvent, Qt, Signal
from PySide6.QtWidgets import (
    QFrame,
    QHBoxLayout,
    QLabel,
    QPushButton,
    QSizePolicy,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.look import icon, pixmap
from app.look.palette import palette
from app.look.spacing import GAP, ICON, SPACE

Kind = Literal["tell", "near", "over"]
#: A choice offered: its words and what it does. The strip goes when one is taken.
Choice = tuple[str, Callable[[], object]]
#: Keys of strips that tell which file was written.
WRITTEN = frozenset({"sheet", "report", "records"})


class Notices(QWidget):
    """At most one strip for each key; a new one with the same key takes the place of the old."""

    #: Somebody closed the strip with this key, or took one of its choices.
    dismissed = Signal(str)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._strips: dict[str, QFrame] = {}
        self._shown: dict[str, tuple[str, Kind, Sequence[Choice]]] = {}
        self._rows = QVBoxLayout(self)
        self._rows.setContentsMargins(0, 0, 0, 0)
        self._rows.setSpacing(GAP)
        self.hide()

    def show_notice(self, key: str, text: str, kind: Kind = "tell", choices: Sequence[Choice] = ()) -> None:
        """Show a strip; does nothing where it is shown already."""
        old = self._strips.get(key)
        if old is not None:
            if old.property("text") == text:
                return
            self.drop(key)
        if key in WRITTEN and kind == "tell":  # only the last file that was written is news
            for other in WRITTEN & self._shown.keys():
                if self._shown[other][1] == "tell":
                    self.drop(other)
        self._shown[key] = text, kind, choices
        strip = self._strip(key, text, kind, choices)
        strip.setProperty("text", text)
        self._strips[key] = strip
        self._rows.addWidget(strip)
        self.show()

    def drop(self, key: str) -> None:
        """Take a strip away, if it is there."""
        strip = self._strips.pop(key, None)
        self._shown.pop(key, None)
        if strip is not None:
            self._rows.removeWidget(strip)
            strip.hide()
            strip.deleteLater()
        self.setVisible(bool(self._strips))

    def event(self, event: QEvent) -> bool:
        """Draw signs and icons anew in another palette, and on a screen of another scale."""
        if event.type() in (QEvent.Type.PaletteChange, QEvent.Type.DevicePixelRatioChange):
            for key, shown in list(self._shown.items()):
                self.drop(key)
                self.show_notice(key, *shown)
        return super().event(event)

    def text_of(self, key: str) -> str | None:
        """What the strip with this key says."""
        strip = self._strips.get(key)
        return strip.property("text") if strip else None

    def buttons_of(self, key: str) -> list[QPushButton]:
        """The choices that the strip with this key offers."""
        return self._strips[key].findChildren(QPushButton)

    def _strip(self, key: str, text: str, kind: Kind, choices: Sequence[Choice]) -> QFrame:
        strip = QFrame(self)
        strip.setProperty("role", "notice")
        row = QHBoxLayout(strip)
        row.setContentsMargins(SPACE + GAP, GAP, GAP, GAP)
        row.setSpacing(SPACE)
        if kind != "tell":
            sign = QLabel(strip)
            colour = palette().over if kind == "over" else palette().ink
            sign.setPixmap(pixmap(kind, ICON, colour, self.devicePixelRatioF()))
            row.addWidget(sign, 0, Qt.AlignmentFlag.AlignVCenter)
        words = QLabel(text, strip)
        words.setWordWrap(True)
        words.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        policy = words.sizePolicy()
        # and as high as its lines, which it tells itself
        policy.setHorizontalPolicy(QSizePolicy.Policy.Expanding)
        words.setSizePolicy(policy)
        row.addWidget(words, 1)
        for label, action in choices:
            button = QPushButton(label, strip)
            button.clicked.connect(lambda _on=False, do=action: self._taken(key, do))
            row.addWidget(button)
        away = QToolButton(strip)
        away.setProperty("role", "quiet")
        away.setIcon(icon("close"))
        away.setToolTip("Close this message")
        away.setAccessibleName("Close this message")
        away.clicked.connect(lambda: self._taken(key, lambda: None))
        row.addWidget(away)
        return strip

    def _taken(self, key: str, action: Callable[[], object]) -> None:
        self.drop(key)
        self.dismissed.emit(key)
        action()
