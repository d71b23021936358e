"""Findings beyond the verdict: cracks, repeated blows, a finer mesh, other cases, and how little room they need."""

from __future__ import annotations

from types import SimpleNamespace

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QMenu

from app.bench.findings_panel import facts_of
from app.bench.member.locked_in import axis_of, table_of
from app.run_words import differences, in_brief, of_the_run, on_a_finer_mesh
from app.units import units_of
from app.words import percent, verdict
from solver import Change, MeshCheck, check_mesh, load_project, solve
from tests.app.pictures.conftest import PILE, project_of


def plain(text):
    return text.replace("\xa0", " ")


def demo(name):
    from pathlib import Path

    folder = Path(__file__).resolve().parents[3] / "demo_projects"
    project = load_project(next(folder.glob(f"*{name}*")))
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


@pytest.fixture(scope="module")
def blows():
    return demo("repeated-blows")


def texts(panel):
    return [plain(row.text()) for row in panel.rows()]


def test_the_set_of_every_blow_is_told_and_the_force_left_behind_leads_to_its_picture(open_bench, blows):
    the = open_bench(blows)
    residual = blows.result.residual
    sets = ", ".join(f"{1000 * value:.2f} mm" for value in residual.set_per_blow)
    told = next(t for t in texts(the.bench.findings) if t.startswith("Set of"))
    assert sets in told
    assert told.endswith("it repeats.") == residual.repeats
    row = next(r for r in the.bench.findings.rows() if "locked in" in r.text())
    largest = np.abs(residual.force).max()
    assert f"{largest / 1000:.0f} kN" in plain(row.text())
    row.click()
    assert the.sight.locked_in
    assert the.sight.place == residual.position[np.argmax(np.abs(residual.force))]
    shot = the.bench.profile.grab().toImage()
    the.sight.set(locked_in=False)
    assert the.bench.profile.grab().toImage() != shot


def test_the_picture_of_the_locked_in_force_holds_its_whole_curve_in_the_sign_shown(open_bench, blows):
    the = open_bench(blows)
    the.sight.set(locked_in=True)
    units, residual = units_of(blows.project), blows.result.residual
    axis = axis_of(residual, units, the.bench.profile.plot())
    table = the.bench.profile.table()
    shown = table.columns[1]
    np.testing.assert_allclose(shown, units.sign * residual.force / 1000)  # kN
    assert axis.low < min(shown.min(), 0) <= max(shown.max(), 0) < axis.high
    assert table.headings == table_of(residual, units).headings
    menu = QMenu()
    the.bench.profile.fill_menu(menu)
    menu.actions()[0].trigger()
    assert not the.sight.locked_in


def test_one_blow_has_no_picture_of_a_locked_in_force(open_bench, pile):
    the = open_bench(pile)
    the.sight.set(locked_in=True)
    assert the.bench.profile.residual() is None
    menu = QMenu()
    the.bench.profile.fill_menu(menu)
    assert menu.isEmpty()


def test_how_far_a_crack_opens_is_told_with_its_segment():
    cracked = demo("cracked-by-its-own-echo")
    (segment, opening) = next(iter(cracked.result.crack_openings.items()))
    told = [plain(n.text) for n in of_the_run(cracked.result, units_of(cracked.project))]
    shown = plain(units_of(cracked.project).show(opening, "small_length"))
    assert told[0] == f"Cracks in {segment} open by up to {shown}."


@pytest.mark.parametrize("height", [690, 724])
def test_at_1280_by_800_all_headline_figures_are_seen_without_scrolling(open_bench, pile, height):
    the = open_bench(pile, 986, height)
    panel = the.bench.findings
    rows = panel.rows()[:4]
    assert [plain(r.told.name) for r in rows] == (
        ["peak compression", "peak tension", "set per blow", "past gauge Head"]
    )
    view = panel._scroll.viewport()
    for row in rows:
        top = row.mapTo(panel, row.rect().topLeft()).y()
        bottom = row.mapTo(panel, row.rect().bottomLeft()).y()
        edge = view.mapTo(panel, view.rect().bottomLeft()).y()
        assert top >= 0
        assert bottom <= edge + 2, f"{row.text()} ends {bottom - edge} pixels below"
        assert row._detail_box(row.width(), 0).height() < 1.6 * row.fontMetrics().height()


def test_brief_details_keep_state_share_place_and_time(pile):
    units = units_of(pile.project)
    facts = facts_of(pile.result)
    brief = [plain(b) for b in in_brief(facts, units)]
    worst = facts.compression.worst
    assert brief[0].startswith(f"✓ within, {plain(percent(worst.share))} · ")
    assert plain(units.show(worst.time, "time")) in brief[0]
    assert len(brief) == len(verdict(facts, units))


def test_copy_as_text_is_one_paragraph_without_signs(open_bench, blows):
    the = open_bench(blows)
    the.bench.findings.copy()
    text = plain(QGuiApplication.clipboard().text())
    assert "\n" not in text
    assert not set("✓✕·") & set(text)
    for part in (
        blows.result.case.name,
        "Peak compression",
        "within the limit",
        "Set per blow",
        "Set of",
        "A model's answer",
    ):
        assert part in text


def test_differences_are_shares_of_the_case_looked_at(pile):
    lighter = project_of(dict(PILE, name="Light", load=dict(PILE["load"], drop_height=0.6)))
    other = solve(lighter.cases[0])
    mine, its = facts_of(pile.result), facts_of(other)
    rows = {d.name: d for d in differences(mine, its, units_of(pile.project))}
    assert set(rows) == {"compression", "tension", "set", "energy"}
    share = its.compression.peak.value / mine.compression.peak.value - 1
    # half the height is 0.71 of the speed: the first peak follows it
    assert share == pytest.approx(np.sqrt(0.5) - 1, abs=0.02)
    assert plain(rows["compression"].share) == f"−{plain(percent(abs(share)))}"
    assert plain(rows["compression"].figure) == f"{its.compression.peak.value / 1e6:.0f} MPa"
    same = differences(mine, mine, units_of(pile.project))
    assert {plain(d.share) for d in same} == {"±0 %"}


def test_the_mesh_is_checked_beside_the_window_and_told_in_plain_words(open_bench, pile, qtbot):
    the = open_bench(pile)
    mesh = the.bench.findings.mesh
    qtbot.mouseClick(mesh.link, Qt.MouseButton.LeftButton)
    assert "half as long" in mesh.answer.text()
    qtbot.waitUntil(lambda: mesh.answer.text().startswith("On a finer mesh"), timeout=20_000)
    text = plain(mesh.answer.text())
    expected = check_mesh(pile.result)
    assert f"({expected.finer_elements} elements for {expected.elements})" in text
    for figure in ("peak compression", "the set", "the energy past the first gauge"):
        assert figure in text
    assert "by less than 0.1 %" in text
    panel = the.bench.findings
    foot = panel._scroll.viewport().rect().bottomLeft()
    below = panel._scroll.viewport().mapTo(panel, foot).y()
    qtbot.waitUntil(lambda: mesh.answer.mapTo(panel, mesh.answer.rect().bottomLeft()).y() <= below + 1)
    # what was found belongs to the result: with another one it is gone
    the.document.edit("Drop", "load/drop_height", 1.0)
    qtbot.waitUntil(lambda: the.solution.state == "fresh" and the.solution.result is not pile.result)
    assert mesh.answer.text() == ""
    assert the.bench.close_work()


def test_the_words_on_a_finer_mesh_say_each_change_as_a_share():
    changes = (
        Change("peak_compression", 100.0, 100.3),
        Change("peak_tension", 1e-9, 2e-9),
        Change("set", 1.0, 1.0),
    )
    assert plain(on_a_finer_mesh(MeshCheck(100, 200, changes))) == (
        "On a finer mesh (200 elements for 100): peak compression changes by 0.30 %, "
        "the set changes by less than 0.1 %."
    )
    same = (Change("peak_compression", 1.0, 1.0), Change("peak_tension", 1.0, 1.0), Change("set", 1.0, 1.0))
    assert plain(on_a_finer_mesh(MeshCheck(100, 200, same))) == (
        "On a finer mesh (200 elements for 100) peak compression, peak tension and the set "
        "change by less than 0.1 %."
    )


def test_a_refused_check_says_why(qtbot, pile):
    from app.bench.mesh_view import MeshView
    from solver import SolveError

    def refuse(_result, cancel):
        raise SolveError("The step is too small.")

    view = MeshView(check=refuse)
    qtbot.addWidget(view)
    view.follow(pile.result)
    view.ask()
    qtbot.waitUntil(lambda: view.answer.text() == "✕ The step is too small.")
    assert view.close_work()
