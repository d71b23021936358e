"""From results to a report: sections in the order chosen, own words at the head of each."""

from __future__ import annotations

import io
from collections.abc import Callable, Iterator
from dataclasses import replace
from datetime import datetime
from pathlib import Path

from PIL import Image

from app import __version__
from app.export.fingerprint import input_hash
from app.report import section_closing as closing
from app.report.blocks import Block, Paragraph, Picture, Report, Section, Table, TitlePage
from app.report.choices import PARTICULARS, SECTIONS, report_choices, written_date
from app.report.decimals import with_commas
from app.report.outcome import Material, Solved
from app.report.section_input import analysed
from app.report.section_model import model
from app.report.section_results import results
from app.report.section_summary import summary
from app.report.verdict import verdict_lines
from app.units import units_of
from app.words import AXIAL_CAUTION, LIMIT_CAUTION, MODEL_CAUTION
from solver import Project

WRITERS: dict[str, Callable[[Material], Iterator[Block]]] = {
    "summary": summary,
    "input": analysed,
    "model": model,
    "results": results,
    "limits": closing.limits,
    "quality": closing.quality_section,
    "cautions": closing.cautions,
    "appendix": closing.appendix,
}
#: Pixels of a logo along its longer side, at most.
LOGO_PIXELS = 900


def build_report(
    project: Project,
    cases: tuple[Solved, ...],
    date: datetime,
    path: Path | None = None,
    folder: Path | None = None,
) -> Report:
    """The report of solved cases. `path` is the project's file, `folder` where a relative logo lies."""
    choices = report_choices(project.studies)
    of = Material(
        project,
        cases,
        choices,
        units_of(project),
        input_hash(project),
        date,
        path.name if path else "",
    )
    sections = []
    for key in choices.sections:
        own = choices.words.get(key, "").strip()
        blocks = (*([Paragraph(own)] if own else []), *WRITERS[key](of))
        sections.append(Section(key, SECTIONS[key], blocks))
    title = " ".join(project.title.split()) or "Untitled project"
    footer = f"{title} · Striketrace {__version__} · {written_date(date, choices.dates)}"
    front = _front(of, title, folder or (path.parent if path else None))
    report = Report(front, numbered(sections), footer, choices.paper)
    return with_commas(report, project) if choices.decimal_comma else report


def numbered(sections: list[Section]) -> tuple[Section, ...]:
    """Figures and tables with their numbers before their captions."""
    counts = {"Figure": 0, "Table": 0}

    def caption(word: str, text: str) -> str:
        counts[word] += 1
        return f"{word} {counts[word]}. {text}"

    def told(block: Block) -> Block:
        if isinstance(block, Picture):
            return replace(block, caption=caption("Figure", block.caption))
        if isinstance(block, Table) and block.caption:
            return replace(block, caption=caption("Table", block.caption))
        return block

    return tuple(replace(section, blocks=tuple(map(told, section.blocks))) for section in sections)


def _front(of: Material, title: str, folder: Path | None) -> TitlePage:
    choices = of.choices
    told = [(PARTICULARS[key], choices.particulars[key]) for key in PARTICULARS if key in choices.particulars]
    told += [
        ("Date", written_date(of.date, choices.dates)),
        ("Program", f"Striketrace {__version__}"),
        ("Input", f"SHA-256 {of.hash}"),
    ]
    caution = f"{MODEL_CAUTION} {LIMIT_CAUTION} {AXIAL_CAUTION}"
    logo = None
    if choices.logo:
        logo = _logo(choices.logo, folder)
        if logo is None:
            caution += f" The picture '{choices.logo}' could not be read as a logo."
    return TitlePage(
        title,
        "Stress waves under a blow: a prediction by wave analysis",
        tuple(told),
        verdict_lines(of.project, of.cases),
        caution,
        logo,
    )


def _logo(name: str, folder: Path | None) -> bytes | None:
    """The picture as PNG of modest size; `None` where it cannot be read."""
    path = Path(name)
    if not path.is_absolute() and folder is not None:
        path = folder / path
    try:
        with Image.open(path) as picture:
            if picture.width * picture.height > 50_000_000:
                return None
            small = picture.convert("RGBA")
            small.thumbnail((LOGO_PIXELS, LOGO_PIXELS))
            paper = Image.new("RGB", small.size, "white")
            paper.paste(small, mask=small.getchannel("A"))
    except (OSError, ValueError, SyntaxError):
        return None
    stream = io.BytesIO()
    paper.save(stream, "PNG")
    return stream.getvalue()
