"""A line figure as SVG in the reader's own text colour: the closed form broad and pale, the solver thin over it."""

from __future__ import annotations

from html import escape

import numpy as np

from tests.published.registry import Array, Curve, Picture

WIDTH, HEIGHT = 720, 320
LEFT, RIGHT, TOP, BOTTOM = 84, 16, 30, 46
#: Points that a line of this width can show; a closed form known at fewer than these is shown by marks.
MOST, FEW = 1400, 25

STYLES = {
    "theory": 'stroke-width="5" stroke-opacity="0.3"',
    "solver": 'stroke-width="1.3"',
    "marks": 'stroke="none" fill="currentColor" fill-opacity="0.35"',
}


def svg(picture: Picture) -> str:
    """The figure, with axes, ticks and a legend."""
    xs, ys = (_range([getattr(c, axis) for c in picture.curves]) for axis in ("x", "y"))
    parts = [
        f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {WIDTH} {HEIGHT}" role="img" '
        'fill="none" stroke="currentColor" '
        f'font-family="system-ui, sans-serif" font-size="13" aria-label="{escape(picture.title, quote=True)}">'
    ]
    parts += _axis(xs, picture.x_label, True)
    parts += _axis(ys, picture.y_label, False)
    parts += [_line(curve, xs, ys) for curve in picture.curves]
    parts += _legend(picture.curves)
    return "".join(parts) + "</svg>"


def ticks(low: float, high: float, wanted: int = 6) -> list[float]:
    """Round numbers between two limits, about as many as wanted."""
    rough = (high - low) / wanted
    power = 10.0 ** np.floor(np.log10(rough))
    step = next(m * power for m in (1, 2, 2.5, 5, 10) if m * power >= rough * 0.999)
    first, last = int(np.ceil(low / step - 1e-9)), int(np.floor(high / step + 1e-9))
    return [round(i * step, 12) for i in range(first, last + 1)]


def _range(lines: list[Array]) -> tuple[float, float]:
    low, high = (float(f([f(line) for line in lines])) for f in (np.nanmin, np.nanmax))
    room = 0.04 * (high - low) or 1.0
    return low - room, high + room


def _across(x: Array, limits: tuple[float, float]) -> Array:
    return LEFT + (np.asarray(x) - limits[0]) / (limits[1] - limits[0]) * (WIDTH - LEFT - RIGHT)


def _down(y: Array, limits: tuple[float, float]) -> Array:
    return HEIGHT - BOTTOM - (np.asarray(y) - limits[0]) / (limits[1] - limits[0]) * (HEIGHT - TOP - BOTTOM)


def _axis(limits: tuple[float, float], label: str, across: bool) -> list[str]:
    parts = []
    floor, right = HEIGHT - BOTTOM, WIDTH - RIGHT
    for tick in ticks(*limits):
        text = f"{tick:g}".replace("-", "−")
        if across:
            x = float(_across(tick, limits))
            parts.append(f'<path d="M{x:.1f} {TOP}V{floor}" stroke-opacity="0.15"/>')
            parts.append(_text(x, floor + 18, text, "middle"))
        else:
            y = float(_down(tick, limits))
            parts.append(f'<path d="M{LEFT} {y:.1f}H{right}" stroke-opacity="0.15"/>')
            parts.append(_text(LEFT - 8, y + 4, text, "end"))
    if across:
        parts.append(f'<path d="M{LEFT} {floor}H{right}" stroke-opacity="0.6"/>')
        parts.append(_text((LEFT + right) / 2, HEIGHT - 8, label, "middle"))
    else:
        parts.append(f'<path d="M{LEFT} {TOP}V{floor}" stroke-opacity="0.6"/>')
        parts.append(_text(8, 16, label, "start"))
    return parts


def _text(x: float, y: float, words: str, anchor: str) -> str:
    place = f'x="{x:.1f}" y="{y:.1f}" text-anchor="{anchor}"'
    return f'<text {place} fill="currentColor" stroke="none">{escape(words)}</text>'


def _line(curve: Curve, xs: tuple[float, float], ys: tuple[float, float]) -> str:
    """The curve with gaps where it is not a number; thinned to what can be seen."""
    there = np.isfinite(curve.x) & np.isfinite(curve.y)
    x, y = curve.x[there], curve.y[there]
    if len(x) > MOST:
        kept = np.linspace(0, len(x) - 1, MOST).round().astype(int)
        x, y = x[kept], y[kept]
    if curve.style == "theory" and len(x) < FEW:
        marks = zip(_across(x, xs), _down(y, ys), strict=True)
        return "".join(f'<circle cx="{a:.1f}" cy="{b:.1f}" r="5" {STYLES["marks"]}/>' for a, b in marks)
    points = " ".join(f"{a:.1f},{b:.1f}" for a, b in zip(_across(x, xs), _down(y, ys), strict=True))
    return f'<polyline points="{points}" stroke-linejoin="round" {STYLES[curve.style]}/>'


def _legend(curves: tuple[Curve, ...]) -> list[str]:
    parts, x = [], WIDTH - RIGHT - 120 * len(curves)
    for curve in curves:
        if curve.style == "theory" and len(curve.x) < FEW:
            parts.append(f'<circle cx="{x + 16}" cy="12" r="5" {STYLES["marks"]}/>')
        else:
            parts.append(f'<path d="M{x} 12h26" {STYLES[curve.style]}/>')
        parts.append(_text(x + 32, 16, curve.label, "start"))
        x += 120
    return parts
