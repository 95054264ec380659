"""Starts the window; the only place that wires the parts together."""

from __future__ import annotations

import argparse
import gc
import sys
from collections.abc import Sequence
from pathlib import Path
from typing import NoReturn

from desktop.display import missing_for_window


class _Parser(argparse.ArgumentParser):
    """Says what is wrong with an argument in one sentence."""

    def error(self, message: str) -> NoReturn:
        """Called by argparse."""
        self.exit(2, f"{message[0].upper()}{message[1:]}. See dayfence --help.\n")


def main(arguments: Sequence[str]) -> int:
    """Open the window and return when it is closed.

    Args:
        arguments: ``--sample``, or a journal to open, or nothing.

    Returns:
        0, or 2 with one sentence on stderr where no window can be shown.
    """
    parser = _Parser(
        prog="dayfence",
        description="Keep a daily log, mark a change, and see whether it moved.",
        epilog="Without a window: dayfence review FILE and dayfence page FILE -o page.pdf (each has its --help).",
    )
    parser.add_argument(
        "journal", nargs="?", type=Path, help="a journal to open in place of your own, or a coach's caseload"
    )
    parser.add_argument("--sample", action="store_true", help="open the sample journal of invented logs")
    options = parser.parse_args(arguments)
    lacking = missing_for_window()
    if lacking is not None:
        sys.stderr.write(f"{lacking}\n")
        return 2
    return _run(options)


def _run(options: argparse.Namespace) -> int:
    from PySide6.QtCore import QStandardPaths, QTimer
    from PySide6.QtGui import QIcon
    from PySide6.QtWidgets import QApplication

    from desktop.faces import load_faces
    from desktop.models.collector import Collector
    from desktop.resource_files import resource
    from desktop.screens.caseload_opening import is_caseload
    from desktop.screens.file_commands import show_caseload
    from desktop.screens.main_window import MainWindow

    app = QApplication(sys.argv[:1])
    app.setApplicationName("dayfence")
    app.setApplicationDisplayName("Dayfence")
    app.setDesktopFileName("dayfence")
    load_faces()
    app.setWindowIcon(QIcon(str(resource("icon.svg"))))
    folder = Path(QStandardPaths.writableLocation(QStandardPaths.StandardLocation.AppDataLocation))
    try:
        folder.mkdir(mode=0o700, parents=True, exist_ok=True)
    except OSError as error:
        sys.stderr.write(f"The folder {folder} for your journal cannot be made: {error.strerror}.\n")
        return 2
    Collector(app)
    window = MainWindow(folder)
    if options.journal is not None and is_caseload(options.journal) and show_caseload(window, options.journal):
        return app.exec()
    window.show()
    if options.sample:
        window.open_sample()
    elif options.journal is not None:
        window.open_journal(options.journal)
    else:
        window.open_own()
    QTimer.singleShot(0, window.load_chart)
    # What is there now stays: leaving it out of every later collection keeps typing free of pauses.
    QTimer.singleShot(1000, _freeze)
    return app.exec()


def _freeze() -> None:
    gc.collect()
    gc.freeze()
