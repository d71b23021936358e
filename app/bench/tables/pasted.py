"""A block of cells from the text that a spreadsheet puts on the clipboard."""

from __future__ import annotations

import re
from collections.abc import Sequence
from itertools import zip_longest


def without_headings(block: list[list[str]], headings: Sequence[str]) -> list[list[str]]:
    """The block without a first row that repeats the headings of its columns, as in "Length" or "Length (ft)".

    A unit in such a heading goes to the numbers under it, which would otherwise be taken in the column's own unit.
    """
    if len(block) < 2:
        return block
    units: list[str] = []
    for cell, heading in zip(block[0], headings, strict=False):
        title = re.fullmatch(r"([^(\[,]+?)\s*(?:[(\[,]\s*(.*?)\s*[)\]]?)?", cell)
        if title is None or title[1].casefold() != heading.casefold():
            return block
        units.append(title[2] or "")
    return [
        [_with_unit(cell, unit) for cell, unit in zip_longest(line, units, fillvalue="")]
        for line in block[1:]
    ]


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
