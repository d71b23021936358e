"""What holds the member: its far end, and the ground along its shaft and under its toe."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from solver.model.quantity import (
    Described,
    Fraction,
    Name,
    NotNegative,
    Number,
    Positive,
    PositiveFraction,
    Quantity,
)

SMITH = "E. A. L. Smith 1960 (from memory)"

Quake = Annotated[
    Positive,
    Quantity("small_length", "Quake", "Movement at which the static resistance is fully mobilised.", SMITH),
]
Damping = Annotated[
    NotNegative,
    Quantity(
        "smith_damping",
        "Damping factor",
        "Dynamic resistance per static resistance and velocity; beware of s/ft against s/m.",
        SMITH,
    ),
]
DampingLaw = Literal["smith", "viscous", "power"]
Exponent = Annotated[
    PositiveFraction,
    Quantity("none", "Exponent", "N in |v|^N of the power law.", "Gibson and Coyle 1968 (from memory)"),
]


class Free(Described):
    kind: Literal["free"]


class Fixed(Described):
    kind: Literal["fixed"]


class SpringEnd(Described):
    kind: Literal["spring"]
    stiffness: Annotated[NotNegative, Quantity("stiffness", "Stiffness")]


class DashpotEnd(Described):
    kind: Literal["dashpot"]
    coefficient: Annotated[NotNegative, Quantity("impedance", "Coefficient", "Force per velocity.")]


class MatchedEnd(Described):
    """The member goes on unchanged for ever: nothing comes back."""

    kind: Literal["matched"]


class Wall(Described):
    """A rigid wall beyond a gap."""

    kind: Literal["wall"]
    gap: Annotated[NotNegative, Quantity("small_length", "Gap", "Distance to the wall before the blow.")] = (
        0.0
    )


class GroundToe(Described):
    """The toe stands in the ground."""

    kind: Literal["ground"]


FarEnd = Annotated[
    Free | Fixed | SpringEnd | DashpotEnd | MatchedEnd | Wall | GroundToe, Field(discriminator="kind")
]


class Radiation(Described):
    """Soil as an elastic half-space: toe by Lysmer and Richart 1966, shaft by Randolph and Simons 1986 (from
    memory)."""

    kind: Literal["radiation"]
    shear_modulus: Annotated[Positive, Quantity("modulus", "Shear modulus", "Of the soil, at small strain.")]
    soil_density: Annotated[Positive, Quantity("density", "Soil density")]
    poisson_ratio: Annotated[
        float,
        Field(strict=True, allow_inf_nan=False, ge=0, le=0.5),
        Quantity("none", "Poisson's ratio of the soil"),
    ]


class Resistance(Described):
    """Quake and damping, or a radiation model in their place."""

    quake: Quake | None = None
    damping: Damping | None = None
    damping_law: DampingLaw | None = None
    exponent: Exponent | None = None
    model: Radiation | None = None

    @model_validator(mode="after")
    def _one_model(self) -> Self:
        if self.model is not None:
            if any(v is not None for v in (self.quake, self.damping, self.damping_law, self.exponent)):
                raise ValueError(
                    "a radiation 'model' stands in place of 'quake', 'damping', 'damping_law' and 'exponent'"
                )
            return self
        if self.quake is None or self.damping is None:
            raise ValueError("needs 'quake' and 'damping', or a radiation 'model'")
        if (self.damping_law == "power") != (self.exponent is not None):
            raise ValueError("'exponent' goes with the 'power' damping law, and only with it")
        return self

    @property
    def law(self) -> Literal["smith", "viscous", "power", "radiation"]:
        """Law of the damping; Smith's where the project does not say otherwise."""
        if self.model is not None:
            return "radiation"
        return self.damping_law or "smith"


class Layer(Resistance):
    """One layer of the ground."""

    name: Name
    thickness: Annotated[Positive, Quantity("length", "Thickness")]
    unit_resistance: Annotated[
        NotNegative,
        Quantity("unit_resistance", "Unit resistance", "Shaft resistance per area of the perimeter."),
    ]
    unit_resistance_bottom: (
        Annotated[
            NotNegative,
            Quantity(
                "unit_resistance",
                "At the bottom",
                "Unit resistance at the layer's bottom; linear in between.",
            ),
        ]
        | None
    ) = None


class ShaftTotal(Resistance):
    """Shaft resistance as one total, from the ground surface to the toe."""

    resistance: Annotated[NotNegative, Quantity("force", "Shaft resistance")]
    distribution: Literal["uniform", "growing"]


class Toe(Resistance):
    """Resistance under the toe: compression only."""

    resistance: Annotated[NotNegative, Quantity("force", "Toe resistance")]
    gap: Annotated[
        NotNegative, Quantity("small_length", "Gap", "Movement before the toe meets the ground.")
    ] = 0.0


class Ground(Described):
    """The ground: its surface as a distance from the struck end, and what resists below it."""

    surface: Annotated[
        NotNegative, Quantity("length", "Surface", "Distance of the ground surface from the struck end.")
    ]
    layers: tuple[Layer, ...] = ()
    shaft_total: Annotated[ShaftTotal | None, Field(exclude_if=lambda v: v is None)] = None
    toe: Toe | None = None
    inner_share: Annotated[
        Fraction,
        Quantity(
            "none", "Inner share", "Part of the unit resistance that acts on the inside of open pipes too."
        ),
    ] = 0.0
    level_of_struck_end: (
        Annotated[Number, Quantity("length", "Level of the struck end", "Lets the screen show elevations.")]
        | None
    ) = None

    @model_validator(mode="after")
    def _one_shaft(self) -> Self:
        if self.shaft_total is not None and self.layers:
            raise ValueError("give either 'layers' or 'shaft_total', not both")
        return self
