"""Rows for the limits of a material: by a published expression with what it rests on, or by numbers of one's own."""

from __future__ import annotations

from typing import Any

from app.bench.forms.spec import CheckSpec, ChoiceSpec, Context, NumberSpec, Option, Spec, TextSpec, Tree
from app.provenance import forget_missing, mark_typical
from app.tree import value_at
from solver.model.limits import (
    KSI,
    PrestressedConcreteLimits,
    ReinforcedConcreteLimits,
    SteelLimits,
    TimberLimits,
)
from solver.model.quantity import Bounds, Described, bounds_of, quantity_of

OWN = "own"
WAYS = (
    Option(OWN, "own values", "Numbers of your own, with what they rest on."),
    Option("steel", "steel", "0.9 φ f_y, by AASHTO LRFD 10.7.8 from memory."),
    Option(
        "prestressed_concrete",
        "prestressed concrete",
        "φ (0.85 f'c − f_pe), and φ (0.095 √f'c + f_pe) in ksi, by AASHTO LRFD 10.7.8 from memory.",
    ),
    Option(
        "reinforced_concrete",
        "reinforced concrete",
        "0.85 φ f'c, and 0.7 φ f_y on the bars, by AASHTO LRFD 10.7.8 from memory.",
    ),
    Option("timber", "timber", "φ F_co, by AASHTO LRFD 10.7.8 from memory."),
)
MODELS: dict[str, type[Described]] = {
    "steel": SteelLimits,
    "prestressed_concrete": PrestressedConcreteLimits,
    "reinforced_concrete": ReinforcedConcreteLimits,
    "timber": TimberLimits,
}
#: To begin with, in MPa; marked as typical until somebody stands by them.
START: dict[str, Tree] = {
    "steel": {"yield_stress": 355, "factor": 1.0},
    "prestressed_concrete": {"strength": 40, "prestress": 6, "factor": 1.0, "severe": False},
    "reinforced_concrete": {"strength": 35, "yield_stress": 500, "bar_share": 0.015, "factor": 1.0},
    "timber": {"strength": 20, "factor": 1.15},
}
#: The same for those who think in ksi.
START_KSI: dict[str, Tree] = {
    "steel": {"yield_stress": 50},
    "prestressed_concrete": {"strength": 6, "prestress": 0.8},
    "reinforced_concrete": {"strength": 5, "yield_stress": 60},
    "timber": {"strength": 3},
}
FROM_NOWHERE = "a common grade, put in by the form (common practice)"
SEVERE = "In a severe corrosive environment no tension beyond the prestress is allowed."


def limit_rows(context: Context, pointer: str) -> list[Spec]:
    """All rows about the limits of the material at a pointer."""
    limits = value_at(context.tree, f"{pointer}/limits") or {}
    expression = limits.get("expression")
    found: list[Spec] = [_way(pointer, expression)]
    if expression:
        found += _basis_rows(pointer, expression)
    for sign in ("compression", "tension"):
        found += _own_rows(pointer, sign, limits)
    return found


def _way(pointer: str, expression: Tree | None) -> ChoiceSpec:
    at = f"{pointer}/limits/expression"

    def change(tree: Tree, key: str) -> None:
        limits = value_at(tree, f"{pointer}/limits")
        if key == (limits.get("expression") or {"kind": OWN})["kind"]:
            return
        limits.pop("expression", None)
        if key != OWN:
            limits.update(compression=None, tension=None, expression=_start(tree, key))
            for name in limits["expression"]:
                if name != "kind" and quantity_of(MODELS[key], name):
                    mark_typical(tree, f"{at}/{name}", FROM_NOWHERE)
        forget_missing(tree)

    return ChoiceSpec(
        f"{at}#kind",
        "Limits by",
        "What stresses are held against: numbers of your own, or a published expression. "
        "To be confirmed against the governing code.",
        value=expression["kind"] if expression else OWN,
        options=WAYS,
        change=change,
    )


def _start(tree: Tree, key: str) -> Tree:
    given = dict(START[key])
    for name in START_KSI[key]:
        in_ksi = tree.get("display_units") == "us"
        given[name] = START_KSI[key][name] * KSI if in_ksi else given[name] * 1e6
    return {"kind": key, **given}


def _basis_rows(pointer: str, expression: Tree) -> list[Spec]:
    at, model = f"{pointer}/limits/expression", MODELS[expression["kind"]]
    found: list[Spec] = []
    for name in model.model_fields:
        quantity = quantity_of(model, name)
        if quantity is not None:
            found.append(
                NumberSpec(
                    f"{at}/{name}",
                    quantity.label,
                    quantity.tells,
                    quantity.source,
                    value=expression[name],
                    dimension=quantity.dimension,
                    bounds=bounds_of(model, name),
                )
            )
        elif name == "severe":
            found.append(CheckSpec(f"{at}/{name}", "Severe corrosion", SEVERE, value=bool(expression[name])))
    return found


def _own_rows(pointer: str, sign: str, limits: Tree) -> list[Spec]:
    """A limit as a number with its reason, whichever of its two forms the file has."""
    limit = limits.get(sign)
    by_expression = limits.get("expression") is not None
    parts: Tree = limit if isinstance(limit, dict) else {"value": limit}

    def put(tree: Tree, **changes: Any) -> None:
        now = {k: v for k, v in (parts | changes).items() if v}
        held = value_at(tree, f"{pointer}/limits")
        held[sign] = now if len(now) > 1 and "value" in now else now.get("value")

    number = NumberSpec(
        f"{pointer}/limits/{sign}",
        f"Limit in {sign}",
        f"Largest stress in {sign} allowed, as a magnitude. Limits come from the governing code."
        + (" A number of your own goes before the expression." if by_expression else ""),
        value=parts["value"],
        dimension="stress",
        bounds=Bounds(above=0.0),
        empty="by rule" if by_expression else "no limit given",
        write=lambda tree, value: put(tree, value=value),
    )
    if limit is None:
        return [number]
    basis = TextSpec(
        f"{pointer}/limits/{sign}#basis",
        "rests on",
        "What the limit rests on, such as a clause of a code.",
        value=parts.get("basis"),
        optional=True,
        write=lambda tree, text: put(tree, basis=text or None),
    )
    reason = TextSpec(
        f"{pointer}/limits/{sign}#reason",
        "reason",
        "Why this value, where it is your own choice; the report tells it.",
        value=parts.get("reason"),
        optional=True,
        write=lambda tree, text: put(tree, reason=text or None),
    )
    return [number, basis, reason]
