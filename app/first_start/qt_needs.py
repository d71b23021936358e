"""What Qt needs from a Linux system, told before Qt ends the process with a message for programmers. Imports no Qt.

On Windows and macOS everything comes with the package, and these functions find nothing to say.
"""

import ctypes
import os
import re
import sys
from collections.abc import Callable, Iterable
from typing import NamedTuple


class _Package(NamedTuple):
    debian: str
    fedora: str


# Debian's names were asked of `dpkg -S` on Debian 12; Fedora's are from memory.
_WIDGETS = {
    "libEGL.so.1": _Package("libegl1", "libglvnd-egl"),
    "libGL.so.1": _Package("libgl1", "libglvnd-glx"),
    "libxkbcommon.so.0": _Package("libxkbcommon0", "libxkbcommon"),
    "libdbus-1.so.3": _Package("libdbus-1-3", "dbus-libs"),
    "libfontconfig.so.1": _Package("libfontconfig1", "fontconfig"),
    "libfreetype.so.6": _Package("libfreetype6", "freetype"),
    "libglib-2.0.so.0": _Package("libglib2.0-0", "glib2"),
    "libgthread-2.0.so.0": _Package("libglib2.0-0", "glib2"),
    "libX11.so.6": _Package("libx11-6", "libX11"),
    "libxcb.so.1": _Package("libxcb1", "libxcb"),
    "libz.so.1": _Package("zlib1g", "zlib"),
    "libzstd.so.1": _Package("libzstd1", "libzstd"),
}
_X11 = {
    "libxcb-cursor.so.0": _Package("libxcb-cursor0", "xcb-util-cursor"),
    "libxcb-icccm.so.4": _Package("libxcb-icccm4", "xcb-util-wm"),
    "libxcb-image.so.0": _Package("libxcb-image0", "xcb-util-image"),
    "libxcb-keysyms.so.1": _Package("libxcb-keysyms1", "xcb-util-keysyms"),
    "libxcb-render-util.so.0": _Package("libxcb-render-util0", "xcb-util-renderutil"),
    "libxcb-util.so.1": _Package("libxcb-util1", "xcb-util"),
    "libxcb-randr.so.0": _Package("libxcb-randr0", "libxcb"),
    "libxcb-render.so.0": _Package("libxcb-render0", "libxcb"),
    "libxcb-shape.so.0": _Package("libxcb-shape0", "libxcb"),
    "libxcb-shm.so.0": _Package("libxcb-shm0", "libxcb"),
    "libxcb-sync.so.1": _Package("libxcb-sync1", "libxcb"),
    "libxcb-xfixes.so.0": _Package("libxcb-xfixes0", "libxcb"),
    "libxcb-xkb.so.1": _Package("libxcb-xkb1", "libxcb"),
    "libxkbcommon-x11.so.0": _Package("libxkbcommon-x11-0", "libxkbcommon-x11"),
    "libX11-xcb.so.1": _Package("libx11-xcb1", "libX11-xcb"),
}
_WAYLAND = {
    "libwayland-client.so.0": _Package("libwayland-client0", "libwayland-client"),
    "libwayland-cursor.so.0": _Package("libwayland-cursor0", "libwayland-cursor"),
}
_CANNOT_START = "Striketrace cannot start Qt, which draws its window, because"
_ALL = {**_WIDGETS, **_X11, **_WAYLAND}


def explain_qt_failure(error: BaseException) -> str:
    """One sentence on why Qt could not be imported, with the command that brings all system libraries it lacks."""
    named = re.search(r"(lib[\w.+-]+\.so[.\d]*): cannot open shared object file", str(error))
    if named:
        looked_at = dict(_WIDGETS)
        looked_at |= _X11 if os.environ.get("DISPLAY") else {}
        looked_at |= _WAYLAND if os.environ.get("WAYLAND_DISPLAY") else {}
        return _lacking([named.group(1), *_not_loadable(looked_at)])
    if isinstance(error, ModuleNotFoundError):
        mend = "`python -m pip install --force-reinstall PySide6-Essentials` brings it back"
        return f"{_CANNOT_START} the package '{error.name}' is missing: {mend}."
    return f"{_CANNOT_START} the system's loader says '{error}': reinstall the package PySide6-Essentials."


def explain_no_display() -> str:
    """One sentence on why no window can open here, or an empty string. Ask before the first QApplication is made."""
    if not sys.platform.startswith("linux") or os.environ.get("QT_QPA_PLATFORM"):
        return ""
    ways = [_wayland_problem] if os.environ.get("WAYLAND_DISPLAY") else []
    ways += [_x11_problem] if os.environ.get("DISPLAY") else []
    if not ways:
        return (
            f"{_CANNOT_START} this session has no display (neither DISPLAY nor"
            " WAYLAND_DISPLAY is set): start it on a desktop, through `ssh -X`, or use"
            " `python3 -m app solve FILE.strike --out DIR`, which needs none."
        )
    problems = [way() for way in ways]
    return "" if "" in problems else problems[-1]


def _x11_problem() -> str:
    lacking = _not_loadable(_X11)
    if lacking:
        return _lacking(lacking)
    xcb = ctypes.CDLL("libxcb.so.1")
    xcb.xcb_connect.restype = ctypes.c_void_p
    connection = ctypes.c_void_p(xcb.xcb_connect(None, None))
    try:
        return _no_answer("DISPLAY") if xcb.xcb_connection_has_error(connection) else ""
    finally:
        xcb.xcb_disconnect(connection)


def _wayland_problem() -> str:
    lacking = _not_loadable(_WAYLAND)
    if lacking:
        return _lacking(lacking)
    wayland = ctypes.CDLL("libwayland-client.so.0")
    wayland.wl_display_connect.restype = ctypes.c_void_p
    display = wayland.wl_display_connect(None)
    if not display:
        return _no_answer("WAYLAND_DISPLAY")
    wayland.wl_display_disconnect(ctypes.c_void_p(display))
    return ""


def _no_answer(variable: str) -> str:
    return (
        f"{_CANNOT_START} no display answers at {variable}={os.environ[variable]}:"
        f" correct it with `export {variable}=...`, or start the program on the desktop itself."
    )


def _not_loadable(libraries: Iterable[str], load: Callable[[str], object] = ctypes.CDLL) -> list[str]:
    """Those of `libraries` that the system's loader does not find."""
    absent = []
    for name in libraries:
        try:
            load(name)
        except OSError:
            absent.append(name)
    return absent


def _lacking(libraries: list[str]) -> str:
    names = list(dict.fromkeys(libraries))
    debian = sorted({_ALL[name].debian for name in names if name in _ALL})
    fedora = sorted({_ALL[name].fedora for name in names if name in _ALL})
    what = f"the system library {names[0]}"
    what += f" and {len(names) - 1} more are missing" if len(names) > 1 else " is missing"
    if not debian:
        return f"{_CANNOT_START} {what}: install the package of your system that brings {names[0]}."
    return (
        f"{_CANNOT_START} {what}: run `sudo apt install {' '.join(debian)}` (Debian, Ubuntu)"
        f" or `sudo dnf install {' '.join(fedora)}` (Fedora)."
    )
