"""Choices of the load and the run. Switching the way of telling keeps what was told wherever the mechanics allow it."""

from __future__ import annotations

from collections.abc import Callable

from app.bench.forms.chooser import Chooser, Choosers, options, options_of_union, start_value
from app.bench.forms.kinds import CUSHION, RAM_ROD, filled, words_of
from app.bench.forms.spec import Context, Tree
from solver.model import derived
from solver.model.load import Cushion, Drop, History, Pulse
from solver.model.project import Case, Run


def _change_load(case: Tree, key: str, context: Context) -> None:
    case["load"] = start_value(Case, "load", key, context)
    if key == "none" and not case["run"].get("initial_velocity"):
        case["run"]["initial_velocity"] = 1.0


def _change_ram(load: Tree, key: str, context: Context) -> None:
    if key == "rod":
        material = context.case.member.segments[0].material
        load["ram"], load["ram_mass"] = {"segments": [filled(RAM_ROD, material)]}, None
    else:
        assert isinstance(context.case.load, Drop)
        mass = derived.ram_mass(context.case.load, context.case.materials)
        load["ram"], load["ram_mass"] = None, mass


def _change_speed(load: Tree, key: str, context: Context) -> None:
    drop, materials = context.case.load, context.case.materials
    assert isinstance(drop, Drop)
    velocity = derived.impact_velocity(drop, materials)
    energy = derived.impact_energy(drop, materials)
    load.update(drop_height=None, efficiency=None, energy=None, impact_velocity=None)
    if key == "height":
        load.update(drop_height=derived.height_for_velocity(velocity), efficiency=1.0)
    else:
        load[key] = energy if key == "energy" else velocity


def _speed_key(load: Tree) -> str:
    if load.get("drop_height") is not None:
        return "height"
    return "energy" if load.get("energy") is not None else "impact_velocity"


def _cushion_key(field: str) -> Callable[[Tree], str]:
    def key_of(load: Tree) -> str:
        cushion = load.get(field)
        if cushion is None:
            return "none"
        return "stiffness" if cushion.get("stiffness") is not None else "size"

    return key_of


def _change_cushion(field: str) -> Callable[[Tree, str, Context], None]:
    def change(load: Tree, key: str, context: Context) -> None:
        old = load.get(field) or CUSHION
        if key == "none":
            load[field] = None
        elif key == "stiffness":
            stiffness = Cushion.model_validate(old).loading_stiffness
            load[field] = {"stiffness": stiffness, "restitution": old["restitution"]}
        else:
            load[field] = CUSHION | {"restitution": old["restitution"]}
            if old.get("stiffness"):
                unit = Cushion.model_validate(CUSHION).loading_stiffness / CUSHION["young_modulus"]
                load[field]["young_modulus"] = old["stiffness"] / unit

    return change


def _change_pulse_quantity(load: Tree, key: str, context: Context) -> None:
    """The same wave: a force is impedance times velocity, at the struck end."""
    if key != load["quantity"]:
        case = context.case
        impedance = derived.impedance(case.member.segments[0], case.materials)
        factor = impedance if key == "force" else 1 / impedance
        if load["kind"] == "pulse":
            load["peak"] = load["peak"] * factor
        elif load.get("values"):
            load["values"] = [v * factor for v in load["values"]]
    load["quantity"] = key
    if key == "force":
        load["release"] = False


def _change_pulse_shape(load: Tree, key: str, context: Context) -> None:
    load["shape"] = key
    quarter = load["duration"] / 4
    load["rise"] = load["fall"] = quarter if key == "trapezoid" else None


def _blows_key(run: Tree) -> str:
    blows = run.get("blows", 1)
    return "repeat" if isinstance(blows, dict) else "one" if blows == 1 else "number"


def _change_blows(run: Tree, key: str, context: Context) -> None:
    run["blows"] = {"one": 1, "number": 5, "repeat": {"most": 20, "tolerance": 1e-4}}[key]


CUSHION_WAYS = options(
    ("none", "no cushion"), ("stiffness", "stiffness"), ("size", "dimensions", "Area, thickness and modulus.")
)
FORCE_OR_VELOCITY = options(("force", "force"), ("velocity", "velocity"))

OF_LOAD: Choosers = {
    (Case, "load"): Chooser(
        "Load", options_of_union(Case, "load"), lambda case: case["load"]["kind"], _change_load
    ),
    (Drop, "ram_mass"): Chooser(
        "Ram",
        options(("rigid", "rigid", "One mass."), ("rod", "a rod", "Waves run in the ram too.")),
        lambda load: "rod" if load.get("ram") else "rigid",
        _change_ram,
        pick="ram",
    ),
    (Drop, "drop_height"): Chooser(
        "Speed from",
        options(
            ("height", "drop height", "With the share of its energy that is left at impact."),
            ("energy", "energy", "Kinetic energy at impact: losses are in it already."),
            ("impact_velocity", "velocity", "Measured at impact: losses are in it already."),
        ),
        _speed_key,
        _change_speed,
    ),
    (Drop, "cushion"): Chooser(
        "Given by",
        CUSHION_WAYS,
        _cushion_key("cushion"),
        _change_cushion("cushion"),
        "Its stiffness, or material, area and thickness.",
        pick="cushion",
    ),
    (Drop, "pile_cushion"): Chooser(
        "Given by",
        CUSHION_WAYS,
        _cushion_key("pile_cushion"),
        _change_cushion("pile_cushion"),
        "Its stiffness, or material, area and thickness.",
        pick="cushion",
    ),
    (Pulse, "quantity"): Chooser(
        "Quantity", FORCE_OR_VELOCITY, lambda load: load["quantity"], _change_pulse_quantity
    ),
    (History, "quantity"): Chooser(
        "Quantity", FORCE_OR_VELOCITY, lambda load: load["quantity"], _change_pulse_quantity
    ),
    (Pulse, "shape"): Chooser(
        "Shape",
        options(*words_of(Pulse, "shape").items()),
        lambda load: load["shape"],
        _change_pulse_shape,
    ),
    (Run, "blows"): Chooser(
        "Blows",
        options(
            ("one", "one"),
            ("number", "a number of"),
            ("repeat", "until the set repeats", "Each blow starts from the stresses that the last one left."),
        ),
        _blows_key,
        _change_blows,
    ),
}
