"""Cross-sections: dimensions as given, and the areas, perimeters and radii that follow from them."""

from __future__ import annotations

from math import pi, sqrt, tan
from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from solver.model.quantity import Described, Name, NotNegative, Positive, Quantity


class Section(Described):
    """Base of all sections. Every one has `area` (m2) and `perimeter` (m, outer), some as given, some derived."""

    @property
    def inner_perimeter(self) -> float:
        """Perimeter of the inside of an open pipe, 0 for others."""
        return 0.0

    @property
    def gross_area(self) -> float:
        """Area inside the outer perimeter: what a closed toe bears on."""
        return float(self.area)  # type: ignore[attr-defined]

    @property
    def round_width(self) -> float:
        """Diameter of the circle with the same gross area, for drawings and for the limits of rod theory."""
        return 2 * sqrt(self.gross_area / pi)

    @property
    def polar_radius_squared(self) -> float | None:
        """(Ix + Iy)/A in m2, for lateral inertia; `None` where the shape does not tell it."""
        return None


class SolidRound(Section):
    shape: Literal["solid_round"]
    diameter: Annotated[Positive, Quantity("small_length", "Diameter")]

    @property
    def area(self) -> float:
        return pi * self.diameter**2 / 4

    @property
    def perimeter(self) -> float:
        return pi * self.diameter

    @property
    def polar_radius_squared(self) -> float:
        return self.diameter**2 / 8


class Pipe(Section):
    shape: Literal["pipe"]
    outer_diameter: Annotated[Positive, Quantity("small_length", "Outer diameter")]
    wall: Annotated[Positive, Quantity("small_length", "Wall", "Thickness of the pipe's wall.")]

    @model_validator(mode="after")
    def _wall_fits(self) -> Self:
        if 2 * self.wall >= self.outer_diameter:
            raise ValueError("the wall must be thinner than half of the outer diameter")
        return self

    @property
    def area(self) -> float:
        return pi * self.wall * (self.outer_diameter - self.wall)

    @property
    def perimeter(self) -> float:
        return pi * self.outer_diameter

    @property
    def inner_perimeter(self) -> float:
        return pi * (self.outer_diameter - 2 * self.wall)

    @property
    def gross_area(self) -> float:
        return pi * self.outer_diameter**2 / 4

    @property
    def polar_radius_squared(self) -> float:
        return (self.outer_diameter**2 + (self.outer_diameter - 2 * self.wall) ** 2) / 8


class Rectangle(Section):
    shape: Literal["rectangle"]
    width: Annotated[Positive, Quantity("small_length", "Width")]
    depth: Annotated[Positive, Quantity("small_length", "Depth")]

    @property
    def area(self) -> float:
        return self.width * self.depth

    @property
    def perimeter(self) -> float:
        return 2 * (self.width + self.depth)

    @property
    def polar_radius_squared(self) -> float:
        return (self.width**2 + self.depth**2) / 12


class Octagon(Section):
    shape: Literal["octagon"]
    across_flats: Annotated[
        Positive, Quantity("small_length", "Across flats", "Distance between two parallel sides.")
    ]

    @property
    def area(self) -> float:
        return 2 * (sqrt(2) - 1) * self.across_flats**2

    @property
    def perimeter(self) -> float:
        return 8 * self.across_flats * tan(pi / 8)

    @property
    def polar_radius_squared(self) -> float:
        side = self.across_flats * tan(pi / 8)
        circumradius_squared = (self.across_flats**2 + side**2) / 4
        return (6 * circumradius_squared - side**2) / 12


class HSection(Section):
    shape: Literal["h"]
    depth: Annotated[Positive, Quantity("small_length", "Depth", "Overall depth, across the flanges.")]
    flange_width: Annotated[Positive, Quantity("small_length", "Flange width")]
    flange: Annotated[Positive, Quantity("small_length", "Flange thickness")]
    web: Annotated[Positive, Quantity("small_length", "Web thickness")]

    @model_validator(mode="after")
    def _plates_fit(self) -> Self:
        if 2 * self.flange >= self.depth:
            raise ValueError("two flanges together must be thinner than the depth")
        if self.web > self.flange_width:
            raise ValueError("the web must not be thicker than the flanges are wide")
        return self

    @property
    def area(self) -> float:
        return 2 * self.flange_width * self.flange + (self.depth - 2 * self.flange) * self.web

    @property
    def perimeter(self) -> float:
        """Of the enclosing box, on which the soil between the flanges slides (common practice)."""
        return 2 * (self.depth + self.flange_width)

    @property
    def gross_area(self) -> float:
        return self.depth * self.flange_width

    @property
    def polar_radius_squared(self) -> float:
        clear = self.depth - 2 * self.flange
        about_strong = (self.flange_width * self.depth**3 - (self.flange_width - self.web) * clear**3) / 12
        about_weak = (2 * self.flange * self.flange_width**3 + clear * self.web**3) / 12
        return (about_strong + about_weak) / self.area


class VoidedSquare(Section):
    shape: Literal["voided_square"]
    width: Annotated[Positive, Quantity("small_length", "Width")]
    void_diameter: Annotated[Positive, Quantity("small_length", "Void diameter")]

    @model_validator(mode="after")
    def _void_fits(self) -> Self:
        if self.void_diameter >= self.width:
            raise ValueError("the void must be narrower than the square is wide")
        return self

    @property
    def area(self) -> float:
        return self.width**2 - pi * self.void_diameter**2 / 4

    @property
    def perimeter(self) -> float:
        return 4 * self.width

    @property
    def gross_area(self) -> float:
        return self.width**2

    @property
    def polar_radius_squared(self) -> float:
        return (self.width**4 / 6 - pi * self.void_diameter**4 / 32) / self.area


class FilledPipe(Section):
    """A pipe filled with another material; stiffnesses and masses add. `area` is the pipe's own."""

    shape: Literal["filled_pipe"]
    outer_diameter: Annotated[Positive, Quantity("small_length", "Outer diameter")]
    wall: Annotated[Positive, Quantity("small_length", "Wall", "Thickness of the pipe's wall.")]
    fill: Name

    @model_validator(mode="after")
    def _wall_fits(self) -> Self:
        if 2 * self.wall >= self.outer_diameter:
            raise ValueError("the wall must be thinner than half of the outer diameter")
        return self

    @property
    def area(self) -> float:
        return pi * self.wall * (self.outer_diameter - self.wall)

    @property
    def fill_area(self) -> float:
        """Area of the fill, m2."""
        return pi * (self.outer_diameter - 2 * self.wall) ** 2 / 4

    @property
    def perimeter(self) -> float:
        return pi * self.outer_diameter

    @property
    def gross_area(self) -> float:
        return pi * self.outer_diameter**2 / 4


class Custom(Section):
    shape: Literal["custom"]
    area: Annotated[Positive, Quantity("area", "Area")]
    perimeter: Annotated[
        NotNegative, Quantity("small_length", "Perimeter", "Outer perimeter, for shaft resistance.")
    ]


AnySection = Annotated[
    SolidRound | Pipe | Rectangle | Octagon | HSection | VoidedSquare | FilledPipe | Custom,
    Field(discriminator="shape"),
]
