"""How a picture leaves the screen: kind of file, size, resolution, colours. The last choice is kept."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QFileDialog,
    QFormLayout,
    QHBoxLayout,
    QLabel,
    QMenu,
    QMessageBox,
    QPushButton,
    QSpinBox,
    QVBoxLayout,
    QWidget,
)

from app.disk import why_not, write_whole
from app.look.spacing import GAP, SPACE
from app.picture_files import (
    DPIS,
    FORMATS,
    WIDTHS,
    Drawing,
    PictureChoices,
    choices_from_tree,
    copy_picture,
    picture_file,
)
from app.settings import Settings, user_settings

KEPT = "picture"
TELLS = {
    "png": "Pixels, for documents and pages of the web.",
    "svg": "Lines and text that stay sharp at any size and can be edited.",
    "pdf": "Lines and text that stay sharp at any size, for print.",
}


class PictureDialog(QDialog):
    """Asks how, and then where. `save_to` writes; a sentence under the fields says what was done or why not."""

    def __init__(self, drawing: Drawing, settings: Settings, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Save the picture")
        self._drawing, self._settings = drawing, settings
        kept = choices_from_tree(settings.kept(KEPT))
        self.format = QComboBox()
        for key, word in FORMATS.items():
            self.format.addItem(word, key)
            self.format.setItemData(self.format.count() - 1, TELLS[key], Qt.ItemDataRole.ToolTipRole)
        self.format.setCurrentIndex(self.format.findData(kept.format))
        self.width_mm = _whole_number(WIDTHS, 10, " mm", kept.width_of(drawing))
        self.dpi = _whole_number(DPIS, 50, " DPI", kept.dpi)
        self.colours = QCheckBox("Print colours: dark on white paper")
        self.colours.setChecked(kept.print_colours)
        self.state = QLabel()
        self.state.setWordWrap(True)
        self.state.setProperty("role", "small")
        self.save = QPushButton("Save…")
        self.save.setProperty("role", "main")
        self.save.setDefault(True)
        self.copy = QPushButton("Copy")
        self.cancel = QPushButton("Close")
        self._compose()
        self.format.activated.connect(self._follow)
        self.width_mm.valueChanged.connect(self._follow)
        self.dpi.valueChanged.connect(self._follow)
        self.save.clicked.connect(self._ask)
        self.copy.clicked.connect(self.copy_it)
        self.cancel.clicked.connect(self.reject)
        self._follow()

    @property
    def choices(self) -> PictureChoices:
        scale = self.width_mm.value() / self._drawing.width
        return PictureChoices(self.format.currentData(), scale, self.dpi.value(), self.colours.isChecked())

    def _compose(self) -> None:
        form = QFormLayout()
        form.setSpacing(GAP)
        rows: tuple[tuple[str, QWidget, str], ...] = (
            ("File", self.format, "PNG holds pixels; SVG and PDF hold lines and text."),
            ("Width", self.width_mm, "On paper; the height follows from the picture's shape on the screen."),
            ("Resolution", self.dpi, "Dots to an inch of a PNG: 300 for print, 96 to 150 for the screen."),
        )
        for word, field, tells in rows:
            field.setAccessibleName(word)
            field.setToolTip(tells)
            form.addRow(word, field)
        self.colours.setToolTip("The look for light paper, also where the screen is dark.")
        buttons = QHBoxLayout()
        buttons.setSpacing(GAP)
        buttons.addWidget(self.copy)
        buttons.addStretch(1)
        buttons.addWidget(self.cancel)
        buttons.addWidget(self.save)
        column = QVBoxLayout(self)
        column.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        column.setSpacing(SPACE)
        column.addLayout(form)
        column.addWidget(self.colours)
        column.addWidget(self.state)
        column.addLayout(buttons)
        self.setMinimumWidth(360)

    def _follow(self) -> None:
        choices = self.choices
        self.dpi.setEnabled(choices.format == "png")
        wide = choices.width_of(self._drawing)
        told = f"{wide:.0f} × {self._drawing.height_at(wide):.0f} mm"
        if choices.format == "png":
            told += ", {} × {} pixels".format(*choices.pixels(self._drawing))
        self.state.setText(told)

    def _ask(self) -> None:
        ending = self.choices.format
        safe = "".join(c if c.isalnum() or c in " .-_" else "_" for c in self._drawing.name)[:120]
        chosen, _ = QFileDialog.getSaveFileName(
            self, "Save the picture", f"{safe}.{ending}", f"{FORMATS[ending]} (*.{ending})"
        )
        if chosen and self.save_to(Path(chosen).with_suffix(f".{ending}")):
            self.accept()

    def save_to(self, path: Path) -> bool:
        """Write the file, and keep the choices for the next picture."""
        self._settings.keep(KEPT, self.choices.to_tree())
        try:
            write_whole(path, picture_file(self._drawing, self.choices))
        except ValueError as error:
            self.state.setText(f"✕ {error}")
            return False
        except OSError as error:
            self.state.setText(f"✕ {path.name} was not saved: {why_not(error, path)}.")
            return False
        return True

    def copy_it(self) -> None:
        """Onto the clipboard, at the size and in the colours chosen."""
        self._settings.keep(KEPT, self.choices.to_tree())
        try:
            copy_picture(self._drawing, self.choices)
            self.state.setText("✓ Copied.")
        except ValueError as error:
            self.state.setText(f"✕ {error}")


def _whole_number(bounds: tuple[float, float], step: int, unit: str, value: float) -> QSpinBox:
    box = QSpinBox()
    box.setRange(round(bounds[0]), round(bounds[1]))
    box.setSingleStep(step)
    box.setSuffix(unit)
    box.setValue(round(value))
    box.setButtonSymbols(QSpinBox.ButtonSymbols.NoButtons)
    box.lineEdit().setTextMargins(SPACE - 2, 0, 0, 0)  # the stylesheet gives none to it
    return box


def add_picture_actions(menu: QMenu, drawing: Callable[[], Drawing], parent: QWidget) -> None:
    """Saving and copying; the drawing is made when one of them is chosen."""

    def copy() -> None:
        try:
            copy_picture(drawing(), choices_from_tree(user_settings().kept(KEPT)))
        except ValueError as error:
            QMessageBox.warning(parent, "Not copied", str(error))

    menu.addAction("Save the picture…", lambda: PictureDialog(drawing(), user_settings(), parent).exec())
    menu.addAction("Copy the picture", copy)
