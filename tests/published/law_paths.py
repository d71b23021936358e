"""Laws of ground, cushion and metal along given paths, read through the whole program.

A member too stiff and too light to matter is moved by a prescribed velocity, and what resists it is read at its gauge.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from itertools import pairwise

import numpy as np

from solver import Result
from tests.published.registry import Array, Compared, check, history, value
from tests.published.rods import E, material, part, solved

SMITH = "E. A. L. Smith 1960, J. Soil Mech. Found. Div. ASCE 86 SM4 (from memory); recomputed table"
#: A rod of 0.1 m that gives 4e-5 of what the ground does, and weighs 32 g.
STIFF = material("stiff", 1e13, 32.0)
LONG = 0.1
RU, QUAKE, J = 100e3, 2.54e-3, 0.05 / 0.3048
WHY = "the rod gives by 4e-5 of the quake and swings by 2e-4 of the strength where the acceleration jumps"


def _along(points: Sequence[tuple[float, float]], **ground: dict) -> tuple[Result, Array]:
    """Move the rod through displacements (mm) with velocities (m/s): straight lines of velocity in time between them.

    Returns the run and the times of the points after the first, which is where the rod starts at rest.
    """
    times, speeds = [0.0], [0.0]
    for (d0, v0), (d1, v1) in pairwise(points):
        times.append(times[-1] + 2e-3 * (d1 - d0) / (v0 + v1))
        speeds.append(v1)
    load = {"kind": "history", "quantity": "velocity", "times": times, "values": speeds}
    run = solved(
        load,
        part(LONG, of="stiff"),
        materials=[STIFF],
        gauges={"head": 0.0, "end": LONG},
        duration=times[-1] + 1e-5,
        dx=LONG / 2,
        **ground,
    )
    return run, np.array(times[1:])


def _at(run: Result, gauge: str, times: Array) -> Array:
    """Resistance (compression positive) at the given times; the mean of some steps takes the rod's own ringing off."""
    record, dt = -run.gauges[gauge].force, run.time_step
    steps = np.rint(times / dt).astype(int)
    half = 8
    return np.array([record[max(n - half, 0) : n + half + 1].mean() for n in steps])


SHAFT_PATH = ((0, 0), (1.27, 2), (2.54, 1.5), (5, 0), (3, -1), (-0.08, -1), (-2, 0), (0, 1), (4, 0.5))
"""Displacement (mm) and velocity (m/s)."""
SHAFT_STATIC = (50.0, 100.0, 100.0, 21.259843, -100.0, -100.0, -21.259843, 100.0)
"""Static resistance of the printed table, kN."""


@check(
    model="shaft resistance 100 kN, quake 2.54 mm, damping 0.05 s/ft, three laws, along a path that turns twice",
    title="Smith's spring and slider on the shaft, with damping",
    source=SMITH,
    formula=(
        "R_s = K (D - D') within +-Ru; Smith R_s + J |R_s| v, viscous R_s + J Ru v, power R_s + J Ru "
        "|v|^N sign(v). The table prints R_s (1 + J v), which gives energy back where R_s < 0; with the "
        "magnitude it takes energy both ways"
    ),
    tolerance=1e-3,
    share_of="the strength",
    why=WHY,
    over={"smith": "smith", "viscous": "viscous", "power": "power"},
)
def shaft(law: str) -> Iterator[Compared]:
    more = {"exponent": 0.2} if law == "power" else {}
    total = {
        "resistance": RU,
        "distribution": "uniform",
        "quake": QUAKE,
        "damping": J,
        "damping_law": law,
        **more,
    }
    run, times = _along(SHAFT_PATH, ground={"surface": 0.0, "shaft_total": total})
    found = _at(run, "head", times[:-1])
    for (d, v), static, at in zip(SHAFT_PATH[1:], SHAFT_STATIC, found, strict=False):
        r = static * 1e3
        dashpot = {"smith": abs(r) * v, "viscous": RU * v, "power": RU * abs(v) ** 0.2 * np.sign(v)}[law] * J
        # a power law jumps where v passes zero: the mean of some steps around is not its value there
        if law == "power" and v == 0:
            continue
        yield value(f"D = {d:g} mm, v = {v:g} m/s", r + dashpot, at, "N", RU)


TOE_PATH = (
    (-2, 0),
    (0, 2),
    (1.27, 2),
    (5, 0),
    (3, -1),
    (2.46, -1),
    (0, 0),
    (2.46, 1),
    (3, 1),
    (6, 0.5),
    (6.5, 0),
)


@check(
    model=(
        "toe resistance 100 kN, quake 2.54 mm, damping 0.05 s/ft; approach through a gap of 2 mm, "
        "lift-off and return"
    ),
    title="Toe: no tension, lost and found where it was left",
    source=SMITH,
    formula=(
        "0 <= R_s = K (D - D') <= Ru, D' = 2.46 mm after the first pass; Smith R_s (1 + J v), viscous R_s + J Ru v, "
        "power R_s + J Ru |v|^N sign(v), the sum never a pull"
    ),
    tolerance=1e-3,
    share_of="the strength",
    why=WHY,
    over={"smith": "smith", "viscous": "viscous", "power": "power"},
)
def toe(law: str) -> Iterator[Compared]:
    more = {"exponent": 0.2} if law == "power" else {}
    one = {"resistance": RU, "quake": QUAKE, "damping": J, "damping_law": law, "gap": 0.002, **more}
    run, times = _along(TOE_PATH, far_end="ground", ground={"surface": 0.0, "toe": one})
    static = {
        (1.27, 2): 50.0,
        (5, 0): 100.0,
        (3, -1): 21.259843,
        (0, 0): 0.0,
        (3, 1): 21.259843,
        (6, 0.5): 100.0,
    }
    # of the printed table with Smith's damping, and where contact is lost and found, on which the other laws jump
    printed = {(1.27, 2): 66.404199, (3, -1): 17.772336, (3, 1): 24.747349, (6, 0.5): 108.2021}
    printed |= {(2.46, -1): 0.0, (2.46, 1): 0.0}
    found = dict(zip(TOE_PATH[1:], _at(run, "end", times), strict=True))
    for (d, v), kilonewton in static.items():
        r = kilonewton * 1e3
        # a power law jumps where v passes zero: the mean of some steps around is not its value there
        if law == "power" and v == 0 and r > 0:
            continue
        wanted = r + J * {"smith": r * v, "viscous": RU * v, "power": RU * abs(v) ** 0.2 * np.sign(v)}[law]
        yield value(f"D = {d:g} mm, v = {v:g} m/s", max(wanted, 0.0) if r else 0.0, found[d, v], "N", RU)
    for (d, v), kilonewton in printed.items() if law == "smith" else ():
        yield value(f"D = {d:g} mm, v = {v:g} m/s, printed", kilonewton * 1e3, found[d, v], "N", RU)


@check(
    model=(
        "cushion of 1e9 N/m, restitution 0.8, pressed by 4 mm between a ram of 1000 kg and a base that "
        "does not give"
    ),
    title="A cushion unloads along k/e^2",
    source="E. A. L. Smith 1960; Hirsch, Carr & Lowery 1976, FHWA-IP-76-13 (from memory); recomputed table",
    formula="F = k d up, k/e^2 (d - 1.44 mm) down",
    tolerance=1e-3,
    share_of="the peak force",
    why="compression by integrating the ram's velocity; the base gives by 1e-3 of the cushion, which is allowed for",
)
def cushion() -> Iterator[Compared]:
    load = {
        "kind": "drop",
        "ram_mass": 1000.0,
        "impact_velocity": 4.0,
        "cushion": {"stiffness": 1e9, "restitution": 0.8},
    }
    base = 1e13 * 0.01 / LONG
    run = solved(
        load, part(LONG, of="stiff"), materials=[STIFF], far_end="fixed", duration=0.003, dx=LONG / 2
    )
    train = run.head_train
    pressed = np.cumsum(train.ram_velocity) * run.time_step - train.cushion_force / base
    top = int(np.argmax(pressed))
    down = {3.5: 3218.75, 3.0: 2437.5, 2.5: 1656.25, 2.0: 875.0, 1.5: 93.75}
    at = np.array(list(down)) * 1e-3
    falling = slice(top, top + int(np.argmax(train.cushion_force[top:] <= 0)))
    found = np.interp(-at, -pressed[falling], train.cushion_force[falling])
    share = 1 / (1 + 1e9 / base)
    yield value("peak force", 4e6 * np.sqrt(share), train.cushion_force.max(), "N")
    yield history("force on unloading", np.array(list(down.values())) * 1e3, found, "N", 4e6)
    rising = np.interp(at, pressed[:top], train.cushion_force[:top])
    yield history("force on loading", at * 1e9, rising, "N", 4e6)
    yield value(
        "energy lost, share of what it took", 0.36, run.ledger.final["cushion_loss"] / (8000.0 * share)
    )


@check(
    model="bilinear rod, 355 MPa, E_t = E/10, stretched slowly to and fro between +-0.5 %",
    title="Isotropic and kinematic hardening over three half cycles",
    source="Simo & Hughes 1998, Computational Inelasticity, ch. 1 (from memory); recomputed",
    formula=(
        "first turn s1 = s_y + E_t (e1 - e_y); isotropic: reverse yield at -s1, then on by E_t; "
        "kinematic: reverse yield at s1 - 2 s_y, so that the loop closes: -s1, +s1"
    ),
    tolerance=1e-3,
    share_of="the stress at the first turn",
    why="a half cycle takes 100 passages of the wave: what swings is under 0.1 %",
    over={"isotropic": "isotropic", "kinematic": "kinematic"},
)
def hardening(kind: str) -> Iterator[Compared]:
    limit, tangent, turn = 355e6, E / 10, 0.005
    law = {"kind": "elastic_plastic", "yield_stress": limit, "hardening_modulus": tangent, "hardening": kind}
    half = 0.04
    times = np.linspace(0, 3 * half, 1201)
    # to +e1, to -e1, to +e1: cosines of displacement, so that every turn is at rest
    speed = np.where(
        times <= half,
        -turn * np.pi / (2 * half) * np.sin(np.pi * times / half),
        turn * np.pi / half * np.sin(np.pi * (times - half) / half),
    )
    load = {"kind": "history", "quantity": "velocity", "times": times.tolist(), "values": speed.tolist()}
    run = solved(
        load,
        part(1.0, of="metal"),
        materials=[material("metal", law=law)],
        far_end="fixed",
        gauges={"middle": 0.5},
        duration=3 * half,
        dx=0.1,
    )
    stress = run.gauges["middle"].stress
    found = [stress[round(n * half / run.time_step)] for n in (1, 2, 3)]
    first = limit + tangent * (turn - limit / E)
    wanted, reach = [first], first
    for _ in range(2):
        if kind == "kinematic":
            wanted.append(-wanted[-1])
        else:
            # elastic over 2 x the stress reached, then on by the tangent
            reach += tangent * (2 * turn - 2 * reach / E)
            wanted.append(-np.sign(wanted[-1]) * reach)
    for n, (exact, got) in enumerate(zip(wanted, found, strict=True), 1):
        yield value(f"stress at turn {n}", exact, got, "Pa", first)
