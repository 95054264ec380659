"""Words of the page for an appointment, told so that anyone in the room can read them aloud."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from datetime import date

from analysis.answer import Answer, Review, Since, Stretch
from analysis.log import COUNTED_KINDS, Combine, Log, Period
from analysis.questions.did_it_move import CLAIMS
from desktop.journal.records import Entry, Source
from desktop.wording.cautions import CAUTION
from desktop.wording.days import MONTHS, full_day
from desktop.wording.doubts import doubt_sentence
from desktop.wording.findings import findings_of
from desktop.wording.help import NAME_AND_VERSION
from desktop.wording.moved import NO_CAUSE
from desktop.wording.numbers import chance_in_100, count
from desktop.wording.telling import day_words_of, speech_of

QUESTION = "My question today"
TRUST = "Before trusting it"
AGREED = "Agreed today"
PLAN = "The plan"
UNNAMED = "Log"
TABLE = "The numbers"
WHICH_DAYS = "Which days"
HEADS = {
    "dates": "When",
    "logged": "Logged",
    "readings": "Readings",
    "which": "Which",
    "middle": "Middle",
    "average": "Average",
    "half": "Middle half",
    "goal": "In goal",
    "reach": "Lowest to highest",
}
"""The columns of the table, in their order."""

PAPER_WORDS = {"a4": "A4", "letter": "Letter"}
NO_MEASURE_YET = "There is no measure in this journal yet: start one with Log, Add a measure."
CHART_COPIED = "The chart is copied as a picture."
ROW_HEADS = {"all": "All days", "before": "Before", "settling": "Settling in", "after": "After"}

_COMBINED: dict[Combine, str] = {
    "sum": "sum",
    "mean": "average",
    "median": "middle value",
    "first": "first value",
    "last": "last value",
    "max": "highest value",
    "min": "lowest value",
}
_TO_THE_PERSON = re.compile(r"\b[Yy]ou(?:r|rs)?\b")


def shortened(text: str, most: int) -> str:
    """The text on one line, its end left out where it is longer than ``most`` letters."""
    words = " ".join(text.split())
    if len(words) <= most:
        return words
    kept = words[: most - 1]
    at_word = kept.rpartition(" ")[0]
    return (at_word if len(at_word) > most * 0.6 else kept).rstrip(" ,.;:") + "…"


def unit_words(review: Review) -> str:
    """What follows the title: ``minutes a day``, ``mmHg``, or nothing."""
    speech = speech_of(review)
    unit = review.measure.unit
    return f"{unit}{speech.rate()}" if unit else ""


def title_with_unit(review: Review) -> str:
    """``Upper pressure, mmHg``."""
    return ", ".join(part for part in (review.measure.title or UNNAMED, unit_words(review)) if part)


def short_names(titles: Sequence[str]) -> list[str]:
    """Titles without the words they begin or end with alike: ``Upper`` and ``Lower`` of two pressures."""
    words = [title.split() for title in titles]
    for place, rest in ((-1, slice(None, -1)), (0, slice(1, None))):
        while all(len(one) > 1 for one in words) and len({one[place].lower() for one in words}) == 1:
            words = [one[rest] for one in words]
    return [" ".join(one) for one in words]


def title_of_two(titles: Sequence[str]) -> str:
    """``Upper and lower pressure``."""
    first, second = short_names(titles)
    if second != titles[1] and titles[1].startswith(second):
        return f"{first} and {titles[1][0].lower()}{titles[1][1:]}"
    return f"{titles[0]} and {second}"


def answer_lines(review: Review) -> tuple[str, ...]:
    """What stands under the headline: how much and since when, how sure, and what would settle it."""
    told = {section.title: _for_others(section.sentences) for section in findings_of(review).sections}
    answer = review.answer
    if answer.sureness is None:
        return tuple(" ".join(told[title]) for title in ("", "The log so far", "Which ones?") if told.get(title))
    how_much = list(told.get("By how much?", ()))
    if answer.sureness in (*CLAIMS, "leaning"):
        lately = told.get("Since when?", ())[1 if answer.since is not None else 0 :]
        how_much += _since(answer, review)
    else:
        lately = told.get("Is it so still?", ())
    lines = [[*how_much, *lately], told.get("Did it move?", ())]
    if answer.sureness not in CLAIMS:
        lines.append(told.get("What would settle it?", ()))
    return tuple(" ".join(sentences) for sentences in lines if sentences)


def short_answer_lines(review: Review) -> tuple[str, ...]:
    """The same in one breath, where the page has two answers."""
    answer = review.answer
    if answer.sureness in (None, "too early") or answer.luck is None:
        return answer_lines(review)
    told = {section.title: section.sentences for section in findings_of(review).sections}
    word = str(answer.sureness)
    sure = f"{word[0].upper()}{word[1:]}: by luck alone in {chance_in_100(answer.luck.p)} logs."
    much = [one for one in _for_others(told.get("By how much?", ())) if one.startswith("The difference")]
    since = _since(answer, review) if answer.sureness in (*CLAIMS, "leaning") else ()
    return (" ".join([sure, *much, *since]),)


def doubt_lines(reviews: Sequence[Review]) -> tuple[str, ...]:
    """The doubts of one or two measures, worst first; one that both have alike is said once."""
    told = [[doubt_sentence(doubt, speech_of(one)) for doubt in one.doubts] for one in reviews]
    alike = set(told[0]).intersection(*told[1:]) if told else set()
    lines: list[tuple[int, bool, str]] = []
    for review, sentences in zip(reviews, told, strict=True):
        for place, (sentence, doubt) in enumerate(zip(sentences, review.doubts, strict=True)):
            text = sentence if sentence in alike else f"{review.measure.title}: {sentence}"
            if text not in (said for _, _, said in lines):
                lines.append((place, not doubt.alters, text))
    lines.sort(key=lambda line: (line[1], line[0]))
    return tuple(text for _, _, text in lines)


def always_lines(reviews: Iterable[Review]) -> tuple[str, ...]:
    """What has to be known whatever the doubts are."""
    lines = []
    set_aside = max((len(one.rows.set_aside) for one in reviews), default=0)
    if set_aside:
        read = max(one.rows.read for one in reviews)
        lines.append(f"{count(set_aside, 'row')} of {read} in the table could not be read and are left out.")
    if any(one.answer.sureness not in (None, "too early") for one in reviews):
        lines.append(NO_CAUSE)
    return tuple(lines)


def more_in_the_app(doubts: int) -> str:
    """What stands in place of doubts that have no room."""
    return f"And {doubts} more in the app."


def fact_parts(review: Review, entries: Sequence[Entry]) -> tuple[str, ...]:
    """From when to when, how a point is made, and how the values came in; nothing of a log without a value."""
    measure, points = review.measure, review.points
    if not points.known.any():
        return ()
    first, last = int(points.first[points.known][0]), int(points.last[points.known][-1])
    parts = [long_dates(first, last, measure.period)]
    if measure.period != "day":
        made = "" if points.whole else f": the {_COMBINED[measure.combine_rule]}"
        parts.append(f"one point a {measure.period}{made}")
    if source := _source(entries):
        parts.append(source)
    return tuple(parts)


def long_dates(first: int, last: int, period: Period) -> str:
    """``3 March to 29 April 2031``; ``1871 to 1970`` where a point is a year."""
    begin, end = date.fromordinal(first), date.fromordinal(last)
    if period in ("month", "year"):
        return short_dates(first, last, period, with_year=True).replace(" – ", " to ").replace("\u00a0", " ")
    if begin == end:
        return full_day(end)
    if begin.year != end.year:
        return f"{full_day(begin)} to {full_day(end)}"
    if begin.month != end.month:
        return f"{begin.day} {MONTHS[begin.month - 1]} to {full_day(end)}"
    return f"{begin.day} to {full_day(end)}"


def short_dates(first: int, last: int, period: Period, *, with_year: bool) -> str:
    """``3 Mar – 30 Mar`` as the table has it; a year or a month where a point is one."""
    ends = [_short(date.fromordinal(day), period, with_year=with_year) for day in (first, last)]
    return ends[0] if ends[0] == ends[1] else " – ".join(ends)


def last_head(periods: int, period: Period) -> str:
    """``Last 14 days``."""
    return f"Last {count(periods, period)}"


def after_head(place: int, of: int) -> str:
    """``After``, or which of several changes it is after."""
    return ROW_HEADS["after"] if of == 1 else f"After change {place}"


def change_line(review: Review, hidden: int = 0) -> str:
    """Which changes are marked, with their days; ``""`` without one."""
    days = day_words_of(review)
    after = [one for one in review.stretches if one.change is not None]
    if not after:
        return ""
    told = [
        (f"{place}: " if len(after) > 1 else "")
        + f"{one.label or 'no label'}, {days.day(one.change or one.first)}"
        for place, one in enumerate(after, start=1)
    ]
    shown = told[hidden:]
    head = "Changes" if len(after) > 1 else "Change"
    earlier = f" {count(hidden, 'earlier change')} {'is' if hidden == 1 else 'are'} in the app." if hidden else ""
    return f"{head}: {'; '.join(shown)}.{earlier}"


def averaging_line(log: Log, review: Review) -> str:
    """The rule by which several readings of a day become one, and whether the first day is in the numbers."""
    counted = {int(day) for day, kind in zip(log.days, log.kinds, strict=True) if kind in COUNTED_KINDS}
    if not counted or not review.stretches:
        return ""
    left_out = sum(day < review.stretches[0].first for day in counted)
    first = (
        "day 1 included"
        if not left_out
        else "day 1 left out"
        if left_out == 1
        else f"days 1 to {left_out} left out"
    )
    return f"Each {log.measure.period}: the {_COMBINED[log.measure.combine_rule]} of its readings, {first}."


def foot_line(review: Review) -> str:
    """The rule, the version, and the caution."""
    rule = "Middle = median; middle half = between the fourths"
    baseline = review.stretches[0] if review.stretches else None
    if baseline is not None and baseline.lower_fence is not None:
        is_carried = len(review.stretches) > 1
        held = speech_of(review).periods(baseline.observations) + (" before" if is_carried else "")
        carried = ", dashed where carried on" if is_carried else ""
        rule += f"; fences = 1.5 fourth spreads beyond them, from the {held}{carried}"
    settling = [one for one in review.stretches if one.change is not None and one.first > one.change]
    if settling:
        longest = max(one.first - (one.change or one.first) for one in settling)
        rule += f". The first {count(longest, 'day')} after a change {'is' if longest == 1 else 'are'} settling in"
    if review.measure.missed == "zero":
        rule += ". A missed day counts as zero"
    return f"{rule}. {NAME_AND_VERSION}, a record to talk over. {CAUTION}"


def written(path: object) -> str:
    """What the window says when a file is there."""
    return f"Saved: {path}"


def there_already(path: object) -> str:
    """Why a file is not written on the command line."""
    return f"{path} is there already. Choose another name, or write over it with --force."


def cannot_be_written(path: object, reason: str) -> str:
    """Why a file could not be written."""
    return f"{path} cannot be written: {reason or 'the disk did not take it'}. Choose another place."


def _for_others(sentences: Iterable[str]) -> tuple[str, ...]:
    """The sentences that do not speak to the person who keeps the log."""
    single = (one for text in sentences for one in re.split(r"(?<=[.?!]) (?=[A-Z“−\d])", text))
    # On screen the doubts stand above what would settle it; on the page they stand below.
    return tuple(
        one.replace("the first point above stands", "the first point below stands")
        for one in single
        if not _TO_THE_PERSON.search(one)
    )


def _since(answer: Answer, review: Review) -> tuple[str, ...]:
    since: Since | None = answer.since
    after: Stretch = review.stretches[-1]
    if since is None:
        return ()
    name = day_words_of(review).name
    told = f"Most likely since {name(since.likely)}"
    if since.first != since.last:
        told += f"; a start from {name(since.first)} to {name(since.last)} fits about as well"
    if since.before_change:
        told += ". That is before the change marked"
    elif after.change is not None and since.first > after.change:
        told += ". That is after the change marked"
    return (f"{told}.",)


def _source(entries: Sequence[Entry]) -> str:
    held = [one for one in entries if one.value is not None]
    ways = {one.source for one in held}
    if not ways:
        return ""
    days, late_days = {one.day for one in held}, {one.day for one in held if one.kind == "late"}
    late = len(late_days)
    if ways == {"typed"}:
        return f"written down at the time on {len(days) - late} of {count(len(days), 'day')}"
    words: dict[Source, str] = {"typed": "typed", "table": "from a table", "sample": "an invented sample"}
    told = " and ".join(word for way, word in words.items() if way in ways)
    return f"{told}, {late} typed days afterwards" if late else told


def _short(day: date, period: Period, *, with_year: bool) -> str:
    if period == "year":
        return str(day.year)
    month = MONTHS[day.month - 1][:3]
    if period == "month":
        return f"{month}\u00a0{day.year}"
    # The parts of one date are never parted by the end of a line.
    return f"{day.day}\u00a0{month}" + (f"\u00a0{day.year}" if with_year else "")
