"""SI values of the units that are offered, from their definitions: Pint, which knows all others, takes half a second
to load, and most starts need none of it. A test holds every one of them against Pint."""

from __future__ import annotations

import re
from decimal import Decimal

#: International foot and pound (1959), standard gravity (1901): exact by definition.
FOOT, POUND, GRAVITY = Decimal("0.3048"), Decimal("0.45359237"), Decimal("9.80665")
INCH = FOOT / 12

_METRIC: dict[str, int | str] = {
    "m": 1, "mm": "1e-3", "cm": "1e-2", "km": "1e3", "µm": "1e-6",
    "t": "1e3", "kg": 1, "s": 1, "ms": "1e-3", "µs": "1e-6", "h": 3600,
    "N": 1, "kN": "1e3", "MN": "1e6", "GN": "1e9",
    "Pa": 1, "kPa": "1e3", "MPa": "1e6", "GPa": "1e9", "bar": "1e5",
    "J": 1, "kJ": "1e3", "MJ": "1e6", "%": "1e-2", "‰": "1e-3", "µε": "1e-6",
}  # fmt: skip
_SYMBOLS = {symbol: Decimal(value) for symbol, value in _METRIC.items()} | {
    "ft": FOOT,
    "in": INCH,
    "yd": 3 * FOOT,
    "lb": POUND,
    "ton": 2000 * POUND,
    "kgf": GRAVITY,
    "tf": 1000 * GRAVITY,
    "lbf": POUND * GRAVITY,
    "kip": 1000 * POUND * GRAVITY,
    "psi": POUND * GRAVITY / INCH**2,
    "ksi": 1000 * POUND * GRAVITY / INCH**2,
    "psf": POUND * GRAVITY / FOOT**2,
    "ksf": 1000 * POUND * GRAVITY / FOOT**2,
    "tsf": 2000 * POUND * GRAVITY / FOOT**2,
    "pcf": POUND / FOOT**3,
}
#: What a symbol means in one dimension only.
_OWN = {
    ("g", "mass"): Decimal("1e-3"),
    ("g", "density"): Decimal("1e-3"),
    ("g", "acceleration"): GRAVITY,
    ("kip", "mass"): 1000 * POUND,
}
_POWERS = {"": 1, "²": 2, "³": 3}


def known_factor(unit: str, dimension: str) -> Decimal:
    """SI value of one of a unit written as it is offered: symbols joined by "·", at most one "/". Raises `KeyError`."""
    above, _, below = unit.partition("/")
    value = _product(above, dimension)
    return value / _product(below, dimension) if below else value


def _product(text: str, dimension: str) -> Decimal:
    product = Decimal(1)
    for part in text.split("·"):
        symbol, power = re.fullmatch(r"(.*?)([²³]?)", part).groups()  # type: ignore[union-attr]
        product *= (_OWN.get((symbol, dimension)) or _SYMBOLS[symbol]) ** _POWERS[power]
    return product
