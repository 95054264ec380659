"""Many logs at once: the same answers, on every core, and which of them are worth a look."""

from __future__ import annotations

import os
from collections.abc import Callable, Generator, Iterable, Mapping, Sequence
from dataclasses import replace
from datetime import date, timedelta
from itertools import islice
from typing import TYPE_CHECKING

from analysis.answer import Review
from analysis.log import Log
from analysis.pipeline import chance_of, review
from analysis.points import first_logged_day

if TYPE_CHECKING:
    from concurrent.futures import Future

Asked = tuple[Log, Mapping[str, object]]
"""A log, and what else ``review`` is told of it, by name."""

WORTH_A_LOOK_BUDGET = 1 / 40
LATELY = 14
"""Without a change, a log is worth a look when these last days differ from all before."""

_WORTH_A_PROCESS = 64
"""Starting another process takes as long as this many reviews."""
_CHUNK = 16


def review_many(
    logs_with_arguments: Iterable[Asked | Log],
    worth_a_look_budget: float = WORTH_A_LOOK_BUDGET,
    *,
    on_review: Callable[[int, Review], object] | None = None,
    is_stopped: Callable[[], bool] | None = None,
) -> list[Review]:
    """Review many logs, each as ``review`` would by itself.

    Args:
        logs_with_arguments: each a log, or a log and the further arguments of ``review`` by name.
        worth_a_look_budget: of unchanged logs, this share is flagged as worth a look at one reviewing.
        on_review: called with place and review as each is done, in order.
        is_stopped: asked between logs; once it says so, only the reviews done by then are returned.

    Returns:
        The reviews in order, ``worth_a_look`` filled in.

    Raises:
        AnalysisError: as ``review``, for the first log that has contradictory arguments.
    """
    asked = [(one, {}) if isinstance(one, Log) else one for one in logs_with_arguments]
    cores = os.cpu_count() or 1
    is_small = len(asked) < _WORTH_A_PROCESS or cores < 2
    done = _one_by_one(asked, worth_a_look_budget) if is_small else _shared(asked, worth_a_look_budget, cores)
    reviews: list[Review] = []
    for one in done:
        if on_review is not None:
            on_review(len(reviews), one)
        reviews.append(one)
        if is_stopped is not None and is_stopped():
            done.close()
            break
    return reviews


def _one_by_one(asked: Sequence[Asked], budget: float) -> Generator[Review, None, None]:
    for one in asked:
        yield _reviewed(one, budget)


def _shared(asked: Sequence[Asked], budget: float, cores: int) -> Generator[Review, None, None]:
    """The same on every core; a few chunks ahead are handed out, so that stopping is quick and memory bounded."""
    # Other processes are only needed where there are many logs, and not to import the analysis.
    from concurrent.futures import ProcessPoolExecutor
    from multiprocessing import get_context

    chunks = (asked[start : start + _CHUNK] for start in range(0, len(asked), _CHUNK))
    # Spawned: a forked child of a program with a window may hang on a lock that another thread held.
    with ProcessPoolExecutor(cores, mp_context=get_context("spawn")) as pool:
        waiting: list[Future[list[Review]]] = [
            pool.submit(_reviewed_chunk, chunk, budget) for chunk in islice(chunks, 2 * cores)
        ]
        try:
            while waiting:
                chunk = waiting.pop(0).result()
                waiting += [pool.submit(_reviewed_chunk, more, budget) for more in islice(chunks, 1)]
                yield from chunk
        finally:
            for one in waiting:
                one.cancel()


def _reviewed_chunk(chunk: Sequence[Asked], budget: float) -> list[Review]:
    return [_reviewed(one, budget) for one in chunk]


def _reviewed(asked: Asked, budget: float) -> Review:
    log, how = asked
    answer = review(log, **how)  # type: ignore[arg-type]
    return replace(answer, worth_a_look=is_worth_a_look(log, how, answer, budget))


def is_worth_a_look(log: Log, how: Mapping[str, object], answer: Review, budget: float) -> bool:
    """Whether luck alone would make a gap this big in fewer than ``budget`` of unchanged logs.

    With a change the last stretch is compared with the baseline; without one, the last 14 days with those before.
    A doubt that alters takes the flag away.
    """
    if any(doubt.alters for doubt in answer.doubts):
        return False
    if len(answer.stretches) > 1:
        known = answer.answer.luck is not None and answer.answer.sureness != "too early"
        chance = answer.answer.luck.p if known and answer.answer.luck is not None else None
    else:
        chance = _chance_lately(log, how)
    return chance is not None and chance < budget


def _chance_lately(log: Log, how: Mapping[str, object]) -> float | None:
    today = how.get("today")
    end = today if isinstance(today, date) else (date.fromordinal(int(log.days[-1])) if len(log) else None)
    begin = first_logged_day(log, end.toordinal()) if end is not None else None
    if end is None or begin is None:
        return None
    last = end - timedelta(LATELY)
    return chance_of(log, (), (date.fromordinal(begin), last), end) if last.toordinal() > begin else None
