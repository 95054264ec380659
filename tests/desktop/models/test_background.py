"""Work off the screen's thread: results come back, and no widget is taken away over there."""

import gc
import threading
from weakref import finalize

from PySide6.QtCore import QObject

from desktop.models.background import Background


class Knot(QObject):
    """An object of the screen's thread that only the collector can free."""

    def __init__(self) -> None:
        super().__init__()
        self.itself = self


def test_garbage_of_the_screen_is_collected_on_its_own_thread(qtbot):
    freed_on = []
    background = Background()
    gc.disable()
    try:
        for _ in range(50):
            finalize(Knot(), lambda: freed_on.append(threading.current_thread()))
    finally:
        gc.enable()

    def work():
        # Far more than the collector waits for.
        return len([[place] for place in range(300_000)])

    done = []
    background.run(work, done.append, done.append)
    background.run(work, done.append, done.append)
    background.wait()
    qtbot.waitUntil(lambda: len(done) == 2)
    assert done == [300_000, 300_000]
    assert gc.isenabled()
    gc.collect()
    assert set(freed_on) == {threading.main_thread()}
    assert len(freed_on) == 50


def test_a_collector_that_was_off_stays_off(qtbot):
    background, done = Background(), []
    gc.disable()
    try:
        background.run(lambda: gc.isenabled(), done.append, done.append)
        background.wait()
        qtbot.waitUntil(lambda: bool(done))
        assert done == [False]
        assert not gc.isenabled()
    finally:
        gc.enable()


def test_an_error_comes_back_and_the_collector_too(qtbot):
    background, failed = Background(), []
    background.run(lambda: 1 / 0, failed.append, failed.append)
    background.wait()
    qtbot.waitUntil(lambda: bool(failed))
    assert isinstance(failed[0], ZeroDivisionError)
    assert gc.isenabled()
