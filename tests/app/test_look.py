"""The look: contrast after WCAG 2.1, colours that stay apart for colour-blind eyes, icons that draw something."""

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QLineEdit,
    QListWidget,
    QListWidgetItem,
    QPushButton,
    QSpinBox,
    QVBoxLayout,
    QWidget,
)

from app.look import DARK, LIGHT, apply_look, icon, motion_map, stress_map
from app.look.icons import SHAPES
from app.look.palette import CHOICE, palette
from app.look.stylesheet import stylesheet


@pytest.fixture(params=["light", "dark"])
def look(request, qapp):
    """The program's look, put back as it was."""
    before, sheet, colours = qapp.property(CHOICE), qapp.styleSheet(), qapp.palette()
    apply_look(qapp, request.param)
    yield
    qapp.setProperty(CHOICE, before)
    qapp.setPalette(colours)
    qapp.setStyleSheet(sheet)


PALETTES = pytest.mark.parametrize("colours", [LIGHT, DARK], ids=["light", "dark"])

# Machado, Oliveira and Fernandes 2009, "A physiologically-based model for simulation of color vision deficiency",
# severity 1.0; acts on linear RGB (matrices from memory: each row sums to 1, so grey stays grey).
DEFICIENCIES = {
    "protanopia": [
        [0.152286, 1.052583, -0.204868],
        [0.114503, 0.786281, 0.099216],
        [-0.003882, -0.048116, 1.051998],
    ],
    "deuteranopia": [
        [0.367322, 0.860646, -0.227968],
        [0.280085, 0.672501, 0.047413],
        [-0.011820, 0.042940, 0.968881],
    ],
    "tritanopia": [
        [1.255528, -0.076749, -0.178779],
        [-0.078411, 0.930809, 0.147602],
        [0.004733, 0.691367, 0.303900],
    ],
}


def linear(colour):
    """Linear RGB of "#rrggbb", 0 to 1 (IEC 61966-2-1)."""
    v = np.array([int(colour[i : i + 2], 16) for i in (1, 3, 5)]) / 255
    return np.where(v <= 0.04045, v / 12.92, ((v + 0.055) / 1.055) ** 2.4)


def luminance(colour):
    return float(linear(colour) @ [0.2126, 0.7152, 0.0722])


def contrast(a, b):
    """WCAG 2.1: (lighter + 0.05) / (darker + 0.05)."""
    darker, lighter = sorted((luminance(a), luminance(b)))
    return (lighter + 0.05) / (darker + 0.05)


def lab(rgb):
    """CIE L*a*b* (D65) of linear RGB."""
    xyz = np.array([[0.4124, 0.3576, 0.1805], [0.2126, 0.7152, 0.0722], [0.0193, 0.1192, 0.9505]]) @ np.clip(
        rgb, 0, 1
    )
    t = xyz / np.array([0.9505, 1.0, 1.089])
    f = np.where(t > (6 / 29) ** 3, np.cbrt(t), t / (3 * (6 / 29) ** 2) + 4 / 29)
    return np.array([116 * f[1] - 16, 500 * (f[0] - f[1]), 200 * (f[1] - f[2])])


@PALETTES
def test_text_has_a_contrast_of_at_least_4_5(colours):
    grounds = (colours.window, colours.paper, colours.raised, colours.accent_soft)
    for text in (colours.ink, colours.soft_ink, colours.over, colours.accent):
        for ground in grounds:
            assert contrast(text, ground) >= 4.5, (text, ground)
    for text in (colours.compression, colours.tension, *colours.gauges):  # names on curves
        assert contrast(text, colours.paper) >= 4.5, text
    for ground in colours.ground:  # names of layers
        assert contrast(colours.soft_ink, ground) >= 4.5, ground
        assert contrast(colours.ink, ground) >= 4.5, ground
    assert contrast(colours.on_accent, colours.accent) >= 4.5
    assert contrast(colours.on_chosen, colours.chosen) >= 4.5


@PALETTES
def test_marks_have_a_contrast_of_at_least_3(colours):
    marks = (colours.line, colours.accent, colours.forward, colours.backward, *colours.bars, colours.cushion)
    for mark in marks:
        assert contrast(mark, colours.paper) >= 3, mark
    for mark in (*colours.gauges, colours.ground_line):
        for ground in colours.ground:
            assert contrast(mark, ground) >= 3, (mark, ground)
    assert contrast(colours.line, colours.window) >= 3


@PALETTES
@pytest.mark.parametrize("deficiency", DEFICIENCIES)
def test_compression_tension_and_the_first_gauges_stay_apart_for_colour_blind_eyes(colours, deficiency):
    seen = {
        name: lab(np.array(DEFICIENCIES[deficiency]) @ linear(colour))
        for name, colour in {
            "compression": colours.compression,
            "tension": colours.tension,
            "gauge 1": colours.gauges[0],
            "gauge 2": colours.gauges[1],
        }.items()
    }
    # A CIE76 difference of 10 is seen at a glance (2.3 is just noticeable, Mahy 1994); the pair with meaning gets 40.
    assert np.linalg.norm(seen["compression"] - seen["tension"]) > 40
    assert np.linalg.norm(seen["gauge 1"] - seen["gauge 2"]) > 25


@PALETTES
@pytest.mark.parametrize("make", [stress_map, motion_map])
def test_the_maps_have_zero_at_the_paper_and_grow_evenly_to_both_ends(colours, make):
    table = make(colours)
    middle = len(table) // 2
    assert "#{:02x}{:02x}{:02x}".format(*table[middle]) == colours.paper
    light = np.array([luminance("#{:02x}{:02x}{:02x}".format(*entry)) for entry in table])
    away = -1 if not colours.dark else 1  # darker than light paper, lighter than dark paper
    rounding = 0.004  # one step of 8 bits
    assert (np.diff(away * light[middle:]) >= -rounding).all()
    assert (np.diff(away * light[middle::-1]) >= -rounding).all()


def test_compression_is_the_blue_end_and_tension_the_orange_one():
    table = stress_map(LIGHT).astype(int)
    assert table[100][2] > table[100][0] + 50  # more blue than red
    assert table[410][0] > table[410][2] + 50


def test_every_icon_draws_something(qapp):
    for name in SHAPES:
        image = icon(name, "#000000").pixmap(32, 32).toImage()
        dark = sum(image.pixelColor(x, y).alpha() > 0 for x in range(32) for y in range(32))
        assert dark > 15, name


@PALETTES
def test_the_stylesheet_leaves_no_gap(colours):
    assert "{" not in stylesheet(colours, 9.0).replace("{ ", "").replace("{\n", "").replace(" {", "")


def test_boxes_to_tick_are_seen_and_number_boxes_show_their_number(qtbot, look):
    """A box to tick has an edge of 3:1 on what it stands on (WCAG 2.1, 1.4.11), in lists too; a number box gives its
    whole width to the number."""
    ground, ticks, number = QWidget(), QListWidget(), QSpinBox()
    qtbot.addWidget(ground)
    number.setButtonSymbols(QSpinBox.ButtonSymbols.NoButtons)
    item = QListWidgetItem("Force", ticks)
    item.setCheckState(Qt.CheckState.Unchecked)
    column = QVBoxLayout(ground)
    column.addWidget(ticks)
    column.addWidget(number)
    ground.resize(300, 200)
    ground.grab()  # lays out what is not on the screen
    row = ticks.visualItemRect(item)
    line = ticks.viewport().grab().toImage()
    seen = {line.pixelColor(x, row.center().y()).name() for x in range(row.left() + 24)}
    assert max(contrast(colour, palette().paper) for colour in seen) >= 3
    assert number.lineEdit().width() > 0.8 * number.width()


def test_pale_text_is_read_and_a_main_button_shows_that_it_cannot_be_pressed(qtbot, look):
    """What the program takes where a field is empty is text (4.5:1). A button that is off has no accent on it."""
    field, button = QLineEdit(), QPushButton("Save")
    for widget in (field, button):
        qtbot.addWidget(widget)
    field.setPlaceholderText("███")
    button.setProperty("role", "main")
    button.setEnabled(False)
    assert max(contrast(colour, palette().raised) for colour in colours_of(field)) >= 4.5
    assert palette().accent not in colours_of(button)
    button.setEnabled(True)
    assert palette().accent in colours_of(button)


def colours_of(widget):
    """Colours of the pixels through the middle of what is drawn."""
    image = widget.grab().toImage()
    return {image.pixelColor(x, image.height() // 2).name() for x in range(image.width())}
