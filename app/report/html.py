"""A report as one HTML file that needs nothing beside it: figures as SVG, text as text."""

from __future__ import annotations

import base64
from html import escape

from app.look.colours import PRINT
from app.report.blocks import Block, Bullets, Heading, Listing, Paragraph, Picture, Report, Section, Table
from app.report.figures.svg import clean, svg_of

STYLE = f"""
:root {{ color-scheme: light; }}
body {{ font-family: "DejaVu Sans", Verdana, sans-serif; font-size: 10pt; line-height: 1.45; color: {PRINT.ink};
  background: {PRINT.paper}; max-width: 52rem; margin: 2rem auto; padding: 0 1rem; }}
h1 {{ font-size: 20pt; }} h2 {{ font-size: 15pt; margin-top: 2.2em; border-bottom: 1px solid {PRINT.edge}; }}
h3 {{ font-size: 12pt; margin-top: 1.6em; }} h4 {{ font-size: 10.5pt; }}
h1, h2, h3, h4, figcaption, p, li, td, th {{ overflow-wrap: anywhere; }}
p, li, td {{ white-space: pre-line; }}
table {{ border-collapse: collapse; width: 100%; font-size: 8.5pt; margin: 0.6em 0 1.2em; }}
caption {{ text-align: left; font-weight: bold; padding: 0.3em 0; }}
th {{ text-align: left; vertical-align: bottom; background: {PRINT.pressed}; }}
td, th {{ padding: 0.25em 0.5em; border-bottom: 1px solid {PRINT.grid}; vertical-align: top; }}
figure {{ margin: 1em 0 1.4em; }} figcaption, .small {{ font-size: 8.5pt; color: {PRINT.soft_ink}; }}
svg {{ max-width: 100%; height: auto; }} .caution {{ font-weight: bold; }}
pre {{ font-size: 7.5pt; white-space: pre-wrap; overflow-wrap: anywhere; background: {PRINT.window}; }}
footer {{ margin-top: 3em; font-size: 8.5pt; color: {PRINT.soft_ink}; }}
.particulars td:first-child {{ width: 9rem; color: {PRINT.soft_ink}; }}
@media print {{ h2, h3, h4, caption {{ break-after: avoid; }} tr, figure {{ break-inside: avoid; }}
  thead {{ display: table-header-group; }} body {{ max-width: none; margin: 0; padding: 0; }}
  a {{ color: inherit; text-decoration: none; }} p, li {{ orphans: 2; widows: 2; }} }}
@page {{ size: PAPER; margin: 16mm 20mm; }}
"""


def html_of(report: Report) -> str:
    """The file's text; the same report always gives the same text."""
    front = report.front
    title = _text(front.title)
    logo = ""
    if front.logo:
        data = base64.b64encode(front.logo).decode()
        logo = f'<img alt="" style="max-height:5rem" src="data:image/png;base64,{data}">'
    rows = "".join(
        f"<tr><td>{_text(word)}</td><td>{_text(told)}</td></tr>" for word, told in front.particulars
    )
    verdict = "".join(f'<p class="caution">{_text(line)}</p>' for line in front.verdict)
    contents = "".join(
        f'<li><a href="#{section.key}">{_text(section.title)}</a></li>' for section in report.sections
    )
    body = "".join(_section(section, number) for number, section in enumerate(report.sections, 1))
    return (
        f'<!DOCTYPE html>\n<html lang="en"><head><meta charset="utf-8">'
        f'<meta name="viewport" content="width=device-width"><title>{title}</title>'
        f"<style>{STYLE.replace('PAPER', report.paper)}</style></head><body>{logo}"
        f'<h1 dir="auto">{title}</h1><p>{_text(front.subtitle)}</p><table class="particulars"><tbody>{rows}</tbody>'
        f"</table>{verdict}<p>{_text(front.caution)}</p><ol>{contents}</ol>{body}"
        f'<footer dir="auto">{_text(report.footer)}</footer></body></html>\n'
    )


def _text(text: str) -> str:
    return escape(clean(text))


def _section(section: Section, number: int) -> str:
    body = "\n".join(_block(block) for block in section.blocks)
    return f'<section id="{section.key}"><h2>{number}. {_text(section.title)}</h2>\n{body}</section>\n'


def _block(block: Block) -> str:
    match block:
        case Heading():
            tag = f"h{block.level + 1}"
            return f'<{tag} dir="auto">{_text(block.text)}</{tag}>'
        case Paragraph():
            kind = "" if block.style == "body" else f' class="{block.style}"'
            return f'<p dir="auto"{kind}>{_text(block.text)}</p>'
        case Bullets():
            return f"<ul>{''.join(f'<li>{_text(item)}</li>' for item in block.items)}</ul>"
        case Table():
            return _table(block)
        case Picture():
            return f"<figure>{svg_of(block.figure)}<figcaption>{_text(block.caption)}</figcaption></figure>"
        case Listing():
            return f"<pre>{_text(block.text)}</pre>"


def _table(table: Table) -> str:
    caption = f"<caption>{_text(table.caption)}</caption>" if table.caption else ""
    columns = "".join(f'<col style="width:{100 * share:.1f}%">' for share in table.shares)
    head = "".join(f"<th>{_text(cell)}</th>" for cell in table.head)
    rows = "".join(f"<tr>{''.join(f'<td>{_text(c)}</td>' for c in row)}</tr>\n" for row in table.rows)
    return (
        f"<table>{caption}<colgroup>{columns}</colgroup><thead><tr>{head}</tr></thead>"
        f"<tbody>{rows}</tbody></table>"
    )
