"""Units as people write them: from text to a pure factor, and from text to a number in SI.

Pint knows the units; what it does not know is how engineers write them ("lb" for a force, "mm2", "kip" for a ram's
weight, a decimal comma). Numbers are worked out in decimal, so that "40 ft" is 12.192 m and not 12.191999999999998.
"""

from __future__ import annotations

import re
from decimal import Decimal, InvalidOperation
from functools import cache, lru_cache
from math import isfinite
from typing import TYPE_CHECKING, Any

from app.unit_factors import known_factor
from solver.model.quantity import SI_UNITS

if TYPE_CHECKING:
    from pint import UnitRegistry


class UnitError(ValueError):
    """Text that is no number of the dimension asked for; its text is a sentence for the person who typed it."""


#: What units are offered and understood at sight, for each dimension, the metric ones first.
KNOWN_UNITS: dict[str, tuple[str, ...]] = {
    "length": ("m", "mm", "cm", "km", "ft", "in", "yd"),
    "small_length": ("mm", "cm", "m", "µm", "in", "ft"),
    "area": ("cm²", "mm²", "m²", "in²", "ft²"),
    "volume": ("m³", "cm³", "ft³", "in³"),
    "mass": ("t", "kg", "g", "kip", "lb", "ton"),
    "time": ("ms", "s", "µs"),
    "velocity": ("m/s", "mm/s", "km/h", "ft/s", "in/s"),
    "acceleration": ("m/s²", "g", "ft/s²"),
    "force": ("kN", "N", "MN", "tf", "kgf", "kip", "lbf"),
    "stress": ("MPa", "kPa", "Pa", "GPa", "N/mm²", "bar", "ksi", "psi"),
    "modulus": ("GPa", "MPa", "kPa", "N/mm²", "ksi", "psi"),
    "unit_resistance": ("kPa", "MPa", "Pa", "ksf", "psf", "tsf", "psi"),
    "strain": ("µε", "%", "‰"),
    "energy": ("kJ", "J", "MJ", "kN·m", "ft·kip", "ft·lbf"),
    "density": ("kg/m³", "t/m³", "g/cm³", "lb/ft³", "pcf"),
    "stiffness": ("kN/mm", "MN/m", "kN/m", "N/mm", "N/m", "GN/m", "kip/in", "lbf/in"),
    "impedance": ("kN·s/m", "N·s/m", "MN·s/m", "kip·s/ft", "lbf·s/ft"),
    "smith_damping": ("s/m", "s/ft"),
    "viscosity": ("kPa·s", "Pa·s", "MPa·s", "psi·s", "ksi·s"),
    "none": ("%",),
}

#: Words that Pint reads otherwise, or not at all. "lb" and "kip" are a force or a mass, as the dimension wants.
ALIASES = {
    "psf": "force_pound/ft**2",
    "ksf": "kip/ft**2",
    "tsf": "ton_force/ft**2",
    "pcf": "pound/ft**3",
    "g0": "g_0",
    "‰": "permille",
    "ε": "dimensionless",
    "µε": "microstrain",
    "ue": "microstrain",
    "kips": "kip",
    "lbs": "lb",
    "pounds": "lb",
    "lbm": "pound",
    "inches": "inch",
    "msec": "ms",
    '"': "inch",
    "″": "inch",
    "'": "ft",
    "′": "ft",
    "%": "percent",
}
MASSES = ("mass", "density")
POWERS = {"²": "**2", "³": "**3", "⁴": "**4"}
NUMBER = re.compile(r"[-+−]?(?:\d[\d\s',. \u202f\u2009]*|[.,]\d+)(?:[eE][-+−]?\d+)?")
#: "3/4", "1 1/2" and "1-1/2", as inches are written.
FRACTION = re.compile(r"([-+−]?)(?:(\d+)[\s\u00a0-]+)?(\d{1,4})/(\d{1,4})(?![\d.,])")
PLAIN_UNIT = re.compile(r"[A-Za-zµμε°%‰'\"′″_0-9/*·⋅^().\s²³⁴-]*")


def value_of(text: str, dimension: str, unit: str) -> float:
    """Number in SI of what was typed; `unit` is taken where the text has none.

    "12.5", "40 ft", "1,5", "2e3 kN", "5 ft 6 in" and "1 1/2 in" are understood. Raises `UnitError` with a sentence.
    """
    wanted = text.strip()
    if not wanted:
        raise UnitError("A number is needed here.")
    if len(wanted) > 120:
        raise UnitError("That is too long to be a number with its unit.")
    total, rest = Decimal(0), wanted
    sign = 1
    first = True
    while rest:
        fraction, found = FRACTION.match(rest), NUMBER.match(rest)
        if not found:
            raise UnitError(f"'{wanted}' is no number, or no number with its unit{_example(dimension)}.")
        digits, after = found.group().rstrip(), rest[found.end() :]
        digits, after = _feet_mark(digits, after)
        if fraction:
            after = rest[fraction.end() :]
        following = re.search(r"(?<=[A-Za-z'\"′″])\s*(?=\d)(?!\d*\s*(?:/(?!\d)|[*)]|$))", after)
        own, rest = (after[: following.start()], after[following.end() :]) if following else (after, "")
        if not first and not own.strip():
            raise UnitError(
                f"'{wanted}' has a second number without a unit: write each with its own, such as 5 ft 6 in."
            )
        number = _of_fraction(fraction, wanted) if fraction else _number(digits, wanted)
        if first and number.is_signed():
            sign, number = -1, abs(number)
        total += number * factor_of(own.strip() or unit, dimension)
        first = False
    value = float(sign * total)
    if not isfinite(value):
        raise UnitError(f"'{wanted}' is too large a number.")
    return value + 0.0


def _of_fraction(found: re.Match[str], wanted: str) -> Decimal:
    sign, whole, above, below = found.groups()
    if int(below) == 0:
        raise UnitError(f"'{wanted}' divides by 0.")
    size = Decimal(whole or 0) + Decimal(above) / Decimal(below)
    return -size if sign in ("-", "−") else size


def _feet_mark(digits: str, after: str) -> tuple[str, str]:
    """The mark of feet in 5'6" also separates thousands in some countries: three digits must follow then."""
    mark = re.search(r"'(?!\d{3}(?:\D|$))", digits)
    if mark:
        return digits[: mark.start()], digits[mark.start() :] + after
    return digits, after


@lru_cache(maxsize=4096)
def factor_of(unit: str, dimension: str) -> Decimal:
    """SI value of one of the unit. Raises `UnitError` for what is no unit of the dimension."""
    if unit == "":
        return Decimal(1)
    if unit in KNOWN_UNITS[dimension]:
        return known_factor(unit, dimension)
    candidates = [unit] + [k for k in KNOWN_UNITS[dimension] if k.casefold() == unit.casefold() and k != unit]
    for candidate in candidates:
        try:
            quantity = _registry().Quantity(Decimal(1), _pint_text(candidate, dimension))
            return Decimal(quantity.to(_pint_text(SI_UNITS[dimension], dimension) or "").magnitude)
        except UnitError:
            raise
        except (
            Exception
        ):  # Pint raises half a dozen kinds, tokenizer faults among them; all mean the same here
            continue
    known = KNOWN_UNITS[dimension]
    offer = (
        f"possible are {', '.join(known[:-1])} and {known[-1]}" if len(known) > 1 else "it is a pure number"
    )
    raise UnitError(f"'{unit}' is not a unit that fits here: {offer}.")


def _pint_text(unit: str, dimension: str) -> str:
    if not PLAIN_UNIT.fullmatch(unit) or re.search(r"\d\d|\*\*\s*[(.]", unit):
        raise UnitError(f"'{unit}' is not a unit.")
    if dimension in MASSES:
        unit = re.sub(r"(?<=[A-Za-z])[-_ ]mass\b", "", unit)  # Pint reads the word as milliarcseconds
    text = unit.strip().replace("μ", "µ").replace("^", "**").replace("⋅", "*").replace("·", "*")
    for sign, power in POWERS.items():
        text = text.replace(sign, power)
    text = re.sub(r"(?<=[A-Za-z])-(?=[A-Za-z])", "*", text)
    text = re.sub(r"(?<=[A-Za-z])\s+(?=[A-Za-z])", "*", text)
    text = re.sub(r"(?<=[A-Za-z])(?=[234]\b)", "**", text)
    return re.sub(r"[A-Za-zµε%‰'\"′″]+\d?", lambda m: _word(m.group(), dimension), text)


def _word(word: str, dimension: str) -> str:
    word = ALIASES.get(word, word)
    if dimension in MASSES:
        return "kilopound" if word == "kip" else word
    if dimension == "acceleration" and word == "g":
        return "g_0"
    return "force_pound" if word in ("lb", "pound") else word


def _number(digits: str, wanted: str) -> Decimal:
    """Decimal point or comma, thousands set apart by spaces, points or commas; refuses what reads in two ways."""
    mantissa, _, exponent = (
        re.sub(r"[\s\u202f\u2009\u00a0']", "", digits.replace("−", "-")).lower().partition("e")
    )
    if "," in mantissa and "." in mantissa:
        point = max(mantissa.rfind(","), mantissa.rfind("."))
        other = "," if mantissa[point] == "." else "."
        mantissa = mantissa[:point].replace(other, "") + "." + mantissa[point + 1 :]
    elif mantissa.count(",") == 1:
        if re.fullmatch(r"[-+]?[1-9]\d{0,2},\d{3}", mantissa):
            plain, fraction = mantissa.replace(",", ""), mantissa.replace(",", ".")
            raise UnitError(f"'{wanted}' can be read in two ways: write {plain} or {fraction}.")
        mantissa = mantissa.replace(",", ".")
    elif re.fullmatch(r"[-+]?\d{1,3}(?:,\d{3}){2,}|[-+]?\d{1,3}(?:\.\d{3}){2,}", mantissa):
        mantissa = mantissa.replace(",", "").replace(".", "")
    try:
        return Decimal(mantissa + ("e" + exponent if exponent else ""))
    except InvalidOperation:
        raise UnitError(f"'{wanted}' is no number.") from None


def _example(dimension: str) -> str:
    known = KNOWN_UNITS[dimension]
    return f" such as '12.5' or '12.5 {known[0]}'" if dimension != "none" else " such as '0.8' or '80 %'"


@cache
def _registry() -> UnitRegistry[Any]:
    from pint import UnitRegistry  # a third of a second: only where a unit is needed

    registry: UnitRegistry[Any] = UnitRegistry(non_int_type=Decimal)
    registry.define("kilopound_of_mass = 1000 * pound = kilopound")
    return registry
