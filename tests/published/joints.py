"""Joints along the member: contact faces with and without a gap, splices with slack."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, part, pulse, solved

EXACT = "contact by impulse: exact at Courant number 1 where closing and opening fall on steps"
LAID = "reflections at a free end, then an interface; recomputed"


@check(
    model="contact joint with a gap of 1 mm between two equal rods, step wave of 2.5 m/s",
    title="A gap delays the wave by gap/(2 v0)",
    source=LAID,
    formula="free end moves at 2 v0 for gap/(2 v0) = 0.2 ms, then full transmission; echo -F0 for 0.2 ms",
    tolerance=1e-8,
    share_of="the incident force",
    why=EXACT,
)
def gap_and_step() -> Iterator[Compared | Picture]:
    run = solved(
        pulse("rectangle", 1.0),
        part(4.0),
        part(4.0, joint_above={"kind": "contact", "gap": 0.001}),
        gauges={"before": 3.0, "behind": 5.0, "face": 4.0},
        far_end="matched",
        duration=0.00215,
        dx=0.02,
    )
    dt = run.time_step
    t = run.gauges["before"].time
    clear = 1.5 * dt
    echo, passed = -run.gauges["before"].up_wave, -run.gauges["behind"].down_wave
    free = (t > 0.0010 + clear) & (t < 0.0012 - clear)
    yield history("echo while open", np.full(free.sum(), -1e6), echo[free], "N")
    # after 1.4 ms the struck end has sent the first echo back again, towards the joint
    shut = (t > 0.0012 + clear) & (t < 0.0020)
    yield history("echo after closing", np.zeros(shut.sum()), echo[shut], "N", 1e6)
    waiting, on = t < 0.0012 - clear, (t > 0.0012 + clear) & (t < 0.0020)
    yield history("transmitted before closing", np.zeros(waiting.sum()), passed[waiting], "N", 1e6)
    yield history("transmitted after closing", np.full(on.sum(), 1e6), passed[on], "N")
    face = run.gauges["face"]
    moving = (t > 0.0008 + clear) & (t < 0.0010 - clear)
    yield history("velocity of the free face", np.full(moving.sum(), 5.0), face.velocity[moving], "m/s")
    closed = next(e.time for e in run.events if e.kind == "joint_closed")
    yield value("joint closes (off in steps)", 0.0010, closed, "s", dt, 1.01)
    exact = np.where(t > 0.0012, 1e6, 0.0)
    yield picture(
        "Step of 1 MN through a joint with a gap of 1 mm: force 1 m behind it",
        "time, ms",
        "force, kN",
        t * 1e3,
        exact / 1e3,
        -run.gauges["behind"].force / 1e3,
    )


@check(
    model="contact joint with a gap of 1 mm, rectangular pulse of 0.6 ms",
    title="A gap shortens a pulse by gap/(2 v0)",
    source=LAID,
    formula="transmitted duration T - gap/(2 v0)",
    tolerance=1e-8,
    why=EXACT,
)
def gap_and_pulse() -> Iterator[Compared]:
    for gap in (0.0, 0.001, 0.002):
        run = solved(
            pulse("rectangle", 0.0006),
            part(4.0),
            part(4.0, joint_above={"kind": "contact", "gap": gap}),
            gauges={"behind": 5.0},
            far_end="matched",
            duration=0.0022,
            dx=0.02,
        )
        width = np.sum(-run.gauges["behind"].force) * run.time_step / 1e6
        yield value(f"duration behind a gap of {gap * 1e3:g} mm", 0.0006 - gap / 5.0, width, "s")


@check(
    model="splice with 0.5 mm of slack, rectangular pull of 1 MN; two equal rods",
    title="A slack splice carries tension late",
    source=LAID,
    formula="open for slack/(2 v0) = 0.1 ms, then full transmission of tension; compression passes at once",
    tolerance=1e-8,
    share_of="the incident force",
    why=EXACT,
)
def slack() -> Iterator[Compared]:
    for peak, delay in ((-1e6, 0.0001), (1e6, 0.0)):
        run = solved(
            pulse("rectangle", 0.0006, peak),
            part(4.0),
            part(4.0, joint_above={"kind": "slack_splice", "slack": 0.0005}),
            gauges={"behind": 5.0},
            far_end="matched",
            duration=0.0022,
            dx=0.02,
        )
        gauge, dt = run.gauges["behind"], run.time_step
        t = gauge.time - 0.0010
        name = "pull" if peak < 0 else "push"
        before, inside = t < delay - 1.5 * dt, (t > delay + 1.5 * dt) & (t < 0.0006 - 1.5 * dt)
        yield history(f"{name}: force before", np.zeros(before.sum()), -gauge.force[before], "N", 1e6)
        yield history(f"{name}: force behind", np.full(inside.sum(), peak), -gauge.force[inside], "N")
    # the pulse's own end closes the splice again: what was open moves back
    after = t > 0.0006 + 1.5 * dt
    yield history("push: force after", np.zeros(after.sum()), gauge.force[after], "N", 1e6)


@check(
    model="contact joint at a step of section, half-sine compression",
    title="A joint under compression is no joint",
    source="continuity of force and velocity at the step",
    formula="transmitted 2 b/(1 + b), reflected (b - 1)/(b + 1), as for a bonded step with b = 2",
    tolerance=1e-8,
    share_of="the incident force",
    why=EXACT + "; compared are times at which the joint is pressed",
)
def at_a_step() -> Iterator[Compared]:
    run = solved(
        pulse("half_sine", 0.0006),
        part(4.0),
        part(4.0, 2 * AREA, joint_above={"kind": "contact", "gap": 0.0}),
        gauges={"before": 3.0, "behind": 5.0},
        far_end="matched",
        duration=0.0017,
        dx=0.02,
    )
    t, dt = run.gauges["before"].time, run.time_step
    inside = (t > 0.0010 + 2 * dt) & (t < 0.0016 - 3 * dt)
    s = t[inside] - 0.0010
    # mean over two steps of a half-sine: its value times sin(w dt)/(w dt)
    w = np.pi / 0.0006
    wave = np.sin(w * s) * np.sin(w * dt) / (w * dt) * 1e6
    yield history("transmitted", 4 / 3 * wave, -run.gauges["behind"].down_wave[inside], "N", 1e6)
    yield history("reflected", wave / 3, -run.gauges["before"].up_wave[inside], "N", 1e6)


@check(
    model="contact joint without gap near a free end, rectangular pulse of 0.2 ms",
    title="The end piece flies off with the momentum",
    source="momentum trap after B. Hopkinson 1914 (Kolsky 1963, from memory); recomputed",
    formula=(
        "an end piece of half the pulse's length takes all of it: velocity 2 v0 of the piece, the rod is "
        "left at rest"
    ),
    tolerance=1e-8,
    share_of="the value, or 2 v0",
    why=EXACT,
)
def end_piece() -> Iterator[Compared]:
    run = solved(
        pulse("rectangle", 0.0002),
        part(4.0),
        part(0.5, joint_above={"kind": "contact", "gap": 0.0}),
        gauges={
            "rod, end": 4.0,
            "rod, middle": 2.0,
            "piece, face": {"position": 4.0, "side": "far"},
            "piece, end": 4.5,
        },
        duration=0.0016,
        dx=0.02,
    )
    dt = run.time_step
    later = run.gauges["rod, end"].time > 0.0010 + 2.5 * dt
    for name, wanted in (("rod, end", 0.0), ("rod, middle", 0.0), ("piece, face", 5.0), ("piece, end", 5.0)):
        found = run.gauges[name].velocity[later]
        yield history(f"velocity of {name}", np.full(later.sum(), wanted), found, "m/s", 5.0)
    parted = next(e.time for e in run.events if e.kind == "joint_opened")
    yield value("joint opens (off in steps)", 0.0010, parted, "s", dt, 1.01)
