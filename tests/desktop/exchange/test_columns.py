"""The columns of a table: names, units, several values a day, and what only the person can know."""

from datetime import date

import pytest

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import choose_column
from tests.desktop.exchange.reading import FIRST, SECOND, aside, pairs, read, refusal


def test_a_header_that_stands_twice_gets_a_number():
    reading = read("day,minutes,minutes\n2024-01-01,5,6\n")
    assert reading.candidates == ("minutes", "minutes 2")


def test_an_apostrophe_against_formulas_is_taken_off_a_name():
    assert read("day,'=minutes\n2024-01-01,5\n").candidates == ("=minutes",)


@pytest.mark.parametrize(
    ("header", "name", "unit"),
    [
        ("minutes (min)", "minutes", "min"),
        ("Weight [kg]", "Weight", "kg"),
        ("Weight (lbs)", "Weight", "lb"),
        ("BP upper [mmHg]", "BP upper", "mmHg"),
        ("Pressure (mm[Hg])", "Pressure", "mmHg"),
        ("Pain (/10)", "Pain", "/10"),
        ("Weight (morning)", "Weight (morning)", ""),
        ("minutes", "minutes", ""),
    ],
)
def test_a_known_unit_in_the_header_is_split_off(header, name, unit):
    column = read(f"day,{header}\n2024-01-01,5\n").columns[0]
    assert (column.name, column.unit) == (name, unit)


def test_the_unit_most_cells_have_is_the_unit_of_the_column():
    reading = read("day,weight\n2024-01-01,71 kg\n2024-01-02,72 kg\n2024-01-03,158 lbs\n2024-01-04,73\n")
    assert reading.columns[0].unit == "kg"
    assert aside(reading) == [(4, "other unit")]


def test_minutes_and_hours_are_brought_to_the_unit_of_the_header():
    reading = read("day,sleep (h)\n2024-01-01,7.5\n2024-01-02,6h45\n2024-01-03,420 min\n2024-01-04,8:00\n")
    assert [value for _, value in pairs(reading)] == [7.5, 6.75, 7.0, 8.0]


def test_durations_alone_are_minutes_and_said_to_be_durations():
    column = read("day,walk\n2024-01-01,1:05\n2024-01-02,0:45\n2024-01-03,0\n").columns[0]
    assert ([value.value for value in column.values], column.unit, column.durations) == ([65, 45, 0], "min", True)


def test_durations_among_numbers_without_a_unit_are_not_guessed():
    reading = read("day,sleep\n2024-01-01,7\n2024-01-02,6h45\n2024-01-03,8\n")
    assert aside(reading) == [(3, "duration without unit")]


def test_a_column_of_pairs_becomes_two():
    reading = read("day,BP (mmHg)\n2024-01-01,128/79\n2024-01-02,131/82\n2024-01-03,\n2024-01-04,140\n")
    assert pairs(reading, "BP upper") == [(FIRST, 128), (SECOND, 131)]
    assert pairs(reading, "BP lower") == [(FIRST, 79), (SECOND, 82)]
    assert aside(reading) == [(5, "not a pair")]
    assert {(column.unit, column.pair) for column in reading.columns} == {("mmHg", "BP")}


def test_a_pair_with_the_lower_number_first_is_set_aside():
    assert aside(read("day,BP\n2024-01-01,128/79\n2024-01-02,79/128\n")) == [(3, "pair reversed")]


def test_a_column_of_pairs_asked_for_by_its_own_name_is_a_question():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,BP\n2024-01-01,128/79\n"), "BP")
    assert caught.value.reason == "which value column"
    assert caught.value.fields["choices"] == ["BP upper", "BP lower"]


def test_several_values_of_a_day_are_all_kept_and_listed():
    reading = read("day,minutes\n2024-01-01,20\n2024-01-01,10\n2024-01-01,5\n2024-01-02,30\n")
    assert [(value.slot, value.value) for value in reading.columns[0].values] == [
        ("", 20),
        ("2", 10),
        ("3", 5),
        ("", 30),
    ]
    assert reading.several_a_day == (FIRST,)


def test_one_value_a_day_has_no_slot_even_with_a_time():
    reading = read("day,pulse\n2024-01-01T08:00,60\n2024-01-02T20:00,61\n")
    assert [value.slot for value in reading.columns[0].values] == ["", ""]


@pytest.mark.parametrize(
    "text",
    [
        pytest.param(
            "day,pulse\n2024-01-01T08:00,60\n2024-01-01 12:00,61\n2024-01-01 15:00,62\n2024-01-01 15:10,63\n"
            "2024-01-02 11:59,64\n",
            id="beside the day",
        ),
        pytest.param(
            "day,time,pulse\n2024-01-01,08:00,60\n2024-01-01,12:00,61\n2024-01-01,15:00,62\n"
            "2024-01-01,15:10,63\n2024-01-02,11:59,64\n",
            id="in a column of its own",
        ),
        pytest.param(
            "day,at,pulse\n2024-01-01,8:00 am,60\n2024-01-01,12:00 pm,61\n2024-01-01,3:00 pm,62\n"
            "2024-01-01,3:10 pm,63\n2024-01-02,11:59 am,64\n",
            id="with am and pm",
        ),
    ],
)
def test_times_of_day_become_slots_where_days_have_several_values(text):
    values = read(text).columns[0].values
    assert [value.slot for value in values] == ["morning", "midday", "evening", "evening 2", "morning"]


def test_a_column_named_time_that_is_the_only_one_holds_the_values():
    assert pairs(read("day,time\n2024-01-01,1:05\n")) == [(FIRST, 65)]


@pytest.mark.parametrize(
    ("text", "reason", "choices"),
    [
        pytest.param("day,n\n03/04/2026,5\n", "which day order", ["dmy", "mdy"], id="day order"),
        pytest.param(
            "day,n\n13/04/2026,5\n04/13/2026,5\n", "which day order", ["dmy", "mdy"], id="contradictory order"
        ),
        pytest.param("day,n\n24-03-15,5\n", "which day order", ["dmy", "ymd"], id="order of a short year"),
        pytest.param("day,n\n3-Mar-24,5\n", "which century", [1900, 2000], id="century"),
        pytest.param('day,n\n2026-04-03,"1,234"\n', "which decimal mark", [".", ","], id="thousand or decimal"),
        pytest.param("day;n\n2026-04-03;1.234\n", "which decimal mark", [".", ","], id="the same with a point"),
        pytest.param("day;n\n2026-04-03;1.5\n2026-04-04;1,5\n", "which decimal mark", [".", ","], id="both"),
        pytest.param(
            "start,end,n\n2026-04-03,2026-04-05,5\n", "which day column", ["start", "end"], id="two day columns"
        ),
        pytest.param("a;b\n1871;1600\n1873;1700\n", "which day column", ["a", "b"], id="two columns of years"),
        pytest.param("when,n\n45292,5\n45293,6\n", "which day column", ["when"], id="spreadsheet numbers"),
        pytest.param("when,n\n20240101,5\n20240102,6\n", "which day column", ["when"], id="eight digits"),
    ],
)
def test_what_is_open_is_asked_and_nothing_is_read(text, reason, choices):
    error = refusal(text)
    assert (error.reason, error.fields["choices"]) == (reason, choices)


@pytest.mark.parametrize(
    ("text", "answers", "expected"),
    [
        pytest.param("day,n\n01/02/2024,5\n", {"day_order": "dmy"}, (date(2024, 2, 1), 5), id="day first"),
        pytest.param("day,n\n01/02/2024,5\n", {"day_order": "mdy"}, (date(2024, 1, 2), 5), id="month first"),
        pytest.param(
            "day,n\n24-03-15,5\n", {"day_order": "ymd", "century": 2000}, (date(2024, 3, 15), 5), id="short year"
        ),
        pytest.param("day;n\n2024-01-01;1.234\n", {"decimal": ","}, (FIRST, 1234), id="thousands"),
        pytest.param("day;n\n2024-01-01;1.234\n", {"decimal": "."}, (FIRST, 1.234), id="decimals"),
        pytest.param("a,b,n\n2023-12-31,2024-01-01,5\n", {"day_column": "b"}, (FIRST, 5), id="day column"),
        pytest.param("when,n\n45292,5\n", {"day_column": "When"}, (FIRST, 5), id="spreadsheet numbers"),
        pytest.param("when,n\n20240101,5\n", {"day_column": "when"}, (FIRST, 5), id="eight digits"),
    ],
)
def test_an_answer_settles_what_was_open(text, answers, expected):
    assert pairs(read(text, **answers), "n") == [expected]


def test_an_answer_does_not_overrule_what_the_cells_prove():
    assert pairs(read("day;n\n2024-01-01;7,5\n", decimal=".")) == [(FIRST, 7.5)]


def test_a_cell_with_the_other_decimal_mark_is_set_aside_once_the_mark_is_settled():
    reading = read("day;n\n2024-01-01;7.5\n2024-01-02;7,5\n", decimal=".")
    assert aside(reading) == [(3, "other decimal mark")]


def test_two_digit_years_beside_years_written_out_take_their_century():
    reading = read("day,n\n31/12/2023,4\n01/01/24,5\n02/01/24,6\n", day_order="dmy")
    assert [day.year for day, _ in pairs(reading)] == [2023, 2024, 2024]


def test_several_value_columns_are_all_read_when_none_is_named():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n")
    assert {name: [value.value for value in values] for name, values in reading.values.items()} == {
        "steps": [100],
        "minutes": [5],
    }


def test_only_the_columns_asked_for_are_read():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n", columns=["Minutes"])
    assert (list(reading.values), reading.candidates) == (["minutes"], ("steps", "minutes"))


def test_an_open_decimal_mark_in_another_column_is_not_asked():
    reading = read("day;steps;minutes\n2024-01-01;1.234;5\n", columns=["minutes"])
    assert pairs(reading) == [(FIRST, 5)]


def test_a_column_asked_for_by_its_whole_header_is_found():
    assert list(read("day,Weight [kg]\n2024-01-01,70\n", columns=["weight [KG]"]).values) == ["Weight"]


@pytest.mark.parametrize("name", ["Weight [kg]", "weight", "Weight", "bp UPPER"])
def test_a_name_that_finds_a_column_also_chooses_it(name):
    reading = read("day,Weight [kg],BP\n2024-01-01,70,128/79\n", columns=[name])
    assert len(choose_column(reading, name).columns) == 1


def test_half_of_a_column_that_holds_no_pairs_is_not_there():
    reading = read("day,BP\n2024-01-01,128\n", columns=["BP upper"])
    with pytest.raises(ExchangeError, match="unknown column"):
        choose_column(reading, "BP upper")


@pytest.mark.parametrize(
    "answers", [{"columns": ["hours upper"]}, {"columns": ["hours"]}, {"day_column": "hours"}]
)
def test_a_column_that_is_not_there_is_told_with_the_choices(answers):
    error = refusal("day,steps,minutes\n2024-01-01,100,5\n", **answers)
    assert error.reason == "unknown column"
    assert {"steps", "minutes"} <= set(error.fields["choices"])


def test_choosing_none_of_several_columns_is_a_question():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,steps,minutes\n2024-01-01,100,5\n"))
    assert caught.value.reason == "which value column"
    assert caught.value.fields["choices"] == ["steps", "minutes"]


def test_choosing_a_column_that_is_not_there_is_refused():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,steps,minutes\n2024-01-01,100,5\n"), "hours")
    assert caught.value.reason == "unknown column"


def test_the_fate_of_a_line_is_that_of_the_column_chosen():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n2024-01-02,~9,6\n2024-01-03,,7\n2024-02-30,1,1\n")
    assert [fate.status for fate in reading.fates] == ["kept", "kept", "kept", "set aside"]
    chosen = choose_column(reading, "steps")
    assert [(fate.status, fate.reason) for fate in chosen.fates] == [
        ("kept", ""),
        ("set aside", "not exact"),
        ("blank", ""),
        ("set aside", "no such day"),
    ]
