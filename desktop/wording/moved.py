"""A comparison in plain words: did it move, by how much, since when, what would settle it."""

from __future__ import annotations

import numpy as np

from analysis.answer import AtLevel, Carried, HowMuch, HowOften, Review, Shift, Since, Still, StillNeeded
from analysis.questions.did_it_move import CLAIMS, FEWEST_AFTER, FEWEST_BEFORE
from desktop.wording.how_often import much_range, often_bound, often_range, often_words, week_words
from desktop.wording.numbers import Speech, chance_in_100, count
from desktop.wording.telling import Findings, Section, Teller

STEADY_BELOW = 0.01
"""A slope is told when luck alone makes it in fewer than 1 of 100 steady logs."""

FEWEST_FOR_LEVELLED = 14
_LEVELLED = 0.3
"""A slope after of at most this part of the one before is none."""

_MOSTLY = 0.8
NO_CAUSE = (
    "This compares before with after. It cannot tell what caused a difference: "
    "other things may have changed at the same time."
)


def outside_sentence(carried: Carried, days: int, speech: Speech) -> str:
    """How many periods are outside the carried fences, and how many would be by luck alone."""
    low, high = len(carried.below), len(carried.above)
    outside = low + high
    if days == 1:
        where = (
            "is outside the old fences, " + ("high" if high else "low") if outside else "is inside the old fences"
        )
        return f"The one {speech.one} since {where}."
    if not outside:
        seen = f"None of the {speech.periods(days)} since is outside the old fences."
    else:
        sides = "all high" if not low else "all low" if not high else f"{high} high and {low} low"
        if outside == 1:
            sides = "high" if high else "low"
        verb = "is" if outside == 1 else "are"
        seen = f"{outside} of the {speech.periods(days)} since {verb} outside the old fences, {sides}."
    return f"{seen} {_luck_alone(carried.expected_by_luck)}"


def _luck_alone(expected: float) -> str:
    if expected < 0.5:
        return "By luck alone there would most often be none."
    return f"About {int(expected + 0.5)} would be by luck alone."


def _is_told_by_amount(often: HowOften, much: HowMuch) -> bool:
    """Whether it is how much that moved, and not on how many days."""
    return often.low <= 0 <= often.high and not much.low <= 0 <= much.high


class MovedTeller(Teller):
    """Tells the last stretch against the baseline."""

    def __init__(self, review: Review) -> None:
        super().__init__(review)
        self.before, self.after, self.answer = review.stretches[0], review.stretches[-1], review.answer

    def tell(self) -> Findings:
        """The headline, the four questions, the doubts, and what would settle it."""
        after, answer = self.after, self.answer
        sections = [Section("Did it move?", tuple(self._did_it_move()))]
        if answer.shift is not None:
            sections.append(Section("By how much?", tuple(self._by_how_much())))
        # Fences mean nothing between a yes and a no.
        if answer.carried is not None and after.observations and self.review.measure.kind != "yes/no":
            day_by_day = outside_sentence(answer.carried, after.observations, self.speech)
            if self._is_slope:
                day_by_day = f"It moves steadily, so {self.speech.many} outside the old fences say nothing here."
            sections.append(Section(f"{self.speech.one.capitalize()} by {self.speech.one}", (day_by_day,)))
        if answer.sureness in (*CLAIMS, "leaning") and not self._is_slope:
            # Of a move that has gone back the likeliest day may be the one on which it went back.
            since = (self._since(answer.since),) if answer.since is not None and not self._is_faded else ()
            sections.append(Section("Since when?", (*since, *self._still())))
        elif not self._is_slope and answer.still is not None and answer.still.state in ("faded", "come late"):
            sections.append(Section("Is it so still?", tuple(self._still())))
        sections += self.doubts()
        if answer.sureness != "too early":
            sections[-1] = Section(sections[-1].title, (*sections[-1].sentences, NO_CAUSE))
        settle = self._settle()
        if settle:
            sections.append(Section("What would settle it?", (settle,)))
        return Findings(self._headline(), tuple(sections))

    def _headline(self) -> str:
        match self.answer.sureness:
            case "too early":
                return "Too early to say if it moved."
            case "leaning" | "cannot tell" if self._is_slope:
                return f"It was moving all along, by about {self._slope_told()}."
            case "cannot tell" if self._moved_with_changes:
                return f"It moved with {self._switched()}."
            case "cannot tell":
                return "This log cannot tell if it moved."
            case "leaning" if self._is_faded:
                return "It may have moved at first. If so, it has gone back."
            case "leaning":
                return f"It may have moved: {self._levels()}"
            case _ if self._is_faded:
                return "It moved at first, and has gone back since."
            case _ if self._began_before:
                return f"It moved before the day you marked: {self._levels()}"
            case _:
                return f"It moved: {self._levels()}"

    @property
    def _moved_with_changes(self) -> bool:
        """Whether it moved with a change, though the last stretch is no other than the first."""
        switches = self.review.switches
        return switches is not None and switches.moved > 0 and not self._is_slope

    def _switched(self) -> str:
        switches = self.review.switches
        assert switches is not None
        changes = "the change" if switches.of == 1 else f"{switches.moved} of {switches.of} changes"
        return f"{changes}, to and fro" if switches.to_and_fro else changes

    @property
    def _began_before(self) -> bool:
        """Whether it began before the marked day, as surely as the range of its start can tell."""
        since = self.answer.since
        return since is not None and since.before_change and not self._is_anytime(since)

    @property
    def _is_faded(self) -> bool:
        return self.answer.still is not None and self.answer.still.state == "faded"

    @property
    def _is_slope(self) -> bool:
        """Whether a steady slope explains what looks like a move at the change."""
        slopes = (doubt for doubt in self.review.doubts if doubt.name == "slope_before" and doubt.alters)
        return any("shape" not in dict(doubt.fields) for doubt in slopes)

    def _slope_told(self) -> str:
        slope = next(dict(doubt.fields)["slope"] for doubt in self.review.doubts if doubt.name == "slope_before")
        return self.speech.pace(float(slope))

    def _levels(self) -> str:
        """Before and since in one breath, in the terms that mean most for this log."""
        speech, before, after, answer = self.speech, self.before, self.after, self.answer
        if answer.how_often is not None:
            much = answer.how_much
            if much is not None and _is_told_by_amount(answer.how_often, much):
                is_much = f"{speech.with_unit(much.after)} on a {speech.one} with some"
                return f"{is_much}, {speech.number(much.before)} before."
            return f"on {often_words(answer.how_often, speech)}."
        assert before.median is not None
        assert after.median is not None
        was_middle, is_middle = speech.number(before.median), speech.with_unit(after.median)
        if speech.number(after.median) == was_middle and answer.at_level is not None:
            (was, was_of), (now, now_of) = answer.at_level.before, answer.at_level.after
            verb, level = (
                "is" if now == 1 else "are",
                f"{speech.number(answer.at_level.level)} {answer.at_level.beyond}",
            )
            return f"{now} of {now_of} {speech.many} since {verb} at {level}, {was} of {was_of} before."
        if speech.number(after.median) == was_middle and answer.shift is not None:
            return self._beyond_old_middle(before.median)
        return f"{is_middle} on a middle {speech.one}, {was_middle} before."

    def _beyond_old_middle(self, old: float) -> str:
        """Where the two middles are alike: how many periods lie beyond the old one, whatever is wanted."""
        points, after, answer = self.review.points, self.after, self.answer
        values = points.values[(points.first >= after.first) & (points.first <= after.last) & points.known]
        is_more = answer.direction == "more"
        beyond = int(np.sum(values > old) if is_more else np.sum(values < old))
        verb = "is" if beyond == 1 else "are"
        return (
            f"{beyond} of {len(values)} {self.speech.many} since {verb} {'above' if is_more else 'below'} "
            f"the old middle of {self.speech.with_unit(old)}."
        )

    def _did_it_move(self) -> list[str]:
        speech, before, after, answer = self.speech, self.before, self.after, self.answer
        if answer.sureness == "too early" and not before.observations:
            return [
                f"There is no {speech.one} with a value before the change, so there is nothing to compare with."
            ]
        if answer.sureness == "too early":
            return [
                f"There {'is' if before.observations == 1 else 'are'} {speech.periods(before.observations)} "
                f"with a value before the change and {after.observations} after. An answer needs "
                f"{FEWEST_BEFORE} before and {FEWEST_AFTER} after; 14 before is better.",
                *self._switches(),
            ]
        assert answer.luck is not None
        luck = (
            f"If nothing had changed, a gap this big would turn up by luck in "
            f"{chance_in_100(answer.luck.p)} logs like this one."
        )
        reason = f"{before.observations} {speech.many} before, {after.observations} after."
        word = str(answer.sureness)
        rhythm = answer.weekday_rhythm
        like_days = ["Weekends differ from weekdays here; that is taken off."] if rhythm and rhythm.used else []
        told = f"{word[0].upper()}{word[1:]}: {reason} {luck}"
        if self._is_slope and answer.sureness == "cannot tell":
            # How sure it is that the change moved it is another question than the headline's.
            told = reason
        return [
            told,
            *like_days,
            *self.season(),
            *self._settling_in(),
            *self._levelled_off(),
            *self._switches(),
            *self.up_to(),
        ]

    def _by_how_much(self) -> list[str]:
        speech, before, after, answer = self.speech, self.before, self.after, self.answer
        shift = answer.shift
        assert shift is not None
        told = []
        if answer.how_often is not None:
            told += self._by_share(answer.how_often)
        elif answer.sureness not in CLAIMS and before.median is not None and after.median is not None:
            told.append(
                f"A middle {speech.one} was {speech.with_unit(before.median)} before and is "
                f"{speech.number(after.median)} since."
            )
        if answer.how_often is not None:
            pass  # The middle of days of which many hold nothing is no amount a day.
        elif shift.low == shift.high == 0 and answer.sureness in CLAIMS:
            pass  # It is days at a level that moved, which are told below.
        elif shift.low == shift.high == 0:
            told.append(f"{speech.one.capitalize()} for {speech.one} there is no difference to see.")
        else:
            told.append(f"The difference {self._how_likely(shift)} {speech.between(shift.low, shift.high)}.")
        told += self._better_days()
        if answer.spread_change is not None and answer.spread_change.word != "alike":
            told.append(f"The {speech.many} are {answer.spread_change.word} than before.")
        if answer.goal is not None:
            told.append(
                f"Inside the range you set on {answer.goal.after[0]} of {answer.goal.after[1]} {speech.many}, "
                f"{answer.goal.before[0]} of {answer.goal.before[1]} before."
            )
            if answer.goal.before[0] >= _MOSTLY * answer.goal.before[1] and answer.sureness not in CLAIMS:
                told.append("It was there on most of them before the change already.")
        if answer.at_level is not None:
            told.append(self._at_level(answer.at_level))
        told += self._worth(shift)
        wanted = self.review.measure.aim
        if wanted in ("more", "less") and answer.direction in ("more", "less"):
            way = speech.way(1 if answer.direction == "more" else -1).capitalize()
            told.append(f"{way}, which is {'' if wanted == answer.direction else 'not '}the way you wanted.")
        return told

    def _by_share(self, often: HowOften) -> list[str]:
        """How often and how much on those days, each with its range, and what a week comes to."""
        answer, speech = self.answer, self.speech
        much, total = answer.how_much, answer.week_total
        is_in_headline = answer.sureness in (*CLAIMS, "leaning") and not self._is_faded and not self._is_slope
        by_amount = much is not None and _is_told_by_amount(often, much)
        told = [] if is_in_headline and not by_amount else [f"On {often_words(often, speech)}."]
        if answer.sureness != "too early":
            told.append(often_range(often, speech))
        told += [much_range(much, speech)] if much is not None else []
        return [*told, *([week_words(total, speech)] if total is not None else [])]

    def _at_level(self, days: AtLevel) -> str:
        level = f"{self.speech.number(days.level)} {days.beyond}"
        (was, was_of), (now, now_of) = days.before, days.after
        many = self.speech.many.capitalize()
        return f"{many} at {level}: {was} of {was_of} before, {now} of {now_of} since."

    def _worth(self, shift: Shift) -> list[str]:
        """The size of a move held against the size that the person said is worth it."""
        needed = self.answer.still_needed
        if needed is None or self.answer.sureness not in CLAIMS:
            return []
        near, far = sorted((abs(shift.low), abs(shift.high)))
        amount = f"the {self.speech.with_unit(needed.for_amount)} you said is worth it"
        if far < needed.for_amount:
            return [f"That is less than {amount}."]
        if shift.low * shift.high > 0 and near >= needed.for_amount:
            return [f"That is at least {amount}."]
        return [f"That may be more or less than {amount}."]

    def _how_likely(self, shift: Shift) -> str:
        if self.answer.sureness == "too early":
            return "could be"
        if shift.low < 0 < shift.high or self.answer.sureness == "cannot tell":
            return "may be"
        is_one_number = self.speech.number(shift.low) == self.speech.number(shift.high)
        return "is" if is_one_number else "is probably"

    def _better_days(self) -> list[str]:
        shift, aim = self.answer.shift, self.review.measure.aim
        assert shift is not None
        if isinstance(aim, tuple) or self.before.median is None or self.answer.how_often is not None:
            return []
        if self.answer.at_level is not None and self.before.median == self.after.median:
            return []
        wants_less = aim == "less" or (aim == "none" and shift.estimate < 0)
        verb = "was" if shift.better_days == 1 else "were"
        return [
            f"{shift.better_days} of {shift.days} {self.speech.many} {verb} "
            f"{'below' if wants_less else 'above'} the old middle."
        ]

    def _since(self, since: Since) -> str:
        name = self.days.name
        if self._is_anytime(since):
            return "This log cannot tell when it began."
        if since.first == since.last:
            told = f"Since {name(since.likely)}."
        else:
            told = (
                f"Most likely since {name(since.likely)}; any start from {name(since.first)} to "
                f"{name(since.last)} fits about as well."
            )
        if self.after.change is None:
            return told
        marked = self.days.day(self.after.change)
        if since.before_change:
            return f"{told} That is before the day you marked, {marked}."
        if since.first > self.after.change:
            return f"{told} That is after the day you marked, {marked}."
        return f"{told} That fits the day you marked, {marked}."

    def _is_anytime(self, since: Since) -> bool:
        """Whether more than half of the log fits as the beginning."""
        whole = self.after.last - self.before.first
        return since.last - since.first > whole / 2

    def _settling_in(self) -> list[str]:
        """Days after the change that are in no number."""
        if self.after.change is None or self.after.first <= self.after.change or self.speech.one != "day":
            return []
        days = self.after.first - self.after.change
        return [f"The first {count(days, 'day')} after the change, to settle in, are in no number."]

    def _levelled_off(self) -> list[str]:
        """A slope before the change that is not there since."""
        slope = self.answer.slope
        if slope is None or slope.before is None or slope.after is None or (slope.p_before or 1.0) >= STEADY_BELOW:
            return []
        if self.after.observations < FEWEST_FOR_LEVELLED or abs(slope.after) > _LEVELLED * abs(slope.before):
            return []
        return [f"Before the change it was moving by about {self.speech.pace(slope.before)}; it has levelled off."]

    def _still(self) -> list[str]:
        """What became of the move; nothing where that says no more than the answer."""
        still, speech = self.answer.still, self.speech
        if still is None or still.last_14 is None:
            return []
        lately = f"The middle of the last 14 {speech.many} is {speech.with_unit(still.last_14)}."
        if self.answer.how_often is not None:
            lately = ""
        return [one.strip() for one in self._state(still, lately)]

    def _state(self, still: Still, lately: str) -> list[str]:
        speech = self.speech
        match still.state:
            case "faded" if self.answer.sureness not in CLAIMS:
                return [f"It may have moved at first; if so, it has gone back since. {lately}"]
            case "faded":
                return [f"It moved at first and has gone back since. {lately}"]
            case "growing":
                return [f"It is still moving the same way. {lately}"]
            case "come late":
                return [f"It came late: the first {speech.many} after the change were as before. {lately}"]
            case "still so":
                return [f"It is so still. {lately}"]
        return []

    def _switches(self) -> list[str]:
        switches = self.review.switches
        if switches is None:
            return []
        marked = len(self.review.stretches) - 1
        early = marked - switches.of
        told = [f"{marked} changes are marked."]
        if switches.of:
            told.append(f"It moved with {self._switched()}.")
        if early:
            told.append(f"{early} of them {'has' if early == 1 else 'have'} too few days yet.")
        if self.answer.how_often is None:
            middles = [one.median for one in self.review.stretches if one.median is not None]
            listed = ", then ".join(self.speech.number(one) for one in middles)
            told.append(f"The middle, stretch by stretch: {listed}.")
        return [" ".join(told)]

    def _settle(self) -> str | None:
        speech, before, after, answer = self.speech, self.before, self.after, self.answer
        if answer.sureness == "too early":
            short_before = max(0, FEWEST_BEFORE - before.observations)
            short_after = max(0, FEWEST_AFTER - after.observations)
            if short_before:
                return (
                    f"The {speech.many} before the change are too few, by {short_before}. Only earlier ones that "
                    "you wrote down somewhere can help: add them."
                )
            return f"{speech.periods(short_after)} more after the change."
        needed = answer.still_needed
        if answer.sureness in CLAIMS:
            if after.observations < FEWEST_FOR_LEVELLED:
                left = speech.periods(FEWEST_FOR_LEVELLED - after.observations)
                return f"This is the answer so far. {left} more would show if it lasts."
            return f"You have your answer. More {speech.many} would show if it lasts."
        if any(doubt.alters for doubt in self.review.doubts):
            return f"More {speech.many} alone will not settle it: the first point above stands in the way."
        if needed is not None:
            amount = f"{speech.with_unit(needed.for_amount)}{speech.rate()}"
            if needed.days is None:
                return f"With this baseline, no number of {speech.many} after can show a move of {amount}."
            if needed.days:
                return f"{self._days_more(needed)} would most often show a move of {amount}."
            shift = answer.shift
            if shift is not None and max(abs(shift.low), abs(shift.high)) < needed.for_amount:
                return f"There are enough {speech.many} to see a move of {amount}; this log does not show one."
            return f"The difference may still be {amount}, or less. More {speech.many} would narrow this."
        if answer.sureness != "cannot tell" or self._is_faded or self._moved_with_changes:
            return None
        if answer.how_often is not None:
            return f"{often_bound(answer.how_often, speech)} More {speech.many} would narrow this."
        if answer.bound:
            bound = f"{speech.with_unit(answer.bound)}{speech.rate()}"
            return f"If it changed at all, it was by less than {bound}. More {speech.many} would narrow this."
        return None

    def _days_more(self, needed: StillNeeded) -> str:
        """The days still needed with their range, where few days leave it wide."""
        assert needed.days is not None
        told = f"About {self.speech.periods(needed.days)} more"
        if needed.high is None:
            return f"{told}, or many more than that,"
        if needed.low is None or needed.high <= needed.low + 1:
            return told
        return f"{told} ({needed.low} to {needed.high})" if needed.low else f"{told} ({needed.high} at most)"
