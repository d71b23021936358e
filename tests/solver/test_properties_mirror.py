"""The whole problem in a mirror: rods seen from the other side, ends exchanged, and force exchanged with velocity."""

from __future__ import annotations

from typing import Any

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from tests.solver import commensurate as rods
from tests.solver.comparing import assert_close
from tests.solver.strategies import Tree, between, logarithmic


def seen_from_below(parts: list[Tree]) -> list[Tree]:
    """The same segments in the opposite order, tapers turned, each joint between the same two neighbours."""
    found = []
    for i, part in enumerate(reversed(parts)):
        turned = {k: v for k, v in part.items() if k != "joint_above"}
        if "end_section" in part:
            turned["section"], turned["end_section"] = part["end_section"], part["section"]
        if i:
            joint = parts[len(parts) - i].get("joint_above")
            turned |= {"joint_above": joint} if joint else {}
        found.append(turned)
    return found


@st.composite
def blows(draw: st.DrawFn) -> dict[str, Any]:
    """A striker and a member, elastic or yielding, with joints, and a gauge on each away from ends and steps."""
    known = [draw(rods.materials(f"m{i}", ("elastic", "elastic_plastic"))) for i in range(2)]
    striker = draw(rods.rods(known, "striker", 2, tapers=True))
    member = draw(rods.rods(known, "member", 3, tapers=True))
    for part in member[1:]:
        kind = draw(st.sampled_from(["bonded", "contact", "slack_splice"]))
        part["joint_above"] = {"kind": kind} | {
            "contact": {"gap": 1e-5},
            "slack_splice": {"slack": 1e-5},
        }.get(kind, {})
    nodes = draw(rods.inner_nodes(striker, known)), draw(rods.inner_nodes(member, known))
    return {
        "known": known,
        "striker": striker,
        "member": member,
        "nodes": nodes,
        "speed": draw(between(0.5, 4)),
    }


@given(blows())
def test_who_strikes_whom_does_not_matter(blow: dict[str, Any]) -> None:
    """A striker at V on a member at rest, and the same two seen from the other side while moving along with the
    striker: the member strikes at V, the striker rests. Forces agree, velocities add to V (Galileo), for every
    law and joint.

    1e-8 of the first force Z V and of V: round-off of two orders of summation, taken up by yielding and contacts.
    """
    known, v = blow["known"], blow["speed"]
    striker, member = blow["striker"], blow["member"]
    first = rods.solved(
        known,
        member,
        {"kind": "striker", "velocity": v, "segments": striker},
        {"kind": "free"},
        gauges=[
            {"name": "striker", "on": "striker", "position": rods.place(striker, known, blow["nodes"][0])},
            {"name": "member", "position": rods.place(member, known, blow["nodes"][1])},
        ],
    )
    new_striker, new_member = seen_from_below(member), seen_from_below(striker)
    lengths = {
        name: sum(p["length"] for p in parts) for name, parts in (("striker", striker), ("member", member))
    }
    second = rods.solved(
        known,
        new_member,
        {"kind": "striker", "velocity": v, "segments": new_striker},
        {"kind": "free"},
        gauges=[
            {"name": "striker", "position": lengths["striker"] - first.gauges["striker"].position},
            {
                "name": "member",
                "on": "striker",
                "position": lengths["member"] - first.gauges["member"].position,
            },
        ],
    )
    for name in ("striker", "member"):
        a, b = first.gauges[name], second.gauges[name]
        scale = a.impedance * v
        assert_close(b.force, a.force, 1e-8, f"force on the {name}", scale)
        assert_close(v - b.velocity, a.velocity, 1e-8, f"velocity of the {name}", v)


@st.composite
def even_rods(draw: st.DrawFn) -> dict[str, Any]:
    """A rod that is the same from both ends, with the same springs, dashpots and masses at both."""
    known = [draw(rods.materials(f"m{i}", ("elastic", "elastic_plastic"))) for i in range(2)]
    half = draw(rods.rods(known, "upper", 3))
    whole = half + [{**part, "name": f"lower {i}"} for i, part in enumerate(reversed(half))]
    values = {"mass": logarithmic(1, 100), "spring": logarithmic(1e7, 1e10), "dashpot": logarithmic(1e4, 1e6)}
    kinds = draw(st.lists(st.sampled_from(sorted(values)), min_size=1, max_size=3, unique=True))
    held = [(kind, draw(values[kind])) for kind in kinds]
    node = draw(rods.inner_nodes(half, known))
    return {"known": known, "parts": whole, "held": held, "node": node, "speed": draw(between(0.1, 2))}


@given(even_rods())
def test_an_even_rod_moves_evenly(rod: dict[str, Any]) -> None:
    """Flying at one velocity into equal holders at both ends: v(x) = v(L - x) and F(x) = -F(L - x), 1e-9 of
    the largest.
    """
    known, parts = rod["known"], rod["parts"]
    length = sum(p["length"] for p in parts)
    x = rods.place(parts, known, rod["node"])
    result = rods.solved(
        known,
        parts,
        {"kind": "none"},
        {"kind": "free"},
        attachments=[{"position": at, "kind": k, "value": v} for k, v in rod["held"] for at in (0.0, length)],
        gauges=[{"name": "above", "position": x}, {"name": "below", "position": length - x}],
        run={"initial_velocity": rod["speed"]},
    )
    above, below = result.gauges["above"], result.gauges["below"]
    assert_close(below.velocity, above.velocity, 1e-9, "velocity", rod["speed"])
    assert_close(-below.force, above.force, 1e-9, "force", above.impedance * rod["speed"])


@st.composite
def dual_pairs(draw: st.DrawFn) -> dict[str, Any]:
    known = [draw(rods.materials(f"m{i}")) for i in range(2)]
    parts = draw(rods.rods(known))
    ends = {"free": "fixed", "fixed": "free", "matched": "matched", "dashpot": "dashpot"}
    end = draw(st.sampled_from(sorted(ends)))
    shape = draw(st.sampled_from(["rectangle", "half_sine", "haversine", "triangle"]))
    coefficient, duration = draw(logarithmic(1e4, 1e6)), draw(logarithmic(1e-4, 1e-3))
    node = draw(rods.inner_nodes(parts, known))
    return {
        "known": known,
        "parts": parts,
        "end": end,
        "dual": ends[end],
        "shape": shape,
        "c": coefficient,
        "t": duration,
        "node": node,
    }


@given(dual_pairs())
def test_force_and_velocity_change_places(pair: dict[str, Any]) -> None:
    """The equations of a rod keep their form when F and K v are exchanged and every Z becomes K^2/Z: free becomes
    fixed, a dashpot C becomes K^2/C, a force at the struck end becomes a velocity. 1e-10 of the largest (required
    of commensurate rods): on them both loads, both ends and both readings of a gauge must be exact, or they would
    not be dual.
    """
    known, parts, k = pair["known"], pair["parts"], 1e5
    by_name = {m["name"]: m for m in known}
    duals = []
    for part in parts:
        m = by_name[part["material"]]
        z_per_area = (m["young_modulus"] * m["density"]) ** 0.5
        area = k**2 / (part["section"]["area"] * z_per_area**2)
        duals.append({**part, "section": {**part["section"], "area": area}})
    gauges = [{"name": "g", "position": rods.place(parts, known, pair["node"])}]
    load = {"kind": "pulse", "shape": pair["shape"], "duration": pair["t"]}
    ends = {"dashpot": {"coefficient": pair["c"]}}, {"dashpot": {"coefficient": k**2 / pair["c"]}}
    force = rods.solved(
        known,
        parts,
        {**load, "quantity": "force", "peak": 1e4},
        {"kind": pair["end"], **ends[0].get(pair["end"], {})},
        gauges=gauges,
    )
    velocity = rods.solved(
        known,
        duals,
        {**load, "quantity": "velocity", "peak": 1e4 / k},
        {"kind": pair["dual"], **ends[1].get(pair["dual"], {})},
        gauges=gauges,
    )
    a, b = force.gauges["g"], velocity.gauges["g"]
    size = max(
        float(np.abs(a.force).max()), k * float(np.abs(b.velocity).max()), k * float(np.abs(a.velocity).max())
    )
    assert_close(-k * b.velocity, a.force, 1e-10, "force from the dual's velocity", size)
    assert_close(-b.force, k * a.velocity, 1e-10, "velocity from the dual's force", size)
