"""``python -m tests.screens FOLDER``: every screen in every look as a picture, to be looked at one by one."""

from __future__ import annotations

import argparse
import os
from pathlib import Path
from tempfile import TemporaryDirectory

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

from PySide6.QtWidgets import QApplication

from desktop.faces import load_faces
from tests.screens.scenes import LOOKS, Scene, visit


def main() -> None:
    """Take every picture."""
    parser = argparse.ArgumentParser(prog="python -m tests.screens")
    parser.add_argument("folder", type=Path)
    parser.add_argument("--looks", default=",".join(LOOKS))
    options = parser.parse_args()
    application = QApplication([])
    load_faces()
    options.folder.mkdir(parents=True, exist_ok=True)
    for look in options.looks.split(","):

        def take(scene: Scene, look: str = look) -> None:
            scene.shown.grab().save(str(options.folder / f"{scene.name}, {look}.png"))

        with TemporaryDirectory() as folder:
            visit(Path(folder), look, take)
    application.quit()


if __name__ == "__main__":
    main()
