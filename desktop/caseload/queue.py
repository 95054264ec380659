"""Who needs the coach today: every client with the reasons for it, the most pressing first.

The order of reasons is that of the coach's work. Within a reason what repeats or lasts comes first, and those with
nothing new are last, the least likely by luck before the others.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from typing import Literal, get_args

from analysis.many_logs import WORTH_A_LOOK_BUDGET
from analysis.questions.did_it_move import CLAIMS, SURENESS
from analysis.questions.plan_kept import WeekOfPlan, missed_running, weeks_of_plan
from analysis.questions.quiet import Quiet
from desktop.caseload.facts import DONE_KEPT, Facts, PastLimit, Said
from desktop.errors import DayfenceError
from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client

ReasonKind = Literal[
    "session today",
    "quiet",
    "plan missed",
    "moved",
    "firm",
    "past limit",
    "device",
    "unreadable",
    "missing",
]
"""Why a client is in the queue, in the order of the queue."""

REASON_KINDS: tuple[ReasonKind, ...] = get_args(ReasonKind)

WEEK = 7
MISSED_WEEKS = 2
"""A plan missed in one week is a week like any other."""

Verdict = Literal["wanted way", "other way", "moved", "no sign", "not enough days"]
"""What the answers of all clients are counted by."""


@dataclass(frozen=True)
class Reason:
    """Why a client is in the queue.

    Attributes:
        kind: which reason.
        mark: the same as long as nothing about it is new.
        strength: among those of one kind the smaller comes first.
        said: for ``moved`` and ``firm``, what the log says.
        quiet: for ``quiet``, how long, and what was usual.
        weeks: for ``plan missed``, the weeks, one after the other.
        past: for ``past limit``, each measure's values.
        days: for ``device``, the first days.
        error: for ``unreadable``, what is wrong with the file.
    """

    kind: ReasonKind
    mark: str
    strength: tuple[float, ...] = ()
    said: tuple[Said, ...] = ()
    quiet: Quiet | None = None
    weeks: tuple[WeekOfPlan, ...] = ()
    past: tuple[PastLimit, ...] = ()
    days: tuple[int, ...] = ()
    error: DayfenceError | None = None


@dataclass(frozen=True)
class QueueRow:
    """One client's line.

    Attributes:
        client: whose.
        facts: of the journal; None where none could be read.
        reasons: those that are new since the coach looked, the most pressing first; none where nothing is new.
        held: every reason there is, looked at or not.
    """

    client: Client
    facts: Facts | None
    reasons: tuple[Reason, ...]
    held: tuple[Reason, ...] = ()

    @property
    def marks(self) -> str:
        """The marks of everything there is to see now, for ``Client.looked_reasons``."""
        return " ".join(reason.mark for reason in self.held if reason.kind not in _EVERY_TIME)


_EVERY_TIME = frozenset({"session today", "unreadable", "missing"})
"""These do not grow old by being looked at."""


def rows_of(
    caseload: Caseload,
    facts: Mapping[str, Facts],
    errors: Mapping[str, DayfenceError],
    today: date,
    *,
    all_read: bool = True,
) -> list[QueueRow]:
    """Every client whose coaching has not ended, in the order they are looked at.

    Args:
        caseload: the clients.
        facts: by the journal's id, of all that could be read.
        errors: by the journal's id, what is wrong with a file that could not be.
        today: the calendar day.
        all_read: the whole folder was read, so that a client without facts has no journal there.
    """
    rows = [
        row_of(client, facts.get(client.journal_id), errors.get(client.journal_id), today, all_read=all_read)
        for client in caseload.clients.values()
        if not client.ended
    ]
    return sorted(rows, key=_place)


def row_of(
    client: Client, facts: Facts | None, error: DayfenceError | None, today: date, *, all_read: bool = True
) -> QueueRow:
    """One client's line: the reasons that are new since the coach last looked."""
    reasons = [one for one in _reasons(client, facts, error, today) if one is not None]
    if not all_read:
        reasons = [one for one in reasons if one.kind != "missing"]
    reasons.sort(key=lambda one: REASON_KINDS.index(one.kind))
    looked = set(client.looked_reasons.split(" "))
    fresh = [one for one in reasons if one.kind in _EVERY_TIME or one.mark not in looked]
    return QueueRow(client, facts, tuple(fresh), tuple(reasons))


def verdict_of(facts: Facts | None) -> Verdict:
    """What a client's answer counts as among all clients."""
    said = facts.answer if facts is not None else None
    if said is None or said.sureness is None or said.sureness == "too early":
        return "not enough days"
    if said.sureness not in CLAIMS or said.is_faded:
        return "no sign"
    return "moved" if said.is_wanted is None else "wanted way" if said.is_wanted else "other way"


def counts_of(rows: Sequence[QueueRow]) -> dict[Verdict, int]:
    """How many clients each answer has; every answer is there, those of nobody with 0."""
    counted = Counter(verdict_of(row.facts) for row in rows)
    return {verdict: counted[verdict] for verdict in get_args(Verdict)}


def weeks_until(facts: Facts, today: date) -> list[WeekOfPlan]:
    """The whole weeks of the plan up to yesterday, or to the last day of a log that has gone quiet."""
    if facts.last is None or not facts.plans:
        return []
    gone_quiet = _quiet(facts, today)
    last = facts.last if gone_quiet.is_longer else max(facts.last, today.toordinal() - 1)
    return weeks_of_plan(facts.done, facts.plans, facts.last - DONE_KEPT + 1, last, facts.pauses)


def _quiet(facts: Facts, today: date) -> Quiet:
    assert facts.last is not None
    return Quiet(max(0, today.toordinal() - facts.last - 1), facts.usual_gap)


def _reasons(client: Client, facts: Facts | None, error: DayfenceError | None, today: date) -> list[Reason | None]:
    session = Reason("session today", "") if client.next_session == today else None
    if error is not None:
        return [session, Reason("unreadable", "", error=error), *(_of_facts(facts, today) if facts else [])]
    if facts is None:
        return [session, Reason("missing", "")]
    return [session, *_of_facts(facts, today)]


def _of_facts(facts: Facts, today: date) -> list[Reason | None]:
    moved, firm = _moved(facts), _firm(facts)
    if moved is not None and firm is not None and firm.said[0].headline in {one.headline for one in moved.said}:
        firm = None
    return [
        _gone_quiet(facts, today),
        _plan_missed(facts, today),
        moved,
        firm,
        _past_limit(facts),
        Reason("device", f"device-{facts.devices[-1]}", (-facts.devices[-1],), days=facts.devices)
        if facts.devices
        else None,
    ]


def _gone_quiet(facts: Facts, today: date) -> Reason | None:
    if facts.last is None and facts.session is None:
        return None
    # Of a log that was never begun the days since the session are counted.
    last = facts.last if facts.last is not None else facts.session
    assert last is not None
    found = Quiet(max(0, today.toordinal() - last - 1), facts.usual_gap)
    if not found.is_longer:
        return None
    strength = (-found.for_days / (1 + (found.usual_longest or 0)),)
    # A silence that goes on is news again a week later.
    return Reason("quiet", f"quiet-{last}-{found.for_days // WEEK}", strength, quiet=found)


def _plan_missed(facts: Facts, today: date) -> Reason | None:
    weeks = weeks_until(facts, today)
    running = missed_running(weeks)
    if running < MISSED_WEEKS:
        return None
    missed = tuple(weeks[-running:])
    return Reason("plan missed", f"missed-{missed[-1].first}", (-running,), weeks=missed)


def _moved(facts: Facts) -> Reason | None:
    """A move since the last session that luck alone makes in fewer than 1 of 40 clients with nothing new.

    Two measures that are looked at share that between them.
    """
    told = [
        said
        for said in facts.lately
        if said.chance is not None
        and not said.is_doubted
        and said.chance < WORTH_A_LOOK_BUDGET / len(facts.lately) / _questions(facts)
    ]
    if not told:
        return None
    return Reason("moved", _mark(f"moved-{facts.session}", told), _strength(told), said=tuple(told))


def _questions(facts: Facts) -> int:
    """How many questions share the budget: since the session, and since a change of another day."""
    answer = facts.answer
    return 2 if facts.lately and answer is not None and answer.change not in (None, facts.session) else 1


def _firm(facts: Facts) -> Reason | None:
    """The answer since the last change is firm, or it was and has gone back."""
    said = facts.answer
    if said is None or said.is_doubted or said.chance is None:
        return None
    is_firm = said.sureness in CLAIMS and said.chance < WORTH_A_LOOK_BUDGET / _questions(facts)
    has_faded = said.is_faded and said.sureness in (*CLAIMS, "leaning")
    if not is_firm and not has_faded:
        return None
    return Reason("firm", _mark(f"firm-{said.change}", [said]), _strength([said]), said=(said,))


def _mark(kind: str, told: Sequence[Said]) -> str:
    words = [f"{one.measure}-{'faded' if one.is_faded else one.direction}" for one in told]
    return "-".join([kind, *words])


def _strength(told: Sequence[Said]) -> tuple[float, ...]:
    return min((-SURENESS.index(one.sureness or SURENESS[0]), one.chance or 0.0) for one in told)


def _past_limit(facts: Facts) -> Reason | None:
    if not facts.past:
        return None
    last = max(one.days[-1] for one in facts.past)
    days = sum(len(one.days) for one in facts.past)
    return Reason("past limit", f"past-{last}", (-days, -last), past=facts.past)


def _place(row: QueueRow) -> tuple[object, ...]:
    """Where a row stands; those with nothing new by how unlikely their days are, then by code."""
    code = row.client.code.casefold()
    if row.reasons:
        first = row.reasons[0]
        others = -len(row.reasons)
        return REASON_KINDS.index(first.kind), (*first.strength, others), code
    said = [*row.facts.lately, *([row.facts.answer] if row.facts.answer else [])] if row.facts else []
    chances = [0.0 if one.is_faded else one.chance for one in said if one.chance is not None]
    return len(REASON_KINDS), (min(chances, default=1.0),), code
