"""A rod strikes a rod: contact by impulse is exact at Courant number 1, and so is when the striker leaves."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from solver import Result
from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, C, Z, material, part, solved

KOLSKY = "Kolsky 1949, Proc. Phys. Soc. B 62; Kolsky 1963; Graff 1975 (from memory); recomputed"
EXACT = (
    "Required are 1e-8 of the first step; contact by impulse needs no stiffness and is exact at "
    "Courant number 1. The time of an event is that of the first step without contact, one step late."
)
SPEED, LONG = 10.0, 0.5


def _shot(
    *striker: dict,
    member: tuple[dict, ...] = (),
    dx: float = 0.01,
    far_end: str = "matched",
    end: float = 0.0021,
    **more,
) -> Result:
    load = {"kind": "striker", "velocity": SPEED, "segments": list(striker)}
    places = {
        "bar": 2.0,
        "rear": {"position": 0.0, "on": "striker"},
        "face": {"position": sum(s["length"] for s in striker), "on": "striker"},
        "head": 0.0,
    }
    return solved(
        load, *(member or (part(4.0),)), far_end=far_end, gauges=places, duration=end, dx=dx, **more
    )


def _left(run: Result) -> float:
    return next(e.time for e in run.events if e.kind == "separation")


@check(
    model="striker rod of 0.5 m at 10 m/s on a long rod of the same impedance",
    title="Equal impedances: a rectangle of rho c V/2, striker left at rest",
    source=KOLSKY,
    formula="F = Z V/2 for 2 Ls/c = 0.2 ms, v = V/2, sigma = 200 MPa, strain 0.001, striker at rest after",
    tolerance=1e-8,
    why=EXACT,
    share_of="the value, or V",
)
def equal() -> Iterator[Compared]:
    run = _shot(part(LONG))
    bar, dt = run.gauges["bar"], run.time_step
    t = bar.time - 2.0 / C
    inside, after = (t > 1.5 * dt) & (t < 0.0002 - 1.5 * dt), t > 0.0002 + 1.5 * dt
    count = inside.sum()
    yield history("stress at 2 m", np.full(count, 200e6), -bar.stress[inside], "Pa")
    yield history("strain at 2 m", np.full(count, 0.001), -bar.strain[inside])
    yield history("velocity at 2 m", np.full(count, 5.0), bar.velocity[inside], "m/s")
    yield history("force after the pulse", np.zeros(after.sum()), bar.force[after], "N", 2e6)
    yield value("impulse at 2 m", 400.0, -np.sum(bar.force) * dt, "N s")
    yield value("striker leaves (off in steps)", 0.0002, _left(run), "s", dt, 1.01)
    for place in ("rear", "face"):
        yield value(
            f"velocity of the striker's {place} after", 0.0, run.gauges[place].velocity[-1], "m/s", SPEED
        )


@check(
    model="striker of twice the impedance on a long rod",
    title="Heavier striker: a staircase",
    source=KOLSKY,
    formula="F_n = Zb V Zs/(Zs + Zb) r^n in steps of 2 Ls/c, r = (Zs - Zb)/(Zs + Zb) = 1/3",
    tolerance=1e-8,
    share_of="the first step",
    why=EXACT,
)
def heavier() -> Iterator[Compared | Picture]:
    run = _shot(part(LONG, 2 * AREA))
    bar, dt = run.gauges["bar"], run.time_step
    steps = np.round((bar.time - 2.0 / C) / dt)
    n, within = np.divmod(steps, round(0.0002 / dt))
    first = 2 / 3 * Z * SPEED
    exact = np.where(steps >= 0, first / 3 ** np.clip(n, 0, None), 0.0)
    # on a front both levels meet: the mean of the two elements beside the gauge
    front = (within == 0) & (steps >= 0)
    exact[front] = (exact[front] + np.where(n[front] > 0, 3 * exact[front], 0.0)) / 2
    yield history("force at 2 m, eight steps", exact, -bar.force, "N", first)
    for i, share in enumerate((0.66666667, 0.22222222, 0.074074074, 0.024691358)):
        at = round((2.0 / C + 0.0001 + 0.0002 * i) / dt)
        yield value(f"step {i + 1}, printed", share, -bar.force[at] / (Z * SPEED), "Zb V", 0.66666667 / 0.9)
    yield picture(
        "Striker of twice the impedance, 0.5 m at 10 m/s: force at 2 m",
        "time, ms",
        "force, kN",
        bar.time * 1e3,
        exact / 1e3,
        -bar.force / 1e3,
    )


@check(
    model="striker of half the impedance on a long rod",
    title="Lighter striker: one step, then it rebounds",
    source=KOLSKY,
    formula="F = Zb V/3 for 2 Ls/c; striker after V (Zs - Zb)/(Zs + Zb) = -V/3",
    tolerance=1e-8,
    share_of="the first step, or V",
    why=EXACT,
)
def lighter() -> Iterator[Compared]:
    run = _shot(part(LONG, AREA / 2))
    bar, dt = run.gauges["bar"], run.time_step
    t = bar.time - 2.0 / C
    inside, after = (t > 1.5 * dt) & (t < 0.0002 - 1.5 * dt), t > 0.0002 + 1.5 * dt
    yield history("force", np.full(inside.sum(), Z * SPEED / 3), -bar.force[inside], "N")
    yield history("force after", np.zeros(after.sum()), bar.force[after], "N", Z * SPEED / 3)
    yield value(
        "velocity of the striker's face after", -SPEED / 3, run.gauges["face"].velocity[-1], "m/s", SPEED
    )
    yield value("striker leaves (off in steps)", 0.0002, _left(run), "s", dt, 1.01)
    yield value("impulse", Z * SPEED / 3 * 0.0002, -np.sum(bar.force) * dt, "N s")


@check(
    model="aluminium striker of 0.5 m on steel of the same section, 10 m/s",
    title="Aluminium on steel",
    source=KOLSKY + "; printed numbers",
    formula="F = V Zs Zb/(Zs + Zb) = 1027.0231 kN for 0.1963961 ms, v = 2.5295061 m/s, striker after -4.9409877 m/s",
    tolerance=1e-7,
    why="Printed with eight digits; the member's length is chosen so that both travel times fit one step. "
    + EXACT,
)
def aluminium_on_steel() -> Iterator[Compared]:
    steel, light = material("steel", 210e9, 7850), material("aluminium", 70e9, 2700)
    passage = LONG / np.sqrt(70e9 / 2700)
    length = 20 * passage * np.sqrt(210e9 / 7850)
    run = _shot(
        part(LONG, of="aluminium"), member=(part(length, of="steel"),), materials=[steel, light], dx=0.01
    )
    bar, dt = run.gauges["bar"], run.time_step
    arrival = 2.0 / np.sqrt(210e9 / 7850)
    at = round((arrival + 0.0001) / dt)
    yield value("force", 1027.0231e3, -bar.force[at], "N")
    yield value("velocity", 2.5295061, bar.velocity[at], "m/s")
    yield value("velocity of the striker's face after", -4.9409877, run.gauges["face"].velocity[-1], "m/s")
    width = -np.sum(bar.force) * dt / 1027.0231e3
    yield value("duration, impulse over force", 0.1963961e-3, width, "s")


@check(
    model="striker of three segments of different section on a stepped rod",
    title="A striker of several segments",
    source=(
        "first contact: momentum at the interface; later: the total impulse is the striker's momentum "
        "lost; recomputed"
    ),
    formula="first step Zb V Zs/(Zs + Zb) with Zs of the segment that touches; impulse = momentum lost",
    tolerance=1e-8,
    why=EXACT,
)
def of_segments() -> Iterator[Compared]:
    run = _shot(part(0.3, 3 * AREA), part(0.2, AREA), part(0.1, 2 * AREA), end=0.0011)
    head, dt = run.gauges["head"], run.time_step
    mass = 8000 * AREA * (0.9 + 0.2 + 0.2)
    yield value("first step", 2 / 3 * Z * SPEED, -head.force[round(0.00002 / dt)], "N")
    on = run.fields.position < 0
    widths = np.diff(run.fields.edges)[on]
    after = round(run.fields.time[-1] / dt)
    speeds = run.fields.velocity[-1][on].astype(float)
    kept = float(np.sum(speeds * run.fields.area[on] * widths) * 8000)
    pushed = -np.sum(head.force[: after + 1]) * dt
    # pictures are kept in single precision, and show the middles of elements
    yield value("impulse given + momentum kept", mass * SPEED, pushed + kept, "N s", tolerance=1e-3)


@check(
    model="three equal rods in contact: a striker on two rods that touch",
    title="The last of three rods takes all of the momentum",
    source="waves of V/2 through equal rods; Kolsky 1963 (from memory); recomputed",
    formula="striker and middle rod are left at rest, the last rod of the striker's length flies off at V on average",
    tolerance=1e-8,
    share_of="V",
    why=EXACT,
)
def three_rods() -> Iterator[Compared]:
    touching = {"kind": "contact", "gap": 0.0}
    run = solved(
        {"kind": "striker", "velocity": SPEED, "segments": [part(LONG)]},
        part(2.0),
        part(LONG, joint_above=touching),
        gauges={
            "middle rod, head": 0.0,
            "middle rod, end": {"position": 2.0},
            "last rod, head": {"position": 2.0, "side": "far"},
            "last rod, end": 2.5,
            "striker": {"position": 0.2, "on": "striker"},
        },
        far_end="free",
        duration=0.00203,
        dx=0.01,
    )
    dt = run.time_step
    # the wave fills the last rod from both sides: it parts at 0.6 ms, after which its two ends move by V T each round
    first, last = round(0.0010 / dt), round(0.0018 / dt)
    moved = [run.gauges[f"last rod, {end}"].displacement for end in ("head", "end")]
    speed = np.mean([(u[last] - u[first]) / ((last - first) * dt) for u in moved])
    parted = next(e.time for e in run.events if e.kind == "joint_opened")
    yield value("mean velocity of the last rod", SPEED, speed, "m/s")
    yield value("striker after", 0.0, run.gauges["striker"].velocity[-1], "m/s", SPEED)
    for end in ("head", "end"):
        yield value(
            f"middle rod, {end}, after", 0.0, run.gauges[f"middle rod, {end}"].velocity[-1], "m/s", SPEED
        )
    yield value("the last rod leaves (off in steps)", (2.0 + 2 * LONG) / C, parted, "s", dt, 1.01)


@check(
    model="ram as a rod of its own, dropped straight on the head",
    title="A ram that is a rod is a striker",
    source="same problem, told in another way",
    formula="F = Z V/2 for 2 Ls/c, V = sqrt(2 g h)",
    tolerance=1e-8,
    share_of="the first step",
    why=EXACT,
)
def ram_as_rod() -> Iterator[Compared]:
    drop = {"kind": "drop", "ram": {"segments": [part(LONG)]}, "drop_height": 2.0, "efficiency": 0.9}
    run = solved(drop, part(4.0), far_end="matched", gauges={"bar": 2.0}, duration=0.0011, dx=0.01)
    bar, dt = run.gauges["bar"], run.time_step
    speed = np.sqrt(2 * 9.80665 * 2.0 * 0.9)
    t = bar.time - 2.0 / C
    inside, after = (t > 1.5 * dt) & (t < 0.0002 - 1.5 * dt), t > 0.0002 + 1.5 * dt
    yield history("force", np.full(inside.sum(), Z * speed / 2), -bar.force[inside], "N")
    yield history("force after", np.zeros(after.sum()), bar.force[after], "N", Z * speed / 2)
