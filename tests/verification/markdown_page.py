"""The page as Markdown."""

from __future__ import annotations

from tests.verification.page import INTRODUCTION, NOT_COVERED, TITLE, Page, Shown, row, short

HEADINGS = ("what", "expected", "solver", "difference", "allowed")


def text(page: Page) -> str:
    """The whole page."""
    parts = [f"# {TITLE}", "\n\n".join(INTRODUCTION), page.made_with, "## Overview", _overview(page)]
    for heading, results in page.by_topic.items():
        parts.append(f"## {heading}")
        parts += [_entry(result) for result in results]
    parts.append("## What this page does not cover")
    parts.append("\n".join(f"- {sentence}" for sentence in NOT_COVERED))
    parts.append("## Counts")
    parts.append(page.counts)
    return "\n\n".join(parts) + "\n"


def _overview(page: Page) -> str:
    rows = []
    for heading, results in page.by_topic.items():
        for result in results:
            state = "✓ holds" if result.holds else "✕ fails"
            worst = result.outcome.worst if result.outcome and result.outcome.compared else None
            figures = (
                (short(worst.difference), short(result.outcome.allowed(worst))) if worst else ("none", "")
            )
            rows.append((heading, result.check.title, *figures, state))
    return table(("topic", "check", "largest difference", "allowed", "state"), rows)


def _entry(result: Shown) -> str:
    check = result.check
    lines = [
        f"### {check.title}",
        "\n".join(
            f"- **{name}:** {words}"
            for name, words in (
                ("Model", check.model),
                ("Source", check.source),
                ("Formula", check.formula),
                ("Tolerance", f"{short(check.tolerance)} of {check.share_of}: {check.why}"),
                ("State", "✓ holds" if result.holds else f"✕ fails: {result.sentence}"),
            )
        ),
    ]
    if result.outcome:
        lines.append(table(HEADINGS, [row(c, result.outcome) for c in result.outcome.compared]))
    return "\n\n".join(lines)


def table(headings: tuple[str, ...], rows: list[tuple[str, ...]]) -> str:
    """A Markdown table; bars inside cells are kept from ending them."""
    lines = ["| " + " | ".join(headings) + " |", "|" + " --- |" * len(headings)]
    lines += ["| " + " | ".join(cell.replace("|", "\\|") for cell in cells) + " |" for cells in rows]
    return "\n".join(lines)
