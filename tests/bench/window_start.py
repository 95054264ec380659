"""Starts a window of our own or a bare one, and says when it was painted and how much memory it took.

``python -m tests.bench.window_start ours|bare JOURNAL`` prints seconds from the start of Python to the first
paint, to the chart (or an empty plot) painted, and the resident memory then in megabytes.
"""

from __future__ import annotations

import os
import resource
import sys
import time
from pathlib import Path

_BEGAN = time.perf_counter()
DAYS = 3650


def main() -> None:
    """Start what was asked for, measure, print, leave."""
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    which, journal = sys.argv[1], Path(sys.argv[2])
    first, chart = _ours(journal) if which == "ours" else _bare()
    peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
    print(first, chart, peak, flush=True)
    os._exit(0)


def _ours(journal: Path) -> tuple[float, float]:
    from PySide6.QtWidgets import QApplication

    from desktop.faces import load_faces
    from desktop.screens.main_window import MainWindow

    app = QApplication([])
    load_faces()
    window = MainWindow(journal.parent)
    window.show()
    window.open_journal(journal)
    window.grab()
    first = time.perf_counter() - _BEGAN
    window.load_chart()
    session = window.session
    assert session is not None
    while session.review is None:
        app.processEvents()
    window.grab()
    return first, time.perf_counter() - _BEGAN


def _bare() -> tuple[float, float]:
    import numpy as np
    from PySide6.QtCore import QAbstractTableModel, Qt
    from PySide6.QtWidgets import QApplication, QHBoxLayout, QMainWindow, QTableView, QWidget

    values = np.arange(DAYS * 5, dtype=float).reshape(DAYS, 5)

    class Table(QAbstractTableModel):
        def rowCount(self, _=None):  # type: ignore[no-untyped-def]
            return DAYS

        def columnCount(self, _=None):  # type: ignore[no-untyped-def]
            return 5

        def data(self, index, role=0):  # type: ignore[no-untyped-def]
            return str(values[index.row(), index.column()]) if role == Qt.ItemDataRole.DisplayRole else None

    app = QApplication([])
    window = QMainWindow()
    centre = QWidget()
    row = QHBoxLayout(centre)
    table = QTableView()
    table.setModel(Table())
    row.addWidget(table)
    window.setCentralWidget(centre)
    window.resize(1360, 820)
    window.show()
    window.grab()
    first = time.perf_counter() - _BEGAN
    import pyqtgraph as pg

    row.addWidget(pg.PlotWidget())
    app.processEvents()
    window.grab()
    return first, time.perf_counter() - _BEGAN


if __name__ == "__main__":
    main()
