"""Driving stress limits against a table worked out by hand in ksi.

AASHTO LRFD 10.7.8 as remembered (to be confirmed against the code). The table has seven digits, hence 1e-6.
"""

import pytest

from solver.model.limits import (
    KSI,
    prestressed_concrete_limits,
    reinforced_concrete_limits,
    steel_limits,
    timber_limits,
)

#: f'c, f_pe, compression, tension, tension in a severe corrosive environment, all in ksi.
PRESTRESSED = [
    (5, 0.7, 3.55, 0.9124265, 0.7),
    (6, 0.8, 4.3, 1.032702, 0.8),
    (7, 1.0, 4.95, 1.251346, 1.0),
    (8, 1.2, 5.6, 1.468701, 1.2),
]


@pytest.mark.parametrize(("strength", "prestress", "compression", "tension", "severe"), PRESTRESSED)
def test_prestressed_concrete(strength, prestress, compression, tension, severe):
    found = prestressed_concrete_limits(strength * KSI, prestress * KSI)
    assert found.compression.value / KSI == pytest.approx(compression, rel=1e-6)
    assert found.tension.value / KSI == pytest.approx(tension, rel=1e-6)
    corroding = prestressed_concrete_limits(strength * KSI, prestress * KSI, severe=True)
    assert corroding.tension.value / KSI == pytest.approx(severe, rel=1e-9)


def test_the_two_unit_systems_agree_on_the_root():
    """0.095 with ksi is 0.24944976 with MPa: sqrt(6.894757) times as much."""
    found = prestressed_concrete_limits(40e6, 1e-3)
    assert found.tension.value == pytest.approx(0.24944976e6 * 40**0.5, rel=1e-6)


@pytest.mark.parametrize(("ksi", "limit_mpa"), [(36, 223.3901), (45, 279.2377), (50, 310.2641)])
def test_steel(ksi, limit_mpa):
    found = steel_limits(ksi * KSI)
    assert found.compression.value == pytest.approx(limit_mpa * 1e6, rel=1e-6)
    assert found.tension.value == found.compression.value


def test_reinforced_concrete_and_timber():
    found = reinforced_concrete_limits(30e6, 420e6, 0.02)
    assert found.compression.value == pytest.approx(25.5e6)
    assert found.tension.value == pytest.approx(0.7 * 420e6 * 0.02)
    assert timber_limits(20e6).compression.value == pytest.approx(23e6)


def test_each_limit_says_its_formula_its_numbers_and_that_it_is_to_be_confirmed():
    held = steel_limits(355e6).compression.limit("as in the tender")
    assert held.basis == "0.9 φ f_y, φ = 1, f_y = 355 MPa"
    assert "10.7.8" in held.source
    assert "to be confirmed against the governing code" in held.source
    assert held.reason == "as in the tender"


@pytest.mark.parametrize("make", [lambda: steel_limits(0), lambda: prestressed_concrete_limits(5e6, 6e6)])
def test_what_cannot_be_is_refused(make):
    with pytest.raises(ValueError, match="must be"):
        make()
