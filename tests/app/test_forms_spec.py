"""Forms as plain rows, generated from the model: every kind can be chosen, and nothing told is lost on the way."""

from __future__ import annotations

from typing import Any

import pytest

from app.bench.forms.fields import CHOOSERS, model_specs
from app.bench.forms.part_forms import form_of
from app.bench.forms.spec import ChoiceSpec, Context, NumberSpec, Spec, TextSpec
from app.bench.forms.use_part import use_part
from app.parts_library import part_named
from app.starting_points import driven_pile, rod_or_bar, slender_rod_by_echo
from app.tree import copied, value_at
from solver import Case, ProjectError, project_from_tree
from solver.model import derived

Tree = dict[str, Any]
ROWS = (
    "load",
    "load/cushion",
    "load/cap_mass",
    "load/pile_cushion",
    "load/segments/0",
    "member/segments/0",
    "member/segments/1",
    "ground",
    "ground/layers/0",
    "far_end",
    "gauges/0",
    "run",
    "/materials/0",
)


def context_of(tree: Tree, **view: str) -> Context:
    project = project_from_tree(tree)
    return Context(project.model_dump(mode="json"), project.cases[0], "/cases/0", **view)


def row(specs: list[Spec], label: str, kind: type[Spec] = Spec) -> Any:
    return next(spec for spec in specs if spec.label == label and isinstance(spec, kind))


def chosen(tree: Tree, pointer: str, label: str, key: str) -> Tree:
    """The tree after another choice in the form of a part."""
    context = context_of(tree)
    after = copied(context.tree)
    row(form_of(context, pointer), label, ChoiceSpec).change(after, key)
    return after


def case_of(tree: Tree) -> Case:
    return project_from_tree(tree).cases[0]


def test_every_choice_of_every_form_gives_a_valid_project_with_a_form_of_its_own() -> None:
    """Each choice once, from each starting point, and from there back again."""
    tried = set()
    for tree in (driven_pile(), rod_or_bar(), slender_rod_by_echo()):
        for pointer in ROWS:
            context = context_of(tree)
            for spec in form_of(context, pointer):
                if not isinstance(spec, ChoiceSpec) or spec.change is None:
                    continue
                for option in spec.options:
                    after = copied(context.tree)
                    spec.change(after, option.key)
                    if (pointer, option.key) == ("load/cushion", "none"):
                        with pytest.raises(ProjectError, match="a rigid ram straight on a rigid cap"):
                            project_from_tree(after)
                        continue
                    there = context_of(after)
                    back = next(
                        s
                        for s in form_of(there, pointer)
                        if s.pointer == spec.pointer and s.label == spec.label
                    )
                    assert back.value == option.key
                    back.change(after, spec.value)
                    case_of(after)
                    tried.add((spec.label, option.key))
    labels = {chooser.label for chooser in CHOOSERS.values()} - {"Kind"}  # attachments: the test below
    assert labels <= {label for label, _key in tried}


def test_an_attachment_changes_its_kind_with_a_value_that_fits() -> None:
    tree = driven_pile()
    tree["cases"][0]["member"]["attachments"] = [{"position": 2.0, "kind": "mass", "value": 50.0}]
    after = chosen(tree, "member/attachments/0", "Kind", "spring")
    number = row(form_of(context_of(after), "member/attachments/0"), "Stiffness")
    assert (number.dimension, number.value) == ("stiffness", 1e7)


@pytest.mark.parametrize("way", ["energy", "impact_velocity", "height"])
def test_a_drop_told_in_another_way_strikes_as_fast(way: str) -> None:
    """Six digits are kept in the number that is worked out."""
    before = case_of(driven_pile())
    after = case_of(chosen(driven_pile(), "load", "Speed from", way))
    speeds = [derived.impact_velocity(case.load, case.materials) for case in (before, after)]
    assert speeds[0] == pytest.approx(speeds[1], rel=1e-5)


@pytest.mark.parametrize("way", ["stiffness", "size"])
def test_a_cushion_told_in_another_way_is_as_stiff(way: str) -> None:
    tree = chosen(driven_pile(), "load/cushion", "Given by", "stiffness")
    after = chosen(tree, "load/cushion", "Given by", way)
    stiffness = [case_of(t).load.cushion.loading_stiffness for t in (driven_pile(), after)]
    assert stiffness[0] == pytest.approx(stiffness[1], rel=1e-5)


def test_a_pulse_as_velocity_is_the_same_wave() -> None:
    """v = F/Z at the struck end."""
    before, tree = case_of(slender_rod_by_echo()), slender_rod_by_echo()
    after = case_of(chosen(tree, "load", "Quantity", "velocity"))
    impedance = derived.impedance(before.member.segments[0], before.materials)
    assert after.load.peak == pytest.approx(before.load.peak / impedance, rel=1e-5)


def test_layers_told_as_a_total_resist_as_much() -> None:
    before = derived.shaft_resistance(case_of(driven_pile()))
    after = chosen(driven_pile(), "ground", "Shaft given by", "total")
    assert derived.shaft_resistance(case_of(after)) == pytest.approx(before, rel=1e-5)
    assert not any("/layers/" in pointer for pointer in after["provenance"])


def test_a_total_is_told_with_the_toes_share() -> None:
    tree = chosen(driven_pile(), "ground", "Shaft given by", "total")
    share = row(form_of(context_of(tree), "ground"), "Toe's share")
    total = tree["cases"][0]["ground"]["shaft_total"]["resistance"] + 900e3
    assert share.value == pytest.approx(900e3 / total)
    share.write(tree, 0.5)
    ground = tree["cases"][0]["ground"]
    assert ground["toe"]["resistance"] == pytest.approx(total / 2)
    assert ground["shaft_total"]["resistance"] == pytest.approx(total / 2)


@pytest.mark.parametrize("way", ["speed_density", "modulus_speed"])
def test_a_material_is_told_by_any_two(way: str) -> None:
    """E = density x speed²; the figure that is not given follows."""
    context = context_of(driven_pile(), material_way=way)
    tree = copied(context.tree)
    row(form_of(context, "/materials/0"), "Wave speed").write(tree, 5100.0)
    steel = project_from_tree(tree).materials[0]
    assert steel.wave_speed == pytest.approx(5100.0, rel=1e-12)
    kept = steel.density == 7850.0 if way == "speed_density" else steel.young_modulus == 210e9
    assert kept


def test_elevations_appear_with_the_level_of_the_struck_end() -> None:
    tree = driven_pile()
    assert "Elevation" not in [s.label for s in form_of(context_of(tree), "gauges/0")]
    tree["cases"][0]["ground"]["level_of_struck_end"] = 12.5
    elevation = row(form_of(context_of(tree), "gauges/0"), "Elevation")
    assert elevation.value == 11.0
    elevation.write(tree, 10.0)
    assert tree["cases"][0]["gauges"][0]["position"] == 2.5


def test_a_renamed_material_is_followed_by_the_parts_made_of_it() -> None:
    context = context_of(driven_pile())
    tree = copied(context.tree)
    row(form_of(context, "/materials/0"), "Name", TextSpec).write(tree, "steel S355")
    assert case_of(tree).member.segments[0].material == "steel S355"


def test_a_limit_takes_a_number_and_what_it_rests_on() -> None:
    context = context_of(driven_pile())
    tree = copied(context.tree)
    row(form_of(context, "/materials/0"), "Limit in tension").write(tree, 200e6)
    context = context_of(tree)
    row(form_of(context, "/materials/0"), "rests on").write(tree, "0.9 of yield")
    limit = project_from_tree(tree).materials[0].limits.tension
    assert (limit.value, limit.basis) == (200e6, "0.9 of yield")
    row(form_of(context_of(tree), "/materials/0"), "Limit in tension").write(tree, None)
    assert project_from_tree(tree).materials[0].limits.tension is None


def test_every_number_of_every_form_has_words_and_a_known_dimension() -> None:
    from solver.model.quantity import SI_UNITS

    for tree in (driven_pile(), rod_or_bar(), slender_rod_by_echo()):
        for pointer in ROWS:
            for spec in form_of(context_of(tree), pointer):
                assert spec.label
                if isinstance(spec, NumberSpec):
                    assert spec.dimension in SI_UNITS


def test_a_part_of_the_library_is_copied_in_with_its_marks() -> None:
    tree = driven_pile()
    place = "/cases/0/member/segments/0/material"
    part = part_named("material", "aluminium 6061-T6")
    use_part(tree, part, place)
    use_part(tree, part, place)
    project = project_from_tree(tree)
    assert [m.name for m in project.materials] == ["steel", "aluminium 6061-T6"]
    assert project.provenance["/materials/1/density"].source == part.source
    use_part(tree, part_named("section", "octagon 500 mm"), "/cases/0/member/segments/0/section")
    use_part(tree, part_named("cushion", "pine plywood"), "/cases/0/load/pile_cushion")
    use_part(tree, part_named("layer", "coarse sand"), "/cases/0/ground/layers/0")
    assert value_at(tree, "/cases/0/load/pile_cushion/restitution") == 0.3
    case_of(tree)


def test_the_form_of_a_model_is_in_the_order_of_its_declaration() -> None:
    """A new field of the model appears in its form without a line of code here."""
    from solver.model.surroundings import SpringEnd

    tree = driven_pile()
    tree["cases"][0]["ground"]["toe"] = None
    tree["cases"][0]["far_end"] = {"kind": "spring", "stiffness": 1e8}
    specs = model_specs(context_of(tree), SpringEnd, "/cases/0/far_end")
    assert [(s.label, s.dimension) for s in specs] == [("Stiffness", "stiffness")]


def test_both_ends_of_a_tapered_filled_pipe_get_the_same_fill() -> None:
    tree = driven_pile()
    filled = {"shape": "filled_pipe", "outer_diameter": 0.5, "wall": 0.01, "fill": "steel"}
    segment = tree["cases"][0]["member"]["segments"][0]
    segment.update(section=filled, end_section=filled | {"outer_diameter": 0.4})
    tree["materials"].append({"name": "grout", "young_modulus": 30e9, "density": 2300.0})
    after = chosen(tree, "member/segments/0", "Fill", "grout")
    case = case_of(after)
    assert case.member.segments[0].end_section.fill == case.member.segments[0].section.fill == "grout"
    use_part(
        after,
        part_named("material", "concrete 5000 psi, static modulus"),
        "/cases/0/member/segments/0/section/fill",
    )
    assert case_of(after).member.segments[0].end_section.fill == "concrete 5000 psi, static modulus"
