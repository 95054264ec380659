"""Situations that hang on what is measured: times of day, scores, goals, amounts worth it, blanks."""

from dataclasses import replace
from datetime import timedelta

import numpy as np
import pytest

from analysis import Change, Log, Measure, Span, review
from desktop.wording.findings import findings_of
from tests.analysis.test_situations import days, doubts, told
from tests.builders import FIRST_DAY, day


def by_slot(slots, change, **measure):
    """A log of readings by time of day: for each slot the readings of its days, None where there is none."""
    pairs = [(day(place), value, slot) for slot, values in slots.items() for place, value in enumerate(values)]
    answer = review(Log.from_pairs(pairs, Measure(**measure)), [Change(day(change), "dose change as directed")])
    return answer, " ".join(findings_of(answer).lines())


def test_two_ill_days_in_the_baseline_are_in_no_number():
    values = [30, 28, 0, 0, 31, 29, 33, 27, 30, *days(31, 28, 30, 3)]
    kinds = ["value", "value", "ill", "ill", *["value"] * 33]
    answer, _ = told(values, 9, kinds=kinds, kind="amount", unit="minutes")
    assert answer.stretches[0].observations == 7
    assert answer.stretches[0].lower_fourth >= 28


def test_a_change_after_the_best_spell_is_told_when_it_went_worse_since():
    values = days(32, 49, 40, 5) + days(33, 7, 55, 3) + days(34, 28, 38, 5)
    answer, said = told(values, 56, kind="amount", unit="minutes")
    assert "worst_spell" in doubts(answer)
    assert "The change came after the highest week of 8. Some way back would likely have come anyway." in said


def test_a_baseline_typed_afterwards_is_named_since_nobody_else_can_tell_a_diary_from_memory():
    kinds = ["late"] * 14 + ["value"] * 28
    answer, said = told(days(35, 14, 20, 1) + days(36, 28, 34, 6), 14, kinds=kinds, kind="amount", unit="minutes")
    assert "late_entries" in doubts(answer)
    assert "14 of 42 days were typed days afterwards." in said


def test_a_slip_of_1200_for_120_does_not_carry_the_answer():
    values = days(37, 14, 118, 4) + days(38, 14, 118, 4)
    values[20] = 1200
    answer, _ = told(values, 14, unit="mmHg")
    assert answer.answer.sureness == "cannot tell"
    assert answer.answer.shift.high < 12


def test_a_week_against_four_weeks_says_both_numbers():
    _, said = told(days(39, 7, 20, 4) + days(40, 28, 34, 4), 7, kind="amount", unit="minutes")
    assert "7 days before, 28 after." in said
    assert said.startswith("It moved")


def test_only_the_days_of_exercise_were_logged_so_the_blanks_are_asked_about():
    before = [value if place % 2 else None for place, value in enumerate(days(41, 28, 35, 4))]
    after = [value if place % 3 else None for place, value in enumerate(days(42, 28, 35, 4))]
    answer, said = told(before + after, 28, kind="amount", unit="minutes", aim="more")
    assert "no_zero" in doubts(answer)
    assert "No zero was ever written, and 22 of 54 days are blank. Were those days without any?" in said
    assert "blank_days" not in doubts(answer)


def test_two_short_walks_in_one_day_are_added_and_two_readings_are_not():
    pairs = [(day(place), 10.0, slot) for place in range(10) for slot in ("morning", "evening")]
    walks = review(Log.from_pairs(pairs, Measure(kind="amount", missed="zero")))
    readings = review(Log.from_pairs(pairs, Measure()))
    assert walks.stretches[0].median == 20
    assert readings.stretches[0].median == 10


def test_three_readings_in_a_row_are_one_day_of_evidence():
    pairs = [(day(place), 120.0 + place % 5 + extra, "") for place in range(28) for extra in (0, 1, 2)]
    answer = review(Log.from_pairs(pairs), [Change(day(14))])
    assert [stretch.observations for stretch in answer.stretches] == [14, 14]
    assert answer.stretches[0].median == 123


def test_when_the_evenings_stop_mornings_are_held_against_mornings():
    mornings, evenings = days(43, 28, 130, 4), [*days(44, 14, 146, 4), *[None] * 14]
    answer, said = by_slot({"morning": mornings, "evening": evenings}, 14, unit="mmHg")
    assert doubts(answer) == {"other_slots": False}
    assert "Only one side has readings for evening, so those for morning are compared." in said
    alone = review(
        Log.from_pairs([(day(place), value) for place, value in enumerate(mornings)], Measure(unit="mmHg")),
        [Change(day(14))],
    )
    assert answer.answer.shift == alone.answer.shift
    assert answer.answer.sureness == "cannot tell"


def test_mornings_before_and_evenings_after_are_never_a_claim():
    slots = {"morning": [*days(45, 14, 130, 4), *[None] * 14], "evening": [*[None] * 14, *days(46, 14, 146, 4)]}
    answer, said = by_slot(slots, 14, unit="mmHg")
    assert doubts(answer)["other_slots"]
    assert answer.answer.sureness == "leaning"
    assert "Such days cannot be held against each other." in said


def test_mornings_and_evenings_on_both_sides_are_one_value_a_day():
    slots = {"morning": days(47, 28, 130, 4), "evening": days(48, 28, 138, 4)}
    answer, _ = by_slot(slots, 14, unit="mmHg")
    assert "other_slots" not in doubts(answer)
    assert 132 < answer.stretches[0].median < 136


SCORES = [7, 8, 6, 9, 7, 5, 8, 6, 7, 9, 6, 7, 8, 5]


def test_very_bad_days_gone_are_counted_beside_the_middle():
    after = [6 if score > 7 else score for score in SCORES * 2]
    answer, said = told(SCORES * 2 + after, 28, kind="score", aim="less")
    level = answer.answer.at_level
    assert (level.level, level.beyond, level.before, level.after) == (8.0, "or more", (10, 28), (0, 28))
    assert "Days at 8 or more: 10 of 28 before, 0 of 28 since." in said


def test_a_score_on_the_floor_counts_its_bad_days():
    before = [0, 0, 3, 0, 0, 5, 0] * 4
    answer, said = told(before + [0, 0, 0, 0, 0, 2, 0] * 4, 28, kind="score", aim="less")
    assert answer.answer.at_level.after[0] < answer.answer.at_level.before[0]
    assert "or more: 8 of 28 before, 4 of 28 since." in said
    assert said.startswith("It may have moved: 4 of 28 days since are at")


def test_where_more_is_wanted_the_low_scores_are_the_bad_days():
    low = [3, 5, 2, 6, 5, 7, 4] * 4
    answer, said = told(low + [value + 2 for value in low], 28, kind="score", aim="more")
    assert answer.answer.at_level.beyond == "or less"
    assert "Days at 3 or less: 8 of 28 before, 0 of 28 since." in said
    assert told([5] * 28, 14, kind="score")[0].answer.at_level is None


def test_all_days_inside_but_nearly_all_on_the_good_side():
    values = days(49, 28, 40, 8) + days(50, 28, 51, 5)
    answer, said = told(values, 28, kind="amount", unit="minutes", aim="more")
    outside = answer.answer.carried
    assert len(outside.below) + len(outside.above) <= 1
    assert said.startswith("It moved")
    assert f"{answer.answer.shift.better_days} of 28 days were above the old middle." in said


def test_good_and_bad_days_move_by_their_share():
    rng = np.random.default_rng(51)
    two_kinds = lambda share, count: np.where(rng.random(count) < share, 8.0, 2.0).tolist()  # noqa: E731
    answer, said = told(two_kinds(0.3, 42) + two_kinds(0.85, 42), 42, kind="score", aim="more")
    assert said.startswith("It moved")
    assert answer.answer.direction == "more"


@pytest.mark.parametrize(
    ("worth", "said_of_it"),
    [
        (30.0, "That is less than the 30 minutes you said is worth it."),
        (2.0, "That is at least the 2 minutes you said is worth it."),
        (10.0, "That may be more or less than the 10 minutes you said is worth it."),
    ],
)
def test_a_move_is_held_against_the_size_that_is_worth_it(worth, said_of_it):
    values = days(52, 28, 30, 6) + days(53, 28, 40, 6)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)], Measure(unit="minutes"))
    answer = review(log, [Change(day(28))], worth=worth)
    assert answer.answer.sureness == "as sure as a log can be"
    assert said_of_it in findings_of(answer).lines()


def test_not_enough_days_says_how_many_more():
    values = days(54, 14, 30, 8) + days(55, 5, 34, 8)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)], Measure(unit="minutes"))
    answer = review(log, [Change(day(14))], worth=14.0)
    needed = answer.answer.still_needed
    assert answer.answer.sureness not in ("fairly sure", "as sure as a log can be")
    assert needed.days > 0
    assert f"About {needed.days} days more" in " ".join(findings_of(answer).lines())


def test_a_slide_that_levels_off_is_told_as_both():
    slide = np.round(80 - 0.3 * np.arange(42) + np.random.default_rng(56).normal(0, 0.6, 42), 1)
    flat = np.round(67.2 + np.random.default_rng(57).normal(0, 0.6, 28), 1)
    _, said = told([*slide.tolist(), *flat.tolist()], 42, unit="kg", aim="less")
    assert "Before the change it was moving by about 2.1 kg lower a week; it has levelled off." in said


def test_a_goal_that_was_met_before_is_not_a_success_of_the_change():
    answer, said = told(days(58, 28, 125, 3) + days(59, 28, 125, 3), 28, unit="mmHg", aim=(110.0, 135.0))
    assert answer.answer.goal.before[0] >= 27
    assert "It was there on most of them before the change already." in said


def test_a_level_that_moved_short_of_its_goal_says_both():
    _, said = told(days(60, 28, 160, 4) + days(61, 28, 150, 4), 28, unit="mmHg", aim=(110.0, 135.0))
    assert said.startswith("It moved")
    assert "Inside the range you set on 0 of 28 days, 0 of 28 before." in said


def test_logging_that_stopped_tells_how_far_the_answer_reaches():
    today = FIRST_DAY + timedelta(28 + 9)
    _, said = told(days(62, 28, 30, 4), 14, today=today, unit="minutes")
    assert "Nothing is logged after 30 March, so this tells of the time up to then." in said
    _, still = told(days(62, 28, 30, 4), 14, today=FIRST_DAY + timedelta(30), unit="minutes")
    assert "Nothing is logged" not in still


def test_a_log_that_begins_with_its_change_has_no_before():
    answer, said = told(days(63, 28, 30, 4), 0, unit="minutes")
    assert answer.answer.sureness == "too early"
    assert "There is no day with a value before the change, so there is nothing to compare with." in said


def test_about_mid_march_gives_the_same_answer_for_every_day_of_that_week():
    values = days(64, 28, 30, 4) + days(65, 28, 40, 4)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)])
    words = {review(log, [Change(day(at))]).answer.sureness for at in range(25, 32)}
    assert words == {"as sure as a log can be"}
    sinces = {replace(review(log, [Change(day(at))]).answer.since, before_change=False) for at in range(25, 32)}
    assert len(sinces) == 1


def test_a_fuller_log_after_the_change_is_held_by_the_thinner_side():
    thin = [value if place % 3 == 0 else None for place, value in enumerate(days(66, 42, 30, 6))]
    full = days(67, 42, 34, 6)
    both, _ = told(days(66, 42, 30, 6) + full, 42, unit="minutes")
    thinned, said = told(thin + full, 42, unit="minutes")
    width = lambda one: one.answer.shift.high - one.answer.shift.low  # noqa: E731
    assert width(thinned) > 1.2 * width(both)
    assert "14 days before, 42 after." in said


def test_one_of_five_measures_moved_is_counted_among_five():
    values = days(68, 14, 30, 6) + days(69, 14, 36, 6)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)])
    alone = review(log, [Change(day(14))])
    among = review(log, [Change(day(14))], others=(0.4, 0.7, 0.2, 0.9))
    assert alone.answer.sureness == "fairly sure"
    assert among.answer.sureness == "leaning"
    assert "5 measures were looked at." in " ".join(findings_of(among).lines())


def test_a_first_day_left_out_as_the_clinic_says_is_in_no_number():
    values = [178, *days(70, 13, 142, 3), *days(71, 14, 141, 3)]
    answer, _ = told(values, 14, kinds=["set aside", *["value"] * 27], unit="mmHg")
    assert answer.stretches[0].observations == 13
    assert answer.stretches[0].above == ()
    assert answer.answer.sureness == "cannot tell"


def test_another_question_from_the_change_on_is_marked_and_never_a_claim():
    marked = Span(day(28), day(55), "device", "worst pain instead of average pain")
    answer, said = told(
        SCORES * 2 + [score + 2 for score in SCORES * 2], 28, spans=[marked], kind="score", aim="less"
    )
    assert doubts(answer)["device_mark"]
    assert answer.answer.sureness == "leaning"
    assert "(worst pain instead of average pain)" in said


def test_a_change_phased_in_over_four_weeks_compares_before_with_fully_in():
    ramp = [round(20 + 15 * at / 28 + noise) for at, noise in enumerate(days(72, 28, 0, 3))]
    values = days(73, 28, 20, 3) + ramp + days(74, 28, 35, 3)
    answer, said = told(values, 28, settle=28, kind="amount", unit="minutes", aim="more")
    assert [stretch.observations for stretch in answer.stretches] == [28, 28]
    assert said.startswith("It moved: 36 minutes on a middle day, 21 before.")


def test_five_bad_days_of_every_28_are_no_move():
    cycle = [3] * 23 + [7] * 5
    noise = np.random.default_rng(75).integers(0, 2, 112).tolist()
    values = [level + extra for level, extra in zip(cycle * 4, noise, strict=True)]
    answer, _ = told(values, 56, kind="score", aim="less")
    assert answer.answer.sureness == "cannot tell"


def test_a_log_typed_in_one_evening_is_not_told_to_stand_without_its_days():
    kinds = ["late"] * 26 + ["value"] * 2
    answer, said = told(days(76, 14, 20, 4) + days(77, 14, 35, 4), 14, kinds=kinds, unit="minutes")
    assert "26 of 28 days were typed days afterwards. Without them too few would be left to tell." in said
    assert answer.answer.sureness == "as sure as a log can be"


def test_a_change_still_to_come_is_named():
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(days(78, 28, 20))])
    answer = review(log, [Change(day(60), "earlier bed")], today=day(27))
    assert "A change is marked for 2 May 2031, which is still to come." in " ".join(findings_of(answer).lines())


def test_a_day_out_of_line_stands_beside_what_luck_puts_there():
    values = [*days(79, 27, 30, 3), 60.0]
    _, said = told(values, unit="minutes", kind="amount")
    assert said.startswith("1 day is out of line with the rest.")
    assert "Luck alone puts some day outside in about 30 of 100 steady logs of this length." in said


def test_settling_in_days_are_named_as_left_out():
    _, said = told(days(16, 18, 20, 4) + days(17, 38, 40, 4), 28, settle=5, unit="minutes")
    assert "The first 5 days after the change, to settle in, are in no number." in said
