"""All colours of the program, for light, for dark and for paper. Nothing outside this folder names a colour. No Qt.

Blue means compression and orange means tension; neither is used for anything else. Text reaches a contrast of 4.5:1
on what it stands on and marks 3:1 (WCAG 2.1, 1.4.3 and 1.4.11); `tests/app/test_look.py` checks both, and that
compression, tension and the gauges stay apart for the three common deficiencies of colour vision.
"""

from __future__ import annotations

from dataclasses import dataclass, replace


@dataclass(frozen=True)
class Palette:
    """Colours as "#rrggbb". `paper` carries pictures and panels, `window` lies around them, `raised` is a field or a
    button; `ink` and `soft_ink` are text; `line` axes and marks,
    `edge` the frame of a field, `grid` the faintest marks; `accent` what is selected,
    `accent_soft` its ground, `on_accent` text on it. `over` goes with the sign and the word of a breach or a fault.
    `gauges` are the hues of gauges in order; `bars` the greys of ram, cap and member outline; `cushion` of cushions;
    `ground` fills and `ground_line` edges of layers; `forward` and `backward` the ends of the map of motion."""

    dark: bool
    window: str
    paper: str
    raised: str
    pressed: str
    ink: str
    soft_ink: str
    line: str
    edge: str
    grid: str
    accent: str
    accent_soft: str
    on_accent: str
    chosen: str
    on_chosen: str
    compression: str
    compression_deep: str
    tension: str
    tension_deep: str
    forward: str
    backward: str
    over: str
    gauges: tuple[str, ...]
    bars: tuple[str, ...]
    cushion: str
    ground: tuple[str, ...]
    ground_line: str

    def gauge(self, index: int) -> str:
        """Hue of the gauge at an index; they repeat after the last."""
        return self.gauges[index % len(self.gauges)]


LIGHT = Palette(
    dark=False,
    window="#eeede8",
    paper="#fcfbf8",
    raised="#ffffff",
    pressed="#e4e2db",
    ink="#1c2230",
    soft_ink="#565c68",
    line="#7f828a",
    edge="#c9c6bd",
    grid="#dddbd4",
    accent="#0a7055",
    accent_soft="#e3f1ec",
    on_accent="#ffffff",
    chosen="#1c2433",
    on_chosen="#ffffff",
    compression="#1f61b0",
    compression_deep="#0a2f5e",
    tension="#ad5407",
    tension_deep="#6b2f00",
    forward="#2c6b3f",
    backward="#6a3d80",
    over="#a8142f",
    gauges=("#6620a0", "#7f6d00", "#b01e62", "#4a5a63", "#3f7d20", "#8a4a4a"),
    bars=("#56616e", "#87909c", "#2a3340"),
    cushion="#9a7f50",
    ground=("#f3ede0", "#eae0ca", "#e4d8be", "#efe6d8"),
    ground_line="#75633e",
)

DARK = Palette(
    dark=True,
    window="#14171c",
    paper="#1b1f26",
    raised="#262b34",
    pressed="#323843",
    ink="#e9e7e2",
    soft_ink="#a5abb6",
    line="#6f7681",
    edge="#454c58",
    grid="#313741",
    accent="#4cc3a0",
    accent_soft="#1f3a35",
    on_accent="#0c1a16",
    chosen="#e9e7e2",
    on_chosen="#14171c",
    compression="#6aa7f2",
    compression_deep="#b9d8ff",
    tension="#ee9b45",
    tension_deep="#ffd9ac",
    forward="#7fce92",
    backward="#c79be0",
    over="#ff7d8c",
    gauges=("#bd85f2", "#dac95a", "#f07ab0", "#9fb3bf", "#8fcb6b", "#d69a9a"),
    bars=("#8993a1", "#6b7482", "#c3cad4"),
    cushion="#a98d5f",
    ground=("#2d2a22", "#393326", "#443c2c", "#332f27"),
    ground_line="#a8966b",
)

#: What leaves the program on paper: the light colours on white.
PRINT = replace(LIGHT, window="#ffffff", paper="#ffffff")
