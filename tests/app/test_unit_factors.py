"""The factors kept for speed are those of Pint."""

from decimal import Decimal

import pytest

from app.unit_factors import known_factor
from app.unit_text import KNOWN_UNITS, SI_UNITS, _pint_text, _registry, factor_of

OFFERED = [(unit, dimension) for dimension, units in KNOWN_UNITS.items() for unit in units]


@pytest.mark.parametrize(("unit", "dimension"), OFFERED)
def test_an_offered_unit_has_pints_factor(unit, dimension):
    quantity = _registry().Quantity(Decimal(1), _pint_text(unit, dimension))
    pints = quantity.to(_pint_text(SI_UNITS[dimension], dimension) or "").magnitude
    # decimals of 28 digits, of which a quotient may lose the last
    assert abs(known_factor(unit, dimension) / Decimal(pints) - 1) < Decimal("1e-26")
    assert float(factor_of(unit, dimension)) == float(pints)


def test_offered_units_need_no_pint():
    import subprocess
    import sys

    code = (
        "import sys; from app.unit_text import factor_of, KNOWN_UNITS;"
        "[factor_of(u, d) for d, us in KNOWN_UNITS.items() for u in us]; sys.exit('pint' in sys.modules)"
    )
    assert subprocess.run([sys.executable, "-c", code]).returncode == 0
