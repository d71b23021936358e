"""A block of cells from the text that a spreadsheet puts on the clipboard."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import zip_longest

#: A heading, with its unit behind it: "Length", "Length (ft)", "Length [ft]", "Length, ft".
TITLE = re.compile(r"([^(\[,]+?)\s*(?:[(\[,]\s*(.*?)\s*[)\]]?)?")


@dataclass(frozen=True)
class Block:
    """Rows of cells, and the column of the table that each cell of a row goes to."""

    rows: list[list[str]]
    columns: list[int]


def placed(rows: list[list[str]], headings: Sequence[str], column: int) -> Block:
    """A block whose corner is at a column; one whose first row repeats headings, as in "Length" or "Length (ft)", goes
    under those without that row, wherever its corner is.

    A unit in such a heading goes to the numbers under it, which would otherwise be taken in the column's own unit.
    Raises `ValueError` with a sentence where the first row is one of headings that the table does not have.
    """
    width = max((len(row) for row in rows), default=0)
    beside = Block(rows, list(range(column, column + width)))
    if len(rows) < 2:
        return beside
    known = [heading.casefold() for heading in headings]
    titles = [TITLE.fullmatch(cell) for cell in rows[0]]
    names = [title[1].casefold() if title else "" for title in titles]
    if names and all(name in known for name in names) and len(set(names)) == len(names):
        units = [title[2] or "" if title else "" for title in titles]
        under = [[_with_unit(c, u) for c, u in zip_longest(row, units, fillvalue="")] for row in rows[1:]]
        return Block(under, [known.index(name) for name in names])
    if _are_headings(rows):
        strange = [cell for cell, name in zip(rows[0], names, strict=True) if name not in known]
        raise ValueError(
            f"The first row looks like headings, but the table has no column '{strange[0]}'. "
            f"Its columns are {', '.join(headings)}: use their names, or paste without the first row."
            if strange
            else "The first row names a column twice."
        )
    return beside


def _are_headings(rows: list[list[str]]) -> bool:
    """Whether the first row has words alone, and the second a number under one of them."""
    first, second = rows[0], rows[1]
    words_alone = not any(char.isdigit() for cell in first for char in re.sub(r"[(\[].*", "", cell))
    return words_alone and any(
        a and re.match(r"[-+−]?[.,]?\d", b) for a, b in zip(first, second, strict=False)
    )


def _with_unit(cell: str, unit: str) -> str:
    return f"{cell} {unit}" if unit and cell[-1:].isdigit() else cell


def cells_of(text: str) -> list[list[str]]:
    """Rows of cells: parted by tabs, or where there are none by semicolons, or by commas between plain numbers.

    A cell in quotes, as spreadsheets write those with a tab or a line break in them, is taken as one.
    """
    lines = _rows(text, "\t") if "\t" in text else None
    if lines is None and ";" in text:
        lines = _rows(text, ";")
    if lines is None:
        lines = [
            _by_comma_or_space(line) for line in text.replace("\r\n", "\n").replace("\r", "\n").split("\n")
        ]
    while lines and not any(cell.strip() for cell in lines[-1]):
        lines.pop()
    return [[cell.strip() for cell in line] for line in lines]


def _rows(text: str, separator: str) -> list[list[str]]:
    rows: list[list[str]] = [[""]]
    quoted = False
    for at, char in enumerate(text.replace("\r\n", "\n").replace("\r", "\n")):
        if char == '"' and (quoted or rows[-1][-1] == ""):
            quoted = not quoted if at else True
        elif char == separator and not quoted:
            rows[-1].append("")
        elif char == "\n" and not quoted:
            rows.append([""])
        else:
            rows[-1][-1] += char
    return rows


def _by_comma_or_space(line: str) -> list[str]:
    """ "0.001, 250" is two cells; "0,001" is a number with a decimal comma."""
    if ", " in line or (line.count(",") == 1 and "." in line):
        return line.split(",")
    return [line]
