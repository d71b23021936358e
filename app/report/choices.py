"""What a person chooses about the report. Kept in the project, under `studies` / `report`."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any, Literal

#: Sections in their usual order, with their titles.
SECTIONS: dict[str, str] = {
    "summary": "Summary",
    "input": "What was analysed",
    "model": "The model and its assumptions",
    "results": "Results",
    "limits": "Limits of stress and their sources",
    "quality": "Quality of the computation",
    "cautions": "Cautions",
    "appendix": "Appendix: input, and how to repeat it",
}
FIGURES: dict[str, str] = {
    "member": "Drawing of the member",
    "envelope": "Envelopes of stress against limits",
    "force_pair": "Force and impedance × velocity",
    "stress": "Stress at the gauges",
    "velocity": "Velocity at the gauges",
    "displacement": "Displacement at the gauges",
    "xt": "x-t diagrams",
    "set": "Movement of both ends, and set",
    "energy": "Energy over time",
}
PARTICULARS: dict[str, str] = {
    "client": "Client",
    "project": "Project",
    "place": "Place",
    "number": "Number",
    "author": "Prepared by",
    "checked": "Checked by",
    "company": "Company",
}
#: Ways of writing a date: day, month and year are put into them.
DATES: dict[str, str] = {
    "words": "{day} {month_name} {year}",
    "iso": "{year}-{month:02}-{day:02}",
    "us": "{month:02}/{day:02}/{year}",
}
MONTHS = (
    *("January", "February", "March", "April", "May", "June", "July"),
    *("August", "September", "October", "November", "December"),
)
Paper = Literal["A4", "Letter"]
KEY = "report"


@dataclass(frozen=True)
class ReportChoices:
    """`sections` and `figures` are those shown, in this order. `words` holds own paragraphs by the section they open;
    `particulars` by the keys of `PARTICULARS`. `logo` is a picture file, relative to the project or absolute.
    `mesh_check`: solve once more on elements half as long."""

    sections: tuple[str, ...] = tuple(SECTIONS)
    figures: tuple[str, ...] = tuple(FIGURES)
    particulars: Mapping[str, str] = field(default_factory=dict)
    words: Mapping[str, str] = field(default_factory=dict)
    logo: str = ""
    paper: Paper = "A4"
    decimal_comma: bool = False
    dates: str = next(iter(DATES))
    mesh_check: bool = True

    def to_tree(self) -> dict[str, Any]:
        """Plain values for the project's file; what is as usual is left out."""
        usual = ReportChoices()
        tree = {
            "sections": list(self.sections),
            "figures": list(self.figures),
            "particulars": {k: v for k, v in self.particulars.items() if v},
            "words": {k: v for k, v in self.words.items() if v},
            "logo": self.logo,
            "paper": self.paper,
            "decimal_comma": self.decimal_comma,
            "dates": self.dates,
            "mesh_check": self.mesh_check,
        }
        kept = {key: list(v) if isinstance(v, tuple) else v for key, v in vars(usual).items()}
        return {key: value for key, value in tree.items() if value != kept[key]}


def report_choices(studies: Mapping[str, Any] | None) -> ReportChoices:
    """The choices kept in a project's `studies`; what cannot be understood is left at its usual value."""
    tree = (studies or {}).get(KEY)
    if not isinstance(tree, Mapping):
        return ReportChoices()
    usual = ReportChoices()
    logo, paper, dates = tree.get("logo"), tree.get("paper"), tree.get("dates")
    return ReportChoices(
        sections=_names(tree.get("sections"), SECTIONS),
        figures=_names(tree.get("figures"), FIGURES),
        particulars=_texts(tree.get("particulars"), PARTICULARS),
        words=_texts(tree.get("words"), SECTIONS),
        logo=logo if isinstance(logo, str) else "",
        paper=paper if paper in ("A4", "Letter") else usual.paper,
        decimal_comma=tree.get("decimal_comma") is True,
        dates=dates if isinstance(dates, str) and dates in DATES else usual.dates,
        mesh_check=tree.get("mesh_check") is not False,
    )


def written_date(date: datetime, way: str) -> str:
    """A date as a person chose, in English whatever the system speaks."""
    return DATES[way].format(
        day=date.day, month=date.month, month_name=MONTHS[date.month - 1], year=date.year
    )


def _names(value: Any, known: Mapping[str, str]) -> tuple[str, ...]:
    if not isinstance(value, list):
        return tuple(known)
    return tuple(dict.fromkeys(v for v in value if isinstance(v, str) and v in known))


def _texts(value: Any, known: Mapping[str, str]) -> dict[str, str]:
    if not isinstance(value, Mapping):
        return {}
    return {key: value[key] for key in known if isinstance(value.get(key), str) and value[key].strip()}
