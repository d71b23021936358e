"""The page as one HTML file for people, with figures. Needs no network; follows the reader's light or dark setting."""

from __future__ import annotations

from html import escape

from tests.verification.figure import svg
from tests.verification.markdown_page import HEADINGS
from tests.verification.page import INTRODUCTION, NOT_COVERED, TITLE, Page, Shown, row, short

#: Rows of a table that are shown at once; longer ones open by a click.
SHOWN_ROWS = 12

STYLE = """
:root { color-scheme: light dark; }
body { font: 15px/1.5 system-ui, sans-serif; max-width: 60rem; margin: 2rem auto; padding: 0 1rem; }
h1, h2, h3 { line-height: 1.25; } h2 { margin-top: 3rem; } h3 { margin-top: 2.2rem; }
table { border-collapse: collapse; font-size: 13px; margin: .6rem 0; }
th, td { text-align: left; padding: .15rem .8rem .15rem 0; border-bottom: 1px solid GrayText; vertical-align: top; }
td.n { font-variant-numeric: tabular-nums; white-space: nowrap; }
dl { display: grid; grid-template-columns: 6rem 1fr; gap: .1rem .8rem; margin: .6rem 0; }
dt { font-weight: 600; } dd { margin: 0; } .state { font-weight: 600; }
svg { width: 100%; max-width: 46rem; height: auto; } figcaption { font-size: 13px; } figure { margin: 1rem 0; }
@media print { details > * { display: block; } h3 { break-after: avoid; } figure { break-inside: avoid; } }
"""


def text(page: Page) -> str:
    """The whole page."""
    body = [f"<h1>{escape(TITLE)}</h1>"]
    body += [f"<p>{escape(words)}</p>" for words in (*INTRODUCTION, page.made_with, page.counts)]
    body.append(_overview(page))
    for heading, results in page.by_topic.items():
        body.append(f"<h2>{escape(heading)}</h2>")
        body += [_entry(result) for result in results]
    body.append("<h2>What this page does not cover</h2>")
    body.append("<ul>" + "".join(f"<li>{escape(sentence)}</li>" for sentence in NOT_COVERED) + "</ul>")
    body.append(f"<h2>Counts</h2><p>{escape(page.counts)}</p>")
    return (
        f'<!doctype html>\n<html lang="en"><head><meta charset="utf-8"><title>{escape(TITLE)}</title>'
        f'<meta name="viewport" content="width=device-width"><style>{STYLE}</style></head>\n<body>\n'
        + "\n".join(body)
        + "\n</body></html>\n"
    )


def _place(result: Shown) -> str:
    return "".join(c if c.isalnum() else "-" for c in result.check.name)


def _state(result: Shown) -> str:
    return "✓ holds" if result.holds else "✕ fails"


def _overview(page: Page) -> str:
    rows = []
    for heading, results in page.by_topic.items():
        for result in results:
            worst = result.outcome.worst if result.outcome and result.outcome.compared else None
            figures = (
                (short(worst.difference), short(result.outcome.allowed(worst))) if worst else ("none", "")
            )
            link = f'<a href="#{_place(result)}">{escape(result.check.title)}</a>'
            rows.append((escape(heading), link, *figures, _state(result)))
            heading = ""
    return _table(("topic", "check", "largest difference", "allowed", "state"), rows)


def _entry(result: Shown) -> str:
    check = result.check
    state = _state(result) + ("" if result.holds else f": {result.sentence}")
    words = {
        "Model": check.model,
        "Source": check.source,
        "Formula": check.formula,
        "Tolerance": f"{short(check.tolerance)} of {check.share_of}: {check.why}",
    }
    parts = [f'<section id="{_place(result)}"><h3>{escape(check.title)}</h3><dl>']
    parts += [f"<dt>{name}</dt><dd>{escape(sentence)}</dd>" for name, sentence in words.items()]
    parts.append(f'<dt>State</dt><dd class="state">{escape(state)}</dd></dl>')
    if result.outcome:
        rows = [tuple(escape(cell) for cell in row(c, result.outcome)) for c in result.outcome.compared]
        parts.append(_table(HEADINGS, rows[:SHOWN_ROWS]))
        if len(rows) > SHOWN_ROWS:
            rest = _table(HEADINGS, rows[SHOWN_ROWS:])
            parts.append(f"<details><summary>{len(rows) - SHOWN_ROWS} more rows</summary>{rest}</details>")
        parts += [
            f"<figure>{svg(p)}<figcaption>{escape(p.title)}</figcaption></figure>"
            for p in result.outcome.pictures
        ]
    return "".join(parts) + "</section>"


def _table(headings: tuple[str, ...], rows: list[tuple[str, ...]]) -> str:
    head = "".join(f"<th>{escape(name)}</th>" for name in headings)
    lines = [
        "<tr>"
        + "".join(f'<td class="{"n" if i else ""}">{cell}</td>' for i, cell in enumerate(cells))
        + "</tr>"
        for cells in rows
    ]
    return f"<table><thead><tr>{head}</tr></thead><tbody>{''.join(lines)}</tbody></table>"
