"""The ground as forces on nodes: every layer's resistance put on the nodes that it touches.

End nodes and the two nodes of a joint carry other laws already, so their halves of the neighbouring elements go to
the node next to them, half an element away.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.model.member import Segment
from solver.model.surroundings import Ground, Resistance, Toe
from solver.numerics.arrays import Shaft
from solver.numerics.chain import Chain
from solver.numerics.power_root import pieces_for
from solver.numerics.toe import POWER, RADIATION, SMITH, VISCOUS

Array = NDArray[np.float64]
LAW_NUMBERS = {"smith": SMITH, "viscous": VISCOUS, "power": POWER, "radiation": RADIATION}


@dataclass(frozen=True)
class Band:
    """A stretch of shaft with one kind of resistance: N per m at positions, `line(x)`."""

    top: float
    bottom: float
    law: Resistance
    unit_top: float
    unit_bottom: float
    per_area: bool

    def unit(self, x: Array) -> Array:
        """Resistance per area (Pa), or per length (N/m) where it is a total that was spread."""
        share = (x - self.top) / (self.bottom - self.top)
        return self.unit_top + (self.unit_bottom - self.unit_top) * share


def bands_of(ground: Ground, end: float) -> Iterator[Band]:
    """The bands of a ground for a member that ends at `end` (m); layers below the toe do not touch it."""
    if ground.shaft_total is not None and ground.surface < end:
        total, embedded = ground.shaft_total, end - ground.surface
        if total.distribution == "uniform":
            mean = total.resistance / embedded
            yield Band(ground.surface, end, total, mean, mean, False)
        else:
            yield Band(ground.surface, end, total, 0.0, 2 * total.resistance / embedded, False)
    top = ground.surface
    for layer in ground.layers:
        bottom = top + layer.thickness
        below = (
            layer.unit_resistance if layer.unit_resistance_bottom is None else layer.unit_resistance_bottom
        )
        yield Band(top, bottom, layer, layer.unit_resistance, below, True)
        top = bottom


def shaft_of(chain: Chain) -> Shaft:
    """Nodal strengths, stiffnesses and damping of the whole shaft."""
    n, head = chain.nodes, chain.head
    # rows: strength, stiffness, damping factor (J Ru, or dashpot), exponent x strength; one table per law
    tables = {name: np.zeros((4, n)) for name in LAW_NUMBERS}
    ground = chain.case.ground
    if ground is not None:
        for band in bands_of(ground, float(chain.position[-1])):
            _add(chain, ground, band, tables[band.law.law])
    _keep_one_law_a_node(tables, head)
    plain = tables["smith"] + tables["viscous"]
    touched = plain[0].nonzero()[0]
    first, stop = (int(touched[0]), int(touched[-1]) + 1) if len(touched) else (head, head)
    rows = plain[:, first:stop]
    smith = tables["smith"][:, first:stop]
    power = _power_rows(tables["power"])
    kept_at, pieces = pieces_for(power[:, 5])
    return Shaft(
        first=first,
        r=np.zeros(stop - first),
        par=np.array(
            [
                rows[0],
                rows[1],
                _inverse(rows[1]),
                np.divide(smith[2], smith[0], out=np.zeros_like(smith[0]), where=smith[0] > 0),
                tables["viscous"][2, first:stop],
            ]
        ),
        power_nodes=np.flatnonzero(tables["power"][0]),
        power=power,
        kept_at=kept_at,
        pieces=pieces,
        radiation_nodes=np.flatnonzero(tables["radiation"][0]),
        radiation=_radiation_rows(tables["radiation"]),
    )


def _inverse(k: Array) -> Array:
    return np.divide(1.0, k, out=np.zeros_like(k), where=k > 0)


def _power_rows(table: Array) -> Array:
    if not table[0].any():
        return np.zeros((0, 11))
    t = table[:, np.flatnonzero(table[0])]
    zero = np.zeros_like(t[0])
    return np.stack([zero, t[0], t[1], _inverse(t[1]), t[2], t[3] / t[0], *5 * [zero]], axis=1)


def _radiation_rows(table: Array) -> Array:
    t = table[:, np.flatnonzero(table[0])]
    return np.array([np.zeros_like(t[0]), t[0], t[1], t[2]])


def _add(chain: Chain, ground: Ground, band: Band, table: Array) -> None:
    """Integrate a band over the halves of all elements; each piece is a product of two lines, so Simpson is exact."""
    for stretch in chain.member_stretches:
        left = chain.position[stretch.start : stretch.stop]
        right = chain.position[stretch.start + 1 : stretch.stop + 1]
        # a bonded boundary shares its node, a joint has two at one place: positions are right either way
        middle = (left + right) / 2
        nodes = np.arange(stretch.start, stretch.stop)
        # upper halves of all elements, then the lower ones
        low = _within(band, np.concatenate([left, middle]))
        high = _within(band, np.concatenate([middle, right]))
        touched = (high > low).nonzero()[0]
        if not len(touched):
            continue
        low, high = low[touched], high[touched]
        at = _receivers(chain, stretch.start, stretch.stop, np.concatenate([nodes, nodes + 1])[touched])
        points = np.array([low, (low + high) / 2, high])
        width = _rubbing(ground, stretch.segment, points, left[0], right[-1])
        line = band.unit(points) * (width if band.per_area else 1.0)
        strength = (high - low) * (line[0] + 4 * line[1] + line[2]) / 6
        area = (high - low) * (width[0] + 4 * width[1] + width[2]) / 6
        for row, amount in enumerate(_amounts(band.law, strength, high - low, area)):
            np.add.at(table[row], at, amount)


def _within(band: Band, x: Array) -> Array:
    return np.minimum(np.maximum(x, band.top), band.bottom)


def _receivers(chain: Chain, start: int, stop: int, node: NDArray[np.int64]) -> NDArray[np.int64]:
    """Nodes that take the resistance: not the first or last node of a piece of rod, where there is another."""
    rods_begin = start == chain.head or chain.axial[start - 1] == 0
    rods_end = stop == chain.nodes - 1 or chain.axial[stop] == 0
    low = start + 1 if rods_begin else start
    high = stop - 1 if rods_end else stop
    return np.minimum(np.maximum(node, low), high) if low <= high else node


def _rubbing(ground: Ground, segment: Segment, points: Array, top: float, bottom: float) -> Array:
    """Perimeter on which the ground acts, linear along a taper, with its share of the inside of open pipes, m."""
    first, last = segment.section, segment.end_section or segment.section
    share = (points - top) / (bottom - top)
    ends = [s.perimeter + ground.inner_share * s.inner_perimeter for s in (first, last)]
    return np.asarray(ends[0] + (ends[1] - ends[0]) * share)


def _amounts(law: Resistance, strength: Array, length: Array, area: Array) -> tuple[Array, ...]:
    """Strength, stiffness, damping coefficient, exponent x strength of each piece."""
    if law.model is not None:
        # Randolph and Simons 1986 (from memory): k = 2.9 G per length, c = sqrt(G rho) per area
        g, rho = law.model.shear_modulus, law.model.soil_density
        return strength, 2.9 * g * length, np.sqrt(g * rho) * area, np.zeros_like(strength)
    assert law.quake is not None
    assert law.damping is not None
    return strength, strength / law.quake, law.damping * strength, (law.exponent or 0.0) * strength


def _keep_one_law_a_node(tables: dict[str, Array], head: int) -> None:
    """Where layers with different laws meet at a node, the weaker part moves to the neighbour with its law."""
    for name in ("power", "radiation"):
        table = tables[name]
        others = [tables[o] for o in tables if o != name]
        for node in np.flatnonzero(table[0]):
            rival = max(others, key=lambda t: t[0, node])
            if rival[0, node] == 0:
                continue
            loser = table if table[0, node] < rival[0, node] else rival
            for neighbour in (node - 1, node + 1):
                if head < neighbour < table.shape[1] and loser[0, neighbour] > 0:
                    loser[:, neighbour] += loser[:, node]
                    loser[:, node] = 0.0
                    break


def toe_of(chain: Chain) -> tuple[Array, Array]:
    """Parameters and state of the toe for the kernels; both empty where the far end is not in the ground."""
    ground = chain.case.ground
    if chain.case.far_end.kind != "ground" or ground is None or ground.toe is None:
        return np.zeros(0), np.zeros(5)
    toe = ground.toe
    stiffness, damping = _toe_constants(chain, toe)
    par = np.array([LAW_NUMBERS[toe.law], toe.resistance, stiffness, damping, toe.exponent or 0.0])
    return par, np.array([toe.gap, 0.0, 0.0, 1.0 if toe.gap == 0 else 0.0, 0.0])


def _toe_constants(chain: Chain, toe: Toe) -> tuple[float, float]:
    if toe.model is None:
        assert toe.quake is not None
        assert toe.damping is not None
        return toe.resistance / toe.quake, toe.damping
    # Lysmer and Richart 1966 (from memory): K = 4 G r/(1 - nu), C = 3.4 r^2 sqrt(rho G)/(1 - nu), no added mass
    last = chain.case.member.segments[-1]
    section = last.end_section or last.section
    r, soil = section.round_width / 2, toe.model
    share = 1 - soil.poisson_ratio
    return (
        4 * soil.shear_modulus * r / share,
        3.4 * r**2 * np.sqrt(soil.soil_density * soil.shear_modulus) / share,
    )
