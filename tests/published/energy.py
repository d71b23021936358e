"""Energy: what a pulse carries, what passes a gauge, what the ground takes; the ledger closes for every model."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from solver import Result
from tests.published.registry import Compared, check, value
from tests.published.rods import AREA, GRAVITY, E, Z, material, part, pulse, solved


@check(
    model="uniform rod, half-sine of 1 MN and 1 ms",
    title="Energy of a pulse",
    source="recomputed from d'Alembert's solution",
    formula="F0^2 T/(2 Z) = 1250 J, half kinetic and half elastic while it travels; as much passes a gauge",
    tolerance=2e-4,
    why="the mean over two steps of a half-sine of 200 steps takes (pi/200)^2/3 of its square",
)
def of_a_pulse() -> Iterator[Compared]:
    run = solved(pulse("half_sine", 0.001), gauges={"5 m": 5.0}, duration=0.0021, dx=0.025)
    middle = int(np.searchsorted(run.ledger.time, 0.0015))
    yield value("work of the load", 1250.0, run.ledger.final["work_of_load"], "J")
    yield value("kinetic while it travels", 625.0, run.ledger.parts["kinetic"][middle], "J")
    yield value("elastic while it travels", 625.0, run.ledger.parts["elastic_member"][middle], "J")
    largest, final = run.transferred_energy["5 m"]
    yield value("passed 5 m, largest", 1250.0, largest, "J")
    yield value("passed 5 m, final", 1250.0, final, "J")


@check(
    model="the same pulse reflected: free end, dashpot of 3 Z",
    title="Energy that comes back past a gauge",
    source="F_r/F0 = (C - Z)/(C + Z) (Graff 1975, from memory); recomputed",
    formula="final = 1250 (1 - r^2) J: 0 for a free end, 937.5 J where C = 3 Z",
    tolerance=2e-4,
    share_of="1250 J",
    why="as for the pulse itself",
)
def that_comes_back() -> Iterator[Compared]:
    for name, end, share in (
        ("free", "free", 0.0),
        ("dashpot 3 Z", {"kind": "dashpot", "coefficient": 3 * Z}, 0.75),
    ):
        run = solved(pulse("half_sine", 0.001), far_end=end, gauges={"5 m": 5.0}, duration=0.0041, dx=0.025)
        yield value(f"final, {name}", 1250.0 * share, run.transferred_energy["5 m"][1], "J", 1250.0)
        lost = run.ledger.final["absorbed_by_dashpots"]
        yield value(f"absorbed, {name}", 1250.0 * share, lost, "J", 1250.0)


@check(
    model="ram, cushion, member and a toe without damping: what the ground takes",
    title="Work on the toe = Ru x set",
    source="E. A. L. Smith 1960 (from memory); energy balance",
    formula=(
        "lost in slip = Ru x set; kinetic energy of the ram = m g h x efficiency; cushion keeps 1 - e^2 "
        "of what it took"
    ),
    tolerance=1e-3,
    why="required: 0.1 %",
)
def on_the_toe() -> Iterator[Compared]:
    run = _pile(damping=0.0)
    yield value("energy of the ram", 4000.0 * GRAVITY * 1.0 * 0.8, run.ledger.parts["initial_energy"][0], "J")
    slipped = run.max_toe_displacement - 2.54e-3
    yield value("lost in the ground by slip", 2e6 * slipped, run.ledger.final["ground_static_loss"], "J")
    yield value("set = largest movement of the toe - quake", slipped, run.set, "m")
    # R_u (set + Q/2) <= energy transferred <= energy of the ram: what is between is left in the member
    energy, _ = run.transferred_energy["head"]
    low, high = 2e6 * (run.set + 2.54e-3 / 2), 4000.0 * GRAVITY * 0.8
    yield value(
        "bounds of the transferred energy hold (1)", 1.0, float(low * 0.999 <= energy <= high), "", 1.0
    )


def _pile(damping: float, **more) -> Result:
    load = {
        "kind": "drop",
        "ram_mass": 4000.0,
        "drop_height": 1.0,
        "efficiency": 0.8,
        "cushion": {"stiffness": 1e9, "restitution": 0.8},
    }
    ground = {"surface": 0.0, "toe": {"resistance": 2e6, "quake": 2.54e-3, "damping": damping}}
    if damping:
        total = {"resistance": 8e5, "distribution": "growing", "quake": 2.54e-3, "damping": damping}
        ground["shaft_total"] = total
    return solved(
        load,
        part(20.0, 0.025, "it"),
        materials=[material("it", 2e11, 8000)],
        gauges={"head": 0.0},
        far_end="ground",
        ground=ground,
        **more,
    )


def _closes() -> dict[str, Result]:
    """One run for each model, at the program's own mesh."""
    drop = {
        "kind": "drop",
        "ram_mass": 800.0,
        "impact_velocity": 3.0,
        "cushion": {"stiffness": 8e8, "restitution": 0.6},
    }
    shot = {"kind": "striker", "velocity": 10.0, "segments": [part(0.5, AREA / 2)]}
    plastic = {
        "kind": "elastic_plastic",
        "yield_stress": 5e7,
        "hardening_modulus": E / 20,
        "hardening": "kinematic",
    }
    viscous = {"kind": "viscoelastic", "viscosity": 1e6}
    brittle = {"kind": "brittle_tension", "tensile_strength": 3e7}
    push = pulse("half_sine", 0.001)
    end = {"duration": 0.012}

    def of(law: dict) -> dict:
        return {"materials": [material("it", law=law, poisson_ratio=0.3)]}

    soft = material("soft", 6e6, 1200.0, law={"kind": "large_strain"})
    round_bar = {"shape": "solid_round", "diameter": 0.3}
    return {
        "ram, cushion with e = 0.6, cap": solved(drop | {"cap_mass": 200.0}, **end),
        "toe and shaft with Smith damping, gravity": _pile(0.5, gravity=True),
        "striker on a rod": solved(shot, **end),
        "contact joint with gap": solved(
            push, part(4.0), part(6.0, joint_above={"kind": "contact", "gap": 2e-4}), **end
        ),
        "elastic-plastic": solved(push, part(of="it"), **of(plastic), **end),
        "Kelvin-Voigt": solved(push, part(of="it"), **of(viscous), **end),
        "Kelvin-Voigt, rectangle": solved(pulse("rectangle", 0.001), part(of="it"), **of(viscous), **end),
        "brittle in tension": solved(push, part(of="it"), **of(brittle), **end),
        "large strain": solved(
            pulse("haversine", 0.05, 2e4), part(2.0, of="soft"), materials=[soft], duration=0.1
        ),
        "wall beyond a gap": solved(push, far_end={"kind": "wall", "gap": 1e-4}, **end),
        "lateral inertia": solved(
            push, part(section=round_bar, of="it"), **of({"kind": "elastic"}), lateral_inertia=True, **end
        ),
    }


LINEAR = ("lateral inertia",)


@check(
    model="one run for each model, half-sine or blow, at the program's own mesh",
    title="The ledger closes",
    source=(
        "energy criterion of Belytschko, Liu & Moran 2000 (from memory), with stored and lost energy "
        "read from states"
    ),
    formula="came in = stored + lost",
    tolerance=1e-3,
    share_of="the largest energy of the run",
    why="required: 0.1 %, and 1e-10 where all is linear",
)
def closes() -> Iterator[Compared]:
    for name, run in _closes().items():
        yield value(name, 0.0, run.ledger.residual, "share", 1.0, tolerance=1e-10 if name in LINEAR else None)


@check(
    model="fixed and free rods under every shape of load, Courant number 1",
    title="The ledger of a linear member closes to round-off",
    source="half-step energies (textbook of central differences)",
    formula="came in = stored + lost",
    tolerance=1e-10,
    share_of="the largest energy of the run",
    why="required: 1e-10",
)
def linear_closes() -> Iterator[Compared]:
    for shape, more in (
        ("rectangle", {}),
        ("half_sine", {}),
        ("haversine", {}),
        ("triangle", {}),
        ("trapezoid", {"rise": 2e-4, "fall": 3e-4}),
        ("decay", {}),
    ):
        for end in ("free", "fixed", "matched", {"kind": "spring", "stiffness": 8e8}):
            run = solved(
                pulse(shape, 0.001, **more), part(4.0), part(6.0, AREA / 2), far_end=end, duration=0.02
            )
            name = end if isinstance(end, str) else "spring"
            yield value(f"{shape}, {name}", 0.0, run.ledger.residual, "share", 1.0)
