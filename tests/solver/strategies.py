"""Random projects that are valid: every section, law, joint, load, far end, ground and attachment of the file.

Sizes keep to what an engineer strikes (stresses of 1 to 100 MPa in steel-like rods, movements of millimetres), so
that a run that is refused says something about the model and not about absurd numbers. Trees are plain
dictionaries as in a file.
"""

from __future__ import annotations

from typing import Any

from hypothesis import strategies as st
from pydantic import TypeAdapter

from solver import Case, project_from_tree
from solver.model.section import AnySection

Tree = dict[str, Any]


SHARES = st.integers(0, 1000).map(lambda thousandths: thousandths / 1000)


def logarithmic(low: float, high: float) -> st.SearchStrategy[float]:
    """Numbers spread evenly over the decades, with three digits, so that a failing case can be read."""
    return SHARES.map(lambda share: float(f"{low * (high / low) ** share:.3g}"))


def between(low: float, high: float) -> st.SearchStrategy[float]:
    """Numbers with three digits, `low` to `high`."""
    return SHARES.map(lambda share: float(f"{low + (high - low) * share:.3g}"))


# --- materials
# -------------------------------------------------------------------------------------------------------

ELASTIC: Tree = {"kind": "elastic"}
LAW_KINDS = ("elastic", "viscoelastic", "elastic_plastic", "brittle_tension", "large_strain")


@st.composite
def laws(draw: st.DrawFn, kind: str, young_modulus: float) -> Tree:
    """A law of one kind, with strengths around the strain that a blow brings (0.02 to 0.1 %)."""
    law: Tree = {"kind": kind}
    if kind == "viscoelastic":
        law["viscosity"] = young_modulus * draw(logarithmic(1e-7, 1e-5))
    elif kind == "elastic_plastic":
        law["yield_stress"] = young_modulus * draw(logarithmic(1e-4, 1e-2))
        law["hardening_modulus"] = young_modulus * draw(between(0.05, 0.5))
        law["hardening"] = draw(st.sampled_from(["isotropic", "kinematic"]))
    elif kind == "brittle_tension":
        law["tensile_strength"] = young_modulus * draw(logarithmic(1e-5, 1e-3))
    return law


@st.composite
def materials(draw: st.DrawFn, name: str, kinds: tuple[str, ...] = LAW_KINDS) -> Tree:
    """A material between timber and steel (a pad where the law is of large strain)."""
    kind = draw(st.sampled_from(kinds))
    young = draw(logarithmic(5e9, 3e11))
    return {
        "name": name,
        "young_modulus": young,
        "density": draw(logarithmic(700, 9000)),
        "poisson_ratio": draw(between(0.1, 0.4)),
        "law": draw(laws(kind, young)),
    }


# --- members
# ---------------------------------------------------------------------------------------------------------

WIDTH = between(0.05, 0.6)


@st.composite
def sections(draw: st.DrawFn, fill: str | None = None) -> Tree:
    """Any shape; a filled pipe only where there is a material to fill it."""
    shapes = ["solid_round", "pipe", "rectangle", "octagon", "h", "voided_square", "custom"]
    shape = draw(st.sampled_from(shapes + (["filled_pipe"] if fill else [])))
    width, share = draw(WIDTH), draw(between(0.05, 0.4))
    dimensions: dict[str, Tree] = {
        "solid_round": {"diameter": width},
        "pipe": {"outer_diameter": width, "wall": width * share},
        "rectangle": {"width": width, "depth": width * (1 + share)},
        "octagon": {"across_flats": width},
        "h": {"depth": width, "flange_width": width, "flange": width * share / 2, "web": width * share / 3},
        "voided_square": {"width": width, "void_diameter": width * share},
        "custom": {"area": width**2 * share, "perimeter": 4 * width},
        "filled_pipe": {"outer_diameter": width, "wall": width * share, "fill": fill},
    }
    return {"shape": shape, **dimensions[shape]}


def axial_stiffness(segment: Tree, known: list[Tree]) -> float:
    """EA at the top of a segment, N (without a fill): the force at a strain of 1, by which forces are sized."""
    young = next(m["young_modulus"] for m in known if m["name"] == segment["material"])
    return float(f"{young * SECTION.validate_python(segment['section']).area:.3g}")


SECTION: TypeAdapter[Any] = TypeAdapter(AnySection)


def tapered(section: Tree, factor: float) -> Tree:
    """The same shape with every dimension times `factor`."""
    return {key: value * factor if isinstance(value, float) else value for key, value in section.items()}


@st.composite
def joints(draw: st.DrawFn) -> Tree:
    kind = draw(st.sampled_from(["bonded", "contact", "slack_splice"]))
    opening = draw(st.sampled_from([0.0, 1e-5, 1e-4]))
    return {"kind": kind} | {"contact": {"gap": opening}, "slack_splice": {"slack": opening}}.get(kind, {})


@st.composite
def segments(draw: st.DrawFn, known: list[Tree], most: int, name: str, bonded: bool = False) -> list[Tree]:
    """One to `most` segments of the materials `known`."""
    elastic = [m["name"] for m in known if m["law"]["kind"] == "elastic"]
    found = []
    for i in range(draw(st.integers(1, most))):
        material = draw(st.sampled_from(known))
        fill = draw(st.sampled_from(elastic)) if material["name"] in elastic else None
        section = draw(sections(fill))
        part = {"name": f"{name} {i + 1}", "length": draw(between(0.5, 8)), "material": material["name"]}
        part["section"] = section
        if draw(st.booleans()):
            part["end_section"] = tapered(section, draw(between(0.7, 1.4)))
        if i and not bonded:
            part["joint_above"] = draw(joints())
        found.append(part)
    return found


@st.composite
def attachments(draw: st.DrawFn, length: float, most: int = 3) -> list[Tree]:
    """Masses, springs and dashpots, at both ends and in between."""
    values = {"mass": logarithmic(1, 1e3), "spring": logarithmic(1e6, 1e11), "dashpot": logarithmic(1e3, 1e7)}
    found = []
    for _ in range(draw(st.integers(0, most))):
        kind = draw(st.sampled_from(sorted(values)))
        position = draw(st.sampled_from([0.0, 0.25, 0.5, 1.0])) * length
        found.append({"position": position, "kind": kind, "value": draw(values[kind])})
    return found


# --- loads
# -----------------------------------------------------------------------------------------------------------

SHAPES = ("rectangle", "half_sine", "haversine", "triangle", "trapezoid", "decay")


#: Strains at the struck end under a force, and velocities that bring about as much.
STRAINS, VELOCITIES = logarithmic(1e-5, 5e-4), logarithmic(0.05, 2)


@st.composite
def pulses(draw: st.DrawFn, stiffness: float, quantity: str | None = None) -> Tree:
    quantity = quantity or draw(st.sampled_from(["force", "velocity"]))
    shape = draw(st.sampled_from(SHAPES))
    duration = draw(logarithmic(2e-4, 5e-3))
    size = stiffness * draw(STRAINS) if quantity == "force" else draw(VELOCITIES)
    load = {"kind": "pulse", "quantity": quantity, "shape": shape, "duration": duration}
    load["peak"] = size * draw(st.sampled_from([1.0, 1.0, -1.0]))
    load["start"] = draw(st.sampled_from([0.0, 0.0, 1e-4]))
    if shape == "trapezoid":
        load["rise"], load["fall"] = draw(between(0, 0.5)) * duration, draw(between(0, 0.5)) * duration
    if quantity == "velocity":
        load["release"] = draw(st.booleans())
    return load


@st.composite
def histories(draw: st.DrawFn, stiffness: float, quantity: str = "force") -> Tree:
    """A few points; steep and flat parts, and jumps (two values at one time)."""
    gaps = draw(st.lists(st.sampled_from([0.0, 1e-4, 3e-4, 1e-3]), min_size=2, max_size=8))
    times, now = [0.0], 0.0
    for gap in [*gaps, 1e-4]:
        now += gap
        times.append(now)
    inner = draw(st.lists(between(-1, 1), min_size=len(times) - 1, max_size=len(times) - 1))
    size = stiffness * draw(STRAINS) if quantity == "force" else draw(VELOCITIES)
    values = [0.0, *(size * v for v in inner)]
    return {"kind": "history", "quantity": quantity, "times": times, "values": values}


@st.composite
def cushions(draw: st.DrawFn) -> Tree:
    restitution = draw(between(0.3, 1))
    if draw(st.booleans()):
        return {"stiffness": draw(logarithmic(1e7, 1e10)), "restitution": restitution}
    sizes = {"area": draw(between(0.02, 0.5)), "thickness": draw(between(0.02, 0.3))}
    return {**sizes, "young_modulus": draw(logarithmic(1e8, 1e10)), "restitution": restitution}


@st.composite
def drops(draw: st.DrawFn, known: list[Tree]) -> Tree:
    """A rigid ram or a ram of segments, with or without cushion, cap and pile cushion."""
    load: Tree = {"kind": "drop"}
    rod = draw(st.booleans())
    if rod:
        load["ram"] = {"segments": draw(segments(known, 2, "ram", bonded=True))}
    else:
        load["ram_mass"] = draw(logarithmic(100, 1e4))
    way = draw(st.sampled_from(["drop_height", "energy", "impact_velocity"]))
    load[way] = draw(
        {"drop_height": between(0.1, 2), "energy": between(500, 2e4), "impact_velocity": between(0.5, 5)}[way]
    )
    if way == "drop_height":
        load["efficiency"] = draw(between(0.4, 1))
    load["cushion"] = draw(st.none() | cushions())
    may_have_cap = rod or load["cushion"] is not None
    load["cap_mass"] = draw(st.sampled_from([0.0, 50.0, 500.0])) if may_have_cap else 0.0
    load["pile_cushion"] = draw(st.none() | cushions())
    return load


@st.composite
def loads(draw: st.DrawFn, known: list[Tree], stiffness: float) -> Tree:
    kind = draw(st.sampled_from(["pulse", "pulse", "history", "drop", "striker", "none"]))
    if kind == "pulse":
        return draw(pulses(stiffness))
    if kind == "history":
        return draw(histories(stiffness, draw(st.sampled_from(["force", "velocity"]))))
    if kind == "drop":
        return draw(drops(known))
    if kind == "striker":
        rods = draw(segments(known, 3, "striker", bonded=True))
        return {"kind": "striker", "velocity": draw(between(0.5, 5)), "segments": rods}
    return {"kind": "none"}


# --- surroundings
# ----------------------------------------------------------------------------------------------------


@st.composite
def resistances(draw: st.DrawFn) -> Tree:
    """Quake and damping with one of the three laws, or soil as a half-space."""
    law = draw(st.sampled_from(["smith", "viscous", "power", "radiation"]))
    if law == "radiation":
        soil = {"shear_modulus": draw(logarithmic(1e6, 1e8)), "soil_density": 1800.0, "poisson_ratio": 0.3}
        return {"model": {"kind": "radiation", **soil}}
    found = {"quake": draw(between(0.001, 0.01)), "damping": draw(between(0, 1)), "damping_law": law}
    return found | ({"exponent": draw(between(0.15, 1))} if law == "power" else {})


@st.composite
def layers(draw: st.DrawFn, length: float, fewest: int = 0) -> list[Tree]:
    """Up to three layers, constant or linear with depth, that may reach below the member's end."""
    return [
        {
            "name": f"layer {i + 1}",
            "thickness": draw(between(0.2, 1)) * length,
            "unit_resistance": draw(logarithmic(1e3, 1e5)),
            "unit_resistance_bottom": draw(st.none() | logarithmic(1e3, 1e5)),
        }
        | draw(resistances())
        for i in range(draw(st.integers(fewest, 3)))
    ]


@st.composite
def grounds(draw: st.DrawFn, length: float, stiffness: float, toe: bool) -> Tree:
    """Layers or a total, sized by the member's EA (N), and a toe where one is wanted."""
    strength = STRAINS.map(lambda strain: float(f"{stiffness * strain:.3g}"))
    ground: Tree = {"surface": draw(st.sampled_from([0.0, 0.3, 0.95])) * length}
    if draw(st.booleans()):
        total = {"resistance": draw(strength), "distribution": draw(st.sampled_from(["uniform", "growing"]))}
        ground["shaft_total"] = total | draw(resistances())
    else:
        ground["layers"] = draw(layers(length))
    ground["inner_share"] = draw(st.sampled_from([0.0, 0.5]))
    if toe:
        gap = draw(st.sampled_from([0.0, 0.0, 0.001]))
        ground["toe"] = {"resistance": draw(strength), "gap": gap} | draw(resistances())
    return ground


@st.composite
def far_ends(draw: st.DrawFn) -> Tree:
    kind = draw(st.sampled_from(["free", "fixed", "spring", "dashpot", "matched", "wall", "ground"]))
    more = {
        "spring": {"stiffness": draw(logarithmic(1e6, 1e12))},
        "dashpot": {"coefficient": draw(logarithmic(1e3, 1e7))},
        "wall": {"gap": draw(st.sampled_from([0.0, 1e-4]))},
    }
    return {"kind": kind, **more.get(kind, {})}


# --- whole projects
# --------------------------------------------------------------------------------------------------


@st.composite
def gauges(draw: st.DrawFn, length: float, most: int = 3) -> list[Tree]:
    """Gauges anywhere on the member, exactly on its ends among others."""
    places = st.sampled_from([0.0, 1.0]) | between(0, 1)
    count = draw(st.integers(0, most))
    sides = st.sampled_from(["near", "far"])
    return [
        {"name": f"gauge {i + 1}", "position": draw(places) * length, "side": draw(sides)}
        for i in range(count)
    ]


@st.composite
def cases(draw: st.DrawFn, known: list[Tree], linear: bool = False) -> Tree:
    """One case. `linear`: a force on a bonded member of elastic segments, with springs and dashpots at most."""
    member = {"segments": draw(segments(known, 4, "part", bonded=linear))}
    length = sum(s["length"] for s in member["segments"])
    stiffness = axial_stiffness(member["segments"][0], known)
    member["attachments"] = draw(attachments(length))
    far = draw(far_ends())
    if linear and far["kind"] in ("wall", "ground"):
        far = {"kind": "matched"}
    in_ground = far["kind"] == "ground" or (not linear and draw(st.booleans()))
    ground = draw(grounds(length, stiffness, far["kind"] == "ground")) if in_ground else None
    load = draw(pulses(stiffness) | histories(stiffness)) if linear else draw(loads(known, stiffness))
    run: Tree = {"duration": draw(between(0.002, 0.008)), "gravity": not linear and draw(st.booleans())}
    if load["kind"] == "none":
        run["initial_velocity"] = draw(between(0.1, 3))
    gauges_of = draw(gauges(length))
    return {
        "name": "case",
        "member": member,
        "load": load,
        "far_end": far,
        "ground": ground,
        "gauges": gauges_of,
        "run": run,
    }


def project_tree(known: list[Tree], *described: Tree, **more: Any) -> Tree:
    head = {"format": "striketrace-project", "version": 1, "title": "random"}
    return {**head, **more, "materials": known, "cases": list(described)}


@st.composite
def project_trees(draw: st.DrawFn, kinds: tuple[str, ...] = LAW_KINDS, linear: bool = False) -> Tree:
    """A project of one case with up to three materials."""
    known = [draw(materials(f"material {i + 1}", kinds)) for i in range(draw(st.integers(1, 3)))]
    return project_tree(known, draw(cases(known, linear)))


def without_powers(tree: Tree) -> Tree:
    """The same project with viscous damping in place of every power law: |v|^N is so steep at v = 0 that
    round-off grows to its N-th power there, which no comparison to many digits survives.
    """
    ground = tree["cases"][0]["ground"] or {}
    for part in [*ground.get("layers", []), ground.get("shaft_total"), ground.get("toe")]:
        if part and part.pop("exponent", None):
            part["damping_law"] = "viscous"
    return tree


def case_in(tree: Tree) -> Case:
    """The first case of a project tree, as the solver takes it."""
    return project_from_tree(tree).cases[0]
