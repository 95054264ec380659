"""Two things timed in turn on the same machine, and their ratio with its spread."""

from __future__ import annotations

import gc
import time
from collections.abc import Callable
from dataclasses import dataclass
from statistics import median, quantiles


@dataclass(frozen=True)
class Row:
    """One line of the table.

    Attributes:
        what: what is measured, against what.
        ratio: median of the ratios of the rounds.
        low, high: fourths of the ratios.
        must: the ratio may be at most this.
        detail: the times themselves.
    """

    what: str
    ratio: float
    low: float
    high: float
    must: float
    detail: str

    def line(self) -> str:
        """The row as printed."""
        verdict = "ok" if self.ratio <= self.must else "SHORT"
        spread = f"{self.low:.2f} to {self.high:.2f}"
        return f"{self.what:76}{self.ratio:9.2f}  {spread:>16}  <= {self.must:<6g}{verdict:6} {self.detail}"


def seconds(work: Callable[[], object], least: float = 0.02) -> float:
    """Time of one call, taken over as many calls as fill ``least`` seconds; the collector waits meanwhile."""
    gc.collect()
    gc.disable()
    try:
        calls, start = 0, time.perf_counter()
        while True:
            work()
            calls += 1
            took = time.perf_counter() - start
            if took >= least:
                return took / calls
    finally:
        gc.enable()


def compared(
    what: str,
    ours: Callable[[], object],
    theirs: Callable[[], object],
    must: float,
    *,
    rounds: int = 7,
    names: tuple[str, str] = ("ours", "theirs"),
) -> Row:
    """Time both in turn, round by round, so that a slow moment of the machine meets both."""
    ours(), theirs()
    pairs = [(seconds(ours), seconds(theirs)) for _ in range(rounds)]
    return row_of(what, pairs, must, names)


def row_of(what: str, pairs: list[tuple[float, float]], must: float, names: tuple[str, str]) -> Row:
    """The row of pairs of times."""
    ratios = [one / other for one, other in pairs]
    low, _, high = quantiles(ratios, n=4) if len(ratios) > 1 else (ratios[0],) * 3
    first, second = (median(times) for times in zip(*pairs, strict=True))
    detail = f"{names[0]} {_told(first)}, {names[1]} {_told(second)}"
    return Row(what, median(ratios), low, high, must, detail)


def _told(taken: float) -> str:
    return f"{1000 * taken:.3g} ms" if taken < 1 else f"{taken:.3g} s"
