"""Has a log gone quiet: how long nothing was written, against the longest that was usual in it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

LOOKED_BACK = 90
"""Days of the log that say what is usual."""

FEWEST_QUIET = 3
"""Two days without an entry are a weekend."""

_FEW_GAPS, _QUIET_UNTIL_KNOWN = 7, 7
"""Under so many steps from entry to entry nobody knows what is usual, and a week has to pass."""


@dataclass(frozen=True)
class Quiet:
    """How long nothing was written.

    Attributes:
        for_days: whole days without an entry up to yesterday; today is not over.
        usual_longest: the longest time without one in the days before; None in a log too short to say.
    """

    for_days: int
    usual_longest: int | None

    @property
    def is_longer(self) -> bool:
        """Whether the log is quiet for longer than was ever usual in it."""
        if self.usual_longest is None:
            return self.for_days >= _QUIET_UNTIL_KNOWN
        return self.for_days > max(self.usual_longest, FEWEST_QUIET - 1)


def quiet(days: Sequence[int], today: int) -> Quiet | None:
    """How long a log is quiet.

    With steps from entry to entry that are as likely in any order, one more gap longer than the ``k`` before it is
    chance in 1 of ``k + 1``, and the last is only looked at while it is open.

    Args:
        days: day numbers on which anything was written, a pause that was said included; ascending.
        today: day number of today.

    Returns:
        None for a log without an entry up to today.
    """
    known = np.unique(np.asarray([day for day in days if day <= today], dtype=np.int64))
    if not len(known):
        return None
    recent = known[known > known[-1] - LOOKED_BACK]
    gaps = np.diff(recent) - 1
    usual = int(gaps.max()) if len(gaps) >= _FEW_GAPS else None
    return Quiet(max(0, today - int(known[-1]) - 1), usual)
