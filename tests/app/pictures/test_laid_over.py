"""Cases laid over each other: solved beside the window, drawn with lines of their own, forgotten when they change."""

from __future__ import annotations

from time import perf_counter, sleep
from types import SimpleNamespace

import numpy as np
import pytest
from PySide6.QtWidgets import QMenu

from app.laid_over import LaidOver, fill_over_menu
from solver import project_from_tree, solve, solve_many
from tests.app.pictures.conftest import CONCRETE, PILE, STEEL


def cases_of(*drops):
    cases = [dict(PILE, name=f"Drop {d} m", load=dict(PILE["load"], drop_height=d)) for d in drops]
    return project_from_tree(
        {
            "format": "striketrace-project",
            "version": 1,
            "title": "Three drops",
            "display_sign": "compression",
            "materials": [STEEL, CONCRETE],
            "cases": cases,
        }
    )


@pytest.fixture(scope="module")
def three():
    project = cases_of(1.2, 0.8, 0.4)
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


@pytest.fixture
def open_over(open_bench, three, qtbot):
    """A Bench with one more case over the first; tells which cases were solved for that."""
    the = open_bench(three)
    the.asked = []

    def telling(cases, **how):
        the.asked += [c.name for c in cases]
        return solve_many(cases, **how)

    the.bench.laid_over._solve_many = telling
    the.sight.set(laid_over=("Drop 0.8 m",))
    qtbot.waitUntil(lambda: len(the.bench.laid_over.results()) == 1)
    yield the
    assert the.bench.close_work()


def test_the_menu_lays_over_and_takes_away_and_holds_the_other_cases_only(open_bench, three):
    the = open_bench(three)
    menu = QMenu()
    fill_over_menu(menu, the.document, the.sight)
    names = [a.text() for a in menu.actions() if a.isCheckable()]
    assert names == ["Drop 0.8 m", "Drop 0.4 m"]
    menu.actions()[0].trigger()
    assert the.sight.laid_over == ("Drop 0.8 m",)
    fill_over_menu(menu, the.document, the.sight)
    assert menu.actions()[0].isChecked()
    menu.actions()[0].trigger()
    assert the.sight.laid_over == ()
    assert the.bench.close_work()


def test_the_result_laid_over_is_that_of_its_case(open_over, three):
    (one,) = open_over.bench.laid_over.results()
    alone = solve(three.project.cases[1])
    assert one.name == "Drop 0.8 m"
    np.testing.assert_array_equal(one.result.gauges["Head"].force, alone.gauges["Head"].force)


def test_strips_hold_both_cases_and_tell_them_apart_by_their_lines(open_over):
    strip = open_over.bench.strips.shown()[0]
    names = {c.name: c for c in strip.content().curves}
    assert {"force", "force · Drop 0.8 m"} <= set(names)
    assert names["force"].over is None
    assert names["force · Drop 0.8 m"].over == 0
    assert len(strip.table().columns) == 2 * len(names)


def test_a_case_is_solved_once_and_again_only_when_it_has_changed(open_over, qtbot):
    the = open_over
    assert the.asked == ["Drop 0.8 m"]
    before = the.bench.laid_over.results()[0].result
    the.document.edit("Drop", "load/drop_height", 1.3)  # of the case looked at
    the.sight.set(time=0.004)
    assert the.bench.laid_over.results()[0].result is before
    the.document.edit("Drop", "/cases/1/load/drop_height", 0.9)
    assert the.bench.laid_over.results() == ()
    assert the.bench.laid_over.shown[0].tells == "being solved"
    qtbot.waitUntil(lambda: len(the.bench.laid_over.results()) == 1)
    assert the.asked == ["Drop 0.8 m", "Drop 0.8 m"]
    assert the.bench.laid_over.results()[0].result.case.load.drop_height == 0.9


def test_what_is_taken_away_is_forgotten_and_the_case_looked_at_is_not_laid_over_itself(open_over, qtbot):
    the = open_over
    the.document.choose_case(1)
    assert the.bench.laid_over.shown == ()
    the.document.choose_case(0)
    qtbot.waitUntil(lambda: len(the.bench.laid_over.results()) == 1)
    the.sight.set(laid_over=())
    assert the.bench.laid_over.shown == ()
    assert the.bench.laid_over._known == []


def test_a_case_that_cannot_be_solved_says_why_and_does_not_stop_the_others(three, qtbot):
    from app.document import Document
    from app.sight import Sight
    from solver import Outcome, SolveError

    def half(cases, **_how):
        yield Outcome(0, None, SolveError("The ram has no mass."))
        yield Outcome(1, three.result)

    document, sight = Document(three.project), Sight()
    over = LaidOver(document, sight, solve_many=half)
    sight.set(laid_over=("Drop 0.8 m", "Drop 0.4 m"))
    qtbot.waitUntil(lambda: len(over.results()) == 1)
    assert over.shown[0].tells == "The ram has no mass."
    assert over.results()[0].number == 1
    assert over.close()


def test_the_profile_has_room_for_what_is_laid_over(open_bench, three, qtbot):
    the = open_bench(three)
    the.document.choose_case(2)  # the lightest blow
    qtbot.waitUntil(lambda: the.solution.state == "fresh")
    profile = the.bench.profile
    alone = profile.value_axis().high
    the.sight.set(laid_over=("Drop 1.2 m",))
    qtbot.waitUntil(lambda: len(the.bench.laid_over.results()) == 1)
    assert profile._largest() == pytest.approx(three.result.peak_compression.value)
    assert profile.value_axis().high >= alone
    assert the.bench.close_work()


def test_what_is_under_way_beside_the_window_ends_at_once_when_it_closes(open_bench, three, qtbot):
    """Both kinds of work go on until they are told to stop; the least that a solver looks at that is every 0.1 s."""
    the = open_bench(three)
    begun = []

    def endless(_what, cancel, **_how):
        begun.append(1)
        while not cancel():
            sleep(0.01)
        return iter(())

    the.bench.laid_over._solve_many = endless
    the.bench.findings.mesh._check = endless
    the.sight.set(laid_over=("Drop 0.8 m",))
    the.bench.findings.mesh.ask()
    qtbot.waitUntil(lambda: len(begun) == 2)
    before = perf_counter()
    assert the.bench.close_work()
    assert perf_counter() - before < 0.5
