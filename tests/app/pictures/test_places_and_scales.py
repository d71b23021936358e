"""Places, scales and curves of the pictures by hand, without a window."""

from __future__ import annotations

import numpy as np
import pytest
from PySide6.QtCore import QRectF

from app.bench.member.handles import change_to, handles_of
from app.bench.member.key_figures import case_load_figure, segment_figure
from app.bench.member.scene import scene_of, width_for_names
from app.bench.pictures.arrival_lines import all_named, lines_of
from app.bench.pictures.axes import Axis, rounded_up, whole_distance
from app.bench.pictures.colouring import columns_under, entries_of
from app.bench.pictures.lettering import width_of
from app.bench.strips.contents import content_of
from app.bench.strips.peaks import peaks_of
from app.demo_files import demo_paths
from app.look.fonts import font
from app.units import NO_BREAK, Units
from solver import load_project, project_from_tree, solve
from solver.model.section import SolidRound
from tests.project.valid import valid_tree

COMPRESSION, TENSION = Units(compression_positive=True), Units()


@pytest.fixture
def drop():
    """6 m over 4 m; the ground begins at 2 m with 5 m of clay over 4 m of sand."""
    return project_from_tree(valid_tree()).cases[0]


def handle(case, pointer):
    return next(h for h in handles_of(case) if h.pointer == pointer)


def test_a_boundary_moves_between_the_ends_of_its_two_segments(drop):
    """No length is dragged below a thousandth of the member's 10 m."""
    boundary = handle(drop, "member/segments/0")
    assert (boundary.place, boundary.low, boundary.high) == pytest.approx((6.0, 0.01, 9.99))


def test_a_gauge_on_a_striker_is_dragged_where_it_is_read():
    """A striker of 0.4 m, its gauge 0.1 m from the far face: at -0.3 m, and dragged to -0.05 m it stands at 0.35 m."""
    tree = valid_tree()
    case = tree["cases"][0]
    case["load"] = {
        "kind": "striker",
        "velocity": 5.0,
        "segments": [case["member"]["segments"][0] | {"length": 0.4}],
    }
    case["gauges"] = [{"name": "Rear", "position": 0.1, "on": "striker"}]
    rear = handle(project_from_tree(tree).cases[0], "gauges/0")
    assert (rear.place, rear.low, rear.high) == pytest.approx((-0.3, -0.4, 0.0))
    change_to(rear, -0.05, 0, tree["cases"][0])(tree)
    assert case["gauges"][0]["position"] == pytest.approx(0.35)


def test_the_foot_of_a_layer_is_dragged_from_the_ground_surface_on(drop):
    """Clay from 2 m to 7 m, its foot dragged to 5 m: 3 m of clay, and the sand still ends at 11 m."""
    tree = valid_tree()
    change_to(handle(drop, "ground/layers/0"), 5.0, 0, tree["cases"][0])(tree)
    clay, sand = tree["cases"][0]["ground"]["layers"]
    assert (clay["thickness"], sand["thickness"]) == pytest.approx((3.0, 6.0))
    lower = handle(drop, "ground/layers/1")
    assert (lower.place, lower.low) == pytest.approx((11.0, 7.01))


def test_what_strikes_has_room_above_the_member():
    """A striker of 0.2 m on 1.2 m: all of it and a little more lies above the struck end."""
    case = project_from_tree(valid_tree()).cases[2]
    top, bottom = whole_distance(case)
    assert -0.24 < top < -0.2
    assert 1.2 < bottom < 1.4


@pytest.mark.parametrize(
    ("value", "top"), [(0.93, 1.0), (1.0, 1.0), (1.01, 1.2), (8.3, 10.0), (230e6, 250e6), (0, 1.0)]
)
def test_a_scale_ends_at_the_next_tidy_number_and_never_below_its_largest_value(value, top):
    assert rounded_up(value) == pytest.approx(top)


def test_colours_run_from_the_lowest_number_to_the_highest():
    """511 entries, the middle one for zero; beyond the ends of the scale the end colour."""
    assert entries_of(np.array([-2.0, -1.0, 0.0, 0.5, 1.0, 9.0]), 1.0).tolist() == [0, 0, 255, 383, 510, 510]


def test_a_place_beside_the_member_has_no_column():
    edges = np.array([0.0, 1.0, 2.0])
    assert columns_under(edges, np.array([-0.1, 0.0, 0.9, 1.0, 2.0, 2.1])).tolist() == [-1, 0, 0, 1, 1, -1]


@pytest.mark.parametrize(("units", "sign"), [(COMPRESSION, -1), (TENSION, 1)])
def test_stress_has_the_sign_of_the_project_and_motion_its_own(pile, units, sign):
    gauges = list(pile.result.gauges.values())
    for curve, gauge in zip(content_of("stress", pile.result, None, units).curves, gauges, strict=True):
        assert np.array_equal(curve.values, sign * gauge.stress)
    for curve, gauge in zip(content_of("velocity", pile.result, None, units).curves, gauges, strict=True):
        assert np.array_equal(curve.values, gauge.velocity)
    waves = content_of("waves", pile.result, "Head", units).curves
    head = pile.result.gauges["Head"]
    assert [np.array_equal(c.values, sign * w) for c, w in zip(waves, (head.down_wave, head.up_wave), strict=True)] == [
        True, True,
    ]  # fmt: skip


def test_the_curves_of_energy_are_the_whole_ledger(pile):
    """What was put in is what moves, what is stored and what is lost: nothing of the ledger is left out of the words.
    Parts under 1 % get no curve, and there are four of them at most.
    """
    curves = {c.name: c.values for c in content_of("energy", pile.result, None, TENSION).curves}
    given = curves["put in"]
    rest = sum(values for name, values in curves.items() if name != "put in" and not name.startswith("past "))
    assert np.abs(given - rest).max() < 0.04 * given.max()
    ground = sum(pile.result.ledger.parts[part] for part in ("ground_static_loss", "ground_damping_loss"))
    assert curves["lost in the ground"] == pytest.approx(ground)


def test_an_arrival_does_not_come_back_past_a_place_below_its_turn(two_materials):
    """What turns at the step, 12 m down, never passes a gauge at 14 m; and a name that is no more is left out."""
    lines = lines_of(two_materials.result)
    at_step = next(one for one in lines if one.arrival.kind == "step")
    assert at_step.arrival.position == 12.0
    assert at_step.passes(14.0) is None
    assert at_step.passes(1.0) is not None
    assert all_named(lines, [len(lines) + 3], TENSION) == ""


def test_the_way_back_bends_where_the_way_there_did():
    """Steel, copper and steel again, 1 m, 2 m and 4 m: each in its own travel time, down and up."""
    tree = valid_tree()
    case, bar = tree["cases"][1], tree["cases"][1]["member"]["segments"][0]
    parts = zip("ABC", (1.0, 2.0, 4.0), ("steel", "copper", "steel"), strict=True)
    case["member"]["segments"] = [bar | {"name": n, "length": long, "material": of} for n, long, of in parts]
    case["run"] = {"duration": 0.004, "element_length": 0.1}
    case = project_from_tree(tree).cases[1]
    line = next(one for one in lines_of(solve(case)) if one.arrival.kind == "far_end")
    steel, copper = 1 / np.sqrt(210e9 / 7850), 1 / np.sqrt(117e9 / 8940)
    down, up = line.legs[:2]
    assert down.places.tolist() == [0.0, 1.0, 3.0, 7.0]
    assert np.diff(down.times) == pytest.approx([steel, 2 * copper, 4 * steel])
    assert up.places.tolist() == [7.0, 3.0, 1.0, 0.0]
    assert np.diff(up.times) == pytest.approx([4 * steel, 2 * copper, steel])


def test_tops_and_bottoms_take_turns():
    """0, 1, 0.5, 1.2, -1, 0.8: a top, a bottom, a top, a bottom, and the end."""
    found = peaks_of(np.array([0.0, 1.0, 0.5, 1.2, -1.0, 0.8, 0.8]))
    assert [(p.index, p.top) for p in found] == [(1, True), (2, False), (3, True), (4, False)]


def test_a_history_lasts_from_its_first_point_to_its_last():
    tree = valid_tree()
    tree["cases"][1]["load"] = {
        "kind": "history", "quantity": "force", "times": [0.001, 0.002, 0.004], "values": [0.0, 1e4, 0.0],
    }  # fmt: skip
    figure = case_load_figure(project_from_tree(tree).cases[1], TENSION)
    assert figure.replace(NO_BREAK, " ") == "3 points, 3.00 ms"


def test_the_drawing_is_wide_enough_for_its_names(qtbot):
    """Of a plot as wide as the names ask for, every gauge's name and every layer's longest word has its room."""
    case = load_project(demo_paths()[0]).cases[0]
    wide = width_for_names(case, font())
    scene = scene_of(case, QRectF(30, 40, wide, 300), Axis(0.0, 24.0, 40.0, 300.0), font())
    assert all(width_of(g.name, font()) <= scene.names_end - scene.plot.left() - 2 for g in case.gauges)
    words = [word for band in scene.bands for word in band.name.split()]
    assert all(width_of(word, font()) <= scene.plot.right() - scene.names_begin for word in words)


def test_a_section_is_called_with_its_unit(drop):
    """In inches as in millimetres: "Ø 0.7874" alone could be either."""
    segment = drop.member.segments[1].model_copy(
        update={"section": SolidRound(shape="solid_round", diameter=0.02), "end_section": None}
    )
    assert segment_figure(segment, Units()).replace(NO_BREAK, " ").endswith(", Ø 20 mm")
    assert segment_figure(segment, Units(system="us")).replace(NO_BREAK, " ").endswith(", Ø 0.7874 in")
