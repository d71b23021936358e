"""Materials: stiffness, density, the law of stress and strain, and the limits that stresses are held against."""

from __future__ import annotations

from math import sqrt
from typing import Annotated, Literal

from pydantic import Field

from solver.model.limits import Expression, Limit
from solver.model.quantity import Described, Name, NotNegative, Positive, Quantity


class Elastic(Described):
    """Linear elastic: P = E e."""

    kind: Literal["elastic"] = "elastic"


class Viscoelastic(Described):
    """Kelvin-Voigt: a spring and a dashpot side by side, P = E e + eta de/dt (Kolsky 1963, from memory)."""

    kind: Literal["viscoelastic"]
    viscosity: Annotated[
        Positive,
        Quantity("viscosity", "Viscosity", "Stress per strain rate that acts beside the elastic stress."),
    ]


class ElasticPlastic(Described):
    """Bilinear: elastic up to yield, then a line of lower slope; isotropic or kinematic hardening."""

    kind: Literal["elastic_plastic"]
    yield_stress: Annotated[
        Positive, Quantity("stress", "Yield stress", "Stress at which the material first yields.")
    ]
    hardening_modulus: Annotated[
        NotNegative,
        Quantity(
            "modulus",
            "Hardening modulus",
            "Slope of stress over total strain after yield; 0 = perfectly plastic.",
        ),
    ] = 0.0
    hardening: Literal["isotropic", "kinematic"] = "isotropic"


class BrittleTension(Described):
    """Elastic until its tensile strength, then an open crack that closes again and carries compression."""

    kind: Literal["brittle_tension"]
    tensile_strength: Annotated[
        Positive, Quantity("stress", "Tensile strength", "Tensile stress at which the member cracks through.")
    ]


class LargeStrain(Described):
    """Incompressible neo-Hookean pad, P = G (s - 1/s^2), s = 1 + e, G = E/3."""

    kind: Literal["large_strain"]


Law = Annotated[
    Elastic | Viscoelastic | ElasticPlastic | BrittleTension | LargeStrain, Field(discriminator="kind")
]


class Limits(Described):
    """Largest stresses allowed, as magnitudes: by a published expression, by numbers of one's own, which go before it,
    or `None` = no limit given."""

    compression: Annotated[Positive, Quantity("stress", "Compression limit")] | Limit | None = None
    tension: Annotated[Positive, Quantity("stress", "Tension limit")] | Limit | None = None
    expression: Annotated[Expression | None, Field(exclude_if=lambda v: v is None)] = None

    def value(self, sign: Literal["compression", "tension"]) -> float | None:
        """The limit's number in Pa, whichever way it was given."""
        limit = getattr(self, sign)
        if limit is None and self.expression is not None:
            return getattr(self.expression.allowed, sign).value
        return limit.value if isinstance(limit, Limit) else limit


class Material(Described):
    """One material of the project."""

    name: Name
    young_modulus: Annotated[
        Positive,
        Quantity(
            "modulus",
            "Young's modulus",
            "Slope of stress over strain; use the dynamic value for concrete under a blow.",
        ),
    ]
    density: Annotated[Positive, Quantity("density", "Density", "Mass per volume.")]
    poisson_ratio: (
        Annotated[
            float,
            Field(strict=True, allow_inf_nan=False, gt=-1, le=0.5),
            Quantity("none", "Poisson's ratio", "Needed for lateral inertia only."),
        ]
        | None
    ) = None
    law: Law = Elastic()
    limits: Limits = Limits()

    @property
    def wave_speed(self) -> float:
        """c = sqrt(E/rho), m/s (thin rod; Kolsky 1963)."""
        return sqrt(self.young_modulus / self.density)


def material_from_any_two(
    young_modulus: float | None = None, density: float | None = None, wave_speed: float | None = None
) -> tuple[float, float]:
    """Young's modulus (Pa) and density (kg/m3) from any two of modulus, density and wave speed (m/s), E = rho c^2.

    Raises `ValueError` unless exactly two are given.
    """
    if (young_modulus, density, wave_speed).count(None) != 1:
        raise ValueError("give exactly two of Young's modulus, density and wave speed")
    if young_modulus is None:
        assert density is not None and wave_speed is not None
        return density * wave_speed**2, density
    if density is None:
        assert wave_speed is not None
        return young_modulus, young_modulus / wave_speed**2
    return young_modulus, density
