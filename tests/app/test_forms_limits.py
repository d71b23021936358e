"""Limits of stress in the form of a material: by a published expression with what it rests on, or one's own.

The numbers are AASHTO LRFD 10.7.8 by hand, from memory: 0.9 x 355 = 319.5 MPa; for concrete of 6 ksi with 0.8 ksi of
prestress 0.85 x 6 - 0.8 = 4.3 ksi and 0.095 sqrt(6) + 0.8 = 1.0327 ksi.
"""

from __future__ import annotations

from collections.abc import Callable

import pytest

from app.bench.forms.other_rows import TextRow
from app.provenance import mark_at
from app.starting_points import driven_pile
from solver import ProjectError, parse_project, project_to_text
from solver.model.limits import KSI
from tests.app.desk import Desk, Tree

STEEL = "/materials/0/limits/expression/yield_stress"


@pytest.fixture
def material(desk: Callable[[Tree], Desk]) -> Desk:
    at = desk(driven_pile())
    at.select("/materials/0")
    return at


def limit(at: Desk, sign: str) -> float | None:
    return at.document.project.materials[0].limits.value(sign)


def test_an_expression_shows_its_formula_with_numbers_and_what_it_comes_to(material):
    material.choose("Limits by", "steel")
    assert limit(material, "compression") == limit(material, "tension") == pytest.approx(319.5e6)
    lines = material.outline.form.lines.text()
    assert "319.5\xa0MPa = 0.9 φ f_y, with φ = 1, f_y = 355.0\xa0MPa" in lines
    assert "10.7.8" in lines
    assert "To be confirmed against the governing code" in lines
    assert mark_at(material.document.tree, STEEL)["state"] == "typical"  # nobody typed 355 MPa

    material.type_into("Yield stress", "50 ksi")
    assert limit(material, "tension") == pytest.approx(45 * KSI)
    assert mark_at(material.document.tree, STEEL) is None

    material.document.undo_stack.undo()
    assert limit(material, "tension") == pytest.approx(319.5e6)
    material.document.undo_stack.undo()
    assert limit(material, "tension") is None


def test_prestressed_concrete_in_ksi_is_told_by_its_formula_in_ksi(material):
    material.document.edit("Units", "/display_units", "us")
    material.choose("Limits by", "prestressed concrete")
    assert limit(material, "compression") == pytest.approx(4.3 * KSI)
    assert limit(material, "tension") == pytest.approx(1.032702 * KSI, rel=1e-6)
    assert (
        "φ (0.095 √f'c + f_pe) in ksi, with φ = 1, f'c = 6.000\xa0ksi" in material.outline.form.lines.text()
    )


def test_a_number_of_ones_own_goes_before_the_expression_and_keeps_its_reason(material, qtbot):
    material.choose("Limits by", "steel")
    material.type_into("Limit in tension", "200")
    row = material.row("reason", TextRow)
    qtbot.keyClicks(row.edit, "old welds")
    row.edit.editingFinished.emit()
    held = material.document.project.materials[0].limits
    assert (held.value("tension"), held.tension.reason) == (200e6, "old welds")
    assert held.value("compression") == pytest.approx(319.5e6)

    material.choose("Limits by", "timber")  # another rule begins anew
    assert material.document.project.materials[0].limits.tension is None


def test_what_cannot_be_is_refused_in_the_form(material):
    material.choose("Limits by", "prestressed concrete")
    material.type_into("Prestress", "80 MPa")
    assert any("takes all of the strength" in p for p in map(str, material.document.rejected.values()))


def test_a_file_says_the_oldest_version_that_can_hold_it(material):
    assert material.document.project.version == 1
    material.choose("Limits by", "timber")
    text = project_to_text(material.document.project)
    assert '"version": 2' in text
    assert project_to_text(parse_project(text)) == text
    with pytest.raises(ProjectError, match="share"):
        parse_project(text.replace('"factor"', '"share"'))
