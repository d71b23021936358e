"""Nodes and links of masses and rods, laid one after the other.

Elements of a segment share their nodes. In a segment that cracks each has two of its own: a crack is a joint that holds
until it is pulled by the strength, and then only touches, so that its two faces are the ends of elements and what holds
for contacts of rods holds for it.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.model.material import Material
from solver.model.member import Segment
from solver.numerics.along import equal_transit, profile_along

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Stretch:
    """One segment as elements: links `start` to `stop` (exclusive) of the chain, with those where it may crack."""

    segment: Segment
    material: Material
    start: int
    stop: int


@dataclass(frozen=True)
class JointLink:
    """A joint between two nodes `link` and `link + 1`. `slack` is infinite where no tension is ever carried.

    `strength` (N) above 0: it is bonded until it is pulled by so much, and a crack of `segment` from then on.
    """

    link: int
    gap: float
    slack: float
    position: float
    strength: float = 0.0
    segment: str = ""


class Laid:
    """What is laid so far: positions and masses of nodes; EA, length, area and mass per length of links."""

    def __init__(self, materials: dict[str, Material]) -> None:
        self.materials = materials
        self.position: list[Array] = []
        self.mass: list[Array] = []
        self.links: list[tuple[Array, Array, Array, Array]] = []
        self.stretches: list[Stretch] = []
        self.count = 0

    def lump(self, mass: float, position: float) -> None:
        """A mass of its own."""
        self._join()
        self._nodes(np.array([position]), np.array([mass]))

    def rod(self, segments: tuple[Segment, ...], counts: tuple[int, ...], start: float) -> list[JointLink]:
        """A rod of `segments` with so many elements each, from `start` (m); returns all of its joints."""
        joints: list[JointLink] = []
        at = start
        for i, (segment, n) in enumerate(zip(segments, counts, strict=True)):
            joint = segment.joint_above
            cracks = self._boundary(segments[i - 1], segment) if i > 0 and joint.kind == "bonded" else None
            if i == 0 or joint.kind != "bonded" or cracks is not None:
                self._join()
                if cracks is not None:
                    joints.append(JointLink(self.count - 1, 0.0, np.inf, at, *cracks))
                elif i > 0:
                    gap = joint.gap if joint.kind == "contact" else 0.0
                    slack = joint.slack if joint.kind == "slack_splice" else np.inf
                    joints.append(JointLink(self.count - 1, gap, slack, at))
                self._nodes(np.array([at]), np.zeros(1))
            joints += self._elements(segment, n, at)
            at += segment.length
        return joints

    def _elements(self, segment: Segment, n: int, at: float) -> list[JointLink]:
        """Elements of a segment behind the last node; returns the joints where it may crack."""
        edges = equal_transit(segment, self.materials, n)
        dx = segment.length * np.diff(edges) if segment.end_section else np.full(n, segment.length / n)
        axial, line_mass, area = profile_along(segment, self.materials, (edges[1:] + edges[:-1]) / 2)
        half, position = line_mass * dx / 2, at + segment.length * edges[1:]
        first, strength, joints = self.count - 1, _strength(self.materials[segment.material]), []
        self.mass[-1][-1] += half[0]
        if strength:
            for i, pull in enumerate(strength * (area[1:] + area[:-1]) / 2):
                place = float(position[i])
                joints.append(JointLink(first + 2 * i + 1, 0.0, np.inf, place, float(pull), segment.name))
            axial, line_mass, dx, area = (
                _apart(axial, 0),
                _apart(line_mass, 0),
                _apart(dx, 1),
                _apart(area, 1),
            )
            self._nodes(np.repeat(position, 2)[:-1], np.repeat(half, 2)[1:])
        else:
            self._nodes(position, half + np.append(half[1:], 0.0))
        self.links.append((axial, dx, area, line_mass))
        self.stretches.append(Stretch(segment, self.materials[segment.material], first, first + len(axial)))
        return joints

    def _boundary(self, above: Segment, below: Segment) -> tuple[float, str] | None:
        """Strength (N) of a bonded boundary, and the segment that cracks there; `None` where neither of both does."""
        found = []
        for segment, end in ((above, 1.0), (below, 0.0)):
            strength = _strength(self.materials[segment.material])
            if strength:
                area = profile_along(segment, self.materials, np.array([end]))[2]
                found.append((strength * float(area[0]), segment.name))
        return min(found, default=None)

    def _nodes(self, position: Array, mass: Array) -> None:
        self.position.append(position)
        self.mass.append(mass)
        self.count += len(position)

    def _join(self) -> None:
        """A link without an element, before the next node."""
        if self.count:
            self.links.append((np.zeros(1), np.ones(1), np.ones(1), np.zeros(1)))


def _strength(material: Material) -> float:
    """Tension at which a material cracks, Pa; 0 where it never does."""
    return material.law.tensile_strength if material.law.kind == "brittle_tension" else 0.0


def _apart(values: Array, between: float) -> Array:
    """The same values with `between` between any two."""
    found = np.full(2 * len(values) - 1, float(between))
    found[::2] = values
    return found
