"""Driving stresses allowed by published expressions: a value with the formula, its numbers, and where it is written.

AASHTO LRFD Bridge Design Specifications, article 10.7.8, from memory: to be confirmed against the governing code.
All stresses in Pa, as magnitudes. `factor` is the resistance factor for driving, 1.0 but 1.15 for timber there.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import sqrt

from solver.model.material import Limit

ARTICLE = "AASHTO LRFD Bridge Design Specifications, article 10.7.8"
TO_CONFIRM = "from memory, to be confirmed against the governing code"
SOURCE = f"{ARTICLE} ({TO_CONFIRM})"
#: 1 ksi in Pa (1000 lbf/in2, exact from the international pound and inch).
KSI = 4448.2216152605 / 0.0254**2


@dataclass(frozen=True)
class PublishedLimit:
    """A limit (Pa) with its basis, which is the formula with its numbers, and its source."""

    value: float
    basis: str
    source: str = SOURCE

    def limit(self, reason: str | None = None) -> Limit:
        """As a material holds it."""
        return Limit(value=self.value, basis=self.basis, reason=reason, source=self.source)


@dataclass(frozen=True)
class PublishedLimits:
    """What a published expression allows in compression and in tension."""

    compression: PublishedLimit
    tension: PublishedLimit


def steel_limits(yield_stress: float, factor: float = 1.0) -> PublishedLimits:
    """0.9 phi f_y in both. Raises `ValueError` for a stress or factor that is not above 0."""
    _above_zero(yield_stress=yield_stress, factor=factor)
    value = 0.9 * factor * yield_stress
    basis = f"0.9 φ f_y = 0.9 × {factor:g} × {_mpa(yield_stress)}"
    return PublishedLimits(PublishedLimit(value, basis), PublishedLimit(value, basis))


def prestressed_concrete_limits(
    strength: float, prestress: float, factor: float = 1.0, severe: bool = False
) -> PublishedLimits:
    """phi (0.85 f'c - f_pe) and phi (0.095 sqrt(f'c) + f_pe) with f'c and f_pe in ksi; in a severe corrosive
    environment phi f_pe in tension. Raises `ValueError` where nothing is left of the strength."""
    _above_zero(strength=strength, prestress=prestress, factor=factor)
    compression = factor * (0.85 * strength - prestress)
    if compression <= 0:
        raise ValueError("the prestress takes all of the strength: 0.85 f'c must be larger than f_pe")
    given = f"f'c = {_mpa(strength)}, f_pe = {_mpa(prestress)}, φ = {factor:g}"
    pressed = PublishedLimit(compression, f"φ (0.85 f'c − f_pe), {given}")
    if severe:
        basis = f"φ f_pe (severe corrosive environment), f_pe = {_mpa(prestress)}, φ = {factor:g}"
        return PublishedLimits(pressed, PublishedLimit(factor * prestress, basis))
    tension = factor * (0.095 * sqrt(strength / KSI) * KSI + prestress)
    # 0.095 with ksi is 0.2494 with MPa
    return PublishedLimits(
        pressed, PublishedLimit(tension, f"φ (0.2494 √f'c + f_pe) in MPa (0.095 √f'c in ksi), {given}")
    )


def reinforced_concrete_limits(
    strength: float, yield_stress: float, bar_share: float, factor: float = 1.0
) -> PublishedLimits:
    """0.85 phi f'c, and 0.7 phi f_y on the reinforcement alone, here over the whole section: times `bar_share`, the
    area of the bars as a share (0 to 1) of it. Raises `ValueError` for what cannot be."""
    _above_zero(strength=strength, yield_stress=yield_stress, bar_share=bar_share, factor=factor)
    if bar_share >= 1:
        raise ValueError(f"the share of the bars must be below 1, not {bar_share:g}")
    pressed = f"0.85 φ f'c = 0.85 × {factor:g} × {_mpa(strength)}"
    pulled = f"0.7 φ f_y A_s/A = 0.7 × {factor:g} × {_mpa(yield_stress)} × {bar_share:g}"
    return PublishedLimits(
        PublishedLimit(0.85 * factor * strength, pressed),
        PublishedLimit(0.7 * factor * yield_stress * bar_share, pulled),
    )


def timber_limits(strength: float, factor: float = 1.15) -> PublishedLimits:
    """phi F_co in both, F_co the strength parallel to the grain. Raises `ValueError` for what is not above 0."""
    _above_zero(strength=strength, factor=factor)
    basis = f"φ F_co = {factor:g} × {_mpa(strength)}"
    value = factor * strength
    return PublishedLimits(PublishedLimit(value, basis), PublishedLimit(value, basis))


def _above_zero(**given: float) -> None:
    for name, value in given.items():
        if not value > 0:
            raise ValueError(f"the {name.replace('_', ' ')} must be above 0, not {value:g}")


def _mpa(stress: float) -> str:
    return f"{stress / 1e6:.4g} MPa"
