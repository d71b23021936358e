"""Small windows that tell something or offer a choice. None is modal."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QDialog, QLabel, QPushButton, QScrollArea, QVBoxLayout, QWidget

from app import __version__
from app.look.spacing import SPACE
from app.starting_points import STARTING_POINTS
from app.words import AXIAL_CAUTION, LIMIT_CAUTION, LOAD_CAUTION, MODEL_CAUTION

#: Size of a text in its window, in device-independent pixels.
WIDTH, HIGHEST = 480, 520

ABOUT = f"""Striketrace {__version__}

One-dimensional stress waves in long slender members that are struck: driven piles, drill strings, instrumented bars.
MIT licence. Made with Qt, numpy, scipy, numba, pydantic and Pint."""

STEPS = (
    "First steps: choose a part on the left and type, or drag it in the drawing; every change is solved at once. "
    "Point at a wave to read its place and time; the space bar plays it. File, New begins a project of your own; "
    "Shift+F1 tells what a part of the window is about."
)
LIMITS = f"""It computes plane waves of axial stress in rods, with what strikes them and what holds them.

{AXIAL_CAUTION} Near the struck end, over about 1.5 diameters, the stress is not yet even over the section.

Pulses shorter than about ten diameters spread in a real rod; rod theory leaves that out unless lateral inertia is on.

{LOAD_CAUTION}

Concrete under a blow is stiffer than in a slow test: give its dynamic modulus.

{LIMIT_CAUTION} {MODEL_CAUTION}"""


def tell(parent: QWidget, title: str, text: str) -> QDialog:
    """A small window with a text, which can be scrolled where it is long."""
    dialog, column = _dialog(parent, title)
    label = QLabel(text, dialog)
    label.setWordWrap(True)
    label.setFixedWidth(WIDTH)
    label.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
    area = QScrollArea(dialog)
    area.setAccessibleName(title)
    area.setWidget(label)
    label.adjustSize()
    area.setMinimumSize(WIDTH + 16, min(label.height() + 4, HIGHEST))
    column.addWidget(area)
    close = QPushButton("Close", dialog)
    close.clicked.connect(dialog.close)
    column.addWidget(close, 0, Qt.AlignmentFlag.AlignRight)
    dialog.show()
    return dialog


def offer_starting_points(parent: QWidget, begin: Callable[[Any], object]) -> QDialog:
    """What a new project can begin with; `begin` is called with the starting point chosen."""
    dialog, column = _dialog(parent, "New project")
    head = QLabel("Begin with", dialog)
    head.setProperty("role", "title")
    column.addWidget(head)
    for point in STARTING_POINTS:
        button = QPushButton(f"{point.name}\n{point.tells}", dialog)
        button.setProperty("role", "choice")
        button.setAccessibleName(point.name)
        button.setMinimumWidth(max(460, button.fontMetrics().horizontalAdvance(point.tells) + 6 * SPACE))
        button.clicked.connect(lambda _on=False, p=point: (dialog.close(), begin(p)))
        column.addWidget(button)
    dialog.show()
    return dialog


def _dialog(parent: QWidget, title: str) -> tuple[QDialog, QVBoxLayout]:
    dialog = QDialog(parent)
    dialog.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
    dialog.setWindowTitle(title)
    dialog.setModal(False)
    column = QVBoxLayout(dialog)
    column.setContentsMargins(2 * SPACE, 2 * SPACE, 2 * SPACE, 2 * SPACE)
    column.setSpacing(SPACE)
    return dialog, column


__all__ = ["ABOUT", "LIMITS", "STEPS", "offer_starting_points", "tell"]
