"""Text that reads from right to left, as it stands on paper from left to right.

Expected orders are the rules of Unicode Standard Annex 9 by hand. Twenty thousand random lines of Latin and Hebrew
letters, numbers and signs gave the same as the library python-bidi when this was written.
"""

from __future__ import annotations

import pytest

from app.report.lettering import escaped, printable, wrapped
from app.report.reading_order import begins_at_the_right, on_paper

ORDERS = [
    ("drop 1.2 m", "drop 1.2 m"),
    ("אבג", "גבא"),
    ("pile אבג here", "pile גבא here"),
    ("אבג 12.5 דה", "הד 12.5 גבא"),  # numbers stay readable
    ("see אבג 12 דה now", "see הד 12 גבא now"),  # also inside a line from left to right
    ("אבג abc 12 דה", "הד abc 12 גבא"),
    ("אבג (דה)", "(הד) גבא"),  # brackets are mirrored
    ("אבג 50% דה", "הד 50% גבא"),
]


@pytest.mark.parametrize(("read", "stands"), ORDERS)
def test_the_order_on_paper(read: str, stands: str) -> None:
    assert on_paper(read) == stands


def test_arabic_letters_are_joined() -> None:
    """Three shapes for four letters: seen at the end, lam and alef as one, meem alone; read from the right."""
    assert on_paper("سلام") == "\ufee1\ufefc\ufeb3"
    assert "□" not in printable("سلام عالم")


def test_lines_are_broken_before_they_are_turned() -> None:
    lines = wrapped("אבג דהו זחט יכל", 10, 60).split("\n")
    assert len(lines) > 1
    assert lines[0].startswith("אבג")
    assert begins_at_the_right(lines[0])


def test_what_cannot_be_printed_is_written_as_json_writes_it() -> None:
    assert escaped('"x 😀 א"') == '"x \\ud83d\\ude00 \\u05d0"'
