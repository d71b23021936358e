"""Extreme but legal: everything that a file may hold is solved, or refused with a sentence. Each case here once
went wrong.
"""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver import SolveError, solve
from tests.published.rods import AREA, LENGTH, C, E, Z, case_of, material, part, pulse, solved
from tests.solver.test_properties_energy import unbalanced

HALF_SINE = pulse("half_sine", 0.001)
PUSH = pulse("half_sine", 0.001, 1.0, "velocity")


def filled(diameter: float, wall: float) -> dict[str, Any]:
    return {"shape": "filled_pipe", "outer_diameter": diameter, "wall": wall, "fill": "soft"}


@pytest.mark.parametrize("ends", [((0.6, 0.012), (0.4, 0.012)), ((0.6, 0.006), (0.2, 0.05))])
def test_a_tapered_filled_pipe(ends: tuple[tuple[float, float], tuple[float, float]]) -> None:
    """The wave speed varies along it, so elements of equal length would exceed Courant number 1 in its faster
    half. The front arrives after the integral of dx/c, within two steps, and energy closes to 1e-10.
    """
    soft = material("soft", 5e9, 2000.0)
    section, end_section = (filled(*end) for end in ends)
    case = case_of(
        pulse("rectangle", 0.003),
        part(section=section, end_section=end_section),
        materials=[soft],
        gauges={"end": LENGTH},
        far_end="fixed",
        duration=0.01,
    )
    result = solve(case)
    share = np.linspace(0, 1, 2001)
    diameter, wall = (a + (b - a) * share for a, b in zip(*ends, strict=True))
    steel, fill = np.pi * wall * (diameter - wall), np.pi * (diameter - 2 * wall) ** 2 / 4
    slowness = np.sqrt((8000 * steel + 2000 * fill) / (E * steel + 5e9 * fill))
    arrival = LENGTH * np.trapezoid(slowness, share)
    gauge = result.gauges["end"]
    first = gauge.time[np.argmax(np.abs(gauge.force) > 0.05 * np.abs(gauge.force).max())]
    assert first == pytest.approx(arrival, abs=2 * result.time_step)
    assert unbalanced(result) < 1e-10


@pytest.mark.parametrize(
    "more",
    [
        {"far_end": "fixed"},
        {"load": pulse("half_sine", 2e-4, 1.0, "velocity")},
        {"load": pulse("half_sine", 2e-4, 1.0, "velocity"), "far_end": "fixed"},
    ],
)
def test_lateral_inertia_with_held_ends(more: dict[str, Any]) -> None:
    """A node whose velocity is known belongs out of the tridiagonal solve: energy closes to 1e-10."""
    of = material("round bar", poisson_ratio=0.3)
    bar = part(2.0, of="round bar", section={"shape": "solid_round", "diameter": 0.1})
    load = (
        more.pop("load", pulse("half_sine", 2e-4))
        if "load" in (more := dict(more))
        else pulse("half_sine", 2e-4)
    )
    result = solved(load, bar, materials=[of], lateral_inertia=True, duration=0.004, **more)
    assert unbalanced(result) < 1e-10


@pytest.mark.parametrize(
    ("load", "end", "attached"),
    [
        (PUSH, "free", {"position": 0.0, "kind": "spring", "value": 1e9}),
        (PUSH, "free", {"position": 0.0, "kind": "dashpot", "value": Z}),
        (PUSH, "free", {"position": 0.0, "kind": "mass", "value": 400.0}),
        (HALF_SINE, "fixed", {"position": LENGTH, "kind": "dashpot", "value": Z}),
        (HALF_SINE, "fixed", {"position": LENGTH, "kind": "spring", "value": 1e9}),
    ],
)
def test_what_is_attached_where_the_motion_is_given(load: Any, end: str, attached: dict[str, Any]) -> None:
    """It changes nothing of the motion (to the last digits), only the work that moving it takes; energy
    closes to 1e-10.
    """
    alone = solved(load, far_end=end, gauges={"g": 5.0}, duration=0.01, dx=0.05)
    result = solved(load, far_end=end, gauges={"g": 5.0}, duration=0.01, dx=0.05, attachments=[attached])
    assert unbalanced(result) < 1e-10
    assert (
        np.abs(result.gauges["g"].force - alone.gauges["g"].force).max()
        < 1e-9 * np.abs(alone.gauges["g"].force).max()
    )


@pytest.mark.parametrize("side", ["near", "far"])
def test_a_gauge_on_the_face_of_a_rod_ram_above_a_cap(side: str) -> None:
    """The cap lies at the same place, but the gauge is on the ram: both sides read the ram's last element."""
    drop = {
        "kind": "drop",
        "ram": {"segments": [part(2.0, 0.05)]},
        "impact_velocity": 3.0,
        "cushion": {"stiffness": 1e9, "restitution": 0.8},
        "cap_mass": 300.0,
    }
    gauge = solved(drop, gauges={"face": {"position": 2.0, "on": "ram", "side": side}}, duration=0.01).gauges[
        "face"
    ]
    assert gauge.area == pytest.approx(0.05, rel=1e-12)
    assert gauge.force.min() < -1e5


@pytest.mark.parametrize(
    ("position", "side", "area"),
    [(3.99, "far", 0.02), (4.0, "near", 0.02), (4.0, "far", 0.01), (4.01, "near", 0.01)],
)
def test_a_gauge_beside_a_step_has_the_section_of_its_own_place(
    position: float, side: str, area: float
) -> None:
    """Also where it lies between the step and the next node: area, impedance and strain are of the segment
    that it is glued to.
    """
    parts = part(4.0, 0.02), part(6.0, 0.01)
    gauge = solved(
        HALF_SINE, *parts, gauges={"g": {"position": position, "side": side}}, duration=0.004
    ).gauges["g"]
    assert gauge.area == pytest.approx(area, rel=1e-12)
    assert gauge.impedance == pytest.approx(Z * area / AREA, rel=1e-12)
    assert gauge.strain == pytest.approx(gauge.force / (E * area), rel=1e-9, abs=1e-12)


@pytest.mark.parametrize("load", [{"kind": "none"}, PUSH])
def test_flying_into_a_held_end_loses_nothing(load: Any) -> None:
    """The half element of a held node never moved: energy closes to 1e-10 (it was off by that half mass, 1.25e-3)."""
    end = "fixed" if load["kind"] == "none" else "free"
    assert unbalanced(solved(load, far_end=end, initial_velocity=3.0, duration=0.01)) < 1e-10


def test_a_plate_between_two_rods_is_meshed_as_such() -> None:
    """1 mm in 10 m: one element of it beside 5,000, all at Courant number 1, where 400 to 3,200 could not fit it."""
    plate = part(5.0), part(0.001), part(5.0)
    result = solved(HALF_SINE, *plate, duration=0.003)
    assert result.courant_worst > 0.995
    assert result.peak_compression.value == pytest.approx(1e6 / AREA, rel=1e-3)


@pytest.mark.parametrize("length", [1e-6, 1e-9])
def test_a_segment_far_too_short_is_refused(length: float) -> None:
    """Instead of ten million steps. The sentence names it and says what to do."""
    with pytest.raises(SolveError, match=r"'part 2'.* too short .*join"):
        solved(HALF_SINE, part(5.0), part(length), part(5.0), duration=0.003)


@pytest.mark.parametrize(("length", "duration"), [(1e-6, 1e-9), (1e4, 10.0)])
def test_members_of_any_size(length: float, duration: float) -> None:
    """A micrometre and ten kilometres: the pulse passes, peak 1 MN on the area to 1 % (sampled by 40 elements
    or more).
    """
    result = solved(pulse("half_sine", duration / 10), part(length), far_end="matched", duration=duration)
    assert result.peak_compression.value == pytest.approx(1e6 / AREA, rel=0.01)
    assert result.max_toe_displacement <= 1e6 / Z * duration


@pytest.mark.parametrize("dx", [10.0, 1e9])
def test_elements_longer_than_the_member_give_two(dx: float) -> None:
    assert solved(HALF_SINE, dx=dx, duration=0.01).elements == 2


@pytest.mark.parametrize(("shape", "duration"), [("half_sine", 1e-7), ("rectangle", 1e-6), ("decay", 1e-6)])
def test_a_pulse_shorter_than_a_step_leaves_its_impulse(shape: str, duration: float) -> None:
    """Whatever its shape, the free rod moves at impulse/mass in the end: mean of all nodes, by the far end's
    travel per echo, 1e-9.

    Impulse of peak 1: 2/pi, 1, and for the decay its whole tail, times the duration.
    """
    impulse = 1e9 * duration * {"half_sine": 2 / np.pi, "rectangle": 1.0, "decay": 1.0}[shape]
    result = solved(pulse(shape, duration, 1e9), gauges={"end": LENGTH}, duration=0.013, dx=0.1)
    gauge = result.gauges["end"]
    per_echo = round(2 * LENGTH / C / result.time_step)
    start = round(0.003 / result.time_step)
    moved = gauge.displacement[start + 2 * per_echo] - gauge.displacement[start]
    mass = 8000 * AREA * LENGTH
    assert moved / (2 * per_echo * result.time_step) == pytest.approx(impulse / mass, rel=1e-9)


def test_sixty_gauges_and_two_hundred_layers() -> None:
    """They change nothing: the same pile with one layer and one gauge, to 1e-6 of the peak."""
    layer = {"unit_resistance": 2e4, "quake": 0.0025, "damping": 0.5}
    toe = {"resistance": 4e5, "quake": 0.0025, "damping": 0.5}
    many = [{"name": f"l{i}", "thickness": 0.05, **layer} for i in range(200)]
    one = [{"name": "all", "thickness": 20.0, **layer}]
    gauges = {f"g{i}": LENGTH * i / 59 for i in range(60)}
    how: dict[str, Any] = {"far_end": "ground", "duration": 0.02, "dx": 0.05}
    a = solved(HALF_SINE, ground={"surface": 0.0, "layers": many, "toe": toe}, gauges=gauges, **how)
    b = solved(
        HALF_SINE, ground={"surface": 0.0, "layers": one, "toe": toe}, gauges={"g30": gauges["g30"]}, **how
    )
    assert a.elements == b.elements
    assert np.abs(a.gauges["g30"].force - b.gauges["g30"].force).max() < 1e-6 * 1e6
    assert a.set == pytest.approx(b.set, abs=1e-9)


@pytest.mark.parametrize("surface", [0.0, LENGTH])
def test_ground_that_begins_at_the_head_or_at_the_toe(surface: float) -> None:
    """Layers partly or wholly below the toe: only what touches the member acts, and at the very toe no shaft does."""
    layers = [
        {"name": "deep", "thickness": 3 * LENGTH, "unit_resistance": 3e4, "quake": 0.0025, "damping": 0.0}
    ]
    toe = {"resistance": 4e5, "quake": 0.0025, "damping": 0.0}
    result = solved(
        HALF_SINE, far_end="ground", ground={"surface": surface, "layers": layers, "toe": toe}, duration=0.01
    )
    assert result.ledger.final["ground_damping_loss"] == 0.0
    assert result.ledger.parts["elastic_ground"].max() > 0
    assert unbalanced(result) < 1e-4


@pytest.mark.parametrize("cap_mass", [1.0, 1e-3, 1e-9])
@pytest.mark.parametrize("pile_cushion", [None, {"stiffness": 2e9, "restitution": 0.5}])
def test_a_cap_without_weight_is_none(cap_mass: float, pile_cushion: Any) -> None:
    """Peak of compression as without a cap, within 0.5 %: a cap of 1 kg is a thousandth of what a pulse of
    this length moves.
    """
    drop = {
        "kind": "drop",
        "ram_mass": 2000.0,
        "impact_velocity": 3.0,
        "cushion": {"stiffness": 1e9, "restitution": 0.5},
    }
    drop |= {"pile_cushion": pile_cushion}
    with_cap = solved(drop | {"cap_mass": cap_mass}, duration=0.02)
    without = solved(drop, duration=0.02)
    assert with_cap.peak_compression.value == pytest.approx(without.peak_compression.value, rel=0.005)
    assert unbalanced(with_cap) < 1e-4


def test_a_soft_pile_cushion_needs_no_fine_mesh() -> None:
    """A ram on a pile cushion alone: the mesh is the usual one, not that of a mass which strikes bare (it was
    38,375 elements).
    """
    drop = {
        "kind": "drop",
        "ram_mass": 261.0,
        "impact_velocity": 0.7,
        "pile_cushion": {"stiffness": 1.4e7, "restitution": 0.7},
    }
    assert solved(drop, duration=0.01).elements == 400


@pytest.mark.parametrize("exponent", [0.01, 0.04])
def test_exponents_that_no_step_resolves_are_refused(exponent: float) -> None:
    toe = {"resistance": 1e6, "quake": 0.0025, "damping": 0.3, "damping_law": "power", "exponent": exponent}
    with pytest.raises(SolveError, match="exponent"):
        solved(HALF_SINE, far_end="ground", ground={"surface": 0.0, "layers": [], "toe": toe}, duration=0.01)


@pytest.mark.parametrize("name", ["striker", "history"])
def test_short_but_exact_waves_are_not_taken_for_growth(name: str) -> None:
    """A striker of a quarter of a percent of the rod, and a history that jumps twice within eight elements:
    solved, peak exact.
    """
    if name == "striker":
        result = solved({"kind": "striker", "velocity": 3.0, "segments": [part(0.025)]}, duration=0.05)
        assert result.peak_compression.value == pytest.approx(Z * 1.5 / AREA, rel=1e-9)
    else:
        load = {
            "kind": "history",
            "quantity": "force",
            "times": [0.0, 0.0, 4e-5, 4e-5],
            "values": [0.0, 1e6, 1e6, 0.0],
        }
        result = solved(load, duration=0.05)
        assert result.peak_compression.value == pytest.approx(1e6 / AREA, rel=1e-9)


@pytest.mark.parametrize("duration", [0.00103, 0.0010301, 0.00103125, 0.0010325, 0.0010349])
def test_a_velocity_load_may_let_go_anywhere_in_a_step(duration: float) -> None:
    """A rectangle that ends on a step of 5 us or between two: what lies behind it is at rest, to 1e-9 of its
    front. Part of a step's reaction is left to act on the free end; with the wrong part, every element behind the
    pulse rings for ever.
    """
    result = solved(pulse("rectangle", duration, 1.0, "velocity", release=True), duration=0.0019)
    behind = result.fields.stress[-1][result.fields.position < 2.0]
    assert np.abs(behind).max() < 1e-6 * Z / AREA  # pictures are in single precision
    assert result.peak_tension.value < 1e-9 * Z / AREA


@pytest.mark.parametrize("kind", ["dashpot", "spring"])
def test_lateral_inertia_with_a_member_that_moves_into_what_holds_it(kind: str) -> None:
    """What holds a node acts from time 0 on, half as long in the first step; a linear case: 1e-10."""
    held = {"position": 5.0, "kind": kind, "value": 4e5 if kind == "dashpot" else 2e9}
    rod = part(of="thick", section={"shape": "solid_round", "diameter": 0.2})
    result = solved(
        {"kind": "none"},
        rod,
        materials=[material("thick", poisson_ratio=0.3)],
        attachments=[held],
        lateral_inertia=True,
        initial_velocity=1.0,
        dx=0.2,
        duration=0.01,
    )
    assert result.ledger.residual < 1e-10
