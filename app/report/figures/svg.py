"""A figure as SVG with real text."""

from __future__ import annotations

import base64
import io
from xml.sax.saxutils import escape, quoteattr

import numpy as np
from PIL import Image

from app.report.figures.marks import Figure, Mark, Path, Raster, Text
from app.report.lettering import UNSEEN

FONTS = "'DejaVu Sans', Verdana, sans-serif"


def svg_of(figure: Figure, alone: bool = False) -> str:
    """The element; `alone`: as a file of its own, with its declaration."""
    width, height = figure.width, figure.height
    head = '<?xml version="1.0" encoding="UTF-8"?>\n' if alone else ""
    body = "".join(_mark(mark) for mark in figure.marks)
    name = quoteattr(clean(figure.name))
    return (
        f'{head}<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {width:g} {height:g}" width="{width:g}pt" '
        f'height="{height:g}pt" role="img" aria-label={name} font-family="{FONTS}">'
        f"<title>{escape(clean(figure.name))}</title>{body}</svg>\n"
    )


def clean(text: str) -> str:
    """Text without what XML cannot hold."""
    return "".join(
        c for c in UNSEEN.sub("", text) if c in "\n\t" or (c >= " " and not "\ud800" <= c <= "\udfff")
    )


def png_of(raster: Raster) -> bytes:
    """The picture as PNG, the same bytes each time."""
    stream = io.BytesIO()
    Image.fromarray(np.ascontiguousarray(raster.colours)).save(stream, "PNG")
    return stream.getvalue()


def _mark(mark: Mark) -> str:
    if isinstance(mark, Path):
        return _path(mark)
    if isinstance(mark, Text):
        turn = f' transform="rotate(-90 {mark.x:.2f} {mark.y:.2f})"' if mark.turned else ""
        weight = ' font-weight="bold"' if mark.bold else ""
        return (
            f'<text x="{mark.x:.2f}" y="{mark.y:.2f}" font-size="{mark.size:g}" fill="{mark.colour}" '
            f'text-anchor="{mark.anchor}"{weight}{turn}>{escape(clean(mark.text))}</text>'
        )
    data = base64.b64encode(png_of(mark)).decode()
    return (
        f'<image x="{mark.x:.2f}" y="{mark.y:.2f}" width="{mark.width:.2f}" height="{mark.height:.2f}" '
        f'preserveAspectRatio="none" href="data:image/png;base64,{data}"/>'
    )


def _path(mark: Path) -> str:
    points = " ".join(f"{x:.2f},{y:.2f}" for x, y in mark.points)
    kind = "polygon" if mark.closed else "polyline"
    stroke = f' stroke="{mark.stroke}" stroke-width="{mark.width:g}"' if mark.stroke else ""
    dash = f' stroke-dasharray="{" ".join(f"{d:g}" for d in mark.dash)}"' if mark.dash else ""
    faint = f' opacity="{mark.opacity:g}"' if mark.opacity < 1 else ""
    return f'<{kind} points="{points}" fill="{mark.fill or "none"}"{stroke}{dash}{faint} stroke-linejoin="round"/>'
