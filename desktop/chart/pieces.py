"""What a chart is made of: plain records of places, shapes and words, drawn by the painter.

Across, a place is a day number; an observation stands in the middle of its period. Up, it is the measure's unit.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from analysis.log import Period

Side = Literal["before", "after"]
Shape = Literal["before", "after", "uncounted", "above", "below", "set aside"]
TickKind = Literal["blank", "ill", "away", "late"]


@dataclass(frozen=True, eq=False)
class Marks:
    """The observations, in order of day; all arrays of shape (k,).

    Attributes:
        x, y: where they stand.
        shape: how each is drawn, as an index into ``SHAPES``.
        is_zero: whether it is drawn hollow, as a counted zero.
        joined: whether a thin line joins it to the one before, which is its neighbour in time.
        labels: the value beside a mark outside the fences, by its place in the arrays.
        spoken: one sentence a mark.
    """

    x: NDArray[np.float64]
    y: NDArray[np.float64]
    shape: NDArray[np.int8]
    is_zero: NDArray[np.bool_]
    joined: NDArray[np.bool_]
    labels: dict[int, str]
    spoken: Sequence[str]


SHAPES: tuple[Shape, ...] = ("before", "after", "uncounted", "above", "below", "set aside")


@dataclass(frozen=True)
class Band:
    """A filled part of the plot; ``inner`` for the fourths, else for the fences."""

    x0: float
    x1: float
    y0: float
    y1: float
    side: Side
    inner: bool


LineRole = Literal["median", "fence", "carried fence", "carried median"]


@dataclass(frozen=True)
class Line:
    """A level line."""

    x0: float
    x1: float
    y: float
    side: Side
    role: LineRole


@dataclass(frozen=True)
class EndLabel:
    """A word with its number at the right end of a line; the number alone where there is little room."""

    y: float
    text: str
    number: str
    side: Side
    strong: bool


@dataclass(frozen=True)
class LanePart:
    """A part of the lane above the plot: a stretch or named days."""

    x0: float
    x1: float
    text: str
    kind: Literal["stretch", "change", "span", "settling in"]


@dataclass(frozen=True)
class Tick:
    """A mark in the lane below the plot."""

    x: float
    kind: TickKind


@dataclass(frozen=True)
class Bracket:
    """The days the new level may have begun on."""

    x0: float
    x1: float
    text: str


@dataclass(frozen=True)
class Picture:
    """Everything on one chart.

    Attributes:
        x0, x1: the days from edge to edge.
        y0, y1: the lowest and highest value shown.
        axis_words: word at the lower end of the upright axis, what it counts, word at the upper end.
        edge_words: fences beyond the picture, told in words at its upper and lower edge.
        uprights: where a change stands.
        left_out: which weeks, months or years are cut and so not counted; ``""`` where none is.
        told: the whole chart in sentences, for those who do not see it.
    """

    period: Period
    x0: float
    x1: float
    y0: float
    y1: float
    axis_words: tuple[str, str, str]
    marks: Marks
    bands: tuple[Band, ...] = ()
    lines: tuple[Line, ...] = ()
    end_labels: tuple[EndLabel, ...] = ()
    lane: tuple[LanePart, ...] = ()
    uprights: tuple[float, ...] = ()
    ticks: tuple[Tick, ...] = ()
    bracket: Bracket | None = None
    edge_words: tuple[tuple[Literal["above", "below"], str], ...] = ()
    left_out: str = ""
    told: str = ""
