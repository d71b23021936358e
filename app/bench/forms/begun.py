"""Numbers that a choice begins with and nobody has typed: marked until they are confirmed or replaced.

A number worked out from a typical one, as a stiffness from a typical modulus, keeps its mark.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from app.bench.forms.kinds import BEGINS
from app.provenance import mark_at, mark_typical
from app.tree import value_at

Tree = dict[str, Any]

#: Where a value's mark goes when a part is told in another way: from one end of a pointer to the other, both ways.
TOLD_AGAIN = (
    ("/load/cushion/young_modulus", "/load/cushion/stiffness"),
    ("/load/pile_cushion/young_modulus", "/load/pile_cushion/stiffness"),
    ("/ground/layers/0/quake", "/ground/shaft_total/quake"),
    ("/ground/layers/0/damping", "/ground/shaft_total/damping"),
)


def mark_begun(tree: Tree, place: str, before: Tree | None = None) -> None:
    """Mark the numbers at a place that a choice has brought; `before` is the tree without them."""
    for pointer, key, value in _numbers(value_at(tree, place), place):
        source = BEGINS.get((key, value))
        if source and (before is None or value_at(before, pointer) != value):
            mark_typical(tree, pointer, source)
    if before is not None:
        _mark_told_again(before, tree)


def _mark_told_again(before: Tree, tree: Tree) -> None:
    for index in range(len(tree["cases"])):
        for pair in TOLD_AGAIN:
            one, other = (f"/cases/{index}{end}" for end in pair)
            for old, new in ((one, other), (other, one)):
                mark = mark_at(before, old)
                if mark and value_at(before, new) is None and value_at(tree, new) is not None:
                    tree["provenance"] = (tree.get("provenance") or {}) | {new: dict(mark)}


def _numbers(node: Any, at: str) -> Iterator[tuple[str, str, float]]:
    """Pointer, key and value of every number inside."""
    inner = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    for key, value in inner:
        pointer = f"{at}/{key}"
        if isinstance(value, dict | list):
            yield from _numbers(value, pointer)
        elif isinstance(value, int | float) and not isinstance(value, bool):
            yield pointer, str(key), float(value)
