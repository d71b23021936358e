"""The stylesheet, built from a palette and the spacing grid.

A widget says what it is by the property `role`, set before it is shown:
labels "title", "strong", "figure", "soft", "small", "problem"; frames "paper" (a panel), "row"; buttons "chip" (one of
several that can be switched on), "quiet" (no frame until pointed at), "main" (the one action of a choice), "link",
"choice" (a name and a sentence); line edits "title"; frames "notice", "popup" and "mark" (where what is dragged will
stand); widgets "clear".
"""

from __future__ import annotations

from pathlib import Path

from app.look.fonts import LEVELS
from app.look.palette import Palette
from app.look.spacing import FIELD, GAP, RADIUS, SPACE

#: Height of a line of text, px, for each point of its size.
LINE = 1.85
#: Side of a box to tick, px, at the usual size of letters.
TICK = 14
HERE = Path(__file__).resolve().parent
SHEET = """
QWidget {{ color: {ink}; }}
QMainWindow, QDialog, QMessageBox {{ background: {window}; }}
QToolTip {{ color: {ink}; background: {raised}; border: 1px solid {line}; padding: {gap}px; }}
QFrame[role="paper"], QWidget[role="paper"] {{ background: {paper}; border-radius: {radius}px; }}
QFrame[role="notice"] {{ background: {raised}; border: 1px solid {edge}; border-radius: {radius}px; }}
QFrame[role="popup"] {{ background: {raised}; border: 1px solid {line}; border-radius: {radius}px; }}
QWidget[role="clear"] {{ background: transparent; }}

QLabel[role="title"] {{ font-size: {title}pt; font-weight: 600; }}
QLabel[role="strong"] {{ font-weight: 600; }}
QLabel[role="figure"] {{ font-size: {figure}pt; font-weight: 600; }}
QLabel[role="soft"] {{ color: {soft_ink}; }}
QLabel[role="small"] {{ color: {soft_ink}; font-size: {small}pt; }}
QLabel[role="problem"] {{ color: {over}; font-size: {small}pt; }}

QAbstractScrollArea {{ border: 1px solid transparent; }}
QAbstractScrollArea:focus {{ border: 1px solid {accent}; }}
QLineEdit, QComboBox, QSpinBox, QPlainTextEdit, QTextEdit {{
    background: {raised}; border: 1px solid {edge}; border-radius: {radius}px;
    padding: 0 {inner}px; min-height: {field}px;
    selection-background-color: {accent}; selection-color: {on_accent}; }}
QLineEdit {{ placeholder-text-color: {soft_ink}; }}
QPlainTextEdit, QTextEdit {{ padding: {gap}px; }}
QSpinBox::up-button, QSpinBox::down-button {{ subcontrol-origin: margin; width: 0; height: 0; }}
QLineEdit:focus, QComboBox:focus, QSpinBox:focus, QPlainTextEdit:focus, QTextEdit:focus {{
    border: 2px solid {accent}; padding: 0 {inner_focus}px; min-height: {field_focus}px; }}
QLineEdit[invalid="true"] {{ border: 2px solid {over}; padding: 0 {inner_focus}px; min-height: {field_focus}px; }}
QLineEdit[role="title"] {{ background: transparent; border: 1px solid transparent; font-weight: 600; }}
QLineEdit[role="title"]:hover {{ background: {raised}; border: 1px solid {edge}; }}
QLineEdit[role="title"]:focus {{ background: {raised}; border: 2px solid {accent}; }}
QPlainTextEdit[role="notes"] {{ background: transparent; border: 1px solid transparent; padding: 1px; }}
QPlainTextEdit[role="notes"]:focus {{ background: {raised}; border: 2px solid {accent}; padding: 0; }}
QLineEdit:disabled, QComboBox:disabled {{ color: {line}; background: {paper}; }}
QComboBox::drop-down {{ border: none; width: 20px; }}
QComboBox::down-arrow {{ image: url("{arrow}"); width: 10px; height: 10px; }}
QComboBox QAbstractItemView {{ background: {raised}; border: 1px solid {line};
    selection-background-color: {accent_soft}; selection-color: {ink}; outline: none; }}

QPushButton, QToolButton {{
    background: {raised}; border: 1px solid {edge}; border-radius: {radius}px;
    padding: 2px 10px; min-height: {button}px; }}
QToolButton {{ padding: 2px {inner}px; }}
QPushButton:hover, QToolButton:hover {{ background: {accent_soft}; border-color: {line}; }}
QPushButton:pressed, QToolButton:pressed {{ background: {pressed}; }}
QPushButton:focus, QToolButton:focus {{ border: 2px solid {accent}; padding: 1px 9px; }}
QToolButton:focus {{ padding: 1px {inner_focus}px; }}
QPushButton:disabled, QToolButton:disabled {{ color: {line}; background: {paper}; }}
QPushButton[role="chip"]:checked, QToolButton[role="chip"]:checked {{
    background: {chosen}; color: {on_chosen}; border-color: {chosen}; }}
QPushButton[role="main"] {{ background: {accent}; color: {on_accent}; border-color: {accent}; font-weight: 600; }}
QPushButton[role="main"]:disabled {{ background: {paper}; color: {line}; border-color: {edge}; }}
QPushButton[role="main"]:focus {{ border: 2px solid {ink}; }}
QPushButton[role="main"]:hover {{ background: {chosen}; color: {on_chosen}; }}
QPushButton[role="quiet"], QToolButton[role="quiet"] {{ background: transparent; border: 1px solid transparent; }}
QPushButton[role="quiet"]:hover, QToolButton[role="quiet"]:hover {{ background: {pressed}; }}
QPushButton[role="quiet"]:focus, QToolButton[role="quiet"]:focus {{ border: 2px solid {accent}; }}
QPushButton[role="link"] {{ background: transparent; border: none; color: {accent}; text-align: left;
    text-decoration: underline; padding: 2px; }}
QPushButton[role="link"]:focus {{ border: 2px solid {accent}; padding: 0; }}
QPushButton[role="link"][level="small"] {{ font-size: {small}pt; min-height: 0; padding: 1px 3px; }}
QPushButton[role="link"][level="small"]:focus {{ padding: 0 1px; }}
QPushButton[role="choice"] {{ text-align: left; padding: {space}px {wide}px; min-height: 40px; }}
QFrame[role="mark"] {{ background: {accent}; border: none; }}
QPushButton[role="choice"]:focus {{ padding: {space_focus}px {wide_focus}px; }}
QPushButton::menu-indicator, QToolButton::menu-indicator {{ image: none; width: 0; }}

QCheckBox, QRadioButton {{ border: 1px solid transparent; border-radius: {radius}px; padding: 1px 2px; }}
QCheckBox:focus, QRadioButton:focus {{ border: 1px solid {accent}; background: {accent_soft}; }}
QCheckBox::indicator, QListView::indicator {{ width: {tick}px; height: {tick}px;
    background: {raised}; border: 1px solid {line}; border-radius: 3px; }}
QCheckBox::indicator:checked, QListView::indicator:checked {{ border: 1px solid {ink}; image: url("{checked}"); }}
QMenuBar {{ background: {window}; padding: 0 {gap}px; }}
QMenuBar::item {{ padding: {gap}px {space}px; border-radius: {radius}px; background: transparent; }}
QMenuBar::item:selected {{ background: {pressed}; }}
QMenu {{ background: {raised}; border: 1px solid {line}; padding: {gap}px; }}
QMenu::item {{ padding: {gap}px 24px {gap}px {wide}px; border-radius: {radius}px; }}
QMenu::item:selected {{ background: {accent_soft}; color: {ink}; }}
QMenu::item:disabled {{ color: {line}; }}
QMenu::separator {{ height: 1px; background: {grid}; margin: {gap}px {space}px; }}

QScrollArea {{ border: 1px solid transparent; background: transparent; }}
QScrollArea:focus {{ border: 1px solid {accent}; border-radius: {radius}px; }}
QScrollBar:vertical {{ background: transparent; width: 10px; margin: 0; }}
QScrollBar:horizontal {{ background: transparent; height: 10px; margin: 0; }}
QScrollBar::handle {{ background: {edge}; border-radius: 3px; min-height: 28px; min-width: 28px; margin: 2px; }}
QScrollBar::handle:hover {{ background: {line}; }}
QScrollBar::add-line, QScrollBar::sub-line {{ width: 0; height: 0; }}
QScrollBar::add-page, QScrollBar::sub-page {{ background: transparent; }}
QSplitter::handle {{ background: transparent; }}
QSplitter::handle:hover {{ background: {accent}; }}

QTableView {{ background: {paper}; alternate-background-color: {window}; gridline-color: {grid};
    border: 1px solid {edge}; selection-background-color: {accent_soft}; selection-color: {ink}; }}
QTableView:focus {{ border: 2px solid {accent}; }}
QHeaderView {{ background: {window}; border: none; }}
QTableCornerButton::section {{ background: {window}; border: none; }}
QHeaderView::section {{ background: {window}; color: {soft_ink}; border: none; padding: {gap}px {space}px; }}
QListView {{ background: {paper}; border: 1px solid {edge}; border-radius: {radius}px; outline: none; }}
QListView:focus {{ border: 1px solid {accent}; background: {raised}; }}
QListView::item {{ padding: {gap}px {space}px; border-radius: {radius}px; color: {ink}; }}
QListView::item:selected {{ background: {accent_soft}; color: {ink}; }}
QProgressBar {{ background: {pressed}; border: none; border-radius: 2px; max-height: 4px; min-height: 4px; }}
QProgressBar::chunk {{ background: {accent}; border-radius: 2px; }}
QSlider::groove:horizontal {{ background: {pressed}; height: 4px; border-radius: 2px; }}
QSlider::sub-page:horizontal {{ background: {line}; border-radius: 2px; }}
QSlider::handle:horizontal {{ background: {chosen}; width: 14px; height: 14px; margin: -5px 0; border-radius: 7px; }}
QSlider::handle:horizontal:focus {{ background: {accent}; }}
"""


def stylesheet(palette: Palette, base_size: float) -> str:
    """The stylesheet of the whole program; `base_size` is the point size of body text."""
    sizes = {level: round(base_size * scale, 1) for level, (scale, _weight) in LEVELS.items()}
    inner = SPACE - 2
    # a height that is given is the least: large type must not be squeezed into it
    line = round(base_size * LINE)
    return SHEET.format(
        **{name: value for name, value in vars(palette).items() if isinstance(value, str)},
        **{name: sizes[name] for name in ("title", "figure", "small")},
        arrow=(HERE / f"arrow_{'dark' if palette.dark else 'light'}.svg").as_posix(),
        checked=(HERE / f"tick_{'dark' if palette.dark else 'light'}.svg").as_posix(),
        tick=max(TICK, round(line * TICK / FIELD)),
        gap=GAP,
        space=SPACE,
        space_focus=SPACE - 1,
        wide=2 * SPACE,
        wide_focus=2 * SPACE - 1,
        radius=RADIUS,
        inner=inner,
        inner_focus=inner - 1,
        field=max(FIELD - 2, line),
        field_focus=max(FIELD - 2, line) - 2,
        button=max(FIELD - 4, line),
    )
