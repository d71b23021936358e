"""Text in the order in which its letters stand on paper, for a page that is filled from left to right.

The Unicode bidirectional algorithm (Unicode Standard Annex 9, from memory) without its explicit embeddings: strong
letters, numbers with their points, signs and units, what lies between them, and brackets that are mirrored. Arabic
letters are joined by `arabic_reshaper`.
"""

from __future__ import annotations

import unicodedata
from functools import lru_cache
from itertools import groupby
from typing import Any

RIGHT = ("R", "AL")
MIRRORED = str.maketrans("()[]{}<>«»", ")(][}{><»«")


def turns(text: str) -> bool:
    """Whether anything in it reads from right to left."""
    return any(unicodedata.bidirectional(c) in RIGHT for c in text)


def begins_at_the_right(text: str) -> bool:
    """Whether its first letter reads from right to left, and so the whole line."""
    ways = (unicodedata.bidirectional(c) for c in text)
    return next((way in RIGHT for way in ways if way in ("L", *RIGHT)), False)


def on_paper(line: str) -> str:
    """One line, with Arabic letters joined, in the order from left to right."""
    if not turns(line):
        return line
    line = _joiner().reshape(line)
    base = int(begins_at_the_right(line))
    levels = _levels(_ways(line), base)
    letters = [c.translate(MIRRORED) if level % 2 else c for c, level in zip(line, levels, strict=True)]
    for level in range(max(levels), 0, -1):
        letters, levels = _reversed_from(letters, levels, level)
    return "".join(letters)


@lru_cache(maxsize=1)
def _joiner() -> Any:
    import arabic_reshaper  # not before somebody writes Arabic

    return arabic_reshaper.ArabicReshaper({"delete_harakat": False})


def _ways(line: str) -> list[str]:
    """ "L", "R", "N" for a number, "" for what takes the way of its surroundings."""
    kinds = [unicodedata.bidirectional(c) for c in line]
    for at, kind in enumerate(kinds):
        if kind == "NSM":  # an accent goes with its letter
            kinds[at] = kinds[at - 1] if at else "ON"
    ways = ["R" if k in RIGHT else "L" if k == "L" else "N" if k in ("EN", "AN") else "" for k in kinds]
    for at in range(1, len(line) - 1):  # "1.5", "12:30"
        if kinds[at] in ("CS", "ES") and ways[at - 1] == ways[at + 1] == "N":
            ways[at] = "N"
    for order in (range(1, len(line)), range(len(line) - 2, -1, -1)):  # "50%", "$20"
        for at in order:
            beside = at - order.step
            if kinds[at] == "ET" and ways[beside] == "N":
                ways[at] = "N"
    return ways


def _levels(ways: list[str], base: int) -> list[int]:
    """Even: read from left to right, odd: from right to left; numbers stay readable inside of odd ones."""
    levels: list[int | None] = []
    strong = "R" if base else "L"
    for way in ways:
        if way in ("L", "R"):
            strong = way
        if way == "N" and strong == "L":
            levels.append(2 * base)  # a number after a letter of that way goes with it
        else:
            levels.append({"L": 2 * base, "R": 1, "N": 2, "": None}[way])
    found: list[int] = []
    for empty, group in groupby(enumerate(levels), key=lambda pair: pair[1] is None):
        members = list(group)
        if not empty:
            found += [level for _, level in members if level is not None]
            continue
        first, last = members[0][0], members[-1][0]
        before = _right(ways, levels, first - 1, base)
        after = _right(ways, levels, last + 1, base)
        found += [(1 if before else 2 * base) if before == after else base] * len(members)
    return found


def _right(ways: list[str], levels: list[int | None], at: int, base: int) -> bool:
    """Whether what stands there counts as read from right to left: letters, and numbers among them."""
    if not 0 <= at < len(ways):
        return bool(base)
    return ways[at] == "R" or (ways[at] == "N" and levels[at] == 2 and not (base and _after_left(ways, at)))


def _after_left(ways: list[str], at: int) -> bool:
    return next((way == "L" for way in reversed(ways[:at]) if way in ("L", "R")), False)


def _reversed_from(letters: list[str], levels: list[int], level: int) -> tuple[list[str], list[int]]:
    """Every run of this level or a higher one, turned round."""
    turned: list[tuple[str, int]] = []
    pairs = zip(letters, levels, strict=True)
    for high, group in groupby(pairs, key=lambda pair: pair[1] >= level):
        members = list(group)
        turned += reversed(members) if high else members
    return [c for c, _ in turned], [v for _, v in turned]
