"""A limit of stress as a person reads it: its formula with the numbers put into it, in the units shown."""

from __future__ import annotations

from typing import Literal

from app.units import Units
from solver.model.limits import Limit, PublishedLimit
from solver.model.material import Limits, Material

SIGNS: tuple[Literal["compression", "tension"], ...] = ("compression", "tension")
TO_BE_CONFIRMED = "To be confirmed against the governing code."


def published(limits: Limits, sign: Literal["compression", "tension"]) -> PublishedLimit | None:
    """What the expression allows where it decides: a number of one's own goes before it."""
    if limits.expression is None or getattr(limits, sign) is not None:
        return None
    allowed = limits.expression.allowed
    return allowed.compression if sign == "compression" else allowed.tension


def formula_with_numbers(limit: PublishedLimit, units: Units) -> str:
    """ "0.9 φ f_y, with φ = 1, f_y = 355 MPa"."""
    told = ", ".join(f"{t.letter} = {units.show(t.value, t.dimension, 4)}" for t in limit.terms)
    formula = limit.in_ksi if limit.in_ksi and units.system == "us" else limit.formula
    return f"{formula}, with {told}"


def what_it_rests_on(limits: Limits, sign: Literal["compression", "tension"], units: Units) -> str:
    """Formula with numbers, or basis and reason as a person wrote them; empty where nothing is told."""
    allowed, own = published(limits, sign), getattr(limits, sign)
    if allowed is not None:
        return formula_with_numbers(allowed, units)
    if isinstance(own, Limit):
        return "\n".join(text for text in (own.basis, own.reason) if text)
    return ""


def limit_lines(material: Material, units: Units) -> list[str]:
    """For under a form: what an expression comes to, each limit in a line, and that it is to be confirmed."""
    found = []
    for sign in SIGNS:
        allowed = published(material.limits, sign)
        if allowed is not None:
            value = units.show(allowed.value, "stress", 4)
            found.append(f"{sign.capitalize()} allowed: {value} = {formula_with_numbers(allowed, units)}")
    expression = material.limits.expression
    if found and expression is not None:
        found.append(f"By {expression.allowed.compression.source.partition(' (')[0]}, from memory.")
    if any(material.limits.value(sign) is not None for sign in SIGNS):
        found.append(f"! {TO_BE_CONFIRMED}")
    return found
