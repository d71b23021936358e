"""Text that goes into tables of other programs: on one line, all different, and never run as a formula."""

from __future__ import annotations

import re
from collections.abc import Iterable

from app.export.columns import one_line

#: A spreadsheet takes a cell that begins with one of these for a formula (OWASP, CSV injection; from memory).
FORMULA = re.compile(r"^(\s*)([=+\-@])")
#: Comment lines are cut into cells at separators, so that a formula may begin within one.
INNER_FORMULA = re.compile(r"([,;]\s*)([=+\-@])")


def harmless(text: str) -> str:
    """One line, with an apostrophe before what a spreadsheet would run."""
    return FORMULA.sub(r"\1'\2", one_line(text))


def harmless_comment(text: str) -> str:
    """One line of comment, harmless also where a separator within it begins a new cell."""
    return INNER_FORMULA.sub(r"\1'\2", one_line(text))


def all_different(names: Iterable[str]) -> list[str]:
    """The names in order, a number behind those that came before, whatever the case of their letters."""
    seen: set[str] = set()
    found = []
    for name in names:
        number, candidate = 1, name
        while candidate.casefold() in seen:
            number += 1
            candidate = f"{name} ({number})"
        seen.add(candidate.casefold())
        found.append(candidate)
    return found
