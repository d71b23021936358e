"""From the text of a project file to plain dicts, lists and numbers; what JSON leaves open is judged here."""

from __future__ import annotations

import json
from collections.abc import Iterator
from math import isfinite
from typing import Any

from solver.model.problem import Problem, shown, step

#: Deepest nesting that is read. A project needs about ten levels, what others keep in it a few more.
DEEPEST = 60
#: Digits of a whole number above which it can be no double: read as one, so that it counts as infinite.
LONGEST_NUMBER = 310


class TwiceGiven(dict[str, Any]):
    """An object in which the keys `twice` stand more than once; the last value counts, if any may."""

    twice: tuple[str, ...] = ()


def tree_of_text(text: str) -> tuple[Any, list[Problem]]:
    """The tree of a JSON text, and what is wrong with it as a text; the tree is `None` where it cannot be read."""
    try:
        tree = json.loads(text, object_pairs_hook=_object, parse_int=_whole)
    except json.JSONDecodeError as error:
        says = error.msg[:1].lower() + error.msg[1:]
        return None, [Problem("", f"is not valid JSON at line {error.lineno}, column {error.colno}: {says}")]
    except RecursionError:
        return None, [Problem("", "is nested too deeply to be a project")]
    return tree, list(_faults(tree))


def _object(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    tree = dict(pairs)
    if len(tree) == len(pairs):
        return tree
    keys = [key for key, _ in pairs]
    marked = TwiceGiven(tree)
    marked.twice = tuple(key for key in tree if keys.count(key) > 1)
    return marked


def _whole(digits: str) -> float:
    return int(digits) if len(digits) < LONGEST_NUMBER else float(digits)


def _faults(tree: Any) -> Iterator[Problem]:
    """Keys given twice and numbers that are none; no recursion, for the deepest of trees."""
    pending = [("", tree, 0)]
    while pending:
        at, node, depth = pending.pop()
        if depth > DEEPEST:
            yield Problem(at[:60], f"is nested deeper than {DEEPEST} levels")
            return
        if isinstance(node, TwiceGiven):
            for key in node.twice:
                yield Problem(at + step(key), "the key is given twice: keep one of them")
        if isinstance(node, float) and not isfinite(node):
            yield Problem(at, f"must be a finite number, not {shown(node)}")
        elif isinstance(node, dict):
            pending += [(at + step(key), value, depth + 1) for key, value in reversed(node.items())]
        elif isinstance(node, list):
            pending += [(at + step(i), value, depth + 1) for i, value in reversed(list(enumerate(node)))]
