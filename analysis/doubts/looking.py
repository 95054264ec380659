"""Doubts about how the answer was looked for: before the agreed day, or in several measures at once."""

from __future__ import annotations

from math import sqrt
from statistics import NormalDist

from analysis.answer import Doubt
from analysis.doubts.seen import Seen
from analysis.questions.did_it_move import FAIRLY_SURE_BELOW
from analysis.questions.several_measures import holm


def early_look(seen: Seen) -> Doubt | None:
    """The day agreed on to judge is still to come: whoever looks often finds luck sooner or later.

    Judged again by the stricter limit of an early look: the usual one divided by the root of the share of days
    that are in.

    Source: O'Brien & Fleming (1979), Biometrics 35:549-556; as a limit for any share of the days, Lan & DeMets
        (1983), Biometrika 70:659-663.
    """
    level, last = seen.level, seen.stretches[-1]
    if seen.look_day is None or level is None or level.sureness == "too early" or seen.today >= seen.look_day:
        return None
    days_in = seen.today - last.first + 1
    share = days_in / (seen.look_day - last.first + 1)
    usual = NormalDist().inv_cdf(1 - FAIRLY_SURE_BELOW / 2)
    stricter = 2 * (1 - NormalDist().cdf(usual / sqrt(share)))
    return Doubt("early_look", (("days", seen.look_day - seen.today),), level.is_claim and level.p >= stricter)


def several_measures(seen: Seen) -> Doubt | None:
    """Other measures were looked at for the same change: one of several moves by luck more easily than one alone.

    Raised when the claim does not stand with the chances of all of them counted together.
    """
    level = seen.level
    if level is None or not level.is_claim or not seen.others:
        return None
    if holm((level.p, *seen.others))[0] < FAIRLY_SURE_BELOW:
        return None
    return Doubt("several_measures", (("measures", len(seen.others) + 1),), alters=True)
