"""The whole input as text for the appendix: the file's own words, with as much in a line as there is room for."""

from __future__ import annotations

import json
from typing import Any

from solver import Project, project_to_text

#: Letters in a line.
WIDTH = 132


def input_text(project: Project) -> str:
    """JSON that reads back as the same project."""
    return "\n".join(_lines(json.loads(project_to_text(project)), "", "", 0)) + "\n"


def _lines(node: Any, lead: str, tail: str, indent: int) -> list[str]:
    """The node between what stands before and behind it, in one line where it fits."""
    margin = " " * indent
    one = f"{margin}{lead}{json.dumps(node, ensure_ascii=False)}{tail}"
    if len(one) <= WIDTH or not isinstance(node, dict | list) or not node:
        return [one]
    opens, closes = "{}" if isinstance(node, dict) else "[]"
    if isinstance(node, dict):
        items = [(json.dumps(key, ensure_ascii=False) + ": ", value) for key, value in node.items()]
    else:
        items = [("", value) for value in node]
    found = [f"{margin}{lead}{opens}"]
    filling = False
    for number, (word, value) in enumerate(items):
        made = _lines(value, word, "," if number < len(items) - 1 else "", indent + 1)
        whole = len(made) == 1
        if filling and whole and len(found[-1]) + len(made[0]) - indent <= WIDTH:
            found[-1] += " " + made[0].strip(" ")
        else:
            found += made
        filling = whole and not isinstance(value, dict)
    return [*found, f"{margin}{closes}{tail}"]
