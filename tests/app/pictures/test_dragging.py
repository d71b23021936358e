"""The drawing is the editor: what is dragged is edited, in tidy steps, as one step of undo, and can be taken back."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, Qt

from app.bench.member.handles import handles_of


def spot(member, place, side):
    return QPoint(round(member.scene().centre + side), round(member.distance_axis().at(place)))


def drag(qtbot, member, start, end, keys=Qt.KeyboardModifier.NoModifier, release=True):
    """Press, move half way and then all the way, release."""
    qtbot.mousePress(member, Qt.MouseButton.LeftButton, keys, start)
    for target in ((start + end) / 2, end):
        if keys == Qt.KeyboardModifier.NoModifier:
            qtbot.mouseMove(member, target)
        else:
            move_with(member, target, keys)
    if release:
        qtbot.mouseRelease(member, Qt.MouseButton.LeftButton, keys, end)


def move_with(member, to, keys):
    """A move with a key held, which `mouseMove` of the test library cannot do."""
    from PySide6.QtCore import QEvent, QPointF
    from PySide6.QtGui import QMouseEvent

    none, left = Qt.MouseButton.NoButton, Qt.MouseButton.LeftButton
    where = member.mapToGlobal(QPointF(to))
    member.mouseMoveEvent(QMouseEvent(QEvent.Type.MouseMove, QPointF(to), where, none, left, keys))


def test_a_gauge_is_dragged_in_tidy_steps_as_one_step_of_undo(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    steps = the.document.undo_stack.count()
    drag(qtbot, member, spot(member, 1.2, -45), spot(member, 5.03, -45))
    position = the.document.case.gauges[0].position
    assert position == pytest.approx(5.0, abs=0.1)
    assert position == pytest.approx(round(position, 1), abs=1e-12)  # a tenth of a metre at this size
    assert the.document.undo_stack.count() == steps + 1
    assert the.document.undo_stack.undoText() == f"Move gauge Head to {position:.2f}\xa0m"
    assert the.sight.selection == "gauges/0"
    the.document.undo_stack.undo()
    assert the.document.project == pile.project


def test_with_control_it_stays_where_it_is_put(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    start, end = spot(member, 1.2, -45), spot(member, 5.03, -45)
    drag(qtbot, member, start, end, Qt.KeyboardModifier.ControlModifier)
    axis = member.distance_axis()
    wanted = 1.2 + (end.y() - start.y()) * (axis.high - axis.low) / axis.length
    assert the.document.case.gauges[0].position == pytest.approx(wanted, rel=1e-6)


def test_escape_takes_a_drag_back(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    drag(qtbot, member, spot(member, 16.0, 0), spot(member, 10.0, 0), release=False)
    qtbot.waitUntil(lambda: the.document.case.member.segments[0].length < 11)  # a step waits for its picture
    qtbot.keyClick(member, Qt.Key.Key_Escape)
    assert the.document.project == pile.project
    assert not the.document.undo_stack.canUndo()


def test_a_boundary_between_segments_leaves_all_others_where_they_are(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    drag(qtbot, member, spot(member, 16.0, 0), spot(member, 12.0, 0))
    upper, lower = the.document.case.member.segments
    assert upper.length == pytest.approx(12.0, abs=0.1)
    assert upper.length + lower.length == pytest.approx(24.0, abs=1e-9)


def test_the_ground_surface_and_the_far_end_are_dragged(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    drag(qtbot, member, spot(member, 6.0, 50), spot(member, 9.0, 50))
    assert the.document.case.ground.surface == pytest.approx(9.0, abs=0.1)
    drag(qtbot, member, spot(member, 24.0, 0), spot(member, 25.0, 0))
    assert the.document.case.member.length == pytest.approx(25.0, abs=0.15)


def test_the_ram_is_lifted(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    ram = next(b.box for b in member.scene().blocks if b.kind == "ram").center().toPoint()
    drag(qtbot, member, ram, ram - QPoint(0, 30))
    assert the.document.case.load.drop_height == pytest.approx(1.5)


def test_nothing_is_dragged_past_what_it_belongs_to(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    refused = []
    the.document.refused.connect(refused.append)
    drag(qtbot, member, spot(member, 1.2, -45), QPoint(10, -300))
    assert the.document.case.gauges[0].position == 0.0
    surface = the.document.case.ground.surface
    # the toe stops at the ground, below the joint
    drag(qtbot, member, spot(member, 24.0, 0), spot(member, 2.0, 0))
    assert the.document.case.member.length == pytest.approx(max(16.0, surface), abs=0.1)
    assert refused == []


def test_a_far_end_dragged_up_takes_gauges_along_as_a_typed_length_does(open_bench, pile, qtbot):
    """They keep their distance from the far end, 0.8 m here, however far the drag went in between; one step of undo."""
    the = open_bench(pile)
    member = the.bench.member
    told = []
    the.document.told.connect(told.append)
    start, highest, end = (spot(member, place, 0) for place in (24.0, 19.0, 22.0))  # on the axis as it is now
    drag(qtbot, member, start, highest, release=False)
    qtbot.waitUntil(lambda: the.document.case.member.length < 19.5)
    qtbot.mouseMove(member, end)
    qtbot.mouseRelease(member, Qt.MouseButton.LeftButton, pos=end)
    length, toe = the.document.case.member.length, the.document.case.gauges[1].position
    assert length == pytest.approx(22.0, abs=0.5)
    assert length - toe == pytest.approx(0.8, abs=1e-9)
    assert "Moved with the end of the shorter member" in told[-1]
    the.document.undo_stack.undo()
    assert the.document.project == pile.project


def test_of_several_gauges_that_are_selected_all_go_along(open_bench, pile, qtbot):
    """The toe gauge has 0.8 m to the end of the pile: no further goes the other."""
    the = open_bench(pile)
    member = the.bench.member
    the.sight.set(selection="gauges/1")
    the.sight.set(also=("gauges/0",))
    head, toe = spot(member, 1.2, -45), spot(member, 1.7, -45)
    drag(qtbot, member, head, toe)
    first, second = (g.position for g in the.document.case.gauges)
    assert first > 1.3
    assert second - first == pytest.approx(22.0, abs=1e-9)
    assert the.document.undo_stack.undoText().startswith("Move 2 gauges down by")
    drag(qtbot, member, spot(member, first, -45), spot(member, 15.0, -45))
    assert [g.position for g in the.document.case.gauges] == pytest.approx([2.0, 24.0])
    the.document.undo_stack.undo()
    the.document.undo_stack.undo()
    assert the.document.project == pile.project
    assert the.sight.also == ("gauges/0",)


def test_control_and_an_arrow_move_what_is_selected_by_a_tidy_step(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    the.sight.set(selection="gauges/0")
    for _ in range(3):
        qtbot.keyClick(member, Qt.Key.Key_Down, Qt.KeyboardModifier.ControlModifier)
    position = the.document.case.gauges[0].position
    assert position > 1.2
    assert position == pytest.approx(round(position, 1), abs=1e-9)
    the.document.undo_stack.undo()  # a burst is one step
    assert the.document.project == pile.project
    the.sight.set(selection="load")
    qtbot.keyClick(member, Qt.Key.Key_Up, Qt.KeyboardModifier.ControlModifier)
    assert the.document.case.load.drop_height == pytest.approx(1.25)


def test_a_click_without_a_drag_changes_nothing(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    qtbot.mouseClick(member, Qt.MouseButton.LeftButton, pos=spot(member, 16.0, 0))
    assert the.document.project == pile.project
    assert the.sight.selection == "member/segments/0"


def test_every_handle_lies_between_its_bounds(pile, two_materials):
    for solved in (pile, two_materials):
        for handle in handles_of(solved.project.cases[0]):
            assert handle.low <= handle.place <= handle.high, handle
