"""Driving stresses allowed by published expressions: arithmetic, against a table worked out by hand."""

from __future__ import annotations

from collections.abc import Iterator

from solver.model.limits import KSI, prestressed_concrete_limits, steel_limits
from tests.published.registry import Compared, check, value

ARTICLE = (
    "AASHTO LRFD Bridge Design Specifications, art. 10.7.8 (from memory: confirm against the code); "
    "recomputed table"
)


@check(
    model="limits of driving stress in steel",
    title="Steel",
    source=ARTICLE,
    formula="0.9 phi f_y, phi = 1",
    tolerance=5e-7,
    why="printed with seven digits",
)
def steel() -> Iterator[Compared]:
    for strength, allowed in ((36, 223.3901), (45, 279.2377), (50, 310.2641)):
        limits = steel_limits(strength * KSI)
        yield value(f"f_y = {strength} ksi, compression", allowed * 1e6, limits.compression.value, "Pa")
        yield value(f"f_y = {strength} ksi, tension", allowed * 1e6, limits.tension.value, "Pa")


@check(
    model="limits of driving stress in prestressed concrete",
    title="Prestressed concrete",
    source=ARTICLE,
    formula="compression 0.85 f'c - f_pe; tension 0.095 sqrt(f'c) + f_pe (ksi), f_pe where it corrodes severely",
    tolerance=5e-7,
    why="printed with seven digits",
)
def prestressed() -> Iterator[Compared]:
    table = {(5, 0.7): (24.47639, 6.290959), (6, 0.8): (29.64746, 7.120226)}
    for (strength, prestress), (pressed, pulled) in (table | {(8, 1.2): (38.61064, 10.12633)}).items():
        limits = prestressed_concrete_limits(strength * KSI, prestress * KSI)
        severe = prestressed_concrete_limits(strength * KSI, prestress * KSI, severe=True)
        name = f"f'c = {strength}, f_pe = {prestress} ksi"
        yield value(f"{name}, compression", pressed * 1e6, limits.compression.value, "Pa")
        yield value(f"{name}, tension", pulled * 1e6, limits.tension.value, "Pa")
        yield value(f"{name}, tension, severe", prestress * KSI, severe.tension.value, "Pa")
