"""The look: palette, type scale, spacing, icons, stylesheet. The only place with a colour in it.

What needs Qt is brought when it is first asked for, so that `app.look.colours` serves where there is no screen.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from app.look.colour_maps import map_of, motion_map, stress_map
    from app.look.colours import DARK, LIGHT, PRINT, Palette
    from app.look.fonts import font
    from app.look.icons import icon, pixmap
    from app.look.theme import apply_look, follow_system

__all__ = [
    "DARK",
    "LIGHT",
    "PRINT",
    "Palette",
    "apply_look",
    "follow_system",
    "font",
    "icon",
    "map_of",
    "motion_map",
    "pixmap",
    "stress_map",
]

_PLACES = {
    "colour_maps": ("map_of", "motion_map", "stress_map"),
    "colours": ("DARK", "LIGHT", "PRINT", "Palette"),
    "fonts": ("font",),
    "icons": ("icon", "pixmap"),
    "theme": ("apply_look", "follow_system"),
}


def __getattr__(name: str) -> Any:
    for place, names in _PLACES.items():
        if name in names:
            return getattr(import_module(f"app.look.{place}"), name)
    raise AttributeError(f"app.look has no {name}")
