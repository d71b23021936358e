"""Repeated blows: what stays locked in, and the set of each blow."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from solver import Result
from tests.published.registry import Compared, check, history, value
from tests.published.rods import GRAVITY, material, part, solved

RIGID = "energy balance of a rigid pile with quasi-static settling; recomputed table"
TOE, TOE_QUAKE, SHAFT, SHAFT_QUAKE = 400e3, 8e-3, 600e3, 2.5e-3
MASS, ENERGY, LONG = 5000.0, 12e3, 1.0


def _blows(count: int | dict, shaft: float = SHAFT, duration: float = 0.0125, **more) -> Result:
    """A rigid pile of 5000 kg, 12 kJ a blow, run to the peak and then settled: a rod 10^5 times as stiff as that."""
    heavy = material("heavy", 3e15, MASS / (LONG * 0.01))
    ground = {"surface": 0.0, "toe": {"resistance": TOE, "quake": TOE_QUAKE, "damping": 0.0}}
    if shaft:
        total = {"resistance": shaft, "distribution": "uniform", "quake": SHAFT_QUAKE, "damping": 0.0}
        ground["shaft_total"] = total
    return solved(
        {"kind": "none"},
        part(LONG, of="heavy"),
        materials=[heavy],
        far_end="ground",
        ground=ground,
        initial_velocity=float(np.sqrt(2 * ENERGY / MASS)),
        duration=duration,
        dx=LONG / 4,
        blows=count,
        **more,
    )


@check(
    model="rigid pile of 5000 kg, 12 kJ a blow; toe 400 kN, quake 8 mm; shaft 600 kN, quake 2.5 mm; no damping",
    title="Residual stress: the rigid pile",
    source=RIGID,
    formula=(
        "rebound delta = (R_t + R_s)/(K_t + K_s); blow 1: D = (E + R_s Q_s/2 + R_t Q_t/2)/(R_s + R_t), "
        "set D - delta; later: set E/(R_s + R_t) - delta/2"
    ),
    tolerance=1e-6,
    share_of="1 m: required is 1e-3 mm",
    why="required: 1e-3 mm; the rod gives by 1e-3 of what the ground does, which costs energy of the same order",
)
def rigid_pile() -> Iterator[Compared]:
    kt, ks = TOE / TOE_QUAKE, SHAFT / SHAFT_QUAKE
    rebound = (TOE + SHAFT) / (kt + ks)
    first = (ENERGY + SHAFT * SHAFT_QUAKE / 2 + TOE * TOE_QUAKE / 2) / (SHAFT + TOE) - rebound
    later = ENERGY / (SHAFT + TOE) - rebound / 2
    run = _blows(3)
    assert run.residual is not None
    for i, (wanted, printed) in enumerate(((first, 10.901724), (later, 10.275862), (later, 10.275862))):
        found = run.residual.set_per_blow[i]
        yield value(f"set of blow {i + 1}", wanted, found, "m", 1.0)
        yield value(f"set of blow {i + 1}, printed", printed * 1e-3, found, "m", 1.0)
    yield value("rebound after blow 1", 3.4482759e-3, rebound, "m", 1.0)


@check(
    model="the same pile: force left at the toe",
    title="Residual stress: toe pressed, shaft pulling back",
    source=RIGID,
    formula="toe R_t - K_t delta = +227.58621 kN, the shaft holds it down with as much",
    tolerance=1e-3,
    why="the last element carries the force of the toe",
)
def left_at_the_toe() -> Iterator[Compared]:
    run = _blows(3)
    assert run.residual is not None
    # the last node but one carries the shaft of the last element: below it is the toe's force alone
    yield value("force in the last element", -227.58621e3, run.residual.force[-1], "N")


@check(
    model="the same pile without shaft resistance, standing on its toe under gravity",
    title="No residual stress where the toe alone resists",
    source="Costa, Danziger & Lopes 2001, Can. Geotech. J. 38 (abstract); numbers by the energy balance, recomputed",
    formula="set E/(R_t - W) - Q_t (1 - W/R_t)/2 at every blow; between blows the pile carries its weight alone",
    tolerance=1e-6,
    share_of="the toe resistance, or 1 m",
    why="required: 1e-3 mm; the rod gives by 1e-5 of what the ground does",
)
def toe_alone() -> Iterator[Compared]:
    run = _blows(2, shaft=0.0, duration=0.0365, gravity=True)
    assert run.residual is not None
    weight = MASS * GRAVITY
    wanted = ENERGY / (TOE - weight) - TOE_QUAKE * (1 - weight / TOE) / 2
    for i in (0, 1):
        yield value(f"set of blow {i + 1}", wanted, run.residual.set_per_blow[i], "m", 1.0)
    own = -weight * run.residual.position / LONG
    yield history("force along the pile", own, run.residual.force, "N", TOE)


@check(
    model="the same pile, blows until the set repeats to 1e-6 m",
    title="The set repeats from the second blow on",
    source=RIGID,
    formula="blow 3 equals blow 2",
    tolerance=1e-9,
    share_of="the number of blows",
    why="a count",
)
def repeats() -> Iterator[Compared]:
    run = _blows({"most": 10, "tolerance": 1e-6})
    assert run.residual is not None
    yield value("blows until it repeats", 3.0, float(len(run.residual.set_per_blow)))
    yield value("said to repeat (1)", 1.0, float(run.residual.repeats))
