"""Waves on a uniform rod: d'Alembert's solution at Courant number 1 is met to round-off."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from tests.published.closed_forms import at_gauge, displacement, impulse, polygon
from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, DENSITY, LENGTH, C, E, Z, material, part, pulse, solved

TEXTBOOK = (
    "Kolsky 1963, Stress Waves in Solids, ch. III; Graff 1975, Wave Motion in Elastic Solids, ch. 2 "
    "(from memory)"
)
MEANS = (
    "At Courant number 1 the scheme solves the wave equation exactly: displacements of nodes are "
    "those of points, forces are means over the two elements beside a gauge, velocities means over "
    "the two steps around a time, and the closed form is averaged alike. What is left is round-off."
)
FORMULA = "u = f(x - ct) + g(x + ct) by images of the struck end and the far end; F = Z v in a wave that runs one way"
SHAPES = {
    "rectangle": ("rectangle", {}),
    "half-sine": ("half_sine", {}),
    "haversine": ("haversine", {}),
    "triangle": ("triangle", {}),
    "trapezoid": ("trapezoid", {"rise": 0.0003, "fall": 0.0002}),
    "decay": ("decay", {}),
}


def _compare(
    load: dict, entering, near: int, far: int, far_end: str, end: float = 0.0102
) -> Iterator[Compared]:
    """Run the round-number rod with gauges at its ends and inside, and compare all three records of each."""
    places = {"the struck end": 0.0, "2.5 m": 2.5, "7 m": 7.0, "the far end": LENGTH}
    run = solved(load, far_end=far_end, gauges=places, duration=end, dx=0.1)
    scale = 1e6 / Z if load["quantity"] == "force" else 1.0
    for name, x in places.items():
        gauge = run.gauges[name]
        force, velocity, moved = at_gauge(
            entering, x, gauge.time, run.time_step, stiffness=E * AREA, length=LENGTH, c=C, near=near, far=far
        )
        yield history(f"velocity at {name}", velocity, gauge.velocity, "m/s", scale)
        yield history(f"displacement at {name}", moved, gauge.displacement, "m", scale * 0.001)
        # where motion is prescribed, the end's force is a reaction: it is compared inside the rod
        if not (load["quantity"] == "velocity" and x == 0.0):
            yield history(f"force at {name}", force, -gauge.force, "N", scale * Z)


@check(
    model="uniform elastic rod, force pulse, free far end",
    title="Every shape of pulse, two reflections",
    source=TEXTBOOK,
    formula=FORMULA,
    tolerance=1e-10,
    share_of="the peak of the incident wave",
    why=MEANS,
    over=SHAPES,
)
def every_shape(which: tuple[str, dict]) -> Iterator[Compared]:
    shape, more = which
    form = impulse(shape, 0.001, **more)
    yield from _compare(pulse(shape, 0.001, **more), lambda t: 1e6 / Z * form(t), 1, 1, "free")


@check(
    model="uniform elastic rod, far ends fixed and matched, force and velocity loads",
    title="Ends that send back +1, -1 and nothing",
    source=TEXTBOOK,
    formula=FORMULA
    + "; a matched end sends nothing back; an end whose motion is prescribed reflects like a fixed one",
    tolerance=1e-10,
    share_of="the peak of the incident wave",
    why=MEANS,
    over={
        "force, fixed": ("force", -1, "fixed"),
        "force, matched": ("force", 0, "matched"),
        "velocity, free": ("velocity", 1, "free"),
        "velocity, fixed": ("velocity", -1, "fixed"),
        "velocity, matched": ("velocity", 0, "matched"),
    },
)
def every_end(which: tuple[str, int, str]) -> Iterator[Compared]:
    quantity, far, end = which
    form = impulse("half_sine", 0.001)
    peak = 1e6 if quantity == "force" else 1.0
    near = 1 if quantity == "force" else -1
    share = peak / Z if quantity == "force" else peak
    yield from _compare(pulse("half_sine", 0.001, peak, quantity), lambda t: share * form(t), near, far, end)


@check(
    model="uniform elastic rod, load from a table of points",
    title="A history of 4001 points, with two jumps",
    source="d'Alembert's solution (textbook)",
    formula=FORMULA + "; the load is linear between its points",
    tolerance=1e-10,
    share_of="the peak of the incident wave",
    why=MEANS,
)
def long_history() -> Iterator[Compared]:
    times = np.linspace(0.0, 0.004, 4001)
    values = 1e6 * np.sin(2 * np.pi * times / 0.0013) * np.exp(-times / 0.002)
    values[1000:1800] += 4e5
    load = {"kind": "history", "quantity": "force", "times": times.tolist(), "values": values.tolist()}
    form = polygon(times, values / Z)
    yield from _compare(load, form, 1, 1, "free", end=0.0061)


@check(
    model="uniform elastic rod, 400 elements",
    title="Half-sine of 1 MN and 1 ms: the table of times",
    source="recomputed from d'Alembert's solution; values at points, not means",
    formula=(
        "F(5 m) = F0 sin(pi (t - 1 ms)/T), reflected with -1; v(toe) = 2 x incident; F(toe) = 2 x "
        "incident if fixed"
    ),
    tolerance=1e-4,
    share_of="the peak",
    why="the mean over two steps of a half-sine of 200 steps differs from its value by (pi/200)^2/6 = 4e-5",
)
def half_sine_table() -> Iterator[Compared | Picture]:
    places = {"5 m": 5.0, "toe": LENGTH}
    free = solved(pulse("half_sine", 0.001), gauges=places, duration=0.004, dx=0.025)
    fixed = solved(pulse("half_sine", 0.001), gauges=places, duration=0.004, far_end="fixed", dx=0.025)
    table = {
        # t (ms): F(5 m) kN, v(5 m) m/s, v(toe) m/s, F(toe) kN if fixed
        1.25: (707.10678, 1.767767, 0, 0),
        1.5: (1000, 2.5, 0, 0),
        2.25: (0, 0, 3.5355339, 1414.2136),
        2.5: (0, 0, 5, 2000),
        2.75: (0, 0, 3.5355339, 1414.2136),
        3.25: (-707.10678, 1.767767, 0, 0),
        3.5: (-1000, 2.5, 0, 0),
    }
    at = [round(ms / 1000 / free.time_step) for ms in table]
    rows = np.array(list(table.values()), float).T
    middle, toe, held = free.gauges["5 m"], free.gauges["toe"], fixed.gauges["toe"]
    yield history("force at 5 m, free toe", rows[0] * 1e3, -middle.force[at], "N")
    yield history("velocity at 5 m, free toe", rows[1], middle.velocity[at], "m/s")
    yield history("velocity of the free toe", rows[2], toe.velocity[at], "m/s")
    yield history("force at the fixed toe", rows[3] * 1e3, -held.force[at], "N", scale=2e6)
    t = middle.time
    form = impulse("half_sine", 0.001)
    exact, _, _ = at_gauge(
        lambda s: 1e6 / Z * form(s), 5.0, t, 1e-6, stiffness=E * AREA, length=LENGTH, c=C, near=1, far=1
    )
    yield picture(
        "Force at 5 m of a free rod of 10 m, half-sine of 1 MN and 1 ms (compression positive)",
        "time, ms",
        "force, kN",
        t * 1e3,
        exact / 1e3,
        -middle.force / 1e3,
    )


@check(
    model="uniform elastic rod, free ends",
    title="Impulse and displacement of a pulse",
    source="recomputed from d'Alembert's solution",
    formula="momentum = impulse = F0 T (rectangle), 2 F0 T/pi (half-sine); the toe moves by 2 x impulse / Z",
    tolerance=1e-10,
    why="sums that the scheme keeps exactly, whatever the mesh",
)
def pulse_totals() -> Iterator[Compared]:
    for shape, length, total in (("rectangle", 0.0004, 400.0), ("half_sine", 0.001, 2e3 / np.pi)):
        places = {"toe": LENGTH} | {f"{x:.1f}": x for x in np.arange(0.2, LENGTH, 0.2)}
        run = solved(pulse(shape, length), gauges=places, duration=0.0035, dx=0.2)
        moved = run.gauges["toe"].displacement[-1]
        yield value(f"displacement of the toe, {shape}", 2 * total / Z, moved, "m")
        then = round(0.0015 / run.time_step)
        speeds = [run.gauges[name].velocity[then] for name in places if name != "toe"]
        yield value(
            f"momentum of the wave on its way, {shape}", total, sum(speeds) * DENSITY * AREA * 0.2, "N s"
        )


@check(
    model="elastic rod thrown against a rigid wall",
    title="Contact of 2L/c, rebound at the same speed",
    source="Timoshenko & Goodier 1970, longitudinal impact of bars (from memory)",
    formula="force Z V for 2L/c, then every point moves back at V",
    tolerance=1e-10,
    why=MEANS,
)
def rod_on_wall() -> Iterator[Compared]:
    run = solved(
        {"kind": "none"},
        far_end={"kind": "wall", "gap": 0.0},
        gauges={"far end": LENGTH, "3 m": 3.0},
        duration=0.006,
        dx=0.1,
        initial_velocity=2.0,
    )
    t, dt = run.gauges["3 m"].time, run.time_step
    # the wall is met from the first step on, the last one that presses is that at 2L/c
    inside = (t > 1.5 * dt) & (t < 0.004 - 1.5 * dt)
    yield history(
        "force on the wall", np.full(inside.sum(), Z * 2.0), -run.gauges["far end"].force[inside], "N"
    )
    after = t > 0.0055
    yield history(
        "velocity after the rebound", np.full(after.sum(), -2.0), run.gauges["3 m"].velocity[after], "m/s"
    )
    still = (t > 0.0014 + 2 * dt) & (t < 0.0026 - 2 * dt)
    yield history(
        "velocity while pressed", np.zeros(still.sum()), run.gauges["3 m"].velocity[still], "m/s", 2.0
    )


@check(
    model="uniform rod: constants that follow from a material and a section",
    title="Wave speed and impedance of five reference rods",
    source="recomputed; steel of EN 1993-1-1, steel of US customary units, concrete and timber of handbooks",
    formula="c = sqrt(E/rho), Z = A sqrt(E rho)",
    tolerance=1e-7,
    why="the table is printed with eight digits",
)
def reference_rods() -> Iterator[Compared]:
    table = {
        "round numbers": (200e9, 8000, 0.01, 5000, 400000),
        "steel, SI": (210e9, 7850, 0.01, 5172.1942, 406017.24),
        "steel, US units": (206.84272e9, 7881.084, 0.00999998, 5123.0329, 403749.71),
        "concrete pile 0.40 m": (40e9, 2450, 0.16, 4040.6102, 1583919.2),
        "timber pile 0.30 m": (12e9, 800, 0.070685835, 3872.9833, 219012.05),
    }
    for name, (modulus, rho, area, speed, impedance) in table.items():
        run = solved(
            pulse("half_sine", 0.001),
            part(10.0, area, "it"),
            materials=[material("it", modulus, rho)],
            gauges={"middle": 5.0},
            duration=1e-4,
            dx=0.1,
        )
        yield value(f"{name}: Z", impedance, run.gauges["middle"].impedance, "N s/m")
        yield value(f"{name}: c", speed, 10.0 / run.elements / run.time_step, "m/s")


@check(
    model="uniform elastic rod, free ends, 50 elements at Courant number 1",
    title="A run of 200 passages stays exact",
    source=TEXTBOOK,
    formula=FORMULA,
    tolerance=1e-9,
    share_of="the peak of the incident wave",
    why="round-off grows with the number of steps, here 10 000, and the scheme adds nothing to it",
)
def long_run() -> Iterator[Compared]:
    run = solved(pulse("triangle", 0.001), gauges={"toe": LENGTH}, duration=0.4, dx=0.2)
    gauge, form = run.gauges["toe"], impulse("triangle", 0.001)
    t, dt = gauge.time, run.time_step
    last = t > 0.39
    both = [
        displacement(LENGTH, t[last] + k * dt, lambda s: 1e6 / Z * form(s), LENGTH, C, 1, 1) for k in (-1, 1)
    ]
    yield history(
        "velocity of the toe, last passages", (both[1] - both[0]) / (2 * dt), gauge.velocity[last], "m/s"
    )


@check(
    model="uniform elastic rod, rectangular pulse on a velocity load with release",
    title="A struck end that is let go after the pulse",
    source="d'Alembert's solution (textbook); what comes back meets a free end once the load is released",
    formula="v at the struck end = 2 x the up-wave after release, as at a free end",
    tolerance=1e-10,
    share_of="the velocity of the pulse",
    why=MEANS,
)
def released() -> Iterator[Compared]:
    run = solved(
        pulse("rectangle", 0.001, 1.0, "velocity", release=True),
        gauges={"head": 0.0, "middle": 5.0},
        duration=0.0102,
        dx=0.1,
    )
    # the end is free again before the first echo arrives at 4 ms, so both ends send back +1
    form = impulse("rectangle", 0.001)
    for name, x in (("head", 0.0), ("middle", 5.0)):
        gauge = run.gauges[name]
        _, velocity, moved = at_gauge(
            form, x, gauge.time, run.time_step, stiffness=E * AREA, length=LENGTH, c=C, near=1, far=1
        )
        yield history(f"velocity at the {name}", velocity, gauge.velocity, "m/s", 1.0)
        yield history(f"displacement at the {name}", moved, gauge.displacement, "m", 0.001)
