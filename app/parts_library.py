"""Parts with typical values, each with its source: copied into a project when chosen, and marked there as typical.

Values are in SI, under the keys of the project file, and exact in the units in which their sources print them.
"(from memory)" marks what was not checked against the printed source. Nothing here names a product.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass
from math import sqrt
from typing import Any, Literal

from solver.model.material import Material

PartKind = Literal["material", "cushion", "ram", "section", "layer", "toe"]

FOOT, INCH, PSI, POUND_PER_CUBIC_FOOT = 0.3048, 0.0254, 6894.757293168, 0.45359237 / 0.3048**3
EC3 = "EN 1993-1-1 (from memory)"
EC2 = "EN 1992-1-1, Ecm = 22 (fcm/10)^0.3 (from memory)"
EC2_DYNAMIC = "EN 1992-1-1 Ecm, raised by 15 % for a dynamic modulus (common practice)"
ACI = "ACI 318, Ec = 57,000 √f'c in psi (from memory)"
EN338 = "EN 338 (from memory)"
HANDBOOK = "general handbooks (from memory)"
TTI = "Hirsch, Carr & Lowery 1976, FHWA-IP-76-13 (from memory)"
SMITH = "E. A. L. Smith 1960 (from memory)"
FHWA = "FHWA driven pile manuals 2006 and 2016 (from memory)"
COYLE = "Coyle, Bartoskewitz & Berger 1973 (from memory)"
FOREHAND = "Forehand & Reese 1964 (from memory)"
COMMON = "common practice"
#: A tenth of an inch, m: the quake that most of the tables give.
TENTH = 0.1 * INCH


@dataclass(frozen=True)
class Part:
    """One entry: `values` go into the project as they are; `tells` is a line for the person who chooses."""

    kind: PartKind
    name: str
    tells: str
    source: str
    values: Mapping[str, Any]
    own: bool = False

    def matches(self, text: str) -> bool:
        """Whether a word of the entry begins with each word of the text."""
        return _begin(text, f"{self.name} {self.tells} {self.source}")


def parts_of_kind(kind: PartKind, text: str = "") -> list[Part]:
    """Entries of one kind that match a search text: those that match by their name come first."""
    parts = [part for part in LIBRARY if part.kind == kind and part.matches(text)]
    return sorted(parts, key=lambda part: not _begin(text, part.name))


def _begin(text: str, here: str) -> bool:
    """Only beginnings count: "50" is not meant to find 2500 kg/m³, and Enter takes the first entry."""
    return all(re.search(rf"(?<!\w){re.escape(word)}", here.casefold()) for word in text.casefold().split())


def part_named(kind: PartKind, name: str) -> Part:
    """The entry of this kind and name. Raises `KeyError`."""
    for part in LIBRARY:
        if part.kind == kind and part.name == name:
            return part
    raise KeyError(f"the parts library has no {kind} named '{name}'")


def _material(
    name: str, modulus: float, density: float, poisson: float | None, source: str, tells: str = ""
) -> Part:
    values = {"young_modulus": modulus, "density": density, "poisson_ratio": poisson}
    speed = Material(name=name, **values).wave_speed
    lead = f"{modulus / 1e9:.4g} GPa · {density:.0f} kg/m³ · {speed:.0f} m/s"
    return Part("material", name, f"{lead} · {tells}" if tells else lead, source, values)


def _concretes() -> list[Part]:
    grades = [(fck, 22e9 * ((fck + 8) / 10) ** 0.3) for fck in (30, 40, 50, 60, 80)]
    static = [
        _material(
            f"concrete {fck} MPa, static modulus", modulus, 2500.0, 0.2, EC2, "a blow meets a stiffer one"
        )
        for fck, modulus in grades
    ]
    dynamic = [
        _material(f"concrete {fck} MPa, dynamic modulus", 1.15 * modulus, 2500.0, 0.2, EC2_DYNAMIC)
        for fck, modulus in grades
    ]
    american = [
        _material(
            f"concrete {psi} psi, static modulus",
            57e3 * sqrt(psi) * PSI,
            150 * POUND_PER_CUBIC_FOOT,
            0.2,
            ACI,
            "150 lb/ft³ · a blow meets a stiffer one",
        )
        for psi in (5000, 6000, 8000)
    ]
    return dynamic + static + american


def _timbers() -> list[Part]:
    grades = (
        ("C24 softwood", 11e9, 420.0),
        ("C30 softwood", 12e9, 460.0),
        ("D40 hardwood", 13e9, 660.0),
        ("D50 hardwood", 14e9, 740.0),
        ("D70 hardwood", 20e9, 1080.0),
    )
    return [
        _material(f"timber {name}", modulus, density, None, EN338, "dry; wet piles are heavier and slower")
        for name, modulus, density in grades
    ]


MATERIALS = [
    _material("steel", 210e9, 7850.0, 0.3, EC3),
    _material("steel, 29,000 ksi", 29e6 * PSI, 490 * POUND_PER_CUBIC_FOOT, 0.3, HANDBOOK, "490 lb/ft³"),
    _material(
        "steel, 30,000 ksi",
        30e6 * PSI,
        492 * POUND_PER_CUBIC_FOOT,
        0.3,
        COMMON,
        "492 lb/ft³, usual for piles in US units",
    ),
    *_concretes(),
    *_timbers(),
    _material("aluminium 6061-T6", 68.9e9, 2700.0, 0.33, HANDBOOK),
    _material("aluminium 7075-T6", 71.7e9, 2810.0, 0.33, HANDBOOK),
    _material("titanium Ti-6Al-4V", 113.8e9, 4430.0, 0.34, HANDBOOK),
    _material("maraging steel (18Ni)", 186e9, 8000.0, 0.3, HANDBOOK),
    _material("brass 70/30", 110e9, 8530.0, 0.35, HANDBOOK),
    _material("copper", 117e9, 8940.0, 0.34, HANDBOOK),
    _material("magnesium", 44.7e9, 1740.0, 0.29, HANDBOOK),
    _material("grey cast iron", 110e9, 7200.0, 0.26, HANDBOOK),
    _material("acrylic (PMMA), dynamic", 5.6e9, 1190.0, 0.35, HANDBOOK),
    _material("polycarbonate", 2.35e9, 1200.0, 0.37, HANDBOOK),
]


def _cushion(name: str, psi: float, restitution: float) -> Part:
    modulus = psi * PSI
    tells = f"{modulus / 1e6:.0f} MPa · restitution {restitution:g}"
    return Part("cushion", name, tells, TTI, {"young_modulus": modulus, "restitution": restitution})


CUSHIONS = [
    _cushion("laminated phenolic", 450e3, 0.8),
    _cushion("oak, load across the grain", 45e3, 0.5),
    _cushion("fir plywood", 35e3, 0.4),
    _cushion("pine plywood", 25e3, 0.3),
    _cushion("gum hardwood", 30e3, 0.25),
]

RAMS = [
    Part("ram", "63.5 kg", "the mass of the standard penetration test", "EN ISO 22476-3", {"ram_mass": 63.5}),
    *(
        Part("ram", f"{tonnes:g} t", "a block of steel, taken as rigid", COMMON, {"ram_mass": tonnes * 1e3})
        for tonnes in (0.5, 1, 2, 3, 4, 5, 6, 7, 8, 10, 12, 14, 16, 20)
    ),
]


def _section(name: str, source: str, **values: Any) -> Part:
    return Part("section", name, "", source, values)


def _mm(*dimensions: float) -> list[float]:
    return [round(d / 1e3, 6) for d in dimensions]


#: Sizes in mm: outer diameter and wall; diameter; depth, width of flange, its thickness, and the web's.
PIPES = (
    (219.1, 8.0),
    (273.0, 8.0),
    (323.9, 10.0),
    (406.4, 12.5),
    (508.0, 12.5),
    (610.0, 12.5),
    (610.0, 16.0),
    (762.0, 16.0),
    (914.0, 16.0),
    (1016.0, 20.0),
    (1219.0, 25.0),
)
BARS = (10.0, 12.0, 16.0, 20.0, 25.0, 32.0, 38.0, 50.0)
H_SECTIONS = ((250, 250, 14, 14), (300, 300, 15, 15), (350, 350, 16, 16), (400, 400, 20, 20))
SECTIONS = [
    *(
        _section(
            f"pipe {d:g} × {w:g} mm",
            "size as in EN 10219-2 (from memory)",
            shape="pipe",
            outer_diameter=_mm(d)[0],
            wall=_mm(w)[0],
        )
        for d, w in PIPES
    ),
    *(_section(f"round bar {d:g} mm", COMMON, shape="solid_round", diameter=_mm(d)[0]) for d in BARS),
    *(
        _section(f"round timber {d:g} mm", COMMON, shape="solid_round", diameter=_mm(d)[0])
        for d in (250.0, 300.0, 350.0)
    ),
    *(
        _section(f"square {w:g} mm", COMMON, shape="rectangle", width=_mm(w)[0], depth=_mm(w)[0])
        for w in (200.0, 250.0, 300.0, 350.0, 400.0, 450.0)
    ),
    *(
        _section(f"octagon {w:g} mm", COMMON, shape="octagon", across_flats=_mm(w)[0])
        for w in (400.0, 500.0, 600.0)
    ),
    _section("square 600 mm with a 300 mm void", COMMON, shape="voided_square", width=0.6, void_diameter=0.3),
    *(
        _section(
            f"H {d} × {b}, flange {f}, web {w} mm",
            COMMON,
            shape="h",
            depth=_mm(d)[0],
            flange_width=_mm(b)[0],
            flange=_mm(f)[0],
            web=_mm(w)[0],
        )
        for d, b, f, w in H_SECTIONS
    ),
]


def _ground(kind: PartKind, name: str, quake: float, per_foot: float, source: str, tells: str = "") -> Part:
    """A quake in m and a Smith damping factor in s/ft, as the sources print it; the project takes s/m."""
    damping = per_foot / FOOT
    lead = f"quake {quake * 1e3:.3g} mm · damping {damping:.2g} s/m ({per_foot:g} s/ft)"
    values = {"quake": quake, "damping": damping, "damping_law": "smith"}
    return Part(kind, name, f"{lead} · {tells}" if tells else lead, source, values)


LAYERS = [
    _ground("layer", "sand or gravel (not cohesive)", TENTH, 0.05, FHWA),
    _ground("layer", "clay (cohesive)", TENTH, 0.20, FHWA),
    _ground("layer", "any ground, Smith's first values", TENTH, 0.05, SMITH),
    _ground("layer", "sand, after tests", TENTH, 0.05, COYLE),
    _ground("layer", "clay, after tests", TENTH, 0.20, COYLE),
    _ground("layer", "coarse sand", TENTH, 0.05, FOREHAND, "damping a third of the toe's"),
    _ground("layer", "fine sand", 0.15 * INCH, 0.05, FOREHAND, "damping a third of the toe's"),
]
TOES = [
    _ground("toe", "any ground, pile that displaces little", TENTH, 0.15, FHWA, "H or open pipe"),
    _ground("toe", "hard rock", 0.04 * INCH, 0.15, FHWA),
    _ground("toe", "dense or hard ground, 300 mm closed toe", 0.3 / 120, 0.15, FHWA, "width / 120"),
    _ground("toe", "other ground, 300 mm closed toe", 0.3 / 60, 0.15, FHWA, "width / 60"),
    _ground("toe", "dense or hard ground, 600 mm closed toe", 0.6 / 120, 0.15, FHWA, "width / 120"),
    _ground("toe", "other ground, 600 mm closed toe", 0.6 / 60, 0.15, FHWA, "width / 60"),
    _ground("toe", "any ground, Smith's first values", TENTH, 0.15, SMITH),
    _ground("toe", "sand, after tests", TENTH, 0.15, COYLE),
    _ground("toe", "clay, after tests", TENTH, 0.01, COYLE),
    _ground("toe", "coarse sand, or sand and gravel", TENTH, 0.15, FOREHAND),
    _ground("toe", "fine sand", 0.15 * INCH, 0.15, FOREHAND),
    _ground("toe", "sand and clay, or loam", 0.20 * INCH, 0.20, FOREHAND, "half of the pile in sand"),
    _ground("toe", "silt and fine sand over hard strata", 0.20 * INCH, 0.20, FOREHAND),
    _ground("toe", "sand and gravel over hard strata", 0.15 * INCH, 0.15, FOREHAND),
]

LIBRARY: tuple[Part, ...] = (*MATERIALS, *CUSHIONS, *RAMS, *SECTIONS, *LAYERS, *TOES)
