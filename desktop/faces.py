"""The typeface that comes with the program, the same on screen, on paper and in every file."""

from __future__ import annotations

from PySide6.QtGui import QFontDatabase

from desktop.resource_files import resource

FACE = "Atkinson Hyperlegible"
FACE_FILES = ("400Regular", "400Regular_Italic", "700Bold")


def face_path(name: str) -> str:
    """Where one of ``FACE_FILES`` is."""
    return str(resource("fonts", f"AtkinsonHyperlegible_{name}.ttf"))


def load_faces() -> None:
    """Make the face that comes with the program known to Qt, so that no machine lacks one."""
    for name in FACE_FILES:
        QFontDatabase.addApplicationFont(face_path(name))
