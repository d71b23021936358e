"""What differs between two projects, in words, for a person who must choose one of them."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from solver import Project

#: So many differences are told one by one.
TOLD = 3


def differences(mine: Project, other: Project) -> str:
    """One sentence: "5 values differ (SI units): Head position 1.2 → 1.4; ... and 2 more." or that nothing does."""
    found = list(_between(mine.model_dump(mode="json"), other.model_dump(mode="json"), ()))
    if not found:
        return "Nothing differs."
    told = "; ".join(words for words, _ in found[:TOLD])
    more = f" and {len(found) - TOLD} more" if len(found) > TOLD else ""
    si = " (SI units)" if any(number for _, number in found[:TOLD]) else ""
    return f"{len(found)} value{'s differ' if len(found) > 1 else ' differs'}{si}: {told}{more}."


def _between(a: Any, b: Any, way: tuple[str, ...]) -> Iterator[tuple[str, bool]]:
    """Each difference in words, and whether it is one of numbers."""
    if isinstance(a, dict) and isinstance(b, dict):
        for key in [*a, *(k for k in b if k not in a)]:
            yield from _between(a.get(key), b.get(key), (*way, key.replace("_", " ")))
    elif isinstance(a, list) and isinstance(b, list) and len(a) == len(b):
        for index, (one, two) in enumerate(zip(a, b, strict=True)):
            yield from _between(one, two, (*way, _name(one, index)))
    elif a != b:
        number = any(isinstance(one, float) for one in (a, b))
        yield f"{' '.join(way[-3:])} {_short(a)} \u2192 {_short(b)}", number


def _name(part: Any, index: int) -> str:
    return str(part["name"]) if isinstance(part, dict) and "name" in part else str(index + 1)


def _short(value: Any) -> str:
    if isinstance(value, list):
        return f"{len(value)} entries"
    if isinstance(value, dict):
        return str(value.get("name") or value.get("kind") or value.get("shape") or "other values")
    if value is None:
        return "nothing"
    text = f"{value:g}" if isinstance(value, float) else str(value)
    return text if len(text) <= 40 else f"{text[:38]}…"
