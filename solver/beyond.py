"""Numbers beyond all measure, refused before anything is computed from them: their squares would overflow unseen."""

from __future__ import annotations

from functools import cache
from typing import Any

from pydantic import BaseModel

from solver.errors import SolveError
from solver.model.project import Case
from solver.model.quantity import Quantity, quantity_of

#: From a part to one within it: the field, whether it holds several, and the part.
Way = tuple[tuple[str, bool, BaseModel], ...]
#: Any quantity in SI units that a member, its load or its ground has lies between these by many powers of ten.
LEAST, MOST = 1e-30, 1e30
#: No solid carries waves faster than some 20 km/s (common practice: diamond); so far above (m/s) lies a slip of a unit,
#: whose steps would be so short that a run takes minutes to be refused.
FASTEST = 1e6


def refuse_beyond_measure(case: Case) -> None:
    """Raise `SolveError` with the place of a number whose size nothing has (0 is none of them), or with a material
    whose waves are faster than any."""
    used = {name: material for name, material in case.materials.items() if name in _named(case)}
    parts = [("", case), *((f"material '{name}'", material) for name, material in used.items())]
    for start, part in parts:
        for way, quantity, value in _numbers(part, ()):
            if value and not LEAST <= abs(value) <= MOST:
                where = _in_words(start, way)
                raise SolveError(
                    f"{where[:1].upper()}{where[1:]}: {quantity.label} {value:.3g} {quantity.unit}".rstrip()
                    + f" is beyond all measure ({LEAST:g} to {MOST:g}). Check the number and its unit."
                )
    for name, material in used.items():
        if material.wave_speed > FASTEST:
            raise SolveError(
                f"Material '{name}': waves of {material.wave_speed:.3g} m/s (modulus {material.young_modulus:.3g} Pa, "
                f"density {material.density:.3g} kg/m3) are faster than in any solid. Check both and their units."
            )


def _named(case: Case) -> set[str]:
    """Names of the materials that the case is made of."""
    segments = (*case.member.segments, *case.ram_segments)
    fills = (getattr(segment.section, "fill", None) for segment in segments)
    return {*(segment.material for segment in segments), *(fill for fill in fills if fill)}


@cache
def _declared(model: type[BaseModel]) -> tuple[dict[str, Quantity], list[str]]:
    """Fields of a model that are quantities, and those that may hold other parts. Every solve asks for all numbers of
    its case, so this is looked up once."""
    quantities, parts = {}, []
    for key, info in model.model_fields.items():
        if (quantity := quantity_of(model, key)) is not None:
            quantities[key] = quantity
        elif _may_hold_parts(info.annotation):
            parts.append(key)
    return quantities, parts


def _may_hold_parts(annotation: Any) -> bool:
    inner = getattr(annotation, "__args__", ())
    return (isinstance(annotation, type) and issubclass(annotation, BaseModel)) or any(
        map(_may_hold_parts, inner)
    )


def _numbers(part: BaseModel, way: Way) -> list[tuple[Way, Quantity, float]]:
    """Every quantity of a part and of what is in it, and the way to it."""
    quantities, parts = _declared(type(part))
    values = part.__dict__
    found = [
        (way, quantity, value)
        for key, quantity in quantities.items()
        if isinstance(value := values[key], float)
    ]
    for key in parts:
        value = values[key]
        several = isinstance(value, tuple)
        for entry in value if several else (value,):
            if isinstance(entry, BaseModel):
                found += _numbers(entry, (*way, (key, several, entry)))
    return found


def _in_words(start: str, way: Way) -> str:
    """The part at the end of a way; one with a name needs no more than it."""
    where = start
    for key, several, entry in way:
        word = (key.removesuffix("s") if several else key).replace("_", " ")
        name = getattr(entry, "name", "")
        inner = f"{word} '{name}'" if name else word
        where = f"{where}, {inner}" if where and not name else inner
    return where or "case"
