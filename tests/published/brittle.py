"""Rods that crack in tension: the first opening under a pulse sent back by a free end, and the pieces that fly off."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from solver import Result
from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, DENSITY, LENGTH, C, material, part, pulse, solved

SPALL = "Kolsky 1963, Stress Waves in Solids, ch. VIII, spalling under a triangular pulse (from memory); recomputed"
SPAN = 0.0004
EXACT = "a crack is a joint between two elements, here at the very place; at Courant number 1 it is exact"


def _struck(
    strength: float, shape: dict, peak: float = 100e6, end: float = 0.0032, dx: float = 0.01
) -> Result:
    law = {"kind": "brittle_tension", "tensile_strength": strength}
    return solved(
        pulse(**shape, peak=peak * AREA),
        part(LENGTH, of="brittle"),
        materials=[material("brittle", law=law)],
        gauges={"end": LENGTH, "9.9 m": 9.9},
        duration=end,
        dx=dx,
    )


TRIANGLE = {"shape": "trapezoid", "duration": SPAN, "rise": 0.0, "fall": SPAN}


@check(
    model="brittle rod of 10 m, sudden rise and linear decay, free far end",
    title="Place and time of the first opening",
    source=SPALL,
    formula="net tension s0 2 x/(c T) at x from the end: opens at x = (st/s0) c T/2, t = (L + x)/c",
    tolerance=1e-6,
    share_of="one element, or one step",
    why=EXACT,
)
def first_opening() -> Iterator[Compared]:
    for share in (0.2, 0.4, 0.6, 0.8):
        run = _struck(share * 100e6, TRIANGLE)
        crack = next(e for e in run.events if e.kind == "crack")
        x = share * C * SPAN / 2
        yield value(f"distance from the end, st/s0 = {share}", x, LENGTH - crack.position, "m", 0.01)
        yield value(f"time, st/s0 = {share}", (LENGTH + x) / C, crack.time, "s", run.time_step)


@check(
    model="brittle rod, triangular pulse: the piece that flies off",
    title="Velocity of the piece",
    source=SPALL,
    formula="momentum trapped in it: (2 s0 - st)/(rho c)",
    tolerance=1e-6,
    why=EXACT,
)
def piece() -> Iterator[Compared]:
    for share in (0.4, 0.6):
        run = _struck(share * 100e6, TRIANGLE, end=0.0042)
        crack = next(e for e in run.events if e.kind == "crack")
        x = LENGTH - crack.position
        gauge = run.gauges["end"]
        # over one passage to and fro the end moves by its mean velocity
        turn = round(2 * x / C / run.time_step)
        first = round(((LENGTH + x) / C + 0.0001) / run.time_step)
        moved = gauge.displacement[first + turn] - gauge.displacement[first]
        speed = (2 - share) * 100e6 / (DENSITY * C)
        yield value(
            f"mean velocity of the free end, st/s0 = {share}", speed, moved / (turn * run.time_step), "m/s"
        )


@check(
    model=(
        "brittle rod, sudden rise and linear decay, 3.2 times the strength; segments cut so that each "
        "holds one opening"
    ),
    title="Several pieces, one after the other",
    source=SPALL,
    formula=(
        "what is left of the pulse behind a piece acts anew: openings at x_i = i (st/s0) c T/2, t_i = (L "
        "+ x_i)/c, i = 1, 2, 3"
    ),
    tolerance=1e-6,
    share_of="one element, or one step",
    why=EXACT,
)
def several() -> Iterator[Compared]:
    size = C * SPAN / 2 / 3.2
    cuts = [LENGTH - 4.5 * size, size, size, size, size, size / 2]
    law = {"kind": "brittle_tension", "tensile_strength": 100e6 / 3.2}
    run = solved(
        pulse(**TRIANGLE, peak=100e6 * AREA),
        *(part(length, of="brittle") for length in cuts),
        materials=[material("brittle", law=law)],
        duration=0.0035,
        dx=size / 50,
    )
    cracks = sorted((e for e in run.events if e.kind == "crack"), key=lambda e: e.time)
    yield value("number of openings", 3.0, float(len(cracks)), "", 1.0, 1e-12)
    element = LENGTH / run.elements
    for i, crack in enumerate(cracks[:3], 1):
        yield value(f"distance of opening {i} from the end", i * size, LENGTH - crack.position, "m", element)
        yield value(f"time of opening {i}", (LENGTH + i * size) / C, crack.time, "s", run.time_step)


def _triangle(lag: np.ndarray) -> np.ndarray:
    """Stress of the pulse, MPa, so long (s) after its front."""
    return np.where((lag >= 0) & (lag <= SPAN), 100.0 * (1 - lag / SPAN), 0.0)


@check(
    model="brittle rod under a pulse weaker than its strength",
    title="Under its strength it is an elastic rod",
    source="d'Alembert's solution",
    formula="the reflected pulse is the incident one, turned",
    tolerance=1e-10,
    share_of="the peak",
    why="the law is linear until it cracks",
)
def under_strength() -> Iterator[Compared | Picture]:
    shape = {"shape": "haversine", "duration": SPAN}
    run = _struck(101e6, shape)
    elastic = solved(
        pulse(**shape, peak=100e6 * AREA), gauges={"9.9 m": 9.9}, duration=0.0032, dx=0.01
    ).gauges["9.9 m"]
    yield history("stress at 9.9 m", elastic.stress, run.gauges["9.9 m"].stress, "Pa", 100e6)
    yield value("cracks", 0.0, float(len(run.crack_openings)), "", 1.0)
    broken = _struck(40e6, TRIANGLE, end=0.0026)
    x = broken.fields.position
    # the first opening is at 2.08 ms
    at = int(np.searchsorted(broken.fields.time, 0.002078)) - 1
    s = LENGTH - x
    t = broken.fields.time[at]
    exact = -_triangle(t - x / C) + _triangle(t - (LENGTH + s) / C)
    shown = x > 8.0
    yield picture(
        "Just before the first opening: stress along the rod, strength 40 MPa (tension positive)",
        "distance from the struck end, m",
        "stress, MPa",
        x[shown],
        exact[shown],
        broken.fields.stress[at][shown] / 1e6,
    )
