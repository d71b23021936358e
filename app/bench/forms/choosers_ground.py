"""Choices of the far end and the ground. Switching the way of telling keeps what was told."""

from __future__ import annotations

from app.bench.forms.chooser import Chooser, Choosers, options, options_of_union, start_value
from app.bench.forms.kinds import EXPONENT, RADIATION, SHAFT_TOTAL, TOE
from app.bench.forms.spec import Context, Tree
from solver.model import derived
from solver.model.project import Case
from solver.model.surroundings import Ground, Resistance, Toe


def _change_far_end(case: Tree, key: str, context: Context) -> None:
    case["far_end"] = start_value(Case, "far_end", key, context)
    ground = case.get("ground")
    if key == "ground":
        ground = ground or {"surface": 0.0, "layers": []}
        case["ground"] = ground | {"toe": ground.get("toe") or dict(TOE)}
    elif ground:
        ground["toe"] = None


def _change_ground(case: Tree, key: str, context: Context) -> None:
    if key == "yes":
        case["ground"] = {"surface": 0.0, "layers": []}
    else:
        case["ground"] = None
        if case["far_end"]["kind"] == "ground":
            case["far_end"] = {"kind": "free"}


def _law_key(part: Tree) -> str:
    return "radiation" if part.get("model") else part.get("damping_law") or "smith"


def _change_law(part: Tree, key: str, context: Context) -> None:
    was_radiation = part.get("model") is not None
    part.update(model=None, exponent=None)
    if key == "radiation":
        part.update(model=dict(RADIATION), quake=None, damping=None, damping_law=None)
        return
    part["damping_law"] = key
    if was_radiation:
        part.update(quake=TOE["quake"], damping=TOE["damping"])
    if key == "power":
        part["exponent"] = EXPONENT


def _shaft_key(ground: Tree) -> str:
    return "total" if ground.get("shaft_total") else "layers"


def _change_shaft(ground: Tree, key: str, context: Context) -> None:
    if key == "total":
        first = (ground.get("layers") or [{}])[0]
        total = SHAFT_TOTAL | {k: first[k] for k in ("quake", "damping", "damping_law") if first.get(k)}
        resistance = derived.shaft_resistance(context.case)
        ground["shaft_total"] = total | ({"resistance": resistance} if resistance else {})
        ground["layers"] = []
    else:
        ground["shaft_total"] = None


DYNAMIC = "How the ground resists: with quake and damping, or as an elastic half-space."
LAWS = options(
    ("smith", "Smith", "Dynamic part J |Rs| v: with the static resistance of the moment."),
    ("viscous", "viscous", "Dynamic part J Ru v: with the full resistance."),
    ("power", "power of velocity", "Dynamic part J Ru |v|^N (Gibson and Coyle 1968, from memory)."),
    ("radiation", "half-space", "Elastic half-space: waves radiate into the ground, with slip."),
)
OF_GROUND: Choosers = {
    (Case, "far_end"): Chooser(
        "Far end", options_of_union(Case, "far_end"), lambda case: case["far_end"]["kind"], _change_far_end
    ),
    (Case, "ground"): Chooser(
        "Ground",
        options(("no", "none"), ("yes", "along the shaft")),
        lambda case: "yes" if case.get("ground") else "no",
        _change_ground,
    ),
    (Resistance, "quake"): Chooser("Model", LAWS, _law_key, _change_law, DYNAMIC, pick="layer"),
    (Toe, "quake"): Chooser("Model", LAWS, _law_key, _change_law, DYNAMIC, pick="toe"),
    (Ground, "layers"): Chooser(
        "Shaft given by",
        options(("layers", "layers"), ("total", "a total")),
        _shaft_key,
        _change_shaft,
    ),
}
