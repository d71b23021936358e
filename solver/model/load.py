"""The blow: a pulse, a recorded history, a dropped ram, a striker rod, or none."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, PrivateAttr, ValidationInfo, model_validator

from solver.model.history import Samples, read_history
from solver.model.member import RodParts, Segments
from solver.model.quantity import Described, NotNegative, Number, Positive, PositiveFraction, Quantity

#: Standard acceleration of gravity, m/s2 (ISO 80000-3).
GRAVITY = 9.80665


class Pulse(Described):
    """A force or velocity at the struck end with a shape in closed form. Positive pushes towards the far end."""

    kind: Literal["pulse"]
    quantity: Literal["force", "velocity"]
    shape: Literal["rectangle", "half_sine", "haversine", "triangle", "trapezoid", "decay"]
    peak: Annotated[
        Number, Quantity("none", "Peak", "Largest force (compression positive) or velocity of the pulse.")
    ]
    duration: Annotated[
        Positive,
        Quantity(
            "time", "Duration", "Length of the pulse; for a decay, the time constant of its exponential."
        ),
    ]
    start: Annotated[NotNegative, Quantity("time", "Start", "Time at which the pulse begins.")] = 0.0
    rise: Annotated[NotNegative, Quantity("time", "Rise", "Time to reach the peak; 0 = at once.")] | None = (
        None
    )
    fall: (
        Annotated[NotNegative, Quantity("time", "Fall", "Time from the peak back to zero; 0 = at once.")]
        | None
    ) = None
    release: Annotated[bool, Field(strict=True)] = False

    @model_validator(mode="after")
    def _shape_has_its_numbers(self) -> Self:
        if self.shape == "trapezoid":
            if self.rise is None or self.fall is None:
                raise ValueError("a trapezoid needs both 'rise' and 'fall' in seconds (either may be 0)")
            if self.rise + self.fall > self.duration * (1 + 1e-12):
                raise ValueError("'rise' and 'fall' together must not be longer than 'duration'")
        elif self.rise is not None or self.fall is not None:
            raise ValueError("'rise' and 'fall' belong to the trapezoid only")
        if self.release and self.quantity == "force":
            raise ValueError("'release' belongs to a velocity load: a force lets go by itself")
        return self


class History(Described):
    """A force or velocity at the struck end as points in time, linear between them and zero outside."""

    kind: Literal["history"]
    quantity: Literal["force", "velocity"]
    times: tuple[Annotated[Number, Quantity("time", "Time")], ...] | None = None
    values: tuple[Number, ...] | None = None
    file: str | None = None
    release: Annotated[bool, Field(strict=True)] = False

    _samples: Samples = PrivateAttr()

    @model_validator(mode="after")
    def _points_make_a_history(self, info: ValidationInfo) -> Self:
        if (self.file is None) == (self.times is None and self.values is None):
            raise ValueError("give either 'times' and 'values', or 'file'")
        if self.release and self.quantity == "force":
            raise ValueError("'release' belongs to a velocity load: a force lets go by itself")
        if self.file is not None:
            self._samples = read_history(self.file, (info.context or {}).get("folder"))
        else:
            if self.times is None or self.values is None:
                raise ValueError("'times' and 'values' go together: one of them is missing")
            self._samples = Samples.checked(self.times, self.values)
        return self

    @property
    def samples(self) -> Samples:
        """The points, from the file or from the project."""
        return self._samples


class Cushion(Described):
    """Compression-only cushion: by its stiffness, or by material, area and thickness.

    Loads along k and unloads along k/e^2, e the coefficient of restitution (E. A. L. Smith 1960, from memory).
    """

    stiffness: (
        Annotated[Positive, Quantity("stiffness", "Stiffness", "Force per compression while loading.")] | None
    ) = None
    area: Annotated[Positive, Quantity("area", "Area")] | None = None
    thickness: Annotated[Positive, Quantity("small_length", "Thickness")] | None = None
    young_modulus: Annotated[Positive, Quantity("modulus", "Modulus")] | None = None
    restitution: Annotated[
        PositiveFraction,
        Quantity(
            "none",
            "Coefficient of restitution",
            "e: the cushion gives back e² of the energy put into it.",
            "E. A. L. Smith 1960 (from memory)",
        ),
    ]

    @model_validator(mode="after")
    def _one_way(self) -> Self:
        by_dimensions = (self.area, self.thickness, self.young_modulus)
        given = sum(v is not None for v in by_dimensions)
        if (self.stiffness is not None) == (given > 0) or given not in (0, 3):
            raise ValueError(
                "give either 'stiffness', or all three of 'area', 'thickness' and 'young_modulus'"
            )
        return self

    @property
    def loading_stiffness(self) -> float:
        """k = EA/t where it is not given, N/m."""
        if self.stiffness is not None:
            return self.stiffness
        assert self.area is not None
        assert self.thickness is not None
        assert self.young_modulus is not None
        return self.young_modulus * self.area / self.thickness

    @property
    def unloading_stiffness(self) -> float:
        """k/e^2, N/m."""
        return float(self.loading_stiffness / self.restitution**2)


class Drop(Described):
    """A ram that falls on the member, through a cushion, a drive cap and a pile cushion where there are any."""

    kind: Literal["drop"]
    ram_mass: Annotated[Positive, Quantity("mass", "Ram mass")] | None = None
    ram: RodParts | None = None
    drop_height: Annotated[Positive, Quantity("length", "Drop height")] | None = None
    efficiency: (
        Annotated[
            PositiveFraction,
            Quantity("none", "Efficiency", "Share of the drop energy that the ram has when it strikes."),
        ]
        | None
    ) = None
    energy: Annotated[Positive, Quantity("energy", "Kinetic energy", "Of the ram as it strikes.")] | None = (
        None
    )
    impact_velocity: Annotated[Positive, Quantity("velocity", "Impact velocity")] | None = None
    cushion: Cushion | None = None
    cap_mass: Annotated[NotNegative, Quantity("mass", "Drive cap mass", "0 = no cap.")] = 0.0
    pile_cushion: Cushion | None = None

    @model_validator(mode="after")
    def _one_ram_one_speed(self) -> Self:
        if (self.ram_mass is None) == (self.ram is None):
            raise ValueError("give either 'ram_mass' (a rigid ram) or 'ram' (a rod of segments)")
        ways = [self.drop_height, self.energy, self.impact_velocity]
        if sum(way is not None for way in ways) != 1:
            raise ValueError(
                "give exactly one of 'drop_height' (with 'efficiency'), 'energy' and 'impact_velocity'"
            )
        if self.drop_height is not None and self.efficiency is None:
            raise ValueError("'drop_height' needs 'efficiency' (above 0, up to 1) beside it")
        if self.drop_height is None and self.efficiency is not None:
            raise ValueError(
                "'efficiency' belongs to 'drop_height' only: "
                "an energy or velocity at impact has the losses in it already"
            )
        if self.cushion is None and self.cap_mass > 0 and self.ram is None:
            raise ValueError(
                "a rigid ram straight on a rigid cap has no answer in this model: give a 'cushion', "
                "or describe the ram as a rod of segments ('ram')"
            )
        return self


class Striker(Described):
    """A rod thrown against the struck end, its first segment farthest from the impact."""

    kind: Literal["striker"]
    velocity: Annotated[Positive, Quantity("velocity", "Velocity", "Of the striker towards the member.")]
    segments: Segments


class NoLoad(Described):
    """Nothing strikes: the member starts with `run.initial_velocity`."""

    kind: Literal["none"]


Load = Annotated[Pulse | History | Drop | Striker | NoLoad, Field(discriminator="kind")]
