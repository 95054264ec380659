"""The answer in plain words: the headline, the four questions, and numbers that are those of the review."""

from __future__ import annotations

import math
import re
from dataclasses import replace
from datetime import date, timedelta

import pytest

from analysis import Change, Log, Measure, Review, review
from analysis.answer import Carried, Slope, StillNeeded, Switches
from analysis.pipeline import in_100
from desktop.wording.cautions import CAUTION
from desktop.wording.days import MONTHS
from desktop.wording.findings import findings_of, worded
from desktop.wording.moved import NO_CAUSE, outside_sentence
from desktop.wording.telling import speech_of
from tests.builders import FIRST_DAY, day, log_of, reviewed
from tests.desktop.wording.sweep import sweep

LOW = [20, 25, 18, 30, 15, 10, 22, 24, 18, 31, 12, 16, 26, 21]
HIGH = [38, 41, 35, 44, 29, 33, 47, 40, 36, 52, 31, 39, 45, 37]
MINUTES = {"unit": "minutes", "kind": "amount", "aim": "more"}


def told(*arguments, **measure) -> str:
    return "\n".join(findings_of(reviewed(*arguments, **measure)).lines())


def sections(one: Review) -> dict[str, tuple[str, ...]]:
    return {section.title: section.sentences for section in findings_of(one).sections}


# The five words.


def test_a_clear_move_is_told_with_both_middles_and_its_range():
    one = reviewed(LOW + HIGH, 14, **MINUTES)
    shift, speech = one.answer.shift, speech_of(one)
    assert findings_of(one).headline == "It moved: 38.5 minutes on a middle day, 20.5 before."
    asked = sections(one)
    assert asked["Did it move?"][0].startswith("As sure as a log can be: 14 days before, 14 after. If nothing had")
    assert (
        f"between {speech.number(shift.low)} and {speech.number(shift.high)} minutes more a day"
        in (asked["By how much?"][0])
    )
    assert f"{shift.better_days} of 14 days were above the old middle." in asked["By how much?"]
    assert "More, which is the way you wanted." in asked["By how much?"]
    assert "That fits the day you marked, 17 March." in asked["Since when?"][0]
    assert NO_CAUSE in asked["What else could explain it?"]
    assert asked["What would settle it?"] == ("You have your answer. More days would show if it lasts.",)


def test_a_clear_move_of_few_days_is_fairly_sure():
    said = told(LOW[:8] + HIGH[:6], 8, **MINUTES)
    assert said.startswith("It moved: ")
    assert "Fairly sure: 8 days before, 6 after." in said


def test_a_move_that_luck_could_make_is_leaning():
    one = reviewed([30, 7, 22, 17, 18, 19, 10, 19, 16, 37, 26, 23, 24, 22, 20, 23, 27], 10, **MINUTES)
    assert one.answer.sureness == "leaning"
    assert findings_of(one).headline.startswith("It may have moved: ")
    assert "Leaning: 10 days before, 7 after." in sections(one)["Did it move?"][0]


def test_a_log_that_cannot_tell_says_how_large_a_move_it_rules_out():
    one = reviewed(LOW + LOW[::-1], 14, **MINUTES)
    bound = speech_of(one).with_unit(one.answer.bound)
    assert findings_of(one).headline == "This log cannot tell if it moved."
    assert sections(one)["What would settle it?"] == (
        f"If it changed at all, it was by less than {bound} a day. More days would narrow this.",
    )
    assert "Since when?" not in sections(one)


def test_the_amount_worth_it_is_told_in_days_still_needed():
    one = review(log_of(LOW + LOW[::-1], **MINUTES), [Change(day(14))], worth=8)
    needed = one.answer.still_needed
    assert sections(one)["What would settle it?"] == (
        f"About {needed.days} days more ({needed.high} at most) would most often show a move of 8 minutes a day.",
    )


def test_days_still_needed_that_may_be_many_more_say_so():
    one = review(log_of(LOW + LOW[::-1], **MINUTES), [Change(day(14))], worth=6)
    open_ended = replace(one, answer=replace(one.answer, still_needed=StillNeeded(12, 4, None, 6.0)))
    with_range = replace(one, answer=replace(one.answer, still_needed=StillNeeded(12, 4, 30, 6.0)))
    assert findings_of(with_range).lines()[-1].startswith("About 12 days more (4 to 30) would")
    said = findings_of(open_ended).lines()[-1]
    assert said.startswith("About 12 days more, or many more than that, would most often show")


def test_an_amount_too_small_for_the_baseline_is_told_as_such():
    one = review(log_of(LOW + LOW[::-1], **MINUTES), [Change(day(14))], worth=2)
    assert one.answer.still_needed.days is None
    assert findings_of(one).lines()[-1] == (
        "With this baseline, no number of days after can show a move of 2 minutes a day."
    )


@pytest.mark.parametrize(
    ("before", "after", "settles"),
    [
        (14, 1, "3 days more after the change."),
        (14, 3, "1 day more after the change."),
        (
            5,
            9,
            "The days before the change are too few, by 2. Only earlier ones that you wrote down",
        ),
    ],
)
def test_too_early_says_what_is_missing(before, after, settles):
    said = told(LOW[:before] + HIGH[:after], before, **MINUTES)
    assert said.startswith("Too early to say if it moved.\n")
    assert f"with a value before the change and {after} after. An answer needs 7 before and 4 after" in said
    assert settles in said
    assert NO_CAUSE not in said


def test_one_day_before_is_one():
    assert "There is 1 day with a value before the change" in told([20, 30, 31], 1, **MINUTES)


def test_one_day_after_is_told_alone():
    assert "The one day since is outside the old fences, high." in told([*LOW, 90], 14, **MINUTES)
    assert "The one day since is inside the old fences." in told([*LOW, 20], 14, **MINUTES)


# Without a change.


def test_an_empty_log_has_no_answer_yet():
    said = told([])
    assert said.startswith("No answer yet.\nThere is no value in this log yet.\nType a number and press Enter.")


def test_a_log_without_odd_days_says_so_and_what_to_do_next():
    one = reviewed(LOW, **MINUTES)
    assert findings_of(one).headline == "No day is out of line with the rest."
    level = sections(one)["The log so far"]
    assert level[0] == "14 days with a value. The middle day is 20.5 minutes."
    assert level[1].startswith("The middle half runs from ")
    assert level[2].startswith("The fences stand at ")
    assert sections(one)["What next?"] == (
        "To ask if something moved it, mark the day of a change (Log, Mark a change).",
    )


def test_odd_days_are_named_with_their_value_and_the_fence():
    one = reviewed([*LOW, 120], **MINUTES)
    fence = speech_of(one).number(one.stretches[0].upper_fence)
    assert findings_of(one).headline == "1 day is out of line with the rest."
    assert sections(one)["Which ones?"][0] == f"17 March: 120 minutes, above the upper fence of {fence}."


def test_more_odd_days_than_can_be_listed_are_counted():
    one = reviewed([*LOW, *LOW, 120, 130, 140, 150], **MINUTES)
    assert findings_of(one).headline == "4 days are out of line with the rest."
    assert "The other one is marked on the chart." in sections(one)["Which ones?"]


def test_a_few_days_are_too_early_for_fences():
    said = told(LOW[:4], **MINUTES)
    assert said.startswith("Too early to say if a day is out of line.")
    assert "3 days more with a value would be enough to draw fences. 14 days are better." in said


def test_equal_days_cannot_be_told_apart():
    assert told([5] * 10, **MINUTES).startswith("No day can be told apart from the rest.")


def test_a_steady_slope_without_a_change_is_told():
    one = reviewed(LOW, **MINUTES)
    sloping = replace(one, answer=replace(one.answer, slope=Slope(2.0, None, 0.001)))
    steady = replace(one, answer=replace(one.answer, slope=Slope(2.0, None, 0.4)))
    said = "It is moving steadily, by about 14 minutes more a week."
    assert said in sections(sloping)["The log so far"]
    assert said not in sections(steady)["The log so far"]


# Measures of other kinds.


def test_a_log_of_many_zeros_is_told_by_how_often():
    three, five = [0, 40, 0, 35, 0, 30, 0] * 4, [30, 40, 0, 35, 30, 30, 0] * 4
    said = told(three + five, 28, kind="amount", missed="zero", unit="minutes")
    assert "on 20 of 28 days there was some, on 12 of 28 before." in said.splitlines()[0]
    assert "On those days the middle was 35 before and is 30 minutes since" in said
    assert "That is probably between 3 and 50 days more in 100." in said
    assert "A middle week came to 105 before and comes to 165 minutes since: about 60 minutes more." in said
    # The middle of all days together is no amount that was ever done.
    assert "The difference is" not in said


def test_a_log_of_many_zeros_that_moved_in_amount_alone_is_told_by_how_much():
    said = told([0, 20, 0, 25, 0, 22, 0] * 4 + [0, 40, 0, 45, 0, 42, 0] * 4, 28, kind="amount", unit="minutes")
    assert said.startswith("It moved: 42 minutes on a day with some, 22 before.")
    assert "On 12 of 28 days there was some, on 12 of 28 before." in said


def test_days_in_the_range_that_was_set_are_counted():
    one = reviewed(LOW + HIGH, 14, aim=(20.0, 30.0), unit="minutes")
    (inside, of), (was, was_of) = one.answer.goal.after, one.answer.goal.before
    assert (
        f"Inside the range you set on {inside} of {of} days, {was} of {was_of} before."
        in sections(one)["By how much?"]
    )


@pytest.mark.parametrize("aim", ["more", "less", "none", (4.0, 6.0)])
def test_equal_middles_are_told_by_the_days_beyond_them_whatever_is_wanted(aim):
    before = [5, 5, 5, 4, 5, 5, 3, 5, 5, 4, 5, 5, 4, 5]
    after = [5, 8, 5, 7, 5, 9, 5, 8, 5, 7, 5, 5, 8, 5, 5, 7, 5]
    one = reviewed(before + after, 14, aim=aim, kind="reading")
    assert one.stretches[0].median == one.stretches[1].median == 5
    assert one.answer.direction == "more"
    assert findings_of(one).headline.endswith("7 of 17 days since are above the old middle of 5.")


def test_no_difference_at_all_is_said_in_the_words_of_the_period():
    pairs = [(FIRST_DAY + timedelta(7 * place), 5.0) for place in range(20)]
    weekly = review(Log.from_pairs(pairs, Measure(period="week")), [Change(day(70))])
    assert "Week for week there is no difference to see." in findings_of(weekly).lines()
    assert "Day for day there is no difference to see." in told([5] * 20, 10)


def test_values_below_zero_keep_their_sign():
    said = told([value - 40 for value in LOW] + [value - 60 for value in LOW], 14, unit="°C", kind="reading")
    assert said.startswith("It moved: −39.5 °C on a middle day, −19.5 before.")
    assert "lower." in said


def test_a_reading_moves_higher_and_not_more():
    said = told(LOW + HIGH, 14, unit="mmHg", aim="less")
    assert "Higher, which is not the way you wanted." in said
    assert "more" not in said.split("How")[0].replace("more than", "")
    assert " a day" not in re.sub("a day (?:such|is)", "", said).replace("middle day", "")


@pytest.mark.parametrize(("period", "step"), [("week", 7), ("month", 31), ("year", 366)])
def test_other_periods_are_named_throughout(period, step):
    pairs = [(FIRST_DAY + timedelta(step * place), float(value)) for place, value in enumerate(LOW + HIGH)]
    measure = Measure("Steps", "steps", "count", period=period)
    one = review(Log.from_pairs(pairs, measure), [Change(FIRST_DAY + timedelta(step * 14), "moved house")])
    said = findings_of(one).lines()
    assert re.fullmatch(rf"It moved: [\d.]+ steps on a middle {period}, [\d.]+ before\.", said[0])
    assert re.match(rf"[A-Z][a-z ]+: 1\d {period}s before, 1\d after\.", said[1])
    assert not any(re.search(r"\bdays? (?:before|since|were|with)", line) for line in said)


def test_a_move_that_began_before_the_change_says_so():
    assert "That is before the day you marked, 31 March." in told(LOW + HIGH * 2, 28, **MINUTES)
    sure = told(LOW * 2 + HIGH[:7] + HIGH * 2, 35, **MINUTES)
    assert sure.startswith("It moved before the day you marked: 38.5 minutes on a middle day, 22 before.")


def test_what_became_of_the_move_is_told():
    faded = told(LOW + HIGH + LOW, 14, **MINUTES)
    assert faded.startswith("It may have moved at first. If so, it has gone back.")
    assert "It may have moved at first; if so, it has gone back since." in faded
    # One strength everywhere, and no start of what is over, nor a bound on what there was.
    assert "It moved at first" not in faded
    assert "Most likely since" not in faded
    assert "If it changed at all" not in faded
    assert "It came late: the first days after the change were as before." in told(LOW + LOW + HIGH, 14, **MINUTES)
    assert "It is so still. The middle of the last 14 days is 38.5 minutes." in told(LOW + HIGH, 14, **MINUTES)


def test_to_and_fro_is_told_with_its_count():
    log = log_of(LOW + HIGH + LOW, **MINUTES)
    said = findings_of(review(log, [Change(day(14), "on"), Change(day(28), "off")])).lines()
    assert said[0] == "It moved with 2 of 2 changes, to and fro."
    told_ = (
        "2 changes are marked. It moved with 2 of 2 changes, to and fro. "
        "The middle, stretch by stretch: 20.5, then 38.5, then 20.5."
    )
    assert told_ in said
    assert not [line for line in said if "cannot tell if" in line or "If it changed at all" in line]


@pytest.mark.parametrize("way", [1, -1])
def test_steps_the_same_way_are_no_to_and_fro_and_turning_the_log_over_changes_no_count(way):
    steps = [way * (value + 20 * (place // 14)) for place, value in enumerate(LOW * 4)]
    changes = [Change(day(14 * number), "more") for number in (1, 2, 3)]
    answer = review(log_of(steps, **MINUTES), changes)
    assert answer.switches == Switches(3, 3, to_and_fro=False)
    one = [way * (value - 15 * (14 * 2 <= place < 14 * 3)) for place, value in enumerate(LOW * 4)]
    back = review(log_of(one, **MINUTES), changes)
    assert back.switches == Switches(2, 3, to_and_fro=True)


def test_a_stretch_with_too_few_days_is_not_counted_as_one_it_did_not_move_with():
    changes = [Change(day(14), "on"), Change(day(28), "off")]
    answer = review(log_of(LOW + HIGH + LOW[:2], **MINUTES), changes)
    assert answer.switches == Switches(1, 1)
    assert "1 of them has too few days yet." in " ".join(findings_of(answer).lines())


def test_yes_and_no_is_told_by_days_and_never_by_a_middle():
    mixed = [1, 0, 1, 1, 0, 0, 1] * 4
    said = told(mixed + mixed, 28, kind="yes/no")
    assert "On 16 of 28 days it was a yes, on 16 of 28 before." in said
    assert "In 100 days that may be anywhere from 24 fewer to 24 more." in said
    assert "If it changed at all, it was by fewer than 25 in 100 days." in said
    for wrong in ("middle day", "fences", "The difference", "by luck alone", "no difference to see"):
        assert wrong not in said
    moved = told([0, 0, 1, 0, 0, 0, 0] * 4 + [1, 1, 0, 1, 1, 1, 1] * 4, 28, kind="yes/no")
    assert moved.startswith("It moved: on 24 of 28 days it was a yes, on 4 of 28 before.")


def test_enough_days_are_only_enough_when_the_range_leaves_the_amount_out():
    same = worth_told(LOW * 4, 20.0)
    assert "There are enough days to see a move of 20 minutes a day; this log does not show one." in same
    near = [value + 6 * (place >= 28) for place, value in enumerate(LOW * 4)]
    assert "this log does not show one" not in worth_told(near, 7.0)


def worth_told(values, worth) -> str:
    return "\n".join(findings_of(review(log_of(values, **MINUTES), [Change(day(28))], worth=worth)).lines())


# Outside by luck.


@pytest.mark.parametrize(
    ("below", "above", "seen"),
    [
        (0, 0, "None of the 14 days since is outside the old fences."),
        (0, 1, "1 of the 14 days since is outside the old fences, high."),
        (1, 0, "1 of the 14 days since is outside the old fences, low."),
        (0, 3, "3 of the 14 days since are outside the old fences, all high."),
        (2, 0, "2 of the 14 days since are outside the old fences, all low."),
        (1, 2, "3 of the 14 days since are outside the old fences, 2 high and 1 low."),
    ],
)
@pytest.mark.parametrize(
    ("expected", "by_luck"),
    [
        (0.2, "By luck alone there would most often be none."),
        (0.5, "About 1 would be by luck alone."),
        (1.4, "About 1 would be by luck alone."),
        (2.5, "About 3 would be by luck alone."),
    ],
)
def test_days_outside_stand_beside_those_that_luck_would_make(below, above, seen, expected, by_luck):
    carried = Carried(tuple(range(below)), tuple(range(above)), expected, 1.0)
    assert outside_sentence(carried, 14, speech_of(reviewed(LOW))) == f"{seen} {by_luck}"


# The numbers are those of the review.

_DATES = re.compile(rf"\b(?:\d{{1,2}} )?(?:{'|'.join(MONTHS)})(?: \d{{4}})?\b")
_NUMBER = re.compile(r"\d+(?:\.\d+)?")
RULES = {0, 1, 4, 7, 14, 99, 100}
"""Numbers of the rules: the fewest days, and chances out of 100."""


def numbers_in(shown: object) -> list[float]:
    if isinstance(shown, dict):
        return [one for value in shown.values() for one in numbers_in(value)]
    if isinstance(shown, list):
        return [len(shown), *(one for value in shown for one in numbers_in(value))]
    return [shown] if isinstance(shown, (int, float)) and not isinstance(shown, bool) else []


def years_in(shown: object) -> set[str]:
    return set(re.findall(r"\b(\d{4})-\d\d-\d\d\b", str(shown)))


def allowed(one: Review) -> set[str]:
    """Every number a sentence may show: those of the review, rounded as it says them, and what they add up to."""
    shown, speech = one.to_json(), speech_of(one)
    values = numbers_in(shown) + [float(value) for _, value in _fields(one)]
    slopes = numbers_in(shown["slope"]) + [float(value) for name, value in _fields(one) if name == "slope"]
    values += [times * slope for slope in slopes for times in (1, 7, 12, 30.44, 52.18, 365.25)] + list(RULES)
    values += [float(value) for value in one.points.values[one.points.known]]
    if one.stretches:
        first, last = one.stretches[0], one.stretches[-1]
        values += [7 - first.observations, 4 - last.observations, 14 - last.observations]
        values += [last.first - (last.change or last.first)] + [10 * tenth for tenth in range(1, 11)]
        values += [len(first.below) + len(first.above), len(first.below) + len(first.above) - 3]
        inside = (one.points.first >= last.first) & (one.points.first <= last.last) & one.points.known
        after = one.points.values[inside]
        values += [int((after > first.median).sum()), int((after < first.median).sum())] if first.median else []
    if one.answer.carried is not None:
        carried = one.answer.carried
        values += [len(carried.below) + len(carried.above), int(carried.expected_by_luck + 0.5)]
    if one.answer.luck is not None:
        values.append(in_100(one.answer.luck.p))
    if one.answer.how_often is not None:
        often = one.answer.how_often
        values += [100, round(100 * often.low), round(100 * often.high)]
        values.append(math.ceil(100 * max(abs(often.low), abs(often.high))))
    if one.switches is not None:
        values.append(len(one.stretches) - 1 - one.switches.of)
    return {speech.number(abs(value)) for value in values} | years_in(shown)


def _fields(one: Review) -> list[tuple[str, float]]:
    return [field for doubt in one.doubts for field in doubt.fields if isinstance(field[1], (int, float))]


def test_every_number_shown_is_one_of_the_review():
    wrong = [
        (line, number)
        for one in sweep()
        for line in findings_of(one).lines()
        for number in _NUMBER.findall(_DATES.sub("", line))
        if number not in allowed(one) and not line.startswith("Nearly all values end")
    ]
    assert wrong == []


def test_every_date_shown_is_one_of_the_review():
    wrong = []
    for one in sweep():
        days = set(re.findall(r"\d{4}-\d\d-\d\d", str(one.to_json())))
        named = {f"{at.day} {MONTHS[at.month - 1]}" for at in map(date.fromisoformat, days)}
        named |= {f"{MONTHS[at.month - 1]} {at.year}" for at in map(date.fromisoformat, days)}
        said = {found for line in findings_of(one).lines() for found in _DATES.findall(line)}
        wrong += [found for found in said if not any(found.startswith(name) for name in named)]
    assert wrong == []


def test_a_number_that_is_not_of_the_review_is_found():
    one = reviewed(LOW + HIGH, 14, **MINUTES)
    assert "38.5" in allowed(one)
    assert "38.6" not in allowed(one)


# The JSON.


def test_the_json_holds_the_lines_on_screen_the_doubts_and_the_caution():
    for one in sweep()[::20]:
        shown = worded(one).to_json()
        assert shown["findings"] == list(findings_of(one).lines())
        assert [doubt["sentence"] for doubt in shown["doubts"]] == [doubt.sentence for doubt in worded(one).doubts]
        assert all(doubt["sentence"] in shown["findings"] for doubt in shown["doubts"])
        assert shown["caution"] == CAUTION


def test_words_do_not_touch_the_numbers():
    one = reviewed(LOW + HIGH, 14, **MINUTES)
    assert replace(worded(one), findings=(), caution="", doubts=one.doubts) == one
