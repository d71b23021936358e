"""Plain JSON trees: reading and replacing values at JSON pointers, without changing the tree at hand."""

from __future__ import annotations

import os
from collections.abc import Iterator, Mapping
from pathlib import Path
from typing import Any


def copied(node: Any) -> Any:
    """A copy of dicts and lists all the way down; several times quicker than `copy.deepcopy`."""
    if isinstance(node, dict):
        return {key: copied(value) for key, value in node.items()}
    if isinstance(node, list | tuple):
        return [copied(value) for value in node]
    return node


def parts_of(pointer: str) -> list[str]:
    """The keys of a JSON pointer (RFC 6901)."""
    return [p.replace("~1", "/").replace("~0", "~") for p in pointer.split("/")[1:]]


def value_at(tree: Any, pointer: str) -> Any:
    """The value at a pointer, `None` where the tree has no such place."""
    node = tree
    for part in parts_of(pointer):
        node = _child(node, part)
    return node


def _child(node: Any, part: str) -> Any:
    if isinstance(node, dict):
        return node.get(part)
    if isinstance(node, list) and part.isdecimal() and int(part) < len(node):
        return node[int(part)]
    return None


def with_values(tree: dict[str, Any], values: Mapping[str, Any]) -> dict[str, Any]:
    """A tree with values replaced at pointers; shares what has not changed. Raises `LookupError`."""
    for pointer, value in values.items():
        tree = _with(tree, parts_of(pointer), value)
    return tree


def _with(node: Any, parts: list[str], value: Any) -> Any:
    if not parts:
        return copied(value)
    first, rest = parts[0], parts[1:]
    if isinstance(node, dict):
        if rest and first not in node:
            raise LookupError(first)
        return {**node, first: _with(node.get(first), rest, value)}
    if isinstance(node, list):
        if first == "-" and not rest:
            return [*node, copied(value)]
        if first.isdecimal() and int(first) < len(node):
            index = int(first)
            return [*node[:index], _with(node[index], rest, value), *node[index + 1 :]]
    raise LookupError(first)


def same_place(before: Any, after: Any, pointer: str) -> bool:
    """Whether a pointer means the same part in both trees: lists as long, parts of the same kind, along the way."""
    *way, last = parts_of(pointer)
    for part in way:
        before, after = _child(before, part), _child(after, part)
        if type(before) is not type(after) or before is None:
            return False
        if isinstance(before, list) and len(before) != len(after):
            return False
        if isinstance(before, dict):
            if any(before.get(key) != after.get(key) for key in ("kind", "shape")):
                return False
            if before.keys() != after.keys() and last not in after:
                return False
    return True


def with_files_moved(tree: dict[str, Any], old: Path, new: Path) -> dict[str, Any]:
    """The tree with relative history files still found when the project moves from one folder to another."""
    tree = copied(tree)
    for load in _histories(tree):
        name = Path(load["file"])
        if not name.is_absolute():
            try:
                load["file"] = Path(os.path.relpath(old / name, new)).as_posix()
            except ValueError:  # another drive, on Windows
                load["file"] = (old / name).as_posix()
    return tree


def _histories(tree: dict[str, Any]) -> Iterator[dict[str, Any]]:
    for case in tree["cases"]:
        load = case["load"]
        if load.get("kind") == "history" and load.get("file"):
            yield load
