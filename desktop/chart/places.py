"""Which places of a plot are taken by marks and words, and where a word can still stand."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QRectF


@dataclass(frozen=True, eq=False)
class Places:
    """Where the marks are drawn, and the words that stand already.

    Attributes:
        x, y: the middles of the marks, arrays of shape (k,).
        half: half the size of each mark.
        radius: of a plain mark.
        words: the boxes of words.
        walls: lines that no word crosses, or stands beyond from its mark.
    """

    x: NDArray[np.float64]
    y: NDArray[np.float64]
    half: NDArray[np.float64]
    radius: float
    words: list[QRectF] = field(default_factory=list)
    walls: list[QRectF] = field(default_factory=list)

    def is_free(self, box: QRectF, own: int | None = None) -> bool:
        """Whether a box touches no word, and no mark but its own."""
        if any(box.intersects(other) for other in self.words):
            return False
        reach = box if own is None else box.united(QRectF(float(self.x[own]), float(self.y[own]), 0.1, 0.1))
        if any(reach.intersects(wall) for wall in self.walls):
            return False
        inside = (
            (self.x > box.left() - self.half)
            & (self.x < box.right() + self.half)
            & (self.y > box.top() - self.half)
            & (self.y < box.bottom() + self.half)
        )
        if own is not None:
            inside[own] = False
        return not inside.any()

    def take_first(self, boxes: Iterable[QRectF], within: QRectF, own: int | None = None) -> QRectF | None:
        """The first box that is free and inside, taken from now on; None where there is none."""
        for box in boxes:
            if within.contains(box) and self.is_free(box, own):
                self.words.append(box)
                return box
        return None


def along(rect: QRectF, width: float, height: float, top: float, *, from_right: bool) -> Iterable[QRectF]:
    """Boxes of a width along a row of a plot, from one side to the other."""
    room = rect.width() - width
    parts = np.linspace(1.0, 0.0, 9) if from_right else np.linspace(0.0, 1.0, 9)
    return (QRectF(rect.left() + room * float(part), top, width, height) for part in parts if room >= 0)
