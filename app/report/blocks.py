"""What a report says, as plain data: headings, paragraphs, tables, figures. How it looks is the writers' affair."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from app.report.figures.marks import Figure

Style = Literal["body", "small", "caution"]


@dataclass(frozen=True)
class Heading:
    """`level` 1 begins a section on a new page; 2 and 3 stand within it."""

    text: str
    level: Literal[1, 2, 3] = 2


@dataclass(frozen=True)
class Paragraph:
    """Plain text; line breaks are kept."""

    text: str
    style: Style = "body"


@dataclass(frozen=True)
class Bullets:
    """A list of sentences."""

    items: tuple[str, ...]


@dataclass(frozen=True)
class Table:
    """Rows of text under a head. `shares` of the page's width, one a column; `caption` stands above."""

    head: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    shares: tuple[float, ...]
    caption: str = ""


@dataclass(frozen=True)
class Picture:
    """A figure with its caption below."""

    figure: Figure
    caption: str


@dataclass(frozen=True)
class Listing:
    """Text of a file, line by line."""

    text: str


Block = Heading | Paragraph | Bullets | Table | Picture | Listing


@dataclass(frozen=True)
class Section:
    """A part of the report; its key is one of `choices.SECTIONS`."""

    key: str
    title: str
    blocks: tuple[Block, ...]


@dataclass(frozen=True)
class TitlePage:
    """What stands on the first page: pairs of word and text, the answer in a line or two, a picture for the logo."""

    title: str
    subtitle: str
    particulars: tuple[tuple[str, str], ...]
    verdict: tuple[str, ...]
    caution: str
    logo: bytes | None = None


@dataclass(frozen=True)
class Report:
    """The whole of it. `footer` stands on every page."""

    front: TitlePage
    sections: tuple[Section, ...]
    footer: str
    paper: Literal["A4", "Letter"]
