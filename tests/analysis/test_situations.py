"""Situations from people's weeks: what the answer must say, the sentence included."""

from datetime import date, timedelta

import numpy as np
import pytest

from analysis import Change, Log, Measure, Span, review
from analysis.answer import Switches
from analysis.questions.did_it_move import CLAIMS
from desktop.wording.findings import findings_of
from tests.builders import FIRST_DAY, day, number


def days(seed, count, level, spread=6.0):
    """Invented days around a level, whole numbers."""
    return np.round(np.random.default_rng(seed).normal(level, spread, count)).tolist()


def told(values, change=None, *, kinds=None, spans=(), settle=0, today=None, first=FIRST_DAY, **measure):
    """The review of a daily log and everything it says."""
    log = Log.from_columns(
        Measure(**measure),
        [first.toordinal() + place for place in range(len(values))],
        [float("nan") if value is None else value for value in values],
        kinds or ["blank" if value is None else "value" for value in values],
        spans=spans,
    )
    changes = [] if change is None else [Change(first + timedelta(change), "stretch routine", settle)]
    answer = review(log, changes, today=today)
    return answer, " ".join(findings_of(answer).lines())


def doubts(answer):
    return {doubt.name: doubt.alters for doubt in answer.doubts}


def test_a_baseline_of_five_days_is_too_thin_to_judge():
    answer, said = told(days(1, 5, 20) + days(2, 28, 35), 5, unit="minutes", kind="amount")
    assert answer.answer.sureness == "too early"
    assert "There are 5 days with a value before the change and 28 after." in said


def test_four_of_28_days_outside_stand_beside_what_luck_would_make():
    values = [18, 22, 20, 25, 19, 23, 21] + [20, 22, 21, 40, 19] * 5 + [20, 21, 22]
    answer, said = told(values, 7, unit="minutes", kind="amount")
    assert len(answer.answer.carried.above) == 5
    assert "5 of the 28 days since are outside the old fences, all high. About 3 would be by luck alone." in said


def test_one_day_outside_is_never_an_answer():
    values = days(3, 28, 30) + days(4, 28, 30)
    values[40] = 95
    answer, said = told(values, 28, unit="minutes", kind="amount")
    assert answer.answer.sureness == "cannot tell"
    assert "This log cannot tell if it moved." in said


def test_a_keen_first_week_is_named():
    values = days(5, 7, 48, 4) + days(6, 21, 36, 4) + days(7, 28, 36, 4)
    answer, said = told(values, 28, kind="amount", unit="minutes", aim="more")
    assert "first_days" in doubts(answer)
    assert "The first week of the log was higher than the rest of the baseline" in said


def test_a_log_that_was_climbing_already_is_told_as_a_slope():
    rising = [20 + 0.5 * place for place in range(84)]
    values = np.round(np.array(rising) + np.random.default_rng(8).normal(0, 4, 84)).tolist()
    answer, said = told(values, 28, kind="amount", unit="minutes", aim="more")
    assert doubts(answer)["slope_before"]
    assert answer.answer.sureness == "leaning"
    slope = next(dict(doubt.fields)["slope"] for doubt in answer.doubts if doubt.name == "slope_before")
    assert slope == pytest.approx(0.5, abs=0.12)
    assert said.startswith(f"It was moving all along, by about {7 * slope:.1f} minutes more a week.")


def test_a_change_after_the_worst_week_of_eight_is_told_so():
    values = days(9, 49, 40, 5) + days(10, 7, 28, 3) + days(11, 28, 40, 5)
    answer, said = told(values, 56, kind="amount", unit="minutes", aim="more")
    assert "worst_spell" in doubts(answer)
    assert "The change came after the lowest week of 8. Some way back would likely have come anyway." in said


def test_a_baseline_of_weekdays_alone_is_named():
    week = [20, 22, 21, 23, 19, None, None]
    full = [21, 20, 22, 21, 20, 40, 42]
    answer, said = told(week * 3 + full * 4, 21, unit="minutes")
    assert "weekdays_only" in doubts(answer)
    assert "The baseline holds no weekend day; the days after do." in said


def test_equal_baseline_days_leave_no_spread_to_measure_with():
    answer, said = told([5.0] * 14 + days(12, 14, 7, 1), 14, kind="score")
    assert "no_spread" in doubts(answer)
    assert "No spread to measure with" in said


def test_sessions_a_week_are_counted_as_days_and_not_by_a_middle_of_zero():
    three, five = [0, 40, 0, 35, 0, 30, 0], [30, 40, 0, 35, 30, 30, 0]
    answer, said = told(three * 4 + five * 4, 28, kind="amount", missed="zero", unit="minutes")
    assert answer.answer.how_often.before == (12, 28)
    assert said.startswith("It moved: on 20 of 28 days there was some, on 12 of 28 before.")


def test_one_session_a_week_has_no_fences_and_no_alarms():
    answer, _ = told([0, 0, 0, 40, 0, 0, 0] * 8, 28, kind="amount", missed="zero", unit="minutes")
    assert answer.stretches[0].lower_fence is None
    assert answer.answer.carried is None
    assert answer.answer.sureness == "cannot tell"


def test_a_blank_pressure_is_never_a_zero():
    values = [139, None, 141, None, 138, 140, 142, 137, None, 139, None, 141, 140, 138]
    answer, _ = told(values, unit="mmHg")
    assert answer.stretches[0].blank == 4
    assert answer.stretches[0].median > 135


def test_two_readings_a_day_are_one_day_of_evidence():
    pairs = [(day(place), 120 + place % 5, slot) for place in range(28) for slot in ("morning", "evening")]
    answer = review(Log.from_pairs(pairs), [Change(day(14))])
    assert [stretch.observations for stretch in answer.stretches] == [14, 14]


def test_a_new_monitor_at_the_change_never_makes_a_claim():
    device = Span(day(28), day(55), "device", "new monitor")
    answer, said = told(days(13, 28, 145) + days(14, 28, 133), 28, spans=[device], unit="mmHg")
    assert doubts(answer)["device_mark"]
    assert answer.answer.sureness == "leaning"
    assert "Another device or way of measuring is marked (new monitor)." in said


def test_values_rounded_to_fives_say_what_they_cannot_show():
    values = [float(5 * round(value / 5)) for value in days(15, 56, 40, 12)]
    answer, said = told(values, 28, kind="amount", unit="minutes")
    assert "round_numbers" in doubts(answer)
    assert "a difference under 5 minutes cannot be seen" in said


def test_a_move_that_began_before_the_change_is_dated_before_it():
    answer, said = told(days(16, 18, 20, 4) + days(17, 38, 40, 4), 28, kind="amount", unit="minutes")
    assert answer.answer.since.before_change
    assert "That is before the day you marked, 31 March." in said


def test_settling_in_days_are_shown_and_not_counted():
    values = days(18, 14, 20, 3) + [90.0] * 5 + days(19, 14, 20, 3)
    answer, _ = told(values, 14, settle=5, kind="amount", unit="minutes")
    assert answer.stretches[1].observations == 14
    assert not answer.answer.carried.above


def test_several_changes_in_one_day_are_judged_together_and_never_alter():
    values = days(20, 28, 5, 1) + days(21, 28, 8, 1)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)])
    answer = review(log, [Change(day(28), "no coffee"), Change(day(28), "earlier bed")])
    assert doubts(answer)["several_changes"] is False
    assert answer.answer.sureness == "as sure as a log can be"


def test_two_changes_four_days_apart_cannot_be_told_apart():
    values = days(22, 28, 20) + days(23, 32, 35)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)])
    answer = review(log, [Change(day(28), "class"), Change(day(32), "new shoes")])
    assert "close_change" in doubts(answer)


def test_on_off_on_counts_the_switches_it_moved_with():
    off, on = (days(seed, 14, 30, 3) for seed in (24, 25)), (days(seed, 14, 45, 3) for seed in (26, 27))
    values = next(off) + next(on) + next(off) + next(on)
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)])
    answer = review(log, [Change(day(14), "desk"), Change(day(28), "no desk"), Change(day(42), "desk")])
    assert answer.switches == Switches(3, 3, to_and_fro=True)
    said = " ".join(findings_of(answer).lines())
    assert "3 changes are marked. It moved with 3 of 3 changes, to and fro." in said


def test_a_move_of_three_weeks_is_told_as_faded():
    values = days(28, 21, 20, 5) + days(29, 20, 36, 5) + days(30, 36, 20, 5)
    answer, said = told(values, 21, kind="amount", unit="minutes")
    assert answer.answer.still.state == "faded"
    assert said.startswith("It may have moved at first. If so, it has gone back.")
    assert "Most likely since" not in said


def test_a_move_that_came_late_is_told_so():
    values = days(31, 28, 20, 4) + days(32, 21, 20, 4) + days(33, 28, 38, 4)
    answer, said = told(values, 28, kind="amount", unit="minutes")
    assert answer.answer.still.state == "come late"
    assert "It came late" in said


def test_the_same_middle_but_steadier_is_its_own_sentence():
    answer, said = told(days(34, 28, 420, 60) + days(35, 28, 420, 20), 28, unit="minutes")
    assert answer.answer.spread_change.word == "steadier"
    assert "The days are steadier than before." in said


def test_the_same_middle_but_more_scattered_is_told_too():
    _, said = told(days(36, 28, 420, 20) + days(37, 28, 420, 60), 28, unit="minutes")
    assert "The days are more scattered than before." in said


def test_nothing_seen_has_a_size():
    answer, said = told(days(38, 28, 30) + days(39, 28, 30), 28, kind="amount", unit="minutes")
    assert f"it was by less than {answer.answer.bound:g} minutes a day" in said


def test_wanting_less_is_said_in_words_and_never_in_red():
    _, said = told(days(40, 28, 7, 1) + days(41, 28, 4, 1), 28, kind="score", aim="less")
    assert "Lower, which is the way you wanted." in said


def test_days_within_a_band_are_counted_before_and_after():
    answer, said = told(days(42, 28, 35, 10) + days(43, 28, 50, 4), 28, kind="amount", aim=(40.0, 60.0))
    before, after = answer.answer.goal.before, answer.answer.goal.after
    assert f"Inside the range you set on {after[0]} of 28 days, {before[0]} of 28 before." in said


def test_weekends_that_differ_are_taken_off_before_comparing():
    def weeks(seed, level):
        values = days(seed, 28, level, 3)
        return [value + (25 if place % 7 >= 5 else 0) for place, value in enumerate(values)]

    answer, said = told(weeks(44, 30) + weeks(45, 38), 28, kind="amount", unit="minutes")
    assert answer.answer.weekday_rhythm.used
    assert answer.answer.sureness == "as sure as a log can be"
    assert "Weekends differ from weekdays here; that is taken off." in said


def test_an_away_span_is_not_counted():
    kinds = ["value"] * 20 + ["away"] * 8 + ["value"] * 28
    values = days(46, 20, 30) + [None] * 8 + days(47, 28, 30)
    answer, _ = told(values, 28, kinds=kinds, kind="amount", missed="zero", unit="minutes")
    assert answer.stretches[0].observations == 20
    assert answer.stretches[0].blank == 8


def test_more_blank_days_after_the_change_are_named_with_their_effect():
    after = [None if place % 3 == 0 else value for place, value in enumerate(days(48, 56, 34))]
    answer, said = told(days(49, 28, 30) + after, 28, unit="minutes", aim="more")
    assert "missing_more" in doubts(answer)
    assert "More days are blank since the change: 19 of 56, 0 of 28 before." in said


def test_a_dozen_days_typed_on_one_evening_are_counted_with_and_without():
    kinds = ["value"] * 28 + ["late"] * 12 + ["value"] * 16
    answer, said = told(days(50, 28, 20) + days(51, 28, 36), 28, kinds=kinds, unit="minutes")
    assert doubts(answer)["late_entries"] is False
    assert "12 of 56 days were typed days afterwards. Without them the answer is the same." in said


def test_thirty_written_five_times_in_a_row_is_asked_about_once():
    values = days(52, 10, 25) + [30.0] * 6 + days(53, 12, 25) + days(54, 28, 25)
    answer, said = told(values, 28, kind="amount", unit="minutes")
    assert "equal_in_row" in doubts(answer)
    assert "30 minutes stands there 6 days in a row" in said


def test_three_weeks_lost_around_the_change_leave_the_day_open():
    values = days(55, 21, 20, 4) + [None] * 21 + days(56, 21, 38, 4)
    answer, _ = told(values, 31, unit="minutes")
    assert answer.answer.since.likely in (number(20), number(42))
    assert answer.answer.sureness == "as sure as a log can be"


def test_a_season_behind_a_baseline_of_a_whole_year_is_no_move():
    """Nothing changed; the weeks after are those in which it is highest every year."""
    rng = np.random.default_rng(82)
    year = [70 + 3 * np.cos(2 * np.pi * place / 365) + rng.normal(0, 2) for place in range(365 + 28)]
    answer, said = told(year, 365, unit="beats")
    assert "season" in doubts(answer)
    assert answer.answer.sureness not in CLAIMS
    assert "Held against the same weeks of the year before, the answer is not sure." in said


def test_a_move_beyond_the_same_weeks_of_the_year_before_stands():
    rng = np.random.default_rng(83)
    year = [70 + 3 * np.cos(2 * np.pi * place / 365) + rng.normal(0, 2) for place in range(365 + 28)]
    answer, said = told(year[:365] + [value - 8 for value in year[365:]], 365, unit="beats")
    assert answer.answer.sureness == "as sure as a log can be"
    assert "The days since are of one part of the year, those before are of all of it." in said


def test_a_year_before_and_a_year_after_are_of_no_season():
    answer, _ = told(days(80, 400, 30) + days(81, 320, 30), 400, unit="minutes")
    assert "season" not in doubts(answer)


def test_stretches_months_apart_name_the_season():
    values = days(57, 90, 140) + days(58, 150, 132)
    _, said = told(values, 90, unit="mmHg")
    assert "so the season may be part of the difference" in said


@pytest.mark.parametrize(("period", "whole"), [("week", 13), ("month", 3)])
def test_an_unfinished_period_is_not_compared(period, whole):
    # 1 January to 10 April 2031, a Wednesday to a Thursday.
    values = [(date(2031, 1, 1) + timedelta(place), 10.0) for place in range(100)]
    answer = review(Log.from_pairs(values, Measure(kind="amount", period=period)))
    assert answer.stretches[0].observations == whole
