"""The member: segments from the struck end to the far end, their joints, and what is attached to them."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from solver.model.quantity import Described, Name, NotNegative, Positive, Quantity
from solver.model.section import AnySection


class Bonded(Described):
    """Welded, glued or simply continuous."""

    kind: Literal["bonded"] = "bonded"


class Contact(Described):
    """Touching faces: carry compression only, and open in tension."""

    kind: Literal["contact"]
    gap: Annotated[NotNegative, Quantity("small_length", "Gap", "Opening of the joint before the blow.")] = (
        0.0
    )


class SlackSplice(Described):
    """A splice that carries compression at once, and tension after it has opened by its slack."""

    kind: Literal["slack_splice"]
    slack: Annotated[
        NotNegative, Quantity("small_length", "Slack", "Opening before the splice carries tension.")
    ]


Joint = Annotated[Bonded | Contact | SlackSplice, Field(discriminator="kind")]


class Segment(Described):
    """A length of member with one material and one section, or a linear taper from one section to another."""

    name: Name
    length: Annotated[Positive, Quantity("length", "Length")]
    material: Name
    section: AnySection
    end_section: AnySection | None = None
    joint_above: Joint = Bonded()

    @model_validator(mode="after")
    def _taper_keeps_shape(self) -> Self:
        if self.end_section is not None:
            if self.end_section.shape != self.section.shape:
                raise ValueError("a tapered segment needs the same shape at both ends")
            if getattr(self.end_section, "fill", None) != getattr(self.section, "fill", None):
                raise ValueError("a tapered filled pipe needs the same fill at both ends")
        return self


class Attachment(Described):
    """A mass on the member, or a spring or dashpot from the member to a fixed point."""

    position: Annotated[NotNegative, Quantity("length", "Position", "Distance from the struck end.")]
    kind: Literal["mass", "spring", "dashpot"]
    value: Annotated[
        NotNegative,
        Quantity("none", "Value", "Mass in kg, stiffness in N/m, or damping coefficient in N·s/m."),
    ]


Segments = Annotated[tuple[Segment, ...], Field(min_length=1)]


class Member(Described):
    """What is struck."""

    segments: Segments
    lateral_inertia: Annotated[bool, Field(strict=True)] = False
    attachments: tuple[Attachment, ...] = ()

    @property
    def length(self) -> float:
        """Length of all segments, m."""
        return sum(s.length for s in self.segments)


class RodParts(Described):
    """A rod described by segments alone, the first one farthest from the impact."""

    segments: Segments

    @property
    def length(self) -> float:
        """Length of all segments, m."""
        return sum(s.length for s in self.segments)
