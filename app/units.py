"""What units and what sign the screen shows, for one project. Nothing in the file or the solver changes with them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cached_property, lru_cache
from math import floor, isclose, isfinite, log10
from typing import Any

import numpy as np

from app.unit_text import KNOWN_UNITS, UnitError, factor_of, value_of
from solver.model.project import Project
from solver.model.quantity import SI_UNITS

__all__ = ["KNOWN_UNITS", "UnitError", "Units", "units_of"]

#: For each dimension the usual unit first, then those that `show` may change to for very small or large numbers.
METRIC: dict[str, tuple[str, ...]] = {
    "length": ("m",),
    "small_length": ("mm",),
    "area": ("cm²", "mm²", "m²"),
    "volume": ("m³",),
    "mass": ("t", "kg", "g"),
    "time": ("ms", "µs", "s"),
    "velocity": ("m/s",),
    "acceleration": ("m/s²",),
    "force": ("kN", "N", "MN"),
    "stress": ("MPa", "kPa", "GPa"),
    "modulus": ("GPa", "MPa", "kPa"),
    "unit_resistance": ("kPa",),
    "strain": ("µε",),
    "energy": ("kJ", "J", "MJ"),
    "density": ("kg/m³",),
    "stiffness": ("kN/mm", "N/mm"),
    "impedance": ("kN·s/m", "N·s/m"),
    "smith_damping": ("s/m",),
    "viscosity": ("kPa·s", "Pa·s"),
    "none": ("",),
}
US: dict[str, tuple[str, ...]] = {
    "length": ("ft",),
    "small_length": ("in",),
    "area": ("in²",),
    "volume": ("ft³",),
    "mass": ("kip", "lb"),
    "time": ("ms", "µs", "s"),
    "velocity": ("ft/s",),
    "acceleration": ("ft/s²",),
    "force": ("kip", "lbf"),
    "stress": ("ksi", "psi"),
    "modulus": ("ksi", "psi"),
    "unit_resistance": ("ksf", "psf"),
    "strain": ("µε",),
    "energy": ("ft·kip", "ft·lbf"),
    "density": ("lb/ft³",),
    "stiffness": ("kip/in", "lbf/in"),
    "impedance": ("kip·s/ft", "lbf·s/ft"),
    "smith_damping": ("s/ft",),
    "viscosity": ("psi·s",),
    "none": ("",),
}
SYSTEMS = {"metric": METRIC, "us": US}
#: The usual unit is kept for numbers in this range of it.
USUAL_RANGE = (0.1, 1e5)
#: Where that begins elsewhere: cushions are told in MPa.
USUAL_FROM = {"modulus": 1.0}
#: Below this share of the usual unit a computed number is noise, and `show` says 0.
NOISE = 1e-9
MINUS, NARROW_SPACE, NO_BREAK = "\u2212", "\u202f", "\u00a0"


@dataclass(frozen=True)
class Units:
    """Units and sign of one project. `own` holds units chosen for single dimensions."""

    system: str = "metric"
    own: tuple[tuple[str, str], ...] = ()
    compression_positive: bool = False

    @property
    def sign(self) -> int:
        """What forces, stresses and strains of the solver (tension positive) are multiplied by for the screen."""
        return -1 if self.compression_positive else 1

    @property
    def sign_word(self) -> str:
        return "Compression +" if self.compression_positive else "Tension +"

    @cached_property
    def _own(self) -> dict[str, str]:
        return dict(self.own)

    def unit(self, dimension: str, near: float | None = None) -> str:
        """Unit shown for a dimension, "" for a pure number; `near` (SI) lets it follow the size of a number."""
        if dimension in self._own:
            return self._own[dimension]
        usual, *others = SYSTEMS[self.system][dimension]
        if near is None or not others or near == 0 or not isfinite(near):
            return usual
        size = abs(near)
        in_usual = size / self._factor(usual, dimension)
        if USUAL_FROM.get(dimension, USUAL_RANGE[0]) <= in_usual < USUAL_RANGE[1] or in_usual < NOISE:
            return usual
        by_size = sorted((usual, *others), key=lambda u: self._factor(u, dimension))
        fitting = [u for u in by_size if size >= self._factor(u, dimension)]
        return fitting[-1] if fitting else by_size[0]

    def number(self, value_si: Any, dimension: str, near: float | None = None) -> Any:
        """The number or array in the unit that `unit(dimension, near)` names."""
        factor = self._factor(self.unit(dimension, near), dimension)
        return np.asarray(value_si) / factor if isinstance(value_si, np.ndarray) else value_si / factor

    def text(self, value_si: float, dimension: str, near: float | None = None, typed: bool = True) -> str:
        """Number alone, for a field: as `plain`, with zeros up to three digits where it has a unit."""
        number = float(self.number(value_si, dimension, near))
        written = self.plain(value_si, dimension, near, typed)
        wanted = _decimals(number, 3) if isfinite(number) else 0
        has = len(written.partition(".")[2])
        if isfinite(number) and "e" not in written and has < wanted and number != 0 and dimension != "none":
            written = f"{number:.{wanted}f}"
        return written

    def plain(self, value_si: float, dimension: str, near: float | None = None, typed: bool = True) -> str:
        """Number alone, with the digits that somebody has typed, up to seven; four of one that nobody has typed (or
        not in this unit, such as 16.4042 for 5 m in ft). Reads back with `parse`."""
        number = float(self.number(value_si, dimension, near))
        if not isfinite(number):
            return "–"
        typed = typed and isclose(float(f"{number:.6e}"), number, rel_tol=1e-12)
        return _plain(number, 7 if typed else 4)

    def show(self, value_si: float, dimension: str, digits: int = 3) -> str:
        """Number and unit for reading: "16.0 m", "1755 kN", "50 kg"; digits and unit follow the size.

        The space between them is one that no line breaks at (U+00A0).
        """
        if value_si is None or not isfinite(value_si):
            return "–"
        unit = self.unit(dimension, value_si)
        number = float(self.number(value_si, dimension, value_si))
        if dimension != "none" and abs(self.number(value_si, dimension)) < NOISE:
            number = 0.0
        written = rounded(number, digits)
        if dimension == "none" and "." in written and "e" not in written:
            written = written.rstrip("0").rstrip(".")
        return f"{written}{NO_BREAK}{unit}" if unit else written

    def parse(self, text: str, dimension: str) -> float:
        """SI value of typed text, in the shown unit where it names none. Raises `UnitError` with a sentence."""
        return value_of(text, dimension, self.unit(dimension))

    def _factor(self, unit: str, dimension: str) -> float:
        return float(factor_of(unit, dimension))


def rounded(number: float, digits: int = 3) -> str:
    """A number for reading, with so many digits that count and five or more figures in groups of three."""
    if number == 0:
        return "0"
    if abs(number) >= 1e9 or abs(number) < 1e-6:
        return f"{number:.{digits - 1}e}".replace("-", MINUS)
    decimals = _decimals(number, digits)
    written = f"{number:.{decimals}f}"
    if abs(float(written)) >= 1e4:
        written = f"{float(written):,.{decimals}f}".replace(",", NARROW_SPACE)
    return written.replace("-", MINUS)


def _plain(number: float, digits: int) -> str:
    """Up to `digits` digits, without zeros at the end, and without an exponent where that can be read."""
    if number == 0:
        return "0"
    if not 1e-6 <= abs(number) < 1e9:
        return f"{number:.{digits - 1}e}"
    written = f"{number:.{_decimals(number, digits)}f}"
    return written.rstrip("0").rstrip(".") if "." in written else written


def _decimals(number: float, digits: int) -> int:
    """Decimals that leave so many digits that count."""
    return max(0, digits - 1 - floor(log10(abs(number)))) if number else 0


def units_of(project: Project) -> Units:
    """Units and sign that the project says it is read in; a unit that fits no dimension is left at its usual one."""
    shown = project.display_units
    chosen: Mapping[str, str] = {"system": shown} if isinstance(shown, str) else shown
    return _units(tuple(sorted(chosen.items())), project.display_sign == "compression")


@lru_cache(maxsize=64)
def _units(chosen: tuple[tuple[str, str], ...], compression_positive: bool) -> Units:
    system = dict(chosen).get("system", "metric")
    own = tuple((d, u) for d, u in chosen if d in SI_UNITS and _fits(u, d))
    return Units(system if system in SYSTEMS else "metric", own, compression_positive)


def _fits(unit: str, dimension: str) -> bool:
    try:
        return factor_of(unit, dimension) > 0
    except UnitError:
        return False


def unknown_units(project: Project) -> tuple[str, ...]:
    """A sentence for each entry of `display_units` that means nothing to the program."""
    shown = project.display_units
    if isinstance(shown, str):
        return ()
    found = []
    for dimension, unit in shown.items():
        if dimension == "system":
            if unit not in SYSTEMS:
                found.append(f"The system of units '{unit}' is not known: it is 'metric' or 'us'.")
        elif dimension not in SI_UNITS:
            found.append(f"'{dimension}' in 'display_units' is no quantity that is shown.")
        elif not _fits(unit, dimension):
            found.append(f"'{unit}' is not a unit of {dimension.replace('_', ' ')}; the usual one is shown.")
    return tuple(found)
