"""Units, written by hand."""

import pytest

from desktop.exchange.units import conversion, convert_time, impossible, known_unit, unit_in_name


@pytest.mark.parametrize(
    ("text", "unit"),
    [
        ("minutes", "min"),
        ("Min.", "min"),
        ("Stunden", "h"),
        ("LBS", "lb"),
        ("mmHg", "mmHg"),
        ("hugs", ""),
        ("", ""),
    ],
)
def test_a_unit_has_one_spelling(text, unit):
    assert known_unit(text) == unit


@pytest.mark.parametrize(
    ("name", "unit"), [("Minutes walked", "min"), ("hours_slept", "h"), ("Weight", ""), ("hours and minutes", "")]
)
def test_a_unit_of_time_may_stand_in_a_name(name, unit):
    assert unit_in_name(name) == unit


@pytest.mark.parametrize(
    ("value", "unit", "wanted", "result"),
    [
        (90, "min", "h", 1.5),
        (2, "h", "min", 120),
        (5, "min", "min", 5),
        (5, "kg", "h", None),
        (5, "h", "kg", None),
    ],
)
def test_only_minutes_and_hours_are_converted(value, unit, wanted, result):
    assert convert_time(value, unit, wanted) == result


@pytest.mark.parametrize(
    ("value", "unit", "one_day", "reason"),
    [
        (-1, "min", True, "negative"),
        (-1, "", True, ""),
        (-1, "°C", True, ""),
        (24, "h", True, ""),
        (25, "h", True, "more than a day"),
        (25, "h", False, ""),
        (1441, "min", True, "more than a day"),
        (1441, "", True, ""),
    ],
)
def test_what_cannot_be_is_told(value, unit, one_day, reason):
    assert impossible(value, unit, one_day=one_day) == reason


@pytest.mark.parametrize(
    ("value", "unit", "wanted", "is_then"),
    [
        (80, "kg", "lb", 176.3698),
        (12.5, "stone", "kg", 79.3787),
        (2.5, "hours", "minutes", 150),
        (5, "miles", "km", 8.04672),
        (98.6, "°F", "celsius", 37),
        (37, "°C", "°F", 98.6),
        (100, "kcal", "kJ", 418.4),
    ],
)
def test_a_number_is_turned_into_another_unit_of_its_kind(value, unit, wanted, is_then):
    factor, offset = conversion(unit, wanted)
    assert factor * value + offset == pytest.approx(is_then, abs=1e-4)


@pytest.mark.parametrize(("unit", "wanted"), [("kg", "kilograms"), ("kg", "minutes"), ("beans", "kg"), ("", "")])
def test_no_number_is_turned_where_no_conversion_is_known(unit, wanted):
    assert conversion(unit, wanted) is None
