"""Work off the screen's thread, one job after the other, results handed back on the screen's thread."""

from __future__ import annotations

from collections.abc import Callable
from typing import TypeVar

from PySide6.QtCore import QObject, QRunnable, QThreadPool, Signal, Slot

Result = TypeVar("Result")


class Background(QObject):
    """One worker thread; jobs are done in the order they were handed in.

    Signals:
        finished: a function to call with a result, and the result; for this class only.
    """

    finished = Signal(object, object)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._pool = QThreadPool(self)
        self._pool.setMaxThreadCount(1)
        # The pool's own time-out would end the thread between two jobs.
        self._pool.setExpiryTimeout(-1)
        self._kept: list[_Job] = []
        self.finished.connect(self._hand_back)

    def run(
        self, job: Callable[[], Result], done: Callable[[Result], None], failed: Callable[[Exception], None]
    ) -> None:
        """Do a job on the worker; then call ``done`` or ``failed`` on this object's thread."""
        # Kept until it is handed back: what it refers to must not be let go of on the worker, which would free
        # objects of the screen's thread over there.
        kept = _Job(self, job, done, failed)
        self._kept.append(kept)
        self._pool.start(kept)

    def wait(self) -> None:
        """Return when every job handed in is done; their results may still be on their way."""
        self._pool.waitForDone()

    @Slot(object, object)
    def _hand_back(self, receive: Callable[[object], None], result: object) -> None:
        # Jobs are done in order, so that the oldest is the one that came back.
        self._kept.pop(0)
        receive(result)


class _Job(QRunnable):
    def __init__(
        self,
        owner: Background,
        job: Callable[[], Result],
        done: Callable[[Result], None],
        failed: Callable[[Exception], None],
    ) -> None:
        super().__init__()
        self.setAutoDelete(False)
        self._owner, self._job, self._done, self._failed = owner, job, done, failed

    def run(self) -> None:
        """Called by the pool; an exception must not leave it, since nobody above would see it."""
        try:
            result = self._job()
        except Exception as error:
            self._owner.finished.emit(self._failed, error)
        else:
            self._owner.finished.emit(self._done, result)
