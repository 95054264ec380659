from datetime import date

import numpy as np
import pytest

from analysis import AnalysisError, Change, Log, Measure


def test_entries_come_out_in_order_of_day_whatever_order_they_went_in():
    log = Log.from_pairs([(date(2031, 3, 5), 3), (date(2031, 3, 3), 1), (date(2031, 3, 4), 2)])
    assert log.values.tolist() == [1, 2, 3]
    assert np.diff(log.days).tolist() == [1, 1]


def test_what_is_no_number_is_a_blank_day():
    log = Log.from_pairs(
        [(date(2031, 3, place), value) for place, value in enumerate([None, float("nan"), float("inf"), 4], 1)]
    )
    assert log.kinds == ("blank", "blank", "blank", "value")
    assert np.isnan(log.values[:3]).all()


def test_several_a_day_are_ordered_by_slot():
    log = Log.from_pairs([(date(2031, 3, 3), 2, "morning"), (date(2031, 3, 3), 1, "evening")])
    assert log.slots == ("evening", "morning")


@pytest.mark.parametrize(
    ("kind", "rule"),
    [("amount", "sum"), ("count", "sum"), ("reading", "mean"), ("score", "mean"), ("yes/no", "mean")],
)
def test_each_kind_has_its_way_to_combine(kind, rule):
    assert Measure(kind=kind).combine_rule == rule
    assert Measure(kind=kind, combine="max").combine_rule == "max"


@pytest.mark.parametrize(
    "fields",
    [
        {"kind": "mood"},
        {"period": "hour"},
        {"missed": "none"},
        {"combine": "mode"},
        {"aim": "better"},
        {"aim": (5, 4)},
    ],
    ids=lambda fields: next(iter(fields)),
)
def test_a_measure_that_contradicts_itself_is_refused(fields):
    with pytest.raises(AnalysisError):
        Measure(**fields)


def test_settling_in_cannot_be_negative():
    with pytest.raises(AnalysisError, match="settle_negative"):
        Change(date(2031, 3, 3), settle_days=-1)


def test_columns_of_different_length_are_refused():
    with pytest.raises(AnalysisError, match="lengths_differ"):
        Log.from_columns(Measure(), [1, 2], [1.0], ["value", "value"])


def test_an_unknown_kind_of_day_is_refused():
    with pytest.raises(AnalysisError, match="unknown_word"):
        Log.from_columns(Measure(), [1], [1.0], ["sunny"])
