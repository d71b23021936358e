"""Starting points, the parts library, and the marks that tell where a value came from."""

from __future__ import annotations

from copy import deepcopy

import pytest

from app import provenance
from app.bench.forms.commit import put_choice
from app.bench.forms.part_forms import form_of
from app.bench.forms.spec import ChoiceSpec, Context
from app.bench.forms.use_part import use_part
from app.bench.outline.edits import add
from app.document import Document
from app.own_parts import FILE, forget_part, keep_part, own_parts, part_from
from app.parts_library import LIBRARY, parts_of_kind
from app.starting_points import STARTING_POINTS, driven_pile, new_tree
from app.tree import value_at, with_values
from solver import project_from_tree


@pytest.mark.parametrize("name", [point.name for point in STARTING_POINTS])
def test_a_starting_point_is_a_valid_project_whose_marks_point_at_values(name: str) -> None:
    tree = new_tree(name)
    project = project_from_tree(tree)
    assert project.cases[0].gauges
    assert all(value_at(tree, pointer) is not None for pointer in project.provenance)


@pytest.mark.parametrize("part", LIBRARY, ids=lambda part: f"{part.kind} {part.name}")
def test_every_part_of_the_library_fits_a_project_and_names_its_source(part) -> None:
    tree = driven_pile()
    places = {
        "material": "/materials/0",
        "cushion": "/cases/0/load/cushion",
        "ram": "/cases/0/load",
        "layer": "/cases/0/ground/layers/0",
        "toe": "/cases/0/ground/toe",
    }
    if part.kind == "section":
        tree = with_values(tree, {"/cases/0/member/segments/0/section": dict(part.values)})
    else:
        value_at(tree, places[part.kind]).update(part.values)
    project_from_tree(tree)
    assert part.source


def test_parts_are_found_by_words_in_any_order() -> None:
    names = [part.name for part in parts_of_kind("material", "dynamic 60 concrete")]
    assert names == ["concrete 60 MPa, dynamic modulus"]
    assert parts_of_kind("ram", "no such thing") == []


@pytest.mark.parametrize("grade", [30, 40, 50, 60, 80])
def test_the_entry_that_enter_takes_is_the_one_whose_name_was_typed(grade: int) -> None:
    """Figures inside other figures, such as the 50 in 2500 kg/m³, must not bring another grade to the top."""
    assert parts_of_kind("material", f"concrete {grade}")[0].name == f"concrete {grade} MPa, dynamic modulus"


def test_damping_factors_of_the_library_are_in_seconds_per_metre() -> None:
    """0.05 s/ft is 0.164 s/m (E. A. L. Smith 1960, from memory); four decimals are kept."""
    smith = next(p for p in parts_of_kind("layer") if p.source.startswith("E. A. L. Smith"))
    assert smith.values["damping"] == pytest.approx(0.05 / 0.3048, abs=5e-5)


def test_marks_follow_their_layer_and_go_with_it() -> None:
    tree = driven_pile()
    before = deepcopy(tree["provenance"])
    layers = "/cases/0/ground/layers"
    provenance.rearrange(tree, layers, [1, 0])
    assert tree["provenance"][f"{layers}/0/quake"] == before[f"{layers}/1/quake"]
    assert tree["provenance"]["/materials/0/density"] == before["/materials/0/density"]
    provenance.rearrange(tree, layers, [1])
    assert tree["provenance"][f"{layers}/0/damping"] == before[f"{layers}/0/damping"]
    assert f"{layers}/1/damping" not in tree["provenance"]


def test_a_mark_is_confirmed_or_forgotten() -> None:
    tree = driven_pile()
    provenance.confirm(tree, "/materials/0/density")
    assert provenance.mark_at(tree, "/materials/0/density")["state"] == "confirmed"
    provenance.forget(tree, "/cases/0/ground")
    assert not any(pointer.startswith("/cases/0/ground") for pointer in tree["provenance"])
    provenance.forget(tree, "/cases/0")
    provenance.forget(tree, "/materials/0")
    assert "provenance" not in tree


def test_own_parts_are_kept_used_as_confirmed_and_dropped(tmp_path) -> None:
    tree = driven_pile()
    tree["materials"][0]["young_modulus"] = 207e9
    kept = part_from(tree, "material", "/cases/0/member/segments/0/material", "our steel")
    keep_part(tmp_path, kept)
    keep_part(tmp_path, part_from(tree, "cushion", "/cases/0/load/cushion", "worn oak"))
    keep_part(tmp_path, kept)
    assert [part.name for part in own_parts(tmp_path)] == ["worn oak", "our steel"]
    use_part(tree, own_parts(tmp_path)[1], "/cases/0/member/segments/0/material")
    project = project_from_tree(tree)
    assert project.cases[0].material("our steel").young_modulus == 207e9
    assert project.provenance["/materials/1/density"].state == "confirmed"
    forget_part(tmp_path, kept)
    assert [part.name for part in own_parts(tmp_path)] == ["worn oak"]


@pytest.mark.parametrize(
    "text", ["", "nonsense", "{}", '[1, {"kind": "material"}, {"kind": "x", "name": "y"}]']
)
def test_a_damaged_file_of_own_parts_is_no_hindrance(tmp_path, text: str) -> None:
    (tmp_path / FILE).write_text(text, encoding="utf-8")
    assert own_parts(tmp_path) == []


def test_a_part_that_is_not_whole_cannot_be_kept() -> None:
    tree = driven_pile()
    assert part_from(tree, "cushion", "/cases/0/load/pile_cushion", "none") is None
    tree["cases"][0]["load"]["cushion"] = {"stiffness": 1e9, "restitution": 0.5}
    assert part_from(tree, "cushion", "/cases/0/load/cushion", "stiff") is None


def typical(document: Document) -> set[str]:
    return {
        p.removeprefix("/cases/0/") for p, m in document.project.provenance.items() if m.state == "typical"
    }


def choose(document: Document, pointer: str, label: str, key: str) -> None:
    context = Context(document.tree, document.case, "/cases/0")
    spec = next(s for s in form_of(context, pointer) if isinstance(s, ChoiceSpec) and s.label == label)
    assert put_choice(document, spec, key) is None


def test_a_number_that_a_choice_brings_is_marked_until_somebody_stands_by_it(qapp) -> None:
    document = Document(project_from_tree(driven_pile()), qapp)
    choose(document, "load/pile_cushion", "Given by", "size")
    brought = {f"load/pile_cushion/{k}" for k in ("area", "thickness", "young_modulus", "restitution")}
    assert brought <= typical(document)
    assert document.edit_tree("Ground", lambda tree: tree["cases"][0]["ground"].update(layers=[]))
    document.edit_tree("No marks", lambda tree: provenance.forget(tree, "/cases/0/ground/layers"))
    edit = add(Context(document.tree, document.case, "/cases/0"), "ground/layers")
    assert document.edit_tree(edit.label, edit.change)
    assert {f"ground/layers/0/{k}" for k in ("quake", "damping", "unit_resistance")} <= typical(document)


def test_a_stiffness_worked_out_from_a_typical_modulus_is_typical_and_goes_back_exactly(qapp) -> None:
    document = Document(project_from_tree(driven_pile()), qapp)
    before = document.case.load.cushion
    choose(document, "load/cushion", "Given by", "stiffness")
    assert "load/cushion/stiffness" in typical(document)
    assert document.case.load.cushion.loading_stiffness == before.loading_stiffness
    choose(document, "load/cushion", "Given by", "size")
    assert "load/cushion/young_modulus" in typical(document)
    assert document.case.load.cushion.young_modulus == pytest.approx(before.young_modulus, rel=1e-14)


def test_what_somebody_has_typed_is_not_marked_when_it_is_told_in_another_way(qapp) -> None:
    document = Document(project_from_tree(driven_pile()), qapp)
    own = {"stiffness": 2e9, "restitution": 0.7}
    assert document.edit_tree("Own", lambda tree: tree["cases"][0]["load"].update(cushion=own))
    document.edit_tree("No marks", lambda tree: provenance.forget(tree, "/cases/0/load/cushion"))
    choose(document, "load/cushion", "Given by", "size")
    marked = {p for p in typical(document) if p.startswith("load/cushion")}
    assert marked == {"load/cushion/area", "load/cushion/thickness"}
