"""Units on the screen: what is shown, and what is understood when it is typed."""

from math import isclose

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.starting_points import driven_pile
from app.units import KNOWN_UNITS, METRIC, SYSTEMS, US, UnitError, Units, rounded, units_of, unknown_units
from solver import project_from_tree
from solver.model.quantity import SI_UNITS

METRIC_UNITS, US_UNITS = Units(), Units("us")

# Exact by definition (international foot, pound and standard gravity; NIST SP 811, appendix B.8):
# 1 ft = 0.3048 m, 1 lb = 0.45359237 kg, 1 lbf = 0.45359237 * 9.80665 N.
FOOT, POUND = 0.3048, 0.45359237
LBF = POUND * 9.80665


@pytest.mark.parametrize(
    ("text", "dimension", "si"),
    [
        ("40 ft", "length", 12.192),
        ("250 kN", "force", 250e3),
        ("250", "force", 250e3),  # in the unit shown, kN
        ("1,5", "force", 1500),
        ("2e3", "force", 2e6),
        ("1 755", "force", 1.755e6),
        ("1\u202f755", "force", 1.755e6),
        ("1,755.5", "force", 1.7555e6),
        ("1.755,5", "force", 1.7555e6),
        ("-3.5 kn", "force", -3500),
        ("−3.5", "force", -3500),
        ("610", "small_length", 0.61),
        ("24 in", "small_length", 0.6096),
        ("5'6\"", "length", 5.5 * FOOT),
        ("5 ft 6 in", "length", 5.5 * FOOT),
        ("3 t", "mass", 3000),
        ("5 kips", "mass", 5000 * POUND),
        ("5 kip-mass", "mass", 5000 * POUND),
        ("5 lb-mass", "mass", 5 * POUND),
        ("5 lbm", "mass", 5 * POUND),
        ("80 kips", "force", 80e3 * LBF),
        ("80 lb", "force", 80 * LBF),
        ("80 lb", "mass", 80 * POUND),
        ("20 ft-kips", "energy", 20e3 * FOOT * LBF),
        ("3 mm2", "area", 3e-6),
        ("12 in²", "area", 12 * (FOOT / 12) ** 2),
        ("100 µε", "strain", 1e-4),
        ("100 με", "strain", 1e-4),  # the Greek letter in place of the micro sign
        ("0.15 s/ft", "smith_damping", 0.15 / FOOT),
        ("36 psi", "stress", 36 * LBF / (FOOT / 12) ** 2),
        ("2 ksf", "unit_resistance", 2000 * LBF / FOOT**2),
        ("150 lb/ft³", "density", 150 * POUND / FOOT**3),
        ("12 kN·s/m", "impedance", 12e3),
        ("0.05 kip s/ft", "impedance", 50 * LBF / FOOT),
        ("200 µs", "time", 2e-4),
        ("3 g", "acceleration", 3 * 9.80665),
        ("90 %", "none", 0.9),
        (".5", "none", 0.5),
        ("1.2 GN/m", "stiffness", 1.2e9),
        ("1600", "stiffness", 1.6e9),
    ],
)
def test_what_engineers_type_is_understood(text, dimension, si):
    assert isclose(METRIC_UNITS.parse(text, dimension), si, rel_tol=1e-12)


@pytest.mark.parametrize(
    ("text", "dimension", "says"),
    [
        ("", "force", "number is needed"),
        ("abc", "force", "'abc' is no number"),
        ("nan", "force", "no number"),
        ("1e999", "force", "too large"),
        ("3 m", "force", "'m' is not a unit that fits here: possible are kN"),
        ("3 kN kN", "force", "not a unit"),
        ("5 kN 3", "force", "not a unit"),
        ("1,755", "force", "write 1755 or 1.755"),
        ("3 m**9999999", "length", "not a unit"),
        ("3 __import__", "length", "not a unit"),
        ("3..4", "length", "no number"),
        ("--3", "length", "no number"),
        ("1/x", "length", "not a unit"),
        ("3 kg", "none", "it is a pure number"),
        ("9" * 500, "length", "too long"),
    ],
)
def test_what_is_not_understood_gets_a_sentence(text, dimension, says):
    with pytest.raises(UnitError, match=r"\.$") as caught:
        METRIC_UNITS.parse(text, dimension)
    assert says in str(caught.value)


@pytest.mark.parametrize("system", SYSTEMS)
@pytest.mark.parametrize("dimension", SI_UNITS)
def test_every_unit_that_is_shown_or_offered_can_be_typed(system, dimension):
    for unit in (*SYSTEMS[system][dimension], *KNOWN_UNITS[dimension]):
        assert Units(system).parse(f"1 {unit}", dimension) > 0
    assert METRIC.keys() == US.keys() == KNOWN_UNITS.keys() == SI_UNITS.keys()


@given(
    value=st.floats(1e-9, 1e12) | st.floats(-1e12, -1e-9),
    dimension=st.sampled_from(sorted(SI_UNITS)),
    system=st.sampled_from(sorted(SYSTEMS)),
)
def test_the_text_of_a_field_reads_back(value, dimension, system):
    """Four digits are written of what nobody has typed: the error is at most half of the fourth, 5e-4 of the value."""
    units = Units(system)
    assert isclose(units.parse(units.text(value, dimension), dimension), value, rel_tol=5.1e-4)


@given(
    digits=st.integers(1, 10**7 - 1),
    power=st.integers(-5, 3),
    dimension=st.sampled_from(sorted(SI_UNITS)),
    system=st.sampled_from(sorted(SYSTEMS)),
)
def test_what_was_typed_with_up_to_seven_digits_is_shown_with_all_of_them(digits, power, dimension, system):
    units = Units(system)
    value = units.parse(f"{digits}e{power}", dimension)
    assert isclose(units.parse(units.text(value, dimension), dimension), value, rel_tol=1e-12)


@pytest.mark.parametrize(
    ("text", "inches"),
    [
        ("3/4", 0.75),
        ('3/4"', 0.75),
        ("1 1/2", 1.5),
        ("1-1/2 in", 1.5),
        ("5 ft 6 1/2 in", 66.5),
        ("-1/2", -0.5),
    ],
)
def test_fractions_of_an_inch_are_understood(text, inches):
    assert Units("us").parse(text, "small_length") == pytest.approx(inches * 0.0254, rel=1e-15)


def test_what_comes_from_another_unit_is_shown_with_four_digits():
    assert Units("us").text(5.0, "length") == "16.4"  # 16.4042 ft
    assert Units("us").text(12.3456, "length") == "40.5"
    assert METRIC_UNITS.text(METRIC_UNITS.parse("45 ksi", "modulus"), "modulus", 310e6) == "310.3"
    assert METRIC_UNITS.unit("modulus", 310e6) == "MPa"
    assert METRIC_UNITS.text(12.34567, "length") == "12.34567"
    assert METRIC_UNITS.text(METRIC_UNITS.parse("5 lb", "mass"), "mass", 2.3) == "2.268"


@given(value=st.floats(-1e15, 1e15), dimension=st.sampled_from(sorted(SI_UNITS)))
def test_what_is_shown_reads_back_to_its_digits(value, dimension):
    """Three digits are shown, half of the third is 0.5 %; less than 1e-9 of the usual unit is shown as 0."""
    shown = METRIC_UNITS.show(value, dimension)
    back = METRIC_UNITS.parse(shown, dimension)
    noise = 1e-9 * METRIC_UNITS.parse(f"1 {METRIC_UNITS.unit(dimension)}", dimension)
    assert isclose(back, value, rel_tol=5.1e-3, abs_tol=noise)


@given(text=st.text(max_size=30))
def test_no_text_raises_anything_but_a_sentence(text):
    for dimension in ("length", "mass", "none"):
        sentence = "."
        try:
            METRIC_UNITS.parse(text, dimension)
        except UnitError as error:
            sentence = str(error)
        assert sentence.endswith(".")


@pytest.mark.parametrize(
    ("value", "dimension", "metric", "us"),
    [
        (16.0, "length", "16.0 m", "52.5 ft"),
        (0.0127, "small_length", "12.7 mm", "0.500 in"),
        (4000.0, "mass", "4.00 t", "8.82 kip"),
        (50.0, "mass", "50.0 kg", "0.110 kip"),
        (1.755e6, "force", "1755 kN", "395 kip"),
        (163e6, "stress", "163 MPa", "23.6 ksi"),
        (2.1e11, "modulus", "210 GPa", "30\u202f458 ksi"),
        (7.2e-3, "time", "7.20 ms", "7.20 ms"),
        (25e-6, "time", "25.0 µs", "25.0 µs"),
        (41.4e3, "energy", "41.4 kJ", "30.5 ft·kip"),
        (1.6e9, "stiffness", "1600 kN/mm", "9136 kip/in"),
        (0.16, "smith_damping", "0.160 s/m", "0.0488 s/ft"),
        (0.88, "none", "0.88", "0.88"),
        (0.0, "force", "0 kN", "0 kip"),
        (1e-9, "force", "0 kN", "0 kip"),
        (-1.755e6, "force", "\u22121755 kN", "\u2212395 kip"),
        (float("nan"), "force", "–", "–"),
    ],
)
def test_unit_and_digits_follow_the_size(value, dimension, metric, us):
    assert METRIC_UNITS.show(value, dimension).replace("\u00a0", " ") == metric
    assert US_UNITS.show(value, dimension).replace("\u00a0", " ") == us


def test_a_project_says_its_units_and_its_sign():
    tree = driven_pile() | {"display_units": {"system": "us", "force": "MN", "mass": "parsec"}}
    project = project_from_tree(tree | {"display_sign": "compression"})
    units = units_of(project)
    assert (units.unit("force"), units.unit("length"), units.unit("mass")) == ("MN", "ft", "kip")
    assert (units.sign, units.sign_word) == (-1, "Compression +")
    assert unknown_units(project) == ("'parsec' is not a unit of mass; the usual one is shown.",)


def test_numbers_for_reading():
    assert rounded(999.96) == "1000"
    assert rounded(12345678.0) == "12\u202f345\u202f678"
    assert rounded(-0.0) == "0"
