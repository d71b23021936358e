"""A finding and the picture of the same thing never differ: each is held against envelope, limit line and trace."""

from __future__ import annotations

from types import SimpleNamespace

import numpy as np
import pytest
from PySide6.QtCore import Qt

from app.bench import limits as limits_drawing
from app.bench import profile as profile_drawing
from app.bench.field_values import extremes_of, limit_lines, striking_extremes, value_at
from app.bench.findings_panel import facts_of
from app.bench.strips.contents import content_of
from app.units import units_of
from solver import findings_of, solve
from tests.app.pictures.conftest import PILE, project_of


@pytest.mark.parametrize("which", ["pile", "two_materials"])
@pytest.mark.parametrize("sign", ["compression", "tension"])
def test_a_peak_is_the_farthest_point_of_the_envelope_that_is_drawn(request, which, sign):
    result = request.getfixturevalue(which).result
    finding = getattr(findings_of(result), sign)
    drawn = extremes_of(result, "stress")
    curve = -drawn.lowest if sign == "compression" else drawn.highest
    assert finding.peak.value == curve.max()
    assert finding.peak.position == drawn.position[np.argmax(curve)]
    assert finding.peak.value == getattr(result, f"peak_{sign}").value


@pytest.mark.parametrize("which", ["pile", "two_materials"])
@pytest.mark.parametrize("sign", ["compression", "tension"])
def test_the_limit_of_a_finding_is_the_line_that_is_drawn_there(request, which, sign):
    result = request.getfixturevalue(which).result
    finding = getattr(findings_of(result), sign)
    lines = [line for line in limit_lines(result.case) if line.sign == sign]
    for stress in (finding.peak, finding.worst):
        (line,) = [one for one in lines if one.start <= stress.position <= one.end]
        assert abs(line.stress) == stress.limit
        assert stress.share == stress.value / abs(line.stress)
    # nowhere does the drawn envelope come nearer to the drawn limit than the finding says
    drawn = extremes_of(result, "stress")
    curve = -drawn.lowest if sign == "compression" else drawn.highest
    limits = np.empty(len(curve))
    for line in lines:
        limits[(drawn.position >= line.start) & (drawn.position <= line.end)] = abs(line.stress)
    assert finding.worst.share == np.max(curve / limits)


def test_the_worst_place_need_not_be_that_of_the_peak(two_materials):
    """Steel tip: at most 2 F/A at a free end grows from the jump of section; its limit is ten times concrete's."""
    finding = findings_of(two_materials.result).tension
    assert finding.peak.segment == "Tip"
    assert finding.worst.segment == "Shaft"
    assert finding.differs
    assert finding.worst.share > finding.peak.share


def test_a_limit_that_is_reached_is_over_and_one_nearly_reached_is_near(pile):
    peak = findings_of(pile.result).compression.peak.value
    for limit, state in (
        (peak * 0.999, "over"),
        (peak * 1.05, "near"),
        (peak * 1.2, "within"),
        (None, "no limit"),
    ):
        tree = project_of(PILE).model_dump(mode="json")
        tree["materials"][0]["limits"]["compression"] = limit
        case = project_of(PILE).cases[0]
        bound = case.with_materials(
            tuple(type(pile.project).model_validate(tree).materials),
        )
        result = type(pile.result)(**{**vars(pile.result), "case": bound})
        assert findings_of(result).compression.state == state


def test_the_set_is_what_the_displacement_of_the_toe_comes_to(pile):
    finding = findings_of(pile.result).set
    toe = pile.result.fields.displacement[:, -1]
    assert finding.toe_largest == pytest.approx(float(toe.max()), rel=1e-3)  # the field is thinned in time
    assert 0 < finding.value < finding.toe_largest
    assert finding.blows_per_metre * finding.value == pytest.approx(1.0)


def test_the_energy_past_the_gauge_is_the_top_of_its_curve(pile):
    finding = findings_of(pile.result).energy
    strip = content_of("energy", pile.result, None, units_of(pile.project))
    (curve,) = [c for c in strip.curves if c.name == f"past {finding.gauge}"]
    assert finding.value == curve.values.max()
    assert finding.time == curve.time[np.argmax(curve.values)]
    # m g h times the efficiency, in the first place
    assert finding.source_energy == pytest.approx(4000 * 9.80665 * 1.2 * 0.95)
    assert 0 < finding.share < 1.05


def test_traces_of_the_force_pair_are_apart_by_twice_the_wave_that_goes_up(pile):
    """F + Z v = 2 x up-going wave (d'Alembert), in the sign that the project shows."""
    for sign in ("compression", "tension"):
        units = units_of(project_of(PILE, sign))
        force, product = content_of("force_pair", pile.result, "Head", units).curves
        up = next(c for c in content_of("waves", pile.result, "Head", units).curves if "up" in c.name)
        gap = force.values - product.values
        np.testing.assert_allclose(gap, 2 * up.values, atol=1e-6 * abs(force.values).max())


def test_the_cursor_put_on_a_finding_reads_the_finding(open_bench, pile):
    the = open_bench(pile)
    rows = the.bench.findings.rows()
    finding = facts_of(pile.result).compression.peak
    assert "peak compression" in rows[0].text()
    rows[0].click()
    assert the.sight.time == finding.time
    assert the.sight.place == finding.position
    read = value_at(pile.result, "stress", the.sight.time, the.sight.place)
    # the field holds every second step or so, and single precision: within 1 % of the envelope's peak
    assert -read == pytest.approx(finding.value, rel=0.01)


def test_the_panel_says_the_numbers_of_the_facts_in_the_units_of_the_project(open_bench, pile):
    the = open_bench(pile)
    facts = findings_of(pile.result)
    first = the.bench.findings.rows()[0].text().replace("\xa0", " ")
    assert f"{facts.compression.peak.value / 1e6:.0f} MPa peak compression" in first
    assert f"{100 * facts.compression.worst.share:.0f} %" in first
    assert "✓" in first
    the.document.edit("Units", "/display_units", "us")
    first = the.bench.findings.rows()[0].text().replace("\xa0", " ")
    assert f"{facts.compression.peak.value / 6894757.29:.1f} ksi" in first


def test_without_a_limit_the_panel_says_so(open_bench, pile, qtbot):
    the = open_bench(pile)
    the.document.edit("Limit", "/materials/0/limits/tension", None)
    qtbot.waitUntil(lambda: the.solution.state == "fresh")
    assert "no limit given" in the.bench.findings.rows()[1].text()
    assert [line.sign for line in limit_lines(the.document.case)] == ["compression"]


def test_findings_can_be_reached_and_pressed_by_keyboard(open_bench, pile, qtbot):
    the = open_bench(pile)
    row = the.bench.findings.rows()[1]
    row.setFocus()
    qtbot.keyClick(row, Qt.Key.Key_Space)
    assert the.sight.place == facts_of(pile.result).tension.peak.position


def test_a_limit_is_named_where_no_curve_runs_through_it(open_bench, two_materials, monkeypatch):
    """Two segments with different limits, in tension and compression, of stress and of force."""
    named = []

    def watched(painter, plot, distance, values, limits, quantity, free):
        boxes = limits_drawing.draw_limits(painter, plot, distance, values, limits, quantity, free)
        named.extend((box, free(box), plot) for box in boxes)
        return boxes

    monkeypatch.setattr(profile_drawing, "draw_limits", watched)
    the = open_bench(two_materials)
    for quantity in ("force", "stress"):  # each another picture than the one before
        named.clear()
        the.sight.set(quantity=quantity)
        the.bench.profile.grab()
        assert len(named) >= 2
        for number, (box, free, plot) in enumerate(named):
            assert free
            assert plot.contains(box)
            assert not any(box.intersects(other) for other, _, _ in named[number + 1 :])


def test_a_rod_that_strikes_has_its_extremes_and_its_limit_above_the_struck_end(open_bench):
    """A steel striker of 0.4 m on a bar alike at 12 m/s: both get rho c v/2, the striker until the wave comes back."""
    section = {"shape": "solid_round", "diameter": 0.02}
    case = {
        "name": "Striker",
        "member": {"segments": [{"name": "Bar", "length": 3.0, "material": "steel", "section": section}]},
        "load": {
            "kind": "striker",
            "velocity": 12.0,
            "segments": [{"name": "Rod", "length": 0.4, "material": "steel", "section": section}],
        },
        "far_end": {"kind": "free"},
        "run": {"duration": 0.0005},
    }
    project = project_of(case)
    solved = SimpleNamespace(project=project, result=solve(project.cases[0]))
    found = striking_extremes(solved.result, "stress")
    assert found.position.max() < 0
    expected = np.sqrt(210e9 * 7850) * 12 / 2
    assert -found.lowest.min() == pytest.approx(expected, rel=1e-6)
    assert -found.lowest.min() == facts_of(solved.result).striking[0].peak.value
    the = open_bench(solved)
    limits = [limit for limit, _ in the.bench.profile.limits() if limit.sign == "compression"]
    assert [(limit.start, limit.end) for limit in limits] == [(-0.4, 3.0)]
    assert not the.bench.profile.grab().isNull()


def test_what_lies_between_two_cursors_is_read_at_the_cursor(open_bench, pile):
    the = open_bench(pile)
    readings = the.bench.at_cursor.readings
    top = readings.top()
    the.sight.set(time=0.004, place=18.0)
    assert readings.speed() == ""
    the.sight.set(pinned=(0.002, 8.0))
    assert readings.speed().replace("\xa0", " ") == "5000 m/s ↓"  # 10 m in 2 ms
    assert readings.top() > top + 4 * readings.line()  # the gauges give way
    the.sight.set(pinned=(0.002, None))
    assert readings.speed() == ""


def test_a_stopped_run_says_what_it_is(pile):
    case = pile.project.cases[0]
    long = case.model_copy(update={"run": case.run.model_copy(update={"duration": 1.0})})
    first = solve(long, cancel=lambda: True)
    assert first.duration < 1.0
    assert not findings_of(first).quality.finished
