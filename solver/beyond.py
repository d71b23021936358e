"""Numbers beyond all measure, refused before anything is computed from them: their squares would overflow unseen."""

from __future__ import annotations

from collections.abc import Iterator
from functools import cache

from pydantic import BaseModel

from solver.errors import SolveError
from solver.model.project import Case
from solver.model.quantity import Quantity, quantity_of

#: Any quantity in SI units that a member, its load or its ground has lies between these by many powers of ten.
LEAST, MOST = 1e-30, 1e30


def refuse_beyond_measure(case: Case) -> None:
    """Raise `SolveError` with the place of a number whose size nothing has; 0 is none of them."""
    used = {name: material for name, material in case.materials.items() if name in _named(case)}
    parts = [("", case), *((f"material '{name}'", material) for name, material in used.items())]
    for start, part in parts:
        for where, label, value, unit in _numbers(part, start):
            if value and not LEAST <= abs(value) <= MOST:
                raise SolveError(
                    f"{where[:1].upper()}{where[1:]}: {label} {value:.3g} {unit}".rstrip()
                    + f" is beyond all measure ({LEAST:g} to {MOST:g}). Check the number and its unit."
                )


def _named(case: Case) -> set[str]:
    """Names of the materials that the case is made of."""
    segments = (*case.member.segments, *case.ram_segments)
    fills = (getattr(segment.section, "fill", None) for segment in segments)
    return {*(segment.material for segment in segments), *(fill for fill in fills if fill)}


@cache
def _declared(model: type[BaseModel]) -> tuple[tuple[str, Quantity | None], ...]:
    """Fields of a model with their quantities: looked up once, for every solve asks for them."""
    return tuple((key, quantity_of(model, key)) for key in model.model_fields)


def _numbers(part: BaseModel, where: str) -> Iterator[tuple[str, str, float, str]]:
    """Every quantity of a part and of what is in it: the part in words, the quantity's label, value and SI unit."""
    for key, quantity in _declared(type(part)):
        value = getattr(part, key)
        if quantity is not None and isinstance(value, float):
            yield where or "case", quantity.label, value, quantity.unit
        entries = value if isinstance(value, tuple) else (value,)
        for entry in entries:
            if isinstance(entry, BaseModel):
                name = getattr(entry, "name", "")
                word = (
                    key.removesuffix("s").replace("_", " ")
                    if isinstance(value, tuple)
                    else key.replace("_", " ")
                )
                inner = f"{word} '{name}'" if name else word
                yield from _numbers(entry, f"{where}, {inner}" if where and not name else inner)
