"""Work off the screen's thread: results come back, and no widget is taken away over there."""

import gc
import threading
from weakref import finalize

from PySide6.QtCore import QObject

from desktop.models.background import Background
from desktop.models.collector import Collector

KNOTS = 1500
"""More than the youngest generation waits for."""


class Knot(QObject):
    """An object of the screen's thread that only the collector can free."""

    def __init__(self) -> None:
        super().__init__()
        self.itself = self


def test_garbage_of_the_screen_is_collected_on_its_own_thread(qtbot):
    collector, background = Collector(), Background()
    freed_on, done = [], []
    for _ in range(KNOTS):
        finalize(Knot(), lambda: freed_on.append(threading.current_thread()))
    for _ in range(2):
        # Far more objects than the collector waits for.
        background.run(lambda: len([[place] for place in range(300_000)]), done.append, done.append)
    background.wait()
    qtbot.waitUntil(lambda: len(done) == 2)
    assert done == [300_000, 300_000]
    assert freed_on == []
    collector.look()
    assert freed_on == [threading.main_thread()] * KNOTS


def test_nothing_is_collected_before_it_is_due(qtbot, monkeypatch):
    collector, collected = Collector(), []
    monkeypatch.setattr(gc, "collect", collected.append)
    monkeypatch.setattr(gc, "get_threshold", lambda: (700, 10, 10))
    for counts in ((10, 3, 2), (701, 3, 2), (701, 11, 2), (3, 0, 11)):
        monkeypatch.setattr(gc, "get_count", lambda counts=counts: counts)
        collector.look()
    assert collected == [0, 1, 2]


def test_an_error_comes_back(qtbot):
    background, failed = Background(), []
    background.run(lambda: 1 / 0, failed.append, failed.append)
    background.wait()
    qtbot.waitUntil(lambda: bool(failed))
    assert isinstance(failed[0], ZeroDivisionError)
