"""The rows about the window: a keystroke, a repaint, the start, the memory; each with ten years of days open."""

from __future__ import annotations

import os
import subprocess
import sys
import time
from collections.abc import Iterator
from datetime import date, datetime, timedelta
from pathlib import Path
from statistics import median
from tempfile import TemporaryDirectory

import numpy as np
from PySide6.QtCore import QCoreApplication

from desktop.journal.records import Change, Entry, Measure, Person, Record
from desktop.storage.store import Store
from tests.bench.measuring import Row, compared, row_of

DAYS = 3650
FRAME = 16.7
"""Milliseconds of one frame at 60 a second."""

KEYSTROKES = 300


def ten_years(today: date) -> list[Record]:
    """A journal of five measures of ten years each, with a change in the last months."""
    rng = np.random.default_rng(3)
    records: list[Record] = [Person("0" * 32), Change(1, today - timedelta(60), "a change")]
    for number in range(1, 6):
        records.append(Measure(number, number - 1, f"Measure {number}", "minutes", "amount"))
        values = np.round(rng.normal(40, 8, DAYS))
        records += [
            Entry(number, today - timedelta(DAYS - at), value=float(value), original=f"{value:g}")
            for at, value in enumerate(values)
        ]
    return records


def rows() -> Iterator[Row]:
    """Every row, each measured in one go."""
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    with TemporaryDirectory() as folder:
        journal = Path(folder) / "journal.dayfence"
        Store.create(journal, ten_years(date.today())).close()
        yield from _starts(journal)
        yield from _typing(journal)


def _starts(journal: Path) -> Iterator[Row]:
    pairs: list[list[tuple[float, float]]] = [[], [], []]
    for _ in range(7):
        ours, bare = (_started(which, journal) for which in ("ours", "bare"))
        for row, one, other in zip(pairs, ours, bare, strict=True):
            row.append((one, other))
    names = ("ours", "bare")
    yield row_of("first paint of ten years / a bare window with such a table", pairs[0], 1.3, names)
    yield row_of("chart there, ten years / a bare window with table and empty plot", pairs[1], 1.3, names)
    sizes = [(ours, bare) for ours, bare in pairs[2]]
    ratio = median(ours / bare for ours, bare in sizes)
    detail = f"ours {median(ours for ours, _ in sizes):.0f} MB, bare {median(bare for _, bare in sizes):.0f} MB"
    yield Row("peak memory, ten years / the same bare window", ratio, ratio, ratio, 1.2, detail)


def _started(which: str, journal: Path) -> tuple[float, float, float]:
    command = [sys.executable, "-m", "tests.bench.window_start", which, str(journal)]
    done = subprocess.run(command, capture_output=True, text=True, check=True, timeout=120)
    first, chart, peak = map(float, done.stdout.split())
    return first, chart, peak


def _let_pass(app: QCoreApplication, milliseconds: int) -> None:
    """Let the window do what it has to do for so long."""
    end = time.perf_counter() + milliseconds / 1000
    while time.perf_counter() < end:
        app.processEvents()


def _typing(journal: Path) -> Iterator[Row]:
    import pyqtgraph as pg
    from PySide6.QtCore import Qt
    from PySide6.QtTest import QTest
    from PySide6.QtWidgets import QApplication

    from desktop.faces import load_faces
    from desktop.models.collector import Collector
    from desktop.screens.main_window import MainWindow

    app = QApplication.instance() or QApplication([])
    load_faces()
    collector = Collector()
    window = MainWindow(journal.parent, now=lambda: datetime.now())
    window.show()
    window.open_journal(journal)
    window.load_chart()
    _let_pass(app, 6000)
    window.activateWindow()
    session, days = window.session, window.workspace.days
    assert session is not None
    for what, period in (("each day", "day"), ("each week", "week")):
        window.choose_period(period)  # type: ignore[arg-type]
        _let_pass(app, 1500)
        taken = []
        for place in range(KEYSTROKES):
            days.go_to_row(days.model().rowCount() - 40 + place % 30)
            _let_pass(app, 2)
            start = time.perf_counter()
            for key in (Qt.Key.Key_4, Qt.Key(Qt.Key.Key_0.value + place % 10), Qt.Key.Key_Return):
                focus = QApplication.focusWidget() or days
                QTest.keyClick(focus if days.isAncestorOf(focus) else days, key)
            app.processEvents()
            taken.append(1000 * (time.perf_counter() - start))
        session.wait_until_written()
        worst = float(np.percentile(taken, 99))
        detail = f"median {median(taken):.1f} ms, 99th of 100 {worst:.1f} ms, against a frame of {FRAME} ms"
        ratio = worst / FRAME
        yield Row(f"two digits and Enter, kept and repainted, ten years, {what}", ratio, ratio, ratio, 1, detail)
    window.choose_period("day")
    _let_pass(app, 2500)
    chart = window.workspace.chart_pane.chart
    assert chart is not None
    review = session.review
    assert review is not None
    plot = pg.PlotWidget()
    plot.resize(chart.size())
    plot.plot(review.points.first.astype(float), review.points.values, symbol="o", symbolSize=5)
    plot.show()
    _let_pass(app, 300)
    yield compared(
        "chart of ten years repainted / a bare plot of the same days",
        lambda: chart.grab(),
        lambda: plot.grab(),
        1,
        names=("chart", "plot"),
    )
    plot.close()
    window.close()
    del collector
