"""The look: palette, type scale, spacing, icons, stylesheet. The only place with a colour in it."""

from app.look.colour_maps import map_of, motion_map, stress_map
from app.look.fonts import font
from app.look.icons import icon, pixmap
from app.look.palette import DARK, LIGHT, Palette, palette
from app.look.theme import apply_look, follow_system

__all__ = [
    "DARK",
    "LIGHT",
    "Palette",
    "apply_look",
    "follow_system",
    "font",
    "icon",
    "map_of",
    "motion_map",
    "palette",
    "pixmap",
    "stress_map",
]
