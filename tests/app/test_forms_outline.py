"""The outline as it is used: rows selected by mouse and keys, fields typed into, choices made, parts added."""

from __future__ import annotations

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QFont, QFontMetrics
from PySide6.QtWidgets import QApplication

from app.bench.forms.field_row import FieldRow
from app.bench.forms.number_row import NumberRow
from app.bench.forms.other_rows import CheckRow, ChoiceRow, PointsRow, TextRow
from app.bench.forms.picker import PartPicker
from app.bench.outline.row import texts_in
from app.look import font
from app.starting_points import driven_pile, new_tree, slender_rod_by_echo
from app.tree import value_at


def problem_of(row: FieldRow) -> str:
    return plain(row._problem.text()) if not row._problem.isHidden() else ""


def plain(text: str) -> str:
    """With ordinary spaces between numbers and units."""
    return text.replace("\u00a0", " ")


def test_rows_stand_in_the_order_in_which_the_blow_passes(desk) -> None:
    names = [button.row.name for button in desk(driven_pile()).outline.buttons]
    assert names == [
        "Ram", "Cushion", "Drive cap", "Pile cushion", "Pile", "Ground", "Toe", "Gauges", "Attachments", "Run",
        "Materials",
    ]  # fmt: skip


def test_a_click_unfolds_a_row_in_place(desk, qtbot) -> None:
    at = desk(driven_pile())
    qtbot.mouseClick(at.button("Pile"), Qt.MouseButton.LeftButton)
    assert at.sight.selection == "member/segments/0"
    below = at.button("Pile").geometry().bottom()
    qtbot.waitUntil(lambda: at.outline.folded_out.geometry().top() == below + 1)
    assert "20.0 m" in plain(at.button("Pile").accessibleName())


@pytest.mark.parametrize(
    ("typed", "metres"), [("8", 8.0), ("40 ft", 12.192), ("12,5", 12.5), ("15000mm", 15.0), ("1.6e1", 16.0)]
)
def test_a_length_is_taken_in_the_shown_unit_or_its_own(desk, typed: str, metres: float) -> None:
    tree = driven_pile()
    tree["cases"][0]["gauges"] = []
    at = desk(tree)
    at.select("member/segments/0")
    at.type_into("Length", typed)
    assert at.case.member.segments[0].length == metres
    assert at.document.undo_stack.undoText().startswith("Set length of Pile to ")


@pytest.mark.parametrize(("typed", "kilograms"), [("5", 5e3), ("4800 kg", 4800.0), ("10 kip", 4535.9237)])
def test_a_ram_is_told_in_tonnes_kilograms_or_kips(desk, typed: str, kilograms: float) -> None:
    """1 kip of weight is 1000 lb of mass, 453.59237 kg (exact)."""
    at = desk(driven_pile())
    at.type_into("Ram mass", typed)
    assert at.case.load.ram_mass == pytest.approx(kilograms, rel=1e-12)


def test_the_menu_of_a_row_offers_what_can_be_done(desk) -> None:
    at = desk(driven_pile())
    at.select("ground/layers/0")
    menu = at.outline.doing.menu(at.outline.selected, at.outline)
    words = {action.text().split("\t")[0]: action.isEnabled() for action in menu.actions()}
    assert words == {
        "Add another": True,
        "Duplicate": True,
        "Split in two": True,
        "Move up": False,
        "Move down": True,
        "Remove": True,
    }
    next(a for a in menu.actions() if a.text().startswith("Move down")).trigger()
    assert [layer.name for layer in at.case.ground.layers] == ["Dense sand", "Soft clay"]
    assert at.sight.selection == "ground/layers/1"


def test_typing_is_followed_live_and_is_one_step_of_undo(desk, qtbot) -> None:
    at = desk(driven_pile())
    row = at.type_into("Drop height", "1", enter=False)
    qtbot.keyClicks(row.edit, ".4")
    qtbot.waitUntil(lambda: at.case.load.drop_height == 1.4)
    assert row.edit.text() == "1.4"  # what is being typed stays as it is typed
    qtbot.keyClicks(row.edit, "5")
    qtbot.waitUntil(lambda: at.case.load.drop_height == 1.45)
    qtbot.keyClick(row.edit, Qt.Key.Key_Return)
    assert row.edit.text() == "1.45"
    assert at.document.undo_stack.count() == 1
    at.document.undo_stack.undo()
    assert at.case.load.drop_height == 1.0
    assert row.edit.text() == "1.00"


def test_a_text_that_is_no_number_says_so_and_blocks_no_other_field(desk) -> None:
    at = desk(driven_pile())
    row = at.type_into("Drop height", "high")
    assert "no number" in problem_of(row)
    assert row.edit.text() == "high"
    assert at.case.load.drop_height == 1.0
    at.type_into("Ram mass", "6")
    assert at.case.load.ram_mass == 6000.0
    assert "no number" in problem_of(row)
    at.type_into("Drop height", "1.5")
    assert problem_of(row) == ""
    assert not at.document.rejected


def test_a_bound_of_the_model_is_told_in_the_shown_unit(desk) -> None:
    at = desk(driven_pile())
    row = at.type_into("Efficiency", "1.2")
    assert problem_of(row) == "✕ Must be at most 1."
    row = at.type_into("Ram mass", "0")
    assert problem_of(row) == "✕ Must be more than 0 t."


def test_a_segment_too_short_for_the_ground_says_so_and_what_helps(desk) -> None:
    at = desk(driven_pile())
    at.select("member/segments/0")
    row = at.type_into("Length", "3")
    assert "the ground surface at 4.00 m lies below the member's end at 3.00 m" in problem_of(row)
    assert "smaller distance first" in problem_of(row)
    assert at.case.member.length == 20.0
    at.select("run")
    assert "not valid" in at.button("Pile").accessibleName()


def test_a_share_typed_in_hundredths_is_told_how_to_be_written(desk) -> None:
    at = desk(driven_pile())
    assert (
        problem_of(at.type_into("Efficiency", "80"))
        == "✕ Must be at most 1. 80 of a hundred is 0.8 or '80 %'."
    )


def test_the_last_segment_says_why_it_stays(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.select("member/segments/0")
    assert "keeps at least one segment" in at.outline.doing.buttons["remove"].toolTip()
    with qtbot.waitSignal(at.document.refused) as told:
        qtbot.keyClick(at.button("Pile"), Qt.Key.Key_Delete)
    assert told.args == ["Not done: remove Pile. A rod keeps at least one segment: add another one first."]


def test_escape_gives_the_project_s_number_back(desk, qtbot) -> None:
    at = desk(driven_pile())
    row = at.type_into("Drop height", "x")
    qtbot.keyClick(row.edit, Qt.Key.Key_Escape)
    assert row.edit.text() == "1.00"
    assert not at.document.rejected
    qtbot.keyClick(row.edit, Qt.Key.Key_Escape)
    assert at.outline.focusWidget() is at.button("Ram")


def test_keys_walk_the_rows_and_enter_the_form(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.button("Ram").setFocus()
    for _ in range(4):
        qtbot.keyClick(at.outline.focusWidget(), Qt.Key.Key_Down)
    assert at.sight.selection == "member/segments/0"
    qtbot.keyClick(at.outline.focusWidget(), Qt.Key.Key_Return)
    assert at.outline.focusWidget() is at.row("Name", TextRow).edit
    qtbot.keyClick(at.outline.focusWidget(), Qt.Key.Key_Tab)
    assert at.outline.focusWidget() is at.row("Length", NumberRow).edit


def test_the_keys_stay_with_the_selection_when_it_is_made_elsewhere(desk) -> None:
    at = desk(driven_pile())
    at.button("Ram").setFocus()
    at.select("gauges/1")
    assert at.outline.focusWidget() is at.button("Gauge 2")


def test_a_gauge_is_added_moved_and_removed(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.select("gauges")
    qtbot.mouseClick(at.outline.doing.add_button, Qt.MouseButton.LeftButton)
    assert at.sight.selection == "gauges/3"
    at.type_into("Position", "5")
    assert plain(at.document.undo_stack.undoText()) == "Move Gauge 4 to 5.00 m"
    qtbot.keyClick(at.button("Gauge 4"), Qt.Key.Key_Delete)
    assert [g.name for g in at.case.gauges] == ["Gauge 1", "Gauge 2", "Gauge 3"]
    assert at.document.undo_stack.undoText() == "Remove Gauge 4"


def test_a_segment_is_split_by_its_button(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.select("member/segments/0")
    qtbot.mouseClick(at.outline.doing.buttons["split"], Qt.MouseButton.LeftButton)
    assert [s.length for s in at.case.member.segments] == [10.0, 10.0]
    assert at.sight.selection == "member/segments/1"
    assert [b.row.name for b in at.outline.buttons[4:6]] == ["Pile", "Pile lower"]


def test_another_load_brings_its_form_and_undo_brings_the_ram_back(desk) -> None:
    at = desk(driven_pile())
    at.choose("Load", "Pulse")
    assert at.case.load.kind == "pulse"
    assert [r.spec.label for r in at.outline.form.rows][:4] == ["Load", "Quantity", "Shape", "Peak"]
    at.document.undo_stack.undo()
    assert at.row("Drop height", NumberRow).edit.text() == "1.00"


def test_a_choice_that_is_refused_says_why_and_leaves_nothing_behind(desk) -> None:
    at = desk(driven_pile())
    at.select("load/cushion")
    row = at.choose("Given by", "no cushion")
    assert "rigid ram straight on a rigid cap" in problem_of(row)
    assert row.box.currentText() == "dimensions"
    assert not at.document.rejected


def test_a_switch_is_one_step_with_a_name(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.select("run")
    qtbot.mouseClick(at.row("Gravity", CheckRow).box, Qt.MouseButton.LeftButton)
    assert at.case.run.gravity is False
    assert at.document.undo_stack.undoText() == "Set gravity of the run to off"


def test_an_empty_field_means_what_it_says(desk) -> None:
    at = desk(driven_pile())
    at.select("run")
    assert at.row("Duration", NumberRow).edit.placeholderText() == "until at rest"
    at.type_into("Duration", "40")
    assert at.case.run.duration == pytest.approx(0.04)
    row = at.row("Duration", NumberRow)
    row.edit.clear()
    row.edit.setModified(True)
    row.edit.editingFinished.emit()
    assert at.case.run.duration is None


def test_a_typical_value_is_confirmed_or_edited_away(desk) -> None:
    at = desk(driven_pile())
    at.select("ground/layers/0")
    quake, damping = at.row("Quake", NumberRow), at.row("Damping factor", NumberRow)
    assert not quake._mark.isHidden()
    quake._mark.confirm.click()
    assert at.document.project.provenance["/cases/0/ground/layers/0/quake"].state == "confirmed"
    assert quake._mark.isHidden()
    at.type_into("Damping factor", "0.3")
    assert "/cases/0/ground/layers/0/damping" not in at.document.project.provenance
    assert damping._mark.isHidden()


@pytest.mark.qt_log_ignore("This plugin does not support")  # popups on a screen that is not there
def test_the_library_is_searched_and_its_material_taken(desk, qtbot) -> None:
    at = desk(driven_pile())
    at.select("member/segments/0")
    at.row("Material", ChoiceRow)._pick()
    picker = at.outline.findChild(PartPicker)
    qtbot.keyClicks(picker.search, "alumin 7075")
    assert picker.list.count() == 1
    qtbot.keyClick(picker.search, Qt.Key.Key_Return)
    assert at.case.member.segments[0].material == "aluminium 7075-T6"
    assert at.document.undo_stack.undoText() == "Take aluminium 7075-T6 from the parts library"
    assert at.row("Material", ChoiceRow).box.currentText() == "aluminium 7075-T6"


def test_a_material_is_told_by_its_wave_speed(desk) -> None:
    at = desk(driven_pile())
    at.select("/materials/0")
    at.choose("Given by", "speed, density")
    assert at.document.undo_stack.count() == 0
    at.type_into("Wave speed", "5100")
    assert at.document.project.materials[0].wave_speed == pytest.approx(5100.0)
    assert "/materials/0/young_modulus" not in at.document.project.provenance


def test_points_of_a_history_are_pasted(desk, qtbot) -> None:
    from PySide6.QtGui import QGuiApplication

    tree = slender_rod_by_echo()
    tree["cases"][0]["load"] = {
        "kind": "history",
        "quantity": "force",
        "times": [0.0, 1.0],
        "values": [0.0, 0.0],
    }
    at = desk(tree)
    QGuiApplication.clipboard().setText("time\tforce\n0\t0\n0.001\t5e4\n0,002\t0\n")
    qtbot.mouseClick(at.row("Points", PointsRow).paste, Qt.MouseButton.LeftButton)
    assert list(at.case.load.samples.values) == [0.0, 5e4, 0.0]
    QGuiApplication.clipboard().setText("0\t0\nx\t1\n")
    qtbot.mouseClick(at.row("Points", PointsRow).paste, Qt.MouseButton.LeftButton)
    assert "Line 2 needs two numbers" in problem_of(at.row("Points", PointsRow))
    assert len(at.case.load.samples.times) == 3


def test_units_of_the_project_change_every_field(desk) -> None:
    at = desk(driven_pile())
    at.document.edit("Show US units", "/display_units", "us")
    assert at.row("Drop height", NumberRow).edit.text() == "3.281"
    at.type_into("Drop height", "4")
    assert at.case.load.drop_height == pytest.approx(4 * 0.3048)


def test_damping_of_the_other_unit_system_is_cautioned(desk) -> None:
    at = desk(driven_pile())
    at.select("ground/layers/0")
    at.type_into("Damping factor", "0.05")
    assert at.outline.form.cautions.text().startswith("!")


@pytest.mark.parametrize("name", ["Driven pile", "Rod or bar", "Slender rod read by its echo"])
def test_every_field_has_a_name_for_those_who_hear_the_screen(desk, name: str) -> None:
    at = desk(new_tree(name))
    for pointer in [button.row.pointer for button in at.outline.buttons]:
        at.select(pointer)
        for row in at.outline.form.rows:
            assert row.stops
            for stop in (one for one in row.stops if one.isVisible()):
                assert stop.accessibleName() or stop.text()


def test_every_place_that_other_pictures_select_has_a_row(desk) -> None:
    at = desk(driven_pile())
    for pointer in ("ground/toe", "ground/layers", "member", "load/ram", "gauges/2", "ground/layers/1"):
        at.select(pointer)
        selected = at.outline.selected
        assert selected is not None
        assert value_at(at.document.tree, f"/cases/0/{selected.pointer}") is not None


def test_a_short_figure_stays_whole_beside_a_long_name(qtbot) -> None:
    """ "4141 m/s" is not cut to "4141 …"; a long list of names gives way to the name of its row."""
    metrics = QFontMetrics(font())
    room = metrics.horizontalAdvance("concrete 50 MPa, dynamic modulus")
    name, figure = texts_in(room, "concrete 50 MPa, dynamic modulus", "4141 m/s", metrics, metrics)
    assert figure == "4141 m/s"
    assert name.startswith("concrete 50")
    assert name.endswith("…")
    name, figure = texts_in(room, "Materials", "steel, concrete 50 MPa, dynamic modulus", metrics, metrics)
    assert name == "Materials"
    assert figure.startswith("steel, c")
    assert figure.endswith("…")


def test_numbers_can_be_read_in_large_type(desk, qapp) -> None:
    """At 18 points, in an outline as wide as the window makes it, each number of the ram's form is seen whole."""
    before = QFont(QApplication.font())
    large = QFont(before)
    large.setPointSizeF(18)
    QApplication.setFont(large)
    try:
        the = desk(driven_pile())
        the.window.resize(342, 800)
        the.outline.setGeometry(the.window.rect())
        rows = [row for row in the.outline.findChildren(NumberRow) if row.isVisible()]
        assert len(rows) >= 3
        for row in rows:
            needed = QFontMetrics(row.edit.font()).horizontalAdvance(row.edit.text())
            assert row.edit.width() >= needed + 16, row.spec.label
            assert row.edit.geometry().right() < row.width()
    finally:
        QApplication.setFont(before)
