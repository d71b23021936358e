"""Driving stresses allowed by published expressions: a value with the formula, its numbers, and where it is written.

AASHTO LRFD Bridge Design Specifications, article 10.7.8, from memory: to be confirmed against the governing code.
All stresses in Pa, as magnitudes. `factor` is the resistance factor for driving, 1.0 but 1.15 for timber there.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import sqrt
from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from solver.model.quantity import Described, Positive, Quantity

ARTICLE = "AASHTO LRFD Bridge Design Specifications, article 10.7.8"
TO_CONFIRM = "from memory, to be confirmed against the governing code"
SOURCE = f"{ARTICLE} ({TO_CONFIRM})"
#: 1 ksi in Pa (1000 lbf/in2, exact from the international pound and inch).
KSI = 4448.2216152605 / 0.0254**2


class Limit(Described):
    """A limit of stress with what it rests on."""

    value: Annotated[Positive, Quantity("stress", "Limit", "Largest stress allowed, as a magnitude.")]
    basis: str | None = None
    reason: str | None = None
    source: str | None = None


@dataclass(frozen=True)
class Term:
    """One number of a formula: its letter, its value (SI) and its dimension."""

    letter: str
    value: float
    dimension: str = "none"


@dataclass(frozen=True)
class PublishedLimit:
    """A limit (Pa) with its formula, the numbers put into it, and its source. `in_ksi` is the formula for stresses in
    ksi, where it is not the same for all units."""

    value: float
    formula: str
    terms: tuple[Term, ...]
    in_ksi: str = ""
    source: str = SOURCE

    @property
    def basis(self) -> str:
        """The formula with its numbers, stresses in MPa."""
        told = (
            f"{t.letter} = {_mpa(t.value) if t.dimension == 'stress' else f'{t.value:g}'}" for t in self.terms
        )
        return f"{self.formula}, {', '.join(told)}"

    def limit(self, reason: str | None = None) -> Limit:
        """As a material holds it."""
        return Limit(value=self.value, basis=self.basis, reason=reason, source=self.source)


@dataclass(frozen=True)
class PublishedLimits:
    """What a published expression allows in compression and in tension."""

    compression: PublishedLimit
    tension: PublishedLimit


Factor = Annotated[
    Positive,
    Quantity("none", "Resistance factor", "For driving, φ: what the expression is multiplied by.", SOURCE),
]


class SteelLimits(Described):
    """A share of the yield stress, in compression and in tension."""

    kind: Literal["steel"]
    yield_stress: Annotated[
        Positive, Quantity("stress", "Yield stress", "f_y, as the code or the mill gives it.")
    ]
    factor: Factor = 1.0

    @property
    def allowed(self) -> PublishedLimits:
        """Both limits."""
        return steel_limits(self.yield_stress, self.factor)


class PrestressedConcreteLimits(Described):
    """What the strength leaves above the prestress; what the prestress and the concrete hold in tension."""

    kind: Literal["prestressed_concrete"]
    strength: Annotated[
        Positive, Quantity("stress", "Strength of concrete", "f'c, specified compressive strength.")
    ]
    prestress: Annotated[
        Positive,
        Quantity("stress", "Prestress", "f_pe, effective prestress in the concrete, after all losses."),
    ]
    factor: Factor = 1.0
    severe: Annotated[bool, Field(strict=True)] = False

    @model_validator(mode="after")
    def _strength_is_left(self) -> Self:
        if 0.85 * self.strength <= self.prestress:
            raise ValueError("the prestress takes all of the strength: 0.85 f'c must be larger than f_pe")
        return self

    @property
    def allowed(self) -> PublishedLimits:
        """Both limits."""
        return prestressed_concrete_limits(self.strength, self.prestress, self.factor, self.severe)


class ReinforcedConcreteLimits(Described):
    """The concrete in compression; in tension its bars alone."""

    kind: Literal["reinforced_concrete"]
    strength: Annotated[
        Positive, Quantity("stress", "Strength of concrete", "f'c, specified compressive strength.")
    ]
    yield_stress: Annotated[Positive, Quantity("stress", "Yield stress", "f_y of the bars.")]
    bar_share: Annotated[
        float,
        Field(strict=True, allow_inf_nan=False, gt=0, lt=1),
        Quantity(
            "none", "Share of the bars", "Area of the bars over the area of the section; '2 %' is understood."
        ),
    ]
    factor: Factor = 1.0

    @property
    def allowed(self) -> PublishedLimits:
        """Both limits."""
        return reinforced_concrete_limits(self.strength, self.yield_stress, self.bar_share, self.factor)


class TimberLimits(Described):
    """The strength along the grain, in compression and in tension."""

    kind: Literal["timber"]
    strength: Annotated[
        Positive, Quantity("stress", "Strength along grain", "F_co, compression parallel to the grain.")
    ]
    factor: Factor = 1.15

    @property
    def allowed(self) -> PublishedLimits:
        """Both limits."""
        return timber_limits(self.strength, self.factor)


Expression = Annotated[
    SteelLimits | PrestressedConcreteLimits | ReinforcedConcreteLimits | TimberLimits,
    Field(discriminator="kind"),
]


def steel_limits(yield_stress: float, factor: float = 1.0) -> PublishedLimits:
    """0.9 phi f_y in both. Raises `ValueError` for a stress or factor that is not above 0."""
    _above_zero(yield_stress=yield_stress, factor=factor)
    terms = (Term("φ", factor), Term("f_y", yield_stress, "stress"))
    both = PublishedLimit(0.9 * factor * yield_stress, "0.9 φ f_y", terms)
    return PublishedLimits(both, both)


def prestressed_concrete_limits(
    strength: float, prestress: float, factor: float = 1.0, severe: bool = False
) -> PublishedLimits:
    """phi (0.85 f'c - f_pe) and phi (0.095 sqrt(f'c) + f_pe) with f'c and f_pe in ksi; in a severe corrosive
    environment phi f_pe in tension. Raises `ValueError` where nothing is left of the strength."""
    _above_zero(strength=strength, prestress=prestress, factor=factor)
    compression = factor * (0.85 * strength - prestress)
    if compression <= 0:
        raise ValueError("the prestress takes all of the strength: 0.85 f'c must be larger than f_pe")
    acts = Term("φ", factor), Term("f_pe", prestress, "stress")
    terms = (acts[0], Term("f'c", strength, "stress"), acts[1])
    pressed = PublishedLimit(compression, "φ (0.85 f'c − f_pe)", terms)
    if severe:
        formula = "φ f_pe (severe corrosive environment)"
        return PublishedLimits(pressed, PublishedLimit(factor * prestress, formula, acts))
    tension = factor * (0.095 * sqrt(strength / KSI) * KSI + prestress)
    # 0.095 with ksi is 0.2494 with MPa
    formula, in_ksi = "φ (0.2494 √f'c + f_pe) in MPa", "φ (0.095 √f'c + f_pe) in ksi"
    return PublishedLimits(pressed, PublishedLimit(tension, formula, terms, in_ksi))


def reinforced_concrete_limits(
    strength: float, yield_stress: float, bar_share: float, factor: float = 1.0
) -> PublishedLimits:
    """0.85 phi f'c, and 0.7 phi f_y on the reinforcement alone, here over the whole section: times `bar_share`, the
    area of the bars as a share (0 to 1) of it. Raises `ValueError` for what cannot be."""
    _above_zero(strength=strength, yield_stress=yield_stress, bar_share=bar_share, factor=factor)
    if bar_share >= 1:
        raise ValueError(f"the share of the bars must be below 1, not {bar_share:g}")
    phi = Term("φ", factor)
    pressed = PublishedLimit(0.85 * factor * strength, "0.85 φ f'c", (phi, Term("f'c", strength, "stress")))
    bars = (phi, Term("f_y", yield_stress, "stress"), Term("A_s/A", bar_share))
    return PublishedLimits(
        pressed, PublishedLimit(0.7 * factor * yield_stress * bar_share, "0.7 φ f_y A_s/A", bars)
    )


def timber_limits(strength: float, factor: float = 1.15) -> PublishedLimits:
    """phi F_co in both, F_co the strength parallel to the grain. Raises `ValueError` for what is not above 0."""
    _above_zero(strength=strength, factor=factor)
    terms = (Term("φ", factor), Term("F_co", strength, "stress"))
    both = PublishedLimit(factor * strength, "φ F_co", terms)
    return PublishedLimits(both, both)


def _above_zero(**given: float) -> None:
    for name, value in given.items():
        if not value > 0:
            raise ValueError(f"the {name.replace('_', ' ')} must be above 0, not {value:g}")


def _mpa(stress: float) -> str:
    return f"{stress / 1e6:.4g} MPa"
