"""Units chosen from the menu: what is shown changes, the project's numbers and the solver's input do not."""

from __future__ import annotations

import pytest

from app.document import Document
from app.frame.units_menu import QUANTITIES, SYSTEM_WORDS, UnitsMenu
from app.starting_points import driven_pile
from app.units import units_of
from app.words import verdict
from solver import load_project, project_from_tree, solve
from solver.answer.findings import findings_of

pytestmark = pytest.mark.usefixtures("qapp")


@pytest.fixture
def document():
    return Document(project_from_tree(driven_pile()))


@pytest.fixture
def menu(document, qtbot):
    made = UnitsMenu(document)
    qtbot.addWidget(made)
    return made


def trigger(menu, *words):
    """Choose an entry by the start of its words, from menu to submenu."""
    menu.aboutToShow.emit()
    for word in words[:-1]:
        menu = next(a.menu() for a in menu.actions() if a.text().startswith(word))
    next(a for a in menu.actions() if a.text() == words[-1]).trigger()


def test_one_quantity_has_a_unit_of_its_own_and_goes_back(document, menu, tmp_path):
    before = document.case
    trigger(menu, "Force", "MN")
    trigger(menu, "Length", "ft")
    assert document.project.display_units == {"system": "metric", "force": "MN", "length": "ft"}
    assert document.undo_stack.undoText() == "Show length and distance in ft"
    assert document.case == before  # nothing that is solved has changed
    document.save_as(tmp_path / "x.strike")
    units = units_of(load_project(tmp_path / "x.strike"))
    # half to even, as Python rounds: 1.755 is 1.75499... in binary
    assert units.show(1.755e6, "force") == "1.75\u00a0MN"
    assert units.show(3.048, "length") == "10.0\u00a0ft"
    assert units.show(163e6, "stress") == "163\u00a0MPa"
    trigger(menu, "US")
    assert document.project.display_units == {"system": "us", "force": "MN", "length": "ft"}
    trigger(menu, "Force", "As US units have it: kip")
    assert document.project.display_units == {"system": "us", "length": "ft"}
    trigger(menu, "All quantities in US units")
    assert document.project.display_units == "us"


def test_every_unit_on_offer_can_be_chosen_and_is_then_ticked(document, menu):
    for dimension, word in QUANTITIES.items():
        menu.fill()
        below = next(a.menu() for a in menu.actions() if a.text().startswith(f"{word}\t"))
        for unit in [a.text() for a in below.actions()[2:]]:
            trigger(menu, f"{word}\t", unit)
            assert units_of(document.project).unit(dimension) == unit
            menu.fill()
            ticked = next(a.menu() for a in menu.actions() if a.text().startswith(f"{word}\t"))
            assert [a.text() for a in ticked.actions() if a.isChecked()] == [unit]
    assert not document.rejected
    assert {a.text() for a in menu.actions() if a.isChecked()} == {SYSTEM_WORDS["metric"]}


def test_blows_are_counted_in_the_unit_of_lengths(document, menu):
    """A set of s m/blow is 0.3048/s blows for each foot and 0.25/s for each 0.25 m, whatever the system is called."""
    found = findings_of(solve(document.case))
    counted = []
    for unit in ("As metric units have it: m", "ft"):
        trigger(menu, "Length", unit)
        line = next(
            line for line in verdict(found, units_of(document.project)) if line.name == "set per blow"
        )
        counted.append(line.detail.split(" · ")[0])
    assert counted[0].endswith("blows per 0.25 m")
    assert counted[1].endswith("blows per foot")
    numbers = [float(text.split()[0]) for text in counted]
    # both are rounded to 2 or 3 digits
    assert numbers[1] / numbers[0] == pytest.approx(0.3048 / 0.25, rel=0.02)
