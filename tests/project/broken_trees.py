"""Projects with one fault each, and the answer that each must get."""

from __future__ import annotations

from solver.model.project import VERSION
from tests.project.changes import MISSING, broken

RADIATION = {"kind": "radiation", "shear_modulus": 1e7, "soil_density": 1800.0, "poisson_ratio": 0.3}
FILLED = {"shape": "filled_pipe", "outer_diameter": 0.1, "wall": 0.01, "fill": "grout"}
TOTAL = {"resistance": 1e5, "distribution": "uniform", "quake": 0.0025, "damping": 0.2}
BLOCK = {
    "name": "R",
    "length": 1.0,
    "material": "steel",
    "section": {"shape": "solid_round", "diameter": 0.3},
}
LEAST = {"most": 5, "tolerance": 1e-4, "least": 2}
MARK = {"source": "x", "state": "typical", "by": "y"}

UNKNOWN = "is not a key that is known here"
UNKNOWN_KEYS = [
    broken("/titel", "x", f"{UNKNOWN} ('title' stands beside it)"),
    broken("steel/colour", "red", UNKNOWN),
    broken("steel/law/yield_stress", 1.0, UNKNOWN),
    broken("steel/limits/shear", 1.0, UNKNOWN),
    broken("steel/limits/compression/unit", "MPa", UNKNOWN),
    broken("drop/remark", "x", UNKNOWN),
    broken("drop/member/length", 10.0, UNKNOWN),
    broken("drop/member/segments/0/lenght", 1.0, f"{UNKNOWN} ('length' stands beside it)"),
    broken("drop/member/segments/0/section/diameter", 0.4, UNKNOWN),
    broken("drop/member/segments/0/end_section/thickness", 0.1, UNKNOWN),
    broken("drop/member/segments/1/joint_above/gap", 0.0, UNKNOWN),
    broken("drop/member/attachments/0/name", "x", UNKNOWN),
    broken("drop/load/height", 1.0, UNKNOWN),
    broken("drop/load/cushion/modulus", 1.0, UNKNOWN),
    broken("drop/far_end/stiffness", 1.0, UNKNOWN),
    broken("drop/ground/water", 1.0, UNKNOWN),
    broken("drop/ground/layers/0/quakes", 1.0, f"{UNKNOWN} ('quake' stands beside it)"),
    broken("drop/ground/toe/area", 0.1, UNKNOWN),
    broken("drop/gauges/0/place", 1.0, UNKNOWN),
    broken("drop/run/time_step", 1e-6, UNKNOWN),
    broken("drop/run/blows", LEAST, UNKNOWN, place="drop/run/blows/least"),
    broken("/display_units", {"forse": "kN"}, "(known: force)", place="/display_units/forse"),
    broken("/provenance", {"/title": MARK}, UNKNOWN, place="/provenance/~1title/by"),
]

GONE = "the key is missing"
MISSING_KEYS = [
    broken("/format", MISSING, GONE),
    broken("/version", MISSING, GONE),
    broken("/title", MISSING, GONE),
    broken("/cases", MISSING, GONE),
    broken("steel/young_modulus", MISSING, GONE),
    broken("drop/name", MISSING, GONE),
    broken("drop/member", MISSING, GONE),
    broken("drop/load", MISSING, GONE),
    broken("drop/load/kind", MISSING, "needs the key 'kind'", place="drop/load"),
    broken("drop/load/cushion/restitution", MISSING, GONE),
    broken("drop/load/efficiency", MISSING, "'drop_height' needs 'efficiency'", place="drop/load"),
    broken("drop/member/segments/0/material", MISSING, GONE),
    broken("drop/member/segments/0/section/shape", MISSING, "needs the key 'shape'",
           place="drop/member/segments/0/section"),
    broken("drop/member/segments/0/section/wall", MISSING, GONE),
    broken("drop/far_end", MISSING, GONE),
    broken("drop/ground", MISSING, "give 'ground' with its 'toe'", place="drop/far_end"),
    broken("drop/ground/surface", MISSING, GONE),
    broken("drop/ground/layers/0/unit_resistance", MISSING, GONE),
    broken("drop/ground/layers/0/quake", MISSING, "needs 'quake' and 'damping', or a radiation 'model'",
           place="drop/ground/layers/0"),
    broken("drop/ground/layers/1/exponent", MISSING, "'exponent' goes with the 'power' damping law",
           place="drop/ground/layers/1"),
    broken("drop/gauges/0/position", MISSING, GONE),
    broken("pulse/load/quantity", MISSING, GONE),
    broken("pulse/far_end/stiffness", MISSING, GONE),
]  # fmt: skip

WRONG_TYPES = [
    broken("/title", 5, "must be text, not 5"),
    broken("/title", None, "must be text, not null"),
    broken("/notes", ["a"], "must be text"),
    broken("/materials", {}, "must be a list"),
    broken("/materials/0", 5, "must be an object, not 5"),
    broken("steel/young_modulus", "210e9", "must be a number, not '210e9'"),
    broken("steel/young_modulus", True, "must be a number, not true"),
    broken("steel/limits/compression", "high", "must be a number, not 'high'"),
    broken("/cases", {}, "must be a list"),
    broken("/cases/0", [], "must be an object"),
    broken("drop/member", None, "must be an object, not null"),
    broken("drop/member/segments/0/section", "pipe", "must be an object, not 'pipe'"),
    broken("drop/load", [], "must be an object"),
    broken("drop/load/cushion", 5e8, "must be an object"),
    broken("drop/gauges/0", "Head", "must be an object, not 'Head'"),
    broken("drop/run/gravity", 1, "must be true or false, not 1"),
    broken("drop/run/blows", 2.5, "must be a whole number, not 2.5"),
    broken("/provenance", {"/title": "x"}, "must be an object, not 'x'", place="/provenance/~1title"),
    broken("/records", [], "must be an object"),
]

BOUNDS = [
    broken("steel/young_modulus", 0, "must be more than 0, not 0"),
    broken("steel/young_modulus", 10**399, "must be a finite number, not Infinity"),
    broken("steel/density", -1.0, "must be more than 0, not -1.0"),
    broken("steel/poisson_ratio", 0.6, "must be at most 0.5, not 0.6"),
    broken("steel/limits/tension", -5.0, "must be more than 0"),
    broken("steel/name", "", "must not be empty"),
    broken("drop/name", "x" * 301, "must not be longer than 300 characters"),
    broken("/cases", [], "needs at least one entry"),
    broken("drop/member/segments", [], "needs at least one entry"),
    broken("drop/member/segments/0/length", 0.0, "must be more than 0"),
    broken("drop/member/segments/0/section/wall", 0.3, "must be thinner than half of the outer diameter",
           place="drop/member/segments/0/section"),
    broken("drop/load/efficiency", 1.2, "must be at most 1, not 1.2"),
    broken("drop/load/cushion/restitution", 0.0, "must be more than 0"),
    broken("drop/ground/layers/0/quake", 0.0, "must be more than 0"),
    broken("drop/ground/inner_share", 1.5, "must be at most 1"),
    broken("pulse/load/start", -1e-4, "must be at least 0"),
    broken("drop/run/duration", 0.0, "must be more than 0"),
    broken("drop/run/blows", 0, "must be at least 1, not 0"),
    broken("drop/gauges/0/position", -0.5, "must be at least 0"),
]  # fmt: skip

STRANGE = "is not known here; possible are '"
CHOICES = [
    broken("/format", "another", "this is no Striketrace project"),
    broken("/version", 99, "version 99 was made by a newer version of Striketrace"),
    broken("/version", VERSION + 1, f"version {VERSION + 1} was made by a newer version of Striketrace"),
    broken("/version", True, "must be a whole number from 1 on"),
    broken("/version", 0, "must be a whole number from 1 on"),
    broken("/version", "1", "must be a whole number from 1 on"),
    broken("/display_units", "imperial", "must be 'metric' or 'us', not 'imperial'"),
    broken("/display_units", {"mass": "parsec"}, "'parsec' is not a unit", place="/display_units/mass"),
    broken("/display_sign", "up", "must be 'compression' or 'tension', not 'up'"),
    broken("steel/law", {"kind": "plastic"}, f"'plastic' {STRANGE}elastic'"),
    broken("drop/member/segments/0/section", {"shape": "tube"}, f"'tube' {STRANGE}solid_round'"),
    broken("drop/member/segments/1/joint_above", {"kind": "weld"}, f"'weld' {STRANGE}bonded'"),
    broken("drop/member/attachments/0/kind", "damper", "must be 'mass', 'spring' or 'dashpot'"),
    broken("drop/load", {"kind": "diesel"}, f"'diesel' {STRANGE}pulse'"),
    broken("drop/far_end", {"kind": "rock"}, f"'rock' {STRANGE}free'"),
    broken("drop/ground/layers/0/damping_law", "cubic", "must be 'smith', 'viscous' or 'power'"),
    broken("pulse/load/shape", "bell", "must be 'rectangle', 'half_sine'"),
    broken("drop/gauges/0/on", "anvil", "must be 'member', 'ram' or 'striker'"),
    broken("drop/gauges/0/side", "left", "must be 'near' or 'far'"),
]

BETWEEN_PARTS = [
    broken("drop/member/segments/0/material", "stel", "no material named 'stel' (it has: 'copper', 'steel')"),
    broken("pulse/member/segments/0/section", FILLED, "no material named 'grout'",
           place="pulse/member/segments/0/section/fill"),
    broken("striker/load/segments/0/material", "iron", "no material named 'iron'"),
    broken("drop/load", {"kind": "drop", "ram": {"segments": [BLOCK | {"material": "iron"}]}, "energy": 1e3},
           "no material named 'iron'", place="drop/load/ram/segments/0/material"),
    broken("pulse/name", "Drop", "numbers 1 and 2 of the cases are both called 'Drop'"),
    broken("drop/member/segments/1/name", "Upper", "numbers 1 and 2 of the segments are both called 'Upper'"),
    broken("drop/gauges/1/name", "Head", "numbers 1 and 2 of the gauges are both called 'Head'"),
    broken("drop/ground/layers/1/name", "Clay", "numbers 1 and 2 of the layers are both called 'Clay'"),
    broken("drop/gauges/0/position", 10.5, "gauge 'Head' at 10.5 m lies beyond the member's end at 10 m"),
    broken("striker/gauges/1/position", 0.3, "at 0.3 m lies beyond the striker's end at 0.2 m"),
    broken("drop/gauges/0/on", "ram", "this load has no such rod"),
    broken("striker/gauges/1/on", "ram", "this load has no such rod"),
    broken("drop/member/attachments/0/position", 11.0, "lies beyond the member's end at 10 m"),
    broken("drop/ground/surface", 12.0, "lies below the member's end at 10 m"),
    broken("drop/member/segments/0/end_section", {"shape": "solid_round", "diameter": 0.3},
           "needs the same shape at both ends", place="drop/member/segments/0"),
    broken("drop/member/segments/0/joint_above", {"kind": "contact"}, "has nothing above it"),
    broken("drop/far_end", {"kind": "free"}, "must be of kind 'ground'"),
    broken("drop/ground/shaft_total", TOTAL, "give either 'layers' or 'shaft_total'", place="drop/ground"),
    broken("drop/ground/layers/0/model", RADIATION, "stands in place of 'quake'", place="drop/ground/layers/0"),
    broken("drop/load/ram", {"segments": [BLOCK]}, "give either 'ram_mass' (a rigid ram) or 'ram'",
           place="drop/load"),
    broken("drop/load/energy", 1e3, "give exactly one of 'drop_height'", place="drop/load"),
    broken("drop/load/cushion", None, "a rigid ram straight on a rigid cap", place="drop/load"),
    broken("drop/load/cushion/area", 1.0, "give either 'stiffness', or all three of",
           place="drop/load/cushion"),
    broken("pulse/load/shape", "trapezoid", "needs both 'rise' and 'fall'", place="pulse/load"),
    broken("pulse/load/rise", 1e-5, "'rise' and 'fall' belong to the trapezoid only", place="pulse/load"),
    broken("pulse/load/release", True, "'release' belongs to a velocity load", place="pulse/load"),
    broken("pulse/load", {"kind": "none"}, "nothing moves"),
]  # fmt: skip

BROKEN_TREES = UNKNOWN_KEYS + MISSING_KEYS + WRONG_TYPES + BOUNDS + CHOICES + BETWEEN_PARTS
