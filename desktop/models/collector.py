"""Python's collector, on the screen's thread alone."""

from __future__ import annotations

import gc

from PySide6.QtCore import QObject, QTimer

_LOOK_EVERY = 1000
"""Milliseconds between two looks at how much there is to collect."""


class Collector(QObject):
    """Collects in place of Python's own automatic, which runs on whatever thread makes the next object.

    On a worker it would free widgets that are in a circle of references, and Qt ends a program that frees a widget
    on another thread than its own.
    """

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        gc.disable()
        self._timer = QTimer(self)
        self._timer.timeout.connect(self.look)
        self._timer.start(_LOOK_EVERY)

    def look(self) -> None:
        """Collect the oldest generation that is due, by the limits of Python's own automatic."""
        counts, limits = gc.get_count(), gc.get_threshold()
        for generation in (2, 1, 0):
            if counts[generation] > limits[generation] > 0:
                gc.collect(generation)
                return
