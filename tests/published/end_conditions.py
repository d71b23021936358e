"""Ends with a spring, a dashpot, a mass or all three, met by a step wave; and the same on the way along a rod."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.linalg import expm

from tests.published.registry import Array, Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, LENGTH, E, Z, part, pulse, solved

GRAFF = "F + Z v = 2 F0 at the end (Graff 1975, ch. 2, from memory); recomputed"
SECOND_ORDER = (
    "the step front is one element wide, the rest is of second order in dt; 240 elements give about 2e-5"
)
F0 = 1e6
AFTER = np.array([0.1, 0.25, 0.5, 1.0, 2.0]) * 1e-3
FROM, LONG = 0.0012, 6.0


def _step(far_end: dict | str = "free", **more) -> tuple[Array, Array, Array, Array, float]:
    """A step of 1 MN runs into the end of a rod of 6 m: times after arrival, force, velocity and displacement there."""
    run = solved(
        pulse("rectangle", 1.0, F0),
        part(LONG),
        far_end=far_end,
        gauges={"end": LONG},
        duration=FROM + 0.0022,
        dx=0.025,
        **more,
    )
    gauge = run.gauges["end"]
    return gauge.time - FROM, -gauge.force, gauge.velocity, gauge.displacement, run.time_step


def _rows(at: Array, *records: Array) -> list[Array]:
    return [record[np.rint((FROM + AFTER) / (at[1] - at[0])).astype(int)] for record in records]


@check(
    model="step wave onto a spring, k = 8e8 N/m",
    title="Spring at the far end",
    source=GRAFF,
    formula="u = (2 F0/k)(1 - exp(-k t/Z)), F = k u, v = (2 F0/Z) exp(-k t/Z)",
    tolerance=2e-4,
    share_of="the largest value",
    why=SECOND_ORDER,
)
def spring() -> Iterator[Compared | Picture]:
    k = 8e8
    t, force, velocity, moved, _ = _step({"kind": "spring", "stiffness": k})
    force_at, velocity_at, moved_at = _rows(t, force, velocity, moved)
    yield history("force at the table's times", 2 * F0 * (1 - np.exp(-k * AFTER / Z)), force_at, "N", 2 * F0)
    yield history("velocity", 2 * F0 / Z * np.exp(-k * AFTER / Z), velocity_at, "m/s", 2 * F0 / Z)
    yield history("displacement", 2 * F0 / k * (1 - np.exp(-k * AFTER / Z)), moved_at, "m", 2 * F0 / k)
    yield value("force after 0.5 ms, printed 1264.2411 kN", 1264.2411e3, force_at[2], "N", 2 * F0)
    later = t >= 0
    exact = 2 * F0 * (1 - np.exp(-k * t[later] / Z))
    yield picture(
        "Force on a spring at the far end, step wave of 1 MN",
        "time after arrival, ms",
        "force, kN",
        t[later] * 1e3,
        exact / 1e3,
        force[later] / 1e3,
    )


@check(
    model="step wave onto a dashpot, seven ratios C/Z, and a matched end",
    title="Dashpot at the far end",
    source=GRAFF,
    formula="v = 2 F0/(Z + C), F = C v, F_r/F0 = (C - Z)/(C + Z); nothing comes back from C = Z",
    tolerance=1e-10,
    share_of="the incident wave",
    why="a centred dashpot on a node is exact at Courant number 1: no tolerance is needed",
)
def dashpot() -> Iterator[Compared]:
    for ratio in (0.0, 0.25, 0.5, 1.0, 2.0, 4.0):
        t, force, velocity, _, dt = _step({"kind": "dashpot", "coefficient": ratio * Z})
        inside = t > 1.5 * dt
        yield history(
            f"velocity, C/Z = {ratio}",
            np.full(inside.sum(), 2 / (1 + ratio)),
            velocity[inside] * Z / F0,
            "F0/Z",
        )
        wanted = np.full(inside.sum(), 2 * ratio / (1 + ratio))
        yield history(f"force, C/Z = {ratio}", wanted, force[inside] / F0, "F0", 1.0)
    t, force, velocity, _, dt = _step("matched")
    inside = t > 1.5 * dt
    reflected = (force - Z * velocity)[inside] / 2
    yield history("reflected by a matched end", np.zeros(inside.sum()), reflected / F0, "F0", 1.0)


@check(
    model="step wave onto a rigid mass of 200 kg",
    title="Mass at the far end",
    source=GRAFF,
    formula="v = (2 F0/Z)(1 - exp(-Z t/m)), F = 2 F0 exp(-Z t/m)",
    tolerance=2e-4,
    share_of="the largest value",
    why=SECOND_ORDER,
)
def mass() -> Iterator[Compared]:
    m = 200.0
    attached = [{"position": LONG, "kind": "mass", "value": m}]
    t, force, velocity, _, _ = _step(attachments=attached)
    force_at, velocity_at = _rows(t, force, velocity)
    yield history("force on the mass", 2 * F0 * np.exp(-Z * AFTER / m), force_at, "N", 2 * F0)
    yield history("velocity", 2 * F0 / Z * (1 - np.exp(-Z * AFTER / m)), velocity_at, "m/s", 2 * F0 / Z)
    yield value("force after 0.5 ms, printed 735.75888 kN", 735.75888e3, force_at[2], "N", 2 * F0)


@check(
    model="step wave onto mass 200 kg, dashpot 1e5 N s/m and spring 8e8 N/m side by side",
    title="Mass, dashpot and spring at the far end",
    source=GRAFF,
    formula="m u'' + (Z + C) u' + k u = 2 F0",
    tolerance=2e-4,
    share_of="the largest value",
    why=SECOND_ORDER,
)
def all_three() -> Iterator[Compared]:
    m, c, k = 200.0, 1e5, 8e8
    attached = [
        {"position": LONG, "kind": "mass", "value": m},
        {"position": LONG, "kind": "dashpot", "value": c},
    ]
    t, force, velocity, moved, _ = _step({"kind": "spring", "stiffness": k}, attachments=attached)
    matrix = np.array([[0, 1, 0], [-k / m, -(Z + c) / m, 2 * F0 / m], [0, 0, 0]])
    exact = np.array([expm(matrix * s) @ (0, 0, 1) for s in AFTER])
    force_at, velocity_at, moved_at = _rows(t, force, velocity, moved)
    yield history("displacement", exact[:, 0], moved_at, "m")
    yield history("velocity", exact[:, 1], velocity_at, "m/s", 2 * F0 / Z)
    yield history("force", 2 * F0 - Z * exact[:, 1], force_at, "N", 2 * F0)
    for i, printed in ((0, 0.045930459e-3), (2, 0.79532123e-3), (4, 2.7020382e-3)):
        yield value(f"displacement after {AFTER[i] * 1e3:g} ms, printed", printed, moved_at[i], "m", 2.7e-3)


@check(
    model="haversine onto springs of 0.1 to 100 EA/dx, Courant number 1",
    title="Springs of any stiffness are stable and right",
    source="u' + (k/Z) u = 2 F(t)/Z solved for a haversine (textbook)",
    formula="F/F0 = 1 - exp(-bt) - b (b cos wt + w sin wt - b exp(-bt))/(b^2 + w^2), b = k/Z, w = 2 pi/T",
    tolerance=5e-4,
    share_of="the peak force",
    why="required are 0.5 %; second order in dt, 200 steps in the pulse",
)
def stiff_springs() -> Iterator[Compared]:
    dx, span = 0.025, 0.001
    for factor in (0.1, 1.0, 10.0, 100.0):
        k = factor * E * AREA / dx
        run = solved(
            pulse("haversine", span, F0),
            part(LONG),
            far_end={"kind": "spring", "stiffness": k},
            gauges={"end": LONG},
            duration=FROM + span,
            dx=dx,
        )
        gauge = run.gauges["end"]
        inside = gauge.time >= FROM
        t, b, w = gauge.time[inside] - FROM, k / Z, 2 * np.pi / span
        gone = np.exp(-b * t)
        exact = 1 - gone - b * (b * np.cos(w * t) + w * np.sin(w * t) - b * gone) / (b**2 + w**2)
        yield history(f"force, k = {factor:g} EA/dx", F0 * exact, -gauge.force[inside], "N")


@check(
    model="gap of 1 mm before a rigid wall, step wave of 2.5 m/s",
    title="Far end free until its gap closes, then held",
    source="two reflections laid together; recomputed",
    formula="v = 2 v0 for gap/(2 v0) = 0.2 ms, then v = 0 and F = 2 F0",
    tolerance=1e-10,
    share_of="the incident wave",
    why="contact by impulse needs no stiffness and is exact at Courant number 1 where closing falls on a step",
)
def gap_to_wall() -> Iterator[Compared]:
    t, force, velocity, moved, dt = _step({"kind": "wall", "gap": 0.001})
    before, after = (t > 1.5 * dt) & (t < 0.0002 - 1.5 * dt), t > 0.0002 + 1.5 * dt
    yield history("velocity before", np.full(before.sum(), 5.0), velocity[before], "m/s", 2.5)
    yield history("velocity after", np.zeros(after.sum()), velocity[after], "m/s", 2.5)
    yield history("force after", np.full(after.sum(), 2 * F0), force[after], "N", F0)
    yield history("displacement after", np.full(after.sum(), 0.001), moved[after], "m", 0.001)


def _passed(attachment: dict) -> tuple[Array, Array, Array, float]:
    """A step passes what is attached at 5 m of a long rod: times after arrival there, echo and transmitted force."""
    run = solved(
        pulse("rectangle", 1.0, F0),
        part(LENGTH),
        far_end="matched",
        attachments=[{"position": 5.0, **attachment}],
        gauges={"before": 4.9, "behind": 5.1},
        duration=0.00288,
        dx=0.025,
    )
    before, behind = run.gauges["before"], run.gauges["behind"]
    return before.time - 0.00102, -before.up_wave, -behind.down_wave, run.time_step


@check(
    model="step wave past a dashpot to ground on the way along the rod",
    title="Dashpot along the member",
    source="continuity of velocity, jump of force (textbook); recomputed",
    formula="up-wave C/(2 Z + C), transmitted 2 Z/(2 Z + C) of the incident force",
    tolerance=1e-10,
    share_of="the incident force",
    why="a centred dashpot on a node is exact at Courant number 1",
)
def dashpot_along() -> Iterator[Compared]:
    for ratio in (0.25, 1.0, 4.0):
        t, echo, passed, dt = _passed({"kind": "dashpot", "value": ratio * Z})
        inside = t > 1.5 * dt
        yield history(
            f"up-wave, C/Z = {ratio}",
            np.full(inside.sum(), ratio / (2 + ratio)),
            echo[inside] / F0,
            "F0",
            1.0,
        )
        yield history(
            f"passed, C/Z = {ratio}", np.full(inside.sum(), 2 / (2 + ratio)), passed[inside] / F0, "F0", 1.0
        )


@check(
    model="step wave past a mass of 200 kg or a spring of 8e8 N/m to ground on the way along the rod",
    title="Mass and spring along the member",
    source="continuity (textbook); recomputed",
    formula=(
        "mass: transmitted 1 - exp(-2 Z t/m); spring: transmitted exp(-k t/(2 Z)); echo = transmitted - "
        "incident, turned"
    ),
    tolerance=5e-4,
    share_of="the incident force",
    why="second order in dt: the passage is half as long as at an end, so about 6e-5",
)
def mass_and_spring_along() -> Iterator[Compared]:
    after = np.array([0.1, 0.2, 0.4, 0.8, 1.5]) * 1e-3
    forms = {
        "mass": (200.0, 1 - np.exp(-2 * Z * after / 200.0)),
        "spring": (8e8, np.exp(-8e8 * after / (2 * Z))),
    }
    for kind, (amount, exact) in forms.items():
        t, echo, passed, dt = _passed({"kind": kind, "value": amount})
        at = np.rint((after - t[0]) / dt).astype(int)
        yield history(f"{kind}: transmitted", exact, passed[at] / F0, "F0", 1.0)
        yield history(f"{kind}: echo", 1 - exact, echo[at] / F0, "F0", 1.0)
