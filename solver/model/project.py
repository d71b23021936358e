"""A project: its materials and cases, in SI units, tension positive inside."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Field, PrivateAttr

from solver.model.load import Load
from solver.model.material import Material
from solver.model.member import Member, Segment
from solver.model.quantity import Described, Name, NotNegative, Number, Positive, Quantity
from solver.model.surroundings import FarEnd, Ground

FORMAT = "striketrace-project"
#: The newest version of the file that this program reads. It writes the oldest that holds what is in a project.
VERSION = 2


class Gauge(Described):
    """A place where force and motion are read."""

    name: Name
    position: Annotated[
        NotNegative,
        Quantity(
            "length", "Position", "Distance from the struck end; on a rod that strikes, from its far face."
        ),
    ]
    side: Literal["near", "far"] = "near"
    on: Literal["member", "ram", "striker"] = "member"


class RepeatedBlows(Described):
    """Blows until the set per blow repeats."""

    most: Annotated[int, Field(strict=True, ge=1, le=1000)]
    tolerance: Annotated[
        Positive,
        Quantity("small_length", "Tolerance", "Difference of two sets at which they count as equal."),
    ]


class Run(Described):
    """How long and how finely to solve."""

    duration: (
        Annotated[Positive, Quantity("time", "Duration", "Empty = until the member is at rest.")] | None
    ) = None
    element_length: (
        Annotated[Positive, Quantity("length", "Element length", "Empty = chosen by the program.")] | None
    ) = None
    gravity: Annotated[bool, Field(strict=True)] = False
    blows: Annotated[int, Field(strict=True, ge=1, le=1000)] | RepeatedBlows = 1
    initial_velocity: (
        Annotated[
            Number, Quantity("velocity", "Initial velocity", "Of the whole member, towards the far end.")
        ]
        | None
    ) = None


class Case(Described):
    """One blow on one member. A case of a parsed project knows its materials (`material`)."""

    name: Name
    member: Member
    load: Load
    far_end: FarEnd
    ground: Ground | None = None
    gauges: tuple[Gauge, ...] = ()
    run: Run = Run()

    _materials: dict[str, Material] = PrivateAttr(default_factory=dict)

    def material(self, name: str) -> Material:
        """The material that a segment or a fill names."""
        return self._materials[name]

    def with_materials(self, materials: tuple[Material, ...]) -> Case:
        """The same case, bound to materials by name; a new object."""
        bound = self.model_copy()
        bound._materials = {m.name: m for m in materials}
        return bound

    @property
    def materials(self) -> dict[str, Material]:
        """All materials in reach, by name."""
        return dict(self._materials)

    @property
    def ram_segments(self) -> tuple[Segment, ...]:
        """Segments of a rod that strikes (a striker, or a ram that is a rod), the first farthest from the impact."""
        if self.load.kind == "striker":
            return self.load.segments
        if self.load.kind == "drop" and self.load.ram is not None:
            return self.load.ram.segments
        return ()


class Provenance(Described):
    """Where a value came from, and whether the user has confirmed it."""

    source: str
    state: Literal["typical", "confirmed"]


class Project(Described):
    """Everything in one file."""

    format: Literal["striketrace-project"]
    version: Annotated[int, Field(strict=True)]
    title: Annotated[str, Field(strict=True)]
    notes: Annotated[str, Field(strict=True)] = ""
    display_units: Literal["metric", "us"] | dict[str, str] = "metric"
    display_sign: Literal["compression", "tension"] = "tension"
    written_by: Annotated[str | dict[str, Any] | None, Field(exclude_if=lambda v: v is None)] = None
    provenance: Annotated[dict[str, Provenance] | None, Field(exclude_if=lambda v: v is None)] = None
    records: Annotated[dict[str, Any] | None, Field(exclude_if=lambda v: v is None)] = None
    studies: Annotated[dict[str, Any] | None, Field(exclude_if=lambda v: v is None)] = None
    materials: tuple[Material, ...] = ()
    cases: Annotated[tuple[Case, ...], Field(min_length=1)]

    def oldest_version(self) -> int:
        """The oldest version of the file that has a place for all of it: 2 brought expressions of limits."""
        return 2 if any(m.limits.expression is not None for m in self.materials) else 1
