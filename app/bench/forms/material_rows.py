"""The rows of a material of which any two of modulus, density and wave speed are given."""

from __future__ import annotations

from collections.abc import Callable

from app.bench.forms.spec import ChoiceSpec, Context, NumberSpec, Option, Spec, Tree
from app.tree import value_at
from solver.model.material import Material, material_from_any_two
from solver.model.quantity import Bounds

Write = Callable[[Tree, float | None], None]

#: Ways to tell a material, by the two of its three figures that are given.
MATERIAL_WAYS = (
    Option("modulus_density", "E, density", "The wave speed follows: c = √(E / density)."),
    Option("speed_density", "speed, density", "The modulus follows: E = density x speed²."),
    Option("modulus_speed", "E, speed", "The density follows: E / speed²."),
)
#: Label, meaning and dimension of each of the three, by its place in the file.
FIGURES = {
    "speed": (
        "wave_speed",
        "Wave speed",
        "Measured speed of a wave in a thin rod, c = √(E / density).",
        "velocity",
    ),
    "modulus": (
        "young_modulus",
        "Young's modulus",
        "Slope of stress over strain; use the dynamic value for concrete under a blow.",
        "modulus",
    ),
    "density": ("density", "Density", "Mass per volume.", "density"),
}


def material_rows(context: Context, pointer: str) -> list[Spec]:
    """The choice of the two, and a row for each of them."""
    given = value_at(context.tree, pointer)
    speed = Material.model_validate(given).wave_speed
    values = {"speed": speed, "modulus": given["young_modulus"], "density": given["density"]}
    way = ChoiceSpec(
        f"{pointer}#way",
        "Given by",
        "Any two of Young's modulus E, density and wave speed; the third follows, E = density x speed².",
        value=context.material_way,
        options=MATERIAL_WAYS,
        pick="material",
        pick_at=pointer,
        view="material_way",
    )
    rows: list[Spec] = [way]
    for figure in context.material_way.split("_"):
        key, label, tells, dimension = FIGURES[figure]
        rows.append(
            NumberSpec(
                f"{pointer}/{key}",
                label,
                tells,
                value=values[figure],
                dimension=dimension,
                bounds=Bounds(above=0.0),
                write=_writer(context.material_way, figure, pointer, speed),
            )
        )
    return rows


def _writer(way: str, figure: str, pointer: str, speed: float) -> Write:
    """Writes one of the two and keeps the other; where the other is the wave speed (m/s), the third follows it."""
    given_by_speed = "speed" in way

    def write(tree: Tree, value: float | None) -> None:
        material = value_at(tree, pointer)
        if not given_by_speed:
            material["young_modulus" if figure == "modulus" else "density"] = value
            return
        other = "young_modulus" if "modulus" in way else "density"
        two = {
            other: material[other] if figure == "speed" else value,
            "wave_speed": value if figure == "speed" else speed,
        }
        material["young_modulus"], material["density"] = material_from_any_two(**two)

    return write
