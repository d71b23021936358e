"""Filling cells of a table: what is typed, pasted or put into many cells at once is one step of undo.

Cells that make no sense are not taken and say why; the others are.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from math import isclose
from typing import Any

from app.bench.forms.bounds import breach_of
from app.bench.forms.commit import sentence_of
from app.bench.forms.spec import CheckSpec, ChoiceSpec, Context, NumberSpec, Spec, TextSpec, Tree
from app.bench.forms.use_part import free_name
from app.bench.outline.edits import called, entries_of, word_for
from app.bench.tables.content import Content, content_of, value_from
from app.bench.tables.pasted import Block
from app.document import Document
from app.provenance import forget_changed
from app.tree import copied, value_at
from app.units import Units
from solver import ProjectError, project_from_tree


@dataclass(frozen=True)
class Cell:
    """A text for a cell, by row and column."""

    row: int
    column: int
    text: str


@dataclass(frozen=True)
class Fault:
    """A cell that was not taken: its place in the project, the text, and why."""

    pointer: str
    text: str
    sentence: str


def block_cells(block: Block, row: int, columns: int) -> list[Cell]:
    """The cells of a pasted block from a row on; what lies beyond the last column is left out."""
    return [
        Cell(row + i, column, text)
        for i, line in enumerate(block.rows)
        for column, text in zip(block.columns, line, strict=False)
        if column < columns
    ]


def fill_cells(
    document: Document,
    context: Context,
    content: Content,
    cells: Sequence[Cell],
    units: Units,
    label: str = "",
) -> str | None:
    """Put texts into cells as one edit, adding entries where the cells reach beyond the last.

    Gives the sentence why nothing was taken, `None` where something was; cells that could not be taken are in
    `document.rejected`, each at its place.
    """
    before = context.tree
    tree = copied(before)
    more = max((cell.row for cell in cells), default=-1) + 1 - len(content.rows)
    _extend(tree, context, content.list_pointer, more)
    try:
        wide = _content(tree, context, content, units, document) if more > 0 else content
    except ProjectError as error:
        return sentence_of(error, tree, document)
    faults: list[Fault] = []
    for cell in sorted(cells, key=lambda c: not isinstance(_column_spec(content, c), ChoiceSpec)):
        fault = _put(tree, context, wide, cell, units)
        if fault:
            faults.append(fault)
    forget_changed(before, tree)
    tree.setdefault("provenance", None)  # so that it goes where the last mark has gone
    try:
        project_from_tree(tree, document.folder)
    except ProjectError as error:
        return sentence_of(error, tree, document)
    title = label or _label(context, content, cells)
    document.edit_tree(title, lambda now: now.update(tree))
    for pointer in {_pointer(context, wide, cell) for cell in cells} & document.rejected.keys():
        document.edit_tree(title, lambda now: None, pointer=pointer)  # what stood there is not wrong any more
    for fault in faults:
        document.reject(fault.pointer, fault.text, fault.sentence)
    return None


def _column_spec(content: Content, cell: Cell) -> Spec:
    return content.columns[cell.column].spec


def _extend(tree: Tree, context: Context, list_pointer: str, count: int) -> None:
    """Entries behind the last, like it, under free names."""
    entries = value_at(tree, context.full(list_pointer))
    for _ in range(count):
        entry = copied(entries[-1])
        if "name" in entry:
            name = f"{word_for(list_pointer).capitalize()} {len(entries) + 1}"
            entry["name"] = free_name(name, [e["name"] for e in entries])
        entries.append(entry)


def _content(tree: Tree, context: Context, content: Content, units: Units, document: Document) -> Content:
    """The table of the extended list, with the columns in the order that the user saw."""
    project = project_from_tree(tree, document.folder)
    index = int(context.at.rsplit("/", 1)[1])
    wide = content_of(Context(tree, project.cases[index], context.at), content.list_pointer, units)
    return Content(content.list_pointer, content.columns, wide.rows)


def _pointer(context: Context, content: Content, cell: Cell) -> str:
    entry = context.full(f"{content.list_pointer}/{cell.row}")
    return f"{entry}{content.columns[cell.column].key[0]}"


def _put(tree: Tree, context: Context, content: Content, cell: Cell, units: Units) -> Fault | None:
    """Put one text into the tree; a cell that its entry does not have is left alone where nothing is given for it."""
    column = content.columns[cell.column]
    spec = content.rows[cell.row].get(column.key)
    pointer = _pointer(context, content, cell)
    if spec is None:
        if not cell.text.strip() or value_at(tree, pointer) is None:
            return None  # such as the wall of a solid bar
        spec = column.spec
    try:
        value = value_from(spec, cell.text, units)
    except ValueError as error:
        return Fault(pointer, cell.text, str(error))
    if isinstance(spec, NumberSpec):
        breach = breach_of(spec, value, units)
        if breach:
            return Fault(pointer, cell.text, breach)
        if None not in (value, spec.value) and isclose(value, spec.value or 0.0, rel_tol=1e-12):
            return None  # what was copied from here comes back as it was
    _write(tree, spec, pointer, value)
    return None


def _write(tree: Tree, spec: Spec, pointer: str, value: Any) -> None:
    if isinstance(spec, ChoiceSpec) and spec.change is not None:
        spec.change(tree, value)
    elif isinstance(spec, NumberSpec | TextSpec) and spec.write is not None:
        spec.write(tree, value)
    elif isinstance(spec, NumberSpec | TextSpec | ChoiceSpec | CheckSpec):
        parent, _, key = pointer.rpartition("/")
        value_at(tree, parent)[key] = value


def _label(context: Context, content: Content, cells: Sequence[Cell]) -> str:
    word = word_for(content.list_pointer)
    if len(cells) == 1 and cells[0].row < len(entries_of(context, content.list_pointer)):
        what = content.columns[cells[0].column].heading
        return f"Set {what[:1].lower()}{what[1:]} of {called(context, content.list_pointer, cells[0].row)}"
    return f"Fill {len(cells)} cells of the {word}s"
