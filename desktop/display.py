"""Whether a window can be shown here, asked before Qt is, since Qt ends the program when it cannot."""

from __future__ import annotations

import ctypes
import os
import re
import sys
from collections.abc import Mapping
from pathlib import Path

_PACKAGES = {
    "libEGL.so.1": "libegl1",
    "libGL.so.1": "libgl1",
    "libX11.so.6": "libx11-6",
    "libX11-xcb.so.1": "libx11-xcb1",
    "libdbus-1.so.3": "libdbus-1-3",
    "libfontconfig.so.1": "libfontconfig1",
    "libfreetype.so.6": "libfreetype6",
    "libglib-2.0.so.0": "libglib2.0-0",
    "libgthread-2.0.so.0": "libglib2.0-0",
    "libxkbcommon.so.0": "libxkbcommon0",
    "libxkbcommon-x11.so.0": "libxkbcommon-x11-0",
    "libxcb.so.1": "libxcb1",
    "libxcb-cursor.so.0": "libxcb-cursor0",
    "libxcb-icccm.so.4": "libxcb-icccm4",
    "libxcb-image.so.0": "libxcb-image0",
    "libxcb-keysyms.so.1": "libxcb-keysyms1",
    "libxcb-randr.so.0": "libxcb-randr0",
    "libxcb-render-util.so.0": "libxcb-render-util0",
    "libxcb-render.so.0": "libxcb-render0",
    "libxcb-shape.so.0": "libxcb-shape0",
    "libxcb-shm.so.0": "libxcb-shm0",
    "libxcb-sync.so.1": "libxcb-sync1",
    "libxcb-util.so.1": "libxcb-util1",
    "libxcb-xfixes.so.0": "libxcb-xfixes0",
    "libxcb-xkb.so.1": "libxcb-xkb1",
}
"""Debian's package of each system library that Qt's window needs."""

_ELSE = "For the answer without a window: dayfence review FILE."


def missing_for_window(environment: Mapping[str, str] | None = None) -> str | None:
    """One sentence on what this machine lacks for a window, or None when nothing is known to be lacking.

    Only Linux is looked at; elsewhere a window can always be shown.

    Args:
        environment: variables; those of this process when left out.
    """
    if not sys.platform.startswith("linux"):
        return None
    variables = os.environ if environment is None else environment
    try:
        from PySide6 import QtWidgets
    except ImportError as error:
        return _library_sentence(str(error))
    platform = variables.get("QT_QPA_PLATFORM", "").partition(":")[0]
    if platform not in ("", "xcb", "wayland"):
        return None
    if platform != "xcb" and _has_wayland(variables):
        return None
    if platform == "wayland" or not variables.get("DISPLAY"):
        return f"There is no display to show a window on. {_ELSE}"
    plugin = Path(QtWidgets.__file__).parent / "Qt" / "plugins" / "platforms" / "libqxcb.so"
    try:
        ctypes.CDLL(str(plugin))
    except OSError as error:
        return _library_sentence(str(error))
    if not _answers(variables["DISPLAY"]):
        return f"The display {variables['DISPLAY']} does not answer, so no window can be shown. {_ELSE}"
    return None


def missing_for_drawing() -> str | None:
    """One sentence on what this machine lacks to draw without a window, or None when nothing is lacking."""
    try:
        from PySide6 import QtSvg  # noqa: F401 - it brings everything that drawing needs
    except ImportError as error:
        return _library_sentence(str(error), "Drawing")
    return None


def _library_sentence(message: str, what: str = "The window") -> str:
    found = re.search(r"(lib[\w.+-]+?\.so(?:\.\d+)*)", message)
    library = found.group(1) if found else "a library"
    package = _PACKAGES.get(library)
    install = f"Install it with: apt-get install {package}" if package else "Install it with your package manager"
    return f"{what} needs {library}, which this machine lacks. {install}. {_ELSE}"


def _has_wayland(variables: Mapping[str, str]) -> bool:
    name, folder = variables.get("WAYLAND_DISPLAY"), variables.get("XDG_RUNTIME_DIR", "")
    return bool(name) and Path(folder, str(name)).exists()


def _answers(display: str) -> bool:
    xcb = ctypes.CDLL("libxcb.so.1")
    xcb.xcb_connect.restype = ctypes.c_void_p
    xcb.xcb_connect.argtypes = [ctypes.c_char_p, ctypes.c_void_p]
    xcb.xcb_connection_has_error.argtypes = [ctypes.c_void_p]
    xcb.xcb_disconnect.argtypes = [ctypes.c_void_p]
    connection = xcb.xcb_connect(display.encode(), None)
    has_error = bool(xcb.xcb_connection_has_error(connection))
    xcb.xcb_disconnect(connection)
    return not has_error
