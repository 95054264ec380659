"""What a doubt looks at, and whether the answer turns on it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from analysis.answer import Stretch
from analysis.log import Change, Log, Measure, Values
from analysis.questions.did_it_move import FEWEST_AFTER, FEWEST_BEFORE
from analysis.sides import Level, Sides, compare
from analysis.slots import OtherSlots

_RANDOM_DRAWS = 9


@dataclass(frozen=True, eq=False)
class Seen:
    """One review as the doubts see it.

    Attributes:
        log: every entry, for kinds of day and marks.
        changes: every change in force, those of one day apart.
        stretches: the baseline first; at least one.
        sides: the baseline and the last stretch; None where either holds no observation.
        level: their comparison; None where there is none.
        today: the last day that is looked at.
        look_day: the day agreed on to judge, or None.
        other_slots: times of day that one of the two stretches has alone, or None.
        others: the chance by luck of every other measure looked at for this change.
    """

    log: Log
    changes: Sequence[Change]
    stretches: Sequence[Stretch]
    sides: Sides | None
    level: Level | None
    today: int
    look_day: int | None = None
    others: tuple[float, ...] = ()
    other_slots: OtherSlots | None = None

    @property
    def measure(self) -> Measure:
        """What the log is of."""
        return self.log.measure

    @property
    def baseline(self) -> Stretch:
        """The stretch everything is measured against."""
        return self.stretches[0]

    @property
    def is_claim(self) -> bool:
        """Whether the answer says that it moved."""
        return self.level is not None and self.level.is_claim

    @cached_property
    def rose(self) -> bool:
        """Whether the shift is upwards."""
        return self.level is not None and (self.level.estimate or self.level.share - 0.5) > 0

    def turns_on(self, rival: Sides, widened: float = 1.0) -> bool:
        """Whether a claim is gone or turned round when it is computed again with the rival explanation in.

        Args:
            rival: the sides with the rival explanation taken off.
            widened: factor on the variance for what that had to be estimated by.
        """
        if self.level is None or not self.level.is_claim:
            return False
        if not len(rival.known_before) or not len(rival.known_after):
            return True
        again = compare(rival, widened)
        return not again.is_claim or again.direction != self.level.direction

    def turns_on_days(self, before: NDArray[np.bool_], after: NDArray[np.bool_]) -> bool:
        """The same without some days, and more than without as many days drawn at random.

        Fewer days alone can lose a claim; only if most random drawings keep it is it these days that matter.

        Args:
            before: which periods of the baseline to leave out, shape (m,).
            after: which of the days after, shape (n,).
        """
        if self.sides is None or not self.turns_on(self.sides.without(before, after)):
            return False
        # Seeded by the days left out: the same log gives the same answer.
        rng = np.random.default_rng([int(before.sum()), int(after.sum()), len(before), len(after)])
        lost = sum(
            self.turns_on(
                self.sides.without(
                    _as_many(before, self.sides.before, rng), _as_many(after, self.sides.after, rng)
                )
            )
            for _ in range(_RANDOM_DRAWS)
        )
        return lost <= _RANDOM_DRAWS // 3

    def too_few_left(
        self, before: NDArray[np.bool_], after: NDArray[np.bool_]
    ) -> tuple[tuple[str, float | str], ...]:
        """A field that says so where the days left would not be enough for any answer; masks as above."""
        if self.sides is None:
            return ()
        rest = self.sides.without(before, after)
        enough = len(rest.known_before) >= FEWEST_BEFORE and len(rest.known_after) >= FEWEST_AFTER
        return () if enough else (("left", "too few"),)


def _as_many(chosen: NDArray[np.bool_], values: Values, rng: np.random.Generator) -> NDArray[np.bool_]:
    """As many days with a value as were chosen, at random; leaving out a blank day leaves out nothing."""
    known = np.flatnonzero(~np.isnan(values))
    drawn = np.zeros(len(values), dtype=bool)
    drawn[rng.permutation(known)[: int(chosen[known].sum())]] = True
    return drawn
