"""The menu of units: a system for all quantities, and for single ones another unit where practice differs."""

from __future__ import annotations

from functools import partial

from PySide6.QtGui import QAction
from PySide6.QtWidgets import QMenu, QWidget

from app.document import Document
from app.unit_text import KNOWN_UNITS
from app.units import SYSTEMS, units_of

SYSTEM_WORDS = {"metric": "Metric", "us": "US"}
#: Quantities with a choice of their own, by their dimension, and what they are called here.
QUANTITIES = {
    "length": "Length and distance",
    "small_length": "Movement and thickness",
    "area": "Area",
    "mass": "Mass",
    "time": "Time",
    "velocity": "Velocity",
    "force": "Force",
    "stress": "Stress",
    "modulus": "Modulus",
    "strain": "Strain",
    "unit_resistance": "Resistance for each area",
    "energy": "Energy",
    "density": "Density",
    "stiffness": "Stiffness",
    "impedance": "Impedance",
    "smith_damping": "Damping factor",
}


class UnitsMenu(QMenu):
    """Filled anew whenever it opens, from what the project says."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._below: list[QMenu] = []
        self.setToolTipsVisible(True)
        self.aboutToShow.connect(self.fill)
        self.fill()

    def fill(self) -> None:
        """Systems, quantities, and the way back to one system for all."""
        self.clear()
        for below in self._below:
            below.deleteLater()
        self._below = []
        document, units = self._document, units_of(self._document.project)
        for system in SYSTEMS:
            self._choice(
                self, SYSTEM_WORDS[system], system == units.system, partial(choose_units, document, system)
            )
        self.addSeparator()
        own = dict(units.own)
        for dimension, word in QUANTITIES.items():
            below = self.addMenu(f"{word}\t{units.unit(dimension)}")
            self._below.append(below)
            usual = SYSTEMS[units.system][dimension][0]
            as_system = f"As {_inside(units.system)} units have it: {usual}"
            self._choice(
                below, as_system, dimension not in own, partial(choose_unit, document, dimension, None)
            )
            below.addSeparator()
            for unit in KNOWN_UNITS[dimension]:
                chosen = own.get(dimension) == unit
                self._choice(below, unit, chosen, partial(choose_unit, document, dimension, unit))
        self.addSeparator()
        back = self.addAction(f"All quantities in {_inside(units.system)} units")
        back.triggered.connect(lambda _on=False: choose_one_system(document))
        back.setEnabled(bool(own))

    @staticmethod
    def _choice(menu: QMenu, words: str, chosen: bool, do: partial[None]) -> None:
        action = QAction(words.replace("&", "&&"), menu, checkable=True, checked=chosen)
        action.triggered.connect(lambda _on=False: do())
        menu.addAction(action)


def choose_units(document: Document, system: str) -> None:
    """Show metric or US units; units chosen for single quantities stay."""
    _show(document, f"Show {_inside(system)} units", {**_shown(document), "system": system})


def choose_unit(document: Document, dimension: str, unit: str | None) -> None:
    """Show one quantity in a unit of its own, `None`: in that of the system."""
    shown = {key: value for key, value in _shown(document).items() if key != dimension}
    if unit is not None:
        shown[dimension] = unit
    told = unit or SYSTEMS[units_of(document.project).system][dimension][0]
    _show(document, f"Show {QUANTITIES[dimension].lower()} in {told}", shown)


def choose_one_system(document: Document) -> None:
    """Show every quantity in the unit that its system has for it."""
    system = units_of(document.project).system
    _show(document, f"Show all quantities in {_inside(system)} units", {"system": system})


def _inside(system: str) -> str:
    """The word for a system inside a sentence."""
    return SYSTEM_WORDS[system].replace("Metric", "metric")


def _shown(document: Document) -> dict[str, str]:
    shown = document.project.display_units
    return {"system": shown} if isinstance(shown, str) else dict(shown)


def _show(document: Document, label: str, shown: dict[str, str]) -> None:
    """One system alone stands in the file as a word, as it does where nobody chose anything."""
    alone = set(shown) == {"system"}
    document.edit(label, "/display_units", shown["system"] if alone else shown)
