"""What the chart draws, from a review: places, shapes and words."""

from datetime import date

import numpy as np
import pytest

from analysis import Change, review
from analysis.batch.fences import FEWEST_TO_DRAW
from desktop.chart.picture import empty_picture, picture_of
from desktop.journal.records import Measure, Span
from desktop.wording.findings import findings_of
from desktop.wording.telling import speech_of
from tests.builders import day, number
from tests.desktop.chart.pictures import HIGH, LOW, drawn, journal_of, lines, reviewed, shapes

CHANGE = number(14)
MOVED = journal_of(LOW + HIGH, 14)
REVIEW = reviewed(MOVED)
PICTURE = picture_of(REVIEW, MOVED, 1)


def test_the_picture_reaches_from_the_first_day_to_the_last():
    assert (PICTURE.x0, PICTURE.x1) == (number(0) - 0.5, number(27) + 0.5)
    assert PICTURE.y0 <= 0 < max(HIGH) < PICTURE.y1


def test_each_stretch_has_its_fences_as_a_band_and_its_fourths_as_a_stronger_one():
    for side, stretch, x0, x1 in (
        ("before", REVIEW.stretches[0], number(0) - 0.5, CHANGE - 0.5),
        ("after", REVIEW.stretches[1], CHANGE - 0.5, number(27) + 0.5),
    ):
        outer, inner = (next(b for b in PICTURE.bands if b.side == side and b.inner == is_in) for is_in in (0, 1))
        assert (inner.x0, inner.x1, inner.y0, inner.y1) == (x0, x1, stretch.lower_fourth, stretch.upper_fourth)
        assert (outer.x0, outer.x1) == (x0, x1)
        assert outer.y0 == max(stretch.lower_fence, PICTURE.y0)
        assert outer.y1 == min(stretch.upper_fence, PICTURE.y1)


def test_each_median_is_a_line_over_its_own_days():
    before, after = (stretch.median for stretch in REVIEW.stretches)
    assert lines(PICTURE, "median", "before") == [(number(0) - 0.5, CHANGE - 0.5, before)]
    assert lines(PICTURE, "median", "after") == [(CHANGE - 0.5, number(27) + 0.5, after)]


def test_the_baselines_fences_are_carried_over_the_days_after_and_only_there():
    fences = (REVIEW.stretches[0].lower_fence, REVIEW.stretches[0].upper_fence)
    assert lines(PICTURE, "fence", "before") == [(number(0) - 0.5, CHANGE - 0.5, fence) for fence in fences]
    assert lines(PICTURE, "carried fence") == [(CHANGE - 0.5, number(27) + 0.5, fence) for fence in fences]
    assert lines(PICTURE, "carried median") == [(CHANGE - 0.5, number(27) + 0.5, REVIEW.stretches[0].median)]


def test_without_a_change_nothing_is_carried():
    alone = drawn(LOW)
    assert lines(alone, "carried fence") == lines(alone, "carried median") == []
    assert len(lines(alone, "median")) == 1
    assert alone.uprights == ()
    assert [label.text for label in alone.end_labels] == ["middle 20.5", "fence 2.5", "fence 38.5"]


def test_the_levels_are_named_with_their_numbers_at_the_right_end():
    speech, (before, after) = speech_of(REVIEW), REVIEW.stretches
    named = {label.text: label.y for label in PICTURE.end_labels}
    assert named == {
        f"middle {speech.number(after.median)}": after.median,
        f"was {speech.number(before.median)}": before.median,
        f"fence {speech.number(before.lower_fence)}": before.lower_fence,
        f"fence {speech.number(before.upper_fence)}": before.upper_fence,
    }
    assert [label.text for label in PICTURE.end_labels if label.strong] == [
        f"middle {speech.number(after.median)}"
    ]


def test_marks_are_round_before_square_after_and_pointed_outside():
    outside = REVIEW.answer.carried.above
    for x, shape in zip(PICTURE.marks.x, shapes(PICTURE), strict=True):
        assert shape == ("above" if x in outside else "before" if x < CHANGE else "after")
    assert outside


def test_a_day_far_below_points_down():
    low = drawn([*[60, 62, 61, 63, 59, 60, 62, 58, 61, 60], 12], kind="reading")
    assert shapes(low)[-1] == "below"
    assert low.marks.labels[10] == "12"
    assert "below the lower fence of" in low.marks.spoken[10]


def test_only_days_outside_carry_their_value():
    marks = PICTURE.marks
    speech = speech_of(REVIEW)
    assert marks.labels == {
        place: speech.number(marks.y[place]) for place, shape in enumerate(shapes(PICTURE)) if shape == "above"
    }


def test_too_many_labels_are_left_to_their_marks():
    steady = [20, 21, 22, 20, 21, 19, 20, 21, 22, 20, 21, 19, 20, 21]
    assert drawn([*steady, *[90] * 40], 14).marks.labels != {}
    assert drawn([*steady, *[90] * 41], 14).marks.labels == {}


def test_a_counted_zero_is_hollow_and_a_reading_of_zero_is_not():
    assert drawn([0, *LOW]).marks.is_zero.tolist() == [True, *[False] * 14]
    assert not drawn([0, *LOW], kind="reading").marks.is_zero.any()


def test_neighbouring_days_are_joined_and_never_across_a_blank():
    joined = drawn([20, 25, None, 18, 30]).marks.joined
    assert joined.tolist() == [False, True, False, True]


def test_settling_in_days_are_shown_and_not_counted():
    settled = drawn(LOW + HIGH, 14, 3)
    uncounted = settled.marks.x[[shape == "uncounted" for shape in shapes(settled)]]
    assert (uncounted - CHANGE).tolist() == [0, 1, 2]
    part = next(part for part in settled.lane if part.kind == "settling in")
    assert (part.x0, part.x1) == (CHANGE - 0.5, CHANGE + 2.5)
    assert lines(settled, "median", "after")[0][0] == CHANGE + 2.5
    assert settled.uprights == (CHANGE - 0.5,)


def test_days_set_aside_are_crosses_at_the_end_of_the_marks():
    aside = drawn(LOW, kinds={4: "set aside"})
    assert shapes(aside)[-1] == "set aside"
    assert (aside.marks.x[-1], aside.marks.y[-1]) == (number(4), 15)
    assert aside.marks.spoken[-1] == "Friday 7 March 2031: 15 minutes, set aside, not counted."
    assert number(4) not in aside.marks.x[:-1]


def test_days_not_in_the_numbers_and_late_ones_have_a_tick_each():
    ticked = drawn([20, None, "ill", "away", 22, 25], kinds={4: "late"})
    assert sorted((tick.x - number(0), tick.kind) for tick in ticked.ticks) == [
        (1, "blank"), (2, "ill"), (3, "away"), (4, "late"),
    ]  # fmt: skip


def test_blank_days_have_no_tick_where_a_point_is_a_week():
    weekly = drawn([20, None, *LOW], period="week")
    assert [tick.kind for tick in weekly.ticks] == []


def test_a_week_stands_in_its_middle():
    assert drawn(LOW, period="week").marks.x.tolist() == [number(3), number(10)]


@pytest.mark.parametrize("days", [1, FEWEST_TO_DRAW - 1, FEWEST_TO_DRAW])
def test_bands_wait_until_there_are_enough_days(days):
    assert bool(drawn(LOW[:days]).bands) == (days >= FEWEST_TO_DRAW)
    after = drawn(LOW + HIGH[:days], 14)
    assert any(band.side == "after" for band in after.bands) == (days >= FEWEST_TO_DRAW)
    assert bool(lines(after, "carried fence"))


def test_equal_days_have_a_median_and_no_fence():
    equal = drawn([5] * 14)
    assert len(lines(equal, "median")) == 1
    assert lines(equal, "fence") == []
    assert equal.y0 < 5 < equal.y1


def test_a_fence_beyond_the_picture_is_told_in_words_at_the_edge():
    wide = [10, 90, 12, 88, 14, 86, 11, 89, 13, 87, 50, 52]
    whole = drawn(wide, kind="reading")
    (above, upper), (below, lower) = whole.edge_words
    assert (above, below) == ("above", "below")
    assert upper.startswith("the upper fence ")
    assert upper.endswith(", above this picture")
    assert lower.startswith("the lower fence −")
    assert [text for _, text in drawn(wide, kind="amount").edge_words] == [upper]
    assert [text.split(" fence")[0] for _, text in drawn(wide + wide, 12).edge_words] == ["old upper", "own upper"]


@pytest.mark.parametrize("top", range(24, 80, 4))
def test_a_fence_is_either_in_the_picture_or_told_to_be_beyond_it(top):
    """Room is made for the words, and a fence that this room would hold is drawn in place of them."""
    values = [*[10, 12, 14, 16, 18, 20, 22, 24, 26, 28], top]
    journal = journal_of(values, kind="reading")
    one = reviewed(journal)
    picture, upper = picture_of(one, journal, 1), one.stretches[0].upper_fence
    told = [text for edge, text in picture.edge_words if edge == "above"]
    drawn_at = [y for _, _, y in lines(picture, "fence") if y == upper]
    assert (len(told), len(drawn_at)) == ((1, 0) if upper > picture.y1 else (0, 1))


def test_the_fence_line_is_not_drawn_where_it_is_told_in_words():
    wide = [10, 90, 12, 88, 14, 86, 11, 89, 13, 87, 50, 52]
    assert lines(drawn(wide, kind="reading"), "fence") == []


def test_amounts_begin_at_zero_and_readings_do_not():
    assert drawn([60 + value for value in LOW]).y0 <= 0
    assert drawn([100 + value for value in LOW], kind="reading").y0 > 50
    assert drawn([value - 30 for value in LOW]).y0 < -20


def test_the_axis_names_both_ends_in_words():
    assert PICTURE.axis_words == ("less", "minutes", "more")
    assert drawn(LOW, kind="reading", unit="", title="Balance").axis_words == ("lower", "Balance", "higher")


def test_the_lane_names_the_stretches_and_the_spans():
    spans = [Span(1, day(3), day(5), "ill", "cold"), Span(2, day(20), day(20), "away")]
    lane = [(part.kind, part.text, part.x0, part.x1) for part in drawn(LOW + HIGH, 14, spans=spans).lane]
    assert lane == [
        ("stretch", "baseline, 11 days", number(0) - 0.5, CHANGE - 0.5),
        ("change", "off the bus one stop early", CHANGE - 0.5, number(27) + 0.5),
        ("span", "cold", number(3) - 0.5, number(5) + 0.5),
        ("span", "away", number(20) - 0.5, number(20) + 0.5),
    ]


@pytest.mark.parametrize(
    ("values", "change", "sureness"),
    [
        (LOW + HIGH, 14, "as sure as a log can be"),
        ([30, 7, 22, 17, 18, 19, 10, 19, 16, 37, 26, 23, 24, 22, 20, 23, 27], 10, "leaning"),
        (LOW + LOW[::-1], 14, "cannot tell"),
        (LOW + HIGH[:3], 14, "too early"),
    ],
)
def test_where_it_began_is_shown_only_from_leaning_up(values, change, sureness):
    journal = journal_of(values, change)
    one = reviewed(journal)
    since, bracket = one.answer.since, picture_of(one, journal, 1).bracket
    assert one.answer.sureness == sureness
    if sureness in ("too early", "cannot tell"):
        assert bracket is None
    else:
        assert (bracket.x0, bracket.x1) == (since.first - 0.5, since.last + 0.5)
        assert bracket.text == "began about here"


def test_every_mark_reads_out_its_day_value_and_place():
    above = shapes(PICTURE).index("above")
    fence = speech_of(REVIEW).number(REVIEW.stretches[0].upper_fence)
    assert PICTURE.marks.spoken[0] == "Monday 3 March 2031: 20 minutes."
    assert PICTURE.marks.spoken[above].endswith(f" minutes, above the upper fence of {fence}.")
    assert len(PICTURE.marks.spoken) == len(PICTURE.marks.x)
    assert drawn(LOW, period="week", kind="reading").marks.spoken[0].startswith("The week of 3 March: ")


def test_the_whole_chart_is_told_with_the_numbers_of_the_review():
    speech, (before, after) = speech_of(REVIEW), REVIEW.stretches
    told = PICTURE.told
    assert told.startswith("Chart of Exercise by day, 3 March to 30 March, 28 values.")
    for which, stretch in (("Baseline", before), ("After off the bus one stop early", after)):
        assert (
            f"{which}: 14 days, middle {speech.with_unit(stretch.median)}, middle half "
            f"{speech.number(stretch.lower_fourth)} to {speech.with_unit(stretch.upper_fourth)}."
        ) in told
    assert f"Outside the fences: {len(REVIEW.answer.carried.above)} above, 0 below." in told
    assert told.endswith(findings_of(REVIEW).headline)


def test_an_empty_picture_has_four_weeks_and_no_mark():
    for measure in (None, Measure(1, 0, "Sleep", "hours")):
        empty = empty_picture(measure, date(2031, 3, 30))
        assert len(empty.marks.x) == 0
        assert empty.x1 - empty.x0 == 28
        assert empty.told == "There is no value in this log yet."


def test_three_stretches_have_a_line_each_and_the_baselines_fences_over_both():
    journal = journal_of(LOW + HIGH + LOW, 14)
    changes = [*journal.analysis_changes(1), Change(day(28), "back again")]
    three = picture_of(review(journal.log_of(1), changes), journal, 1)
    assert len(lines(three, "median")) == 3
    assert lines(three, "carried fence")[0][:2] == (CHANGE - 0.5, number(41) + 0.5)
    assert three.uprights == (CHANGE - 0.5, number(28) - 0.5)
    assert [label.text.split()[0] for label in three.end_labels].count("middle") == 1


def test_every_place_is_a_number_inside_the_picture():
    for values in (LOW, LOW + HIGH, [1e9, -1e9, *LOW], [0.001, 0.002, 0.003], [5]):
        one = drawn(values, kind="reading")
        assert np.isfinite([one.x0, one.x1, one.y0, one.y1]).all()
        assert one.y0 < np.min(one.marks.y) <= np.max(one.marks.y) < one.y1
        assert all(one.y0 <= line.y <= one.y1 for line in one.lines)


@pytest.mark.parametrize(
    ("days", "change", "period", "said"),
    [
        (100, 50, "month", "Not counted, since they are not whole: March 2031, April 2031 and June 2031."),
        (80, None, "month", "Not counted, since they are not whole: March 2031 and May 2031."),
        (28, 14, "week", ""),
        (30, 14, "week", "Not counted, since it is not whole: the week of 31 March."),
        (28, 17, "week", "Not counted, since it is not whole: the week of 17 March."),
        (100, 50, "day", ""),
    ],
)
def test_periods_that_are_cut_are_named(days, change, period, said):
    picture = drawn([20 + place % 7 for place in range(days)], change, period=period)
    assert picture.left_out == said
    assert said in picture.told
