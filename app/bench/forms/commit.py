"""From a field to the document: one edit for what was entered, with its label, and the mark of a typical value gone."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from app.bench.forms.labels import label_of
from app.bench.forms.spec import CheckSpec, ChoiceSpec, NumberSpec, Spec, TextSpec, Tree
from app.document import Document
from app.faults import sentence_for
from app.provenance import confirm, forget_changed, mark_at
from app.tree import value_at
from app.units import Units, units_of
from solver import ProjectError, project_from_tree


def put_number(document: Document, spec: NumberSpec, value: float | None, units: Units, live: bool) -> bool:
    """Set a number (SI), or nothing. A burst of typing is one step of undo. False where it is refused."""
    shown = "" if value is None else f"{value:g}" if spec.whole else units.show(value, spec.dimension)
    number = int(value) if spec.whole and value is not None else value
    return _put(document, spec, number, shown, f"typing {spec.pointer}" if live else None)


def put_text(document: Document, spec: TextSpec, text: str) -> bool:
    """Set a text; an empty one is no text where there may be none."""
    value = text.strip()
    if spec.write is None and not value and spec.optional:
        return _put(document, spec, None, "", None)
    return _put(document, spec, value, value, None)


def put_choice(document: Document, spec: ChoiceSpec, key: str) -> str | None:
    """Choose another kind, or another way of telling the same.

    Gives the sentence why it cannot be chosen, `None` where it was: a choice that is refused leaves nothing behind,
    as the box goes back to what the project has.
    """
    word = next(option.word for option in spec.options if option.key == key)
    before = document.tree

    def change(tree: Tree) -> None:
        for one in (spec, *spec.twins):
            if isinstance(one, ChoiceSpec) and one.change is not None:
                one.change(tree, key)
            else:
                _set(tree, one.pointer, key)
        forget_changed(before, tree)

    fault = _fault_of(document, change)
    if fault is None:
        document.edit_tree(label_of(before, spec, word), change)
    return fault


def _fault_of(document: Document, change: Callable[[Tree], None]) -> str | None:
    tree = document.tree
    change(tree)
    try:
        project_from_tree(tree, document.folder)
    except ProjectError as error:
        return sentence_of(error, tree, document)
    return None


def sentence_of(error: ProjectError, tree: Tree, document: Document) -> str:
    """The first fault of a tree that is not valid, as a sentence with its place."""
    return sentence_for("", error.problems, tree, units_of(document.project))


def put_check(document: Document, spec: CheckSpec, on: bool) -> bool:
    """Switch on or off."""
    return _put(document, spec, on, "on" if on else "off", None)


def confirm_mark(document: Document, spec: Spec) -> bool:
    """The user stands by a typical value."""
    label = f"Confirm {spec.label[:1].lower()}{spec.label[1:]}"

    def change(tree: Tree) -> None:
        for one in (spec, *spec.twins):
            if mark_at(tree, one.pointer) is not None:
                confirm(tree, one.pointer)

    return document.edit_tree(label, change)


def _put(document: Document, spec: Spec, value: Any, shown: str, merge: str | None) -> bool:
    tree = document.tree
    label = label_of(tree, spec, shown)
    if not spec.twins and _write_of(spec) is None and mark_at(tree, spec.pointer) is None:
        return document.edit(label, spec.pointer, value, merge=merge)

    def change(after: Tree) -> None:
        for one in (spec, *spec.twins):
            write = _write_of(one)
            if write is not None:
                write(after, value)
            else:
                _set(after, one.pointer, value)
        forget_changed(tree, after)

    return document.edit_tree(label, change, merge=merge, pointer=spec.pointer)


def _write_of(spec: Spec) -> Callable[[Tree, Any], None] | None:
    return spec.write if isinstance(spec, NumberSpec | TextSpec) else None


def _set(tree: Tree, pointer: str, value: Any) -> None:
    parent, _, key = pointer.rpartition("/")
    value_at(tree, parent)[key] = value
