"""Parts added, split, chosen and removed where they are drawn; elevations beside the distances."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt, QTimer
from PySide6.QtGui import QContextMenuEvent
from PySide6.QtWidgets import QApplication, QMenu

from app.bench.member import levels as levels_drawing

LEFT, CONTROL = Qt.MouseButton.LeftButton, Qt.KeyboardModifier.ControlModifier


def spot(member, place, side=0):
    return QPoint(round(member.scene().centre + side), round(member.distance_axis().at(place)))


def menu_at(member, place, side=0):
    member.menu_at = QPointF(spot(member, place, side))
    menu = QMenu(member)
    member.fill_menu(menu)
    return menu


def choose(menu, words):
    next(a for a in menu.actions() if a.text().split("\t")[0].startswith(words)).trigger()


def test_a_segment_is_split_where_it_is_clicked(open_bench, pile):
    the = open_bench(pile)
    menu = menu_at(the.bench.member, 10.02)
    assert the.sight.selection == "member/segments/0"
    choose(menu, "Split at")
    lengths = [s.length for s in the.document.case.member.segments]
    assert lengths == pytest.approx([10.0, 6.0, 8.0], abs=0.1)
    assert lengths[0] + lengths[1] == pytest.approx(16.0, rel=1e-9)
    assert lengths[0] == pytest.approx(round(lengths[0], 1), abs=1e-9)  # a tidy place at this size
    assert the.sight.selection == "member/segments/1"
    the.document.undo_stack.undo()
    assert the.document.project == pile.project


def test_a_gauge_is_added_where_it_is_clicked_and_goes_with_a_key(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    choose(menu_at(member, 8.0), "Add a gauge at")
    assert the.document.case.gauges[-1].position == pytest.approx(8.0, abs=0.1)
    assert the.sight.selection == "gauges/2"
    member.setFocus()
    qtbot.keyClick(member, Qt.Key.Key_D, CONTROL)
    assert len(the.document.case.gauges) == 4
    qtbot.keyClick(member, Qt.Key.Key_Delete)
    qtbot.keyClick(member, Qt.Key.Key_Delete)
    assert [g.name for g in the.document.case.gauges] == ["Head", "Toe"]


def test_control_and_a_click_choose_several_and_they_go_together(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    qtbot.mouseClick(member, LEFT, pos=spot(member, 1.2, -45))
    qtbot.mouseClick(member, LEFT, CONTROL, spot(member, 23.2, -45))
    assert {the.sight.selection, *the.sight.also} == {"gauges/0", "gauges/1"}
    assert the.document.project == pile.project  # a click moves nothing
    choose(menu_at(member, 1.2, -45), "Remove all 2")
    assert not the.document.case.gauges


def test_the_menu_of_the_ground_offers_what_its_row_does(open_bench, pile):
    the = open_bench(pile)
    member = the.bench.member
    menu = menu_at(member, 14.0, member.width() - member.scene().centre - 12)
    assert the.sight.selection == "ground/layers/0"
    choose(menu, "Duplicate")
    assert [layer.name for layer in the.document.case.ground.layers] == ["Dense sand", "Dense sand 2"]


@pytest.mark.parametrize("level", [3.0, -12.5])
def test_elevations_stand_at_the_pixels_of_their_distances(open_bench, pile, monkeypatch, level):
    """A place x below a struck end at elevation z0 lies at z0 - x; the scale must agree with that of distance."""
    the = open_bench(pile)
    the.document.edit("Level", "ground/level_of_struck_end", level)
    put = []
    monkeypatch.setattr(
        levels_drawing, "put", lambda _painter, _x, y, text, *_rest: put.append((y, text.replace("−", "-")))
    )
    the.bench.xt.grab()
    axis = the.bench.member.distance_axis()  # the x-t diagram shares it
    assert put[-1][1] == "Level, m"
    assert len(put) > 3
    for y, text in put[:-1]:
        assert axis.value(y) == pytest.approx(level - float(text), abs=1e-9)


@pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
def test_the_keys_choose_split_and_copy_parts_and_open_their_menu(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    member.setFocus()
    chosen = [the.sight.selection]
    for _ in range(4):
        qtbot.keyClick(member, Qt.Key.Key_Down)
        chosen.append(the.sight.selection)
    assert chosen == ["load", "load/cushion", "load/cap_mass", "load/pile_cushion", "member/segments/0"]
    qtbot.keyClick(member, Qt.Key.Key_D, CONTROL | Qt.KeyboardModifier.ShiftModifier)
    assert [s.length for s in the.document.case.member.segments] == [8.0, 8.0, 8.0]
    assert the.sight.selection == "member/segments/1"
    qtbot.keyClick(member, Qt.Key.Key_Up)
    assert the.sight.selection == "member/segments/0"
    words = []

    def read_and_close():
        menu = QApplication.activePopupWidget()
        words.extend(action.text() for action in menu.actions())
        menu.close()

    QTimer.singleShot(0, read_and_close)  # in the loop of the menu itself
    the.sight.set(place=3.0)
    middle = member.rect().center()
    keys = QContextMenuEvent.Reason.Keyboard
    member.contextMenuEvent(QContextMenuEvent(keys, middle, member.mapToGlobal(middle)))
    assert "Split at 3.00\u00a0m" in words
    assert "Add a gauge at 3.00\u00a0m" in words
    assert the.sight.selection == "member/segments/0"
