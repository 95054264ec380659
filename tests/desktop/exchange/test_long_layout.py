"""Tables with a row a reading, slots and units that stand in columns or rows of their own."""

from datetime import date

import pytest

from desktop.exchange.bring_in import choose_column
from tests.desktop.exchange.reading import FIRST, SECOND, THIRD, aside, pairs, read, refusal

LONG = (
    "date,measure,value,unit\n"
    "2024-01-01,Weight,71.5,kg\n"
    "2024-01-01,Sleep,7.5,h\n"
    "2024-01-02,Weight,71,kg\n"
    "2024-01-02,Sleep,~8,h\n"
    "2024-01-03,weight,,kg\n"
    "2024-02-30,Sleep,8,h\n"
)


def test_each_name_becomes_a_measure_with_its_unit():
    reading = read(LONG)
    assert [(column.name, column.unit) for column in reading.columns] == [("Weight", "kg"), ("Sleep", "h")]
    assert pairs(reading, "Weight") == [(FIRST, 71.5), (SECOND, 71)]
    assert pairs(reading, "Sleep") == [(FIRST, 7.5)]


def test_every_line_of_a_long_table_has_one_fate():
    reading = read(LONG)
    assert [fate.status for fate in reading.fates] == ["kept", "kept", "kept", "set aside", "blank", "set aside"]
    assert aside(reading) == [(5, "not exact"), (7, "no such day")]


def test_a_chosen_measure_has_its_own_lines_and_those_without_a_day():
    chosen = choose_column(read(LONG), "sleep")
    assert [(fate.line, fate.status) for fate in chosen.fates] == [(3, "kept"), (5, "set aside"), (7, "set aside")]


def test_only_the_measures_asked_for_are_read():
    reading = read(LONG, columns=["Sleep"])
    assert (list(reading.values), reading.candidates) == (["Sleep"], ("Weight", "Sleep"))
    assert [fate.line for fate in reading.fates] == [3, 5, 7]


@pytest.mark.parametrize(
    "header", ["Measure", "metric", "Variable", "Messgröße", "Kennzahl", "mesure", "parámetro"]
)
def test_a_header_can_say_that_rows_name_their_measure(header):
    reading = read(f"day;{header};x\n2024-01-01;Pulse;60\n2024-01-02;Pulse;61\n")
    assert reading.candidates == ("Pulse",)


TWO_WALKS = "day,what,minutes\n2024-01-01,walk,30\n2024-01-01,swim,20\n2024-01-02,walk,31\n2024-01-02,swim,21\n"


def test_words_that_could_be_measures_are_asked_about():
    error = refusal(TWO_WALKS)
    assert (error.reason, error.fields["choices"]) == ("which name column", ["what", ""])


def test_the_answer_parts_the_rows_or_leaves_them_together():
    assert list(read(TWO_WALKS, name_column="what").values) == ["walk", "swim"]
    together = read(TWO_WALKS, name_column="")
    assert [value.slot for value in together.columns[0].values] == ["", "2", "", "2"]


@pytest.mark.parametrize(
    "rows",
    [
        pytest.param(
            "2024-01-01,walk,30\n2024-01-02,swim,20\n2024-01-03,walk,5\n2024-01-04,swim,6", id="one a day"
        ),
        pytest.param("2024-01-01,tired,30\n2024-01-01,fresh,20\n2024-01-02,,5", id="notes"),
        pytest.param("2024-01-01,walk,30\n2024-01-01,walk,20\n2024-01-02,swim,5\n2024-01-02,swim,5", id="again"),
    ],
)
def test_words_that_part_nothing_are_notes(rows):
    assert read(f"day,what,minutes\n{rows}\n").candidates == ("minutes",)


def test_pressure_in_a_long_table_becomes_two_measures():
    reading = read("day,measure,value\n2024-01-01,BP,128/79\n2024-01-01,Pulse,60\n2024-01-02,BP,131/82\n")
    assert list(reading.values) == ["BP upper", "BP lower", "Pulse"]


def test_a_measure_in_two_units_goes_by_the_unit_of_each_row():
    reading = read("day,measure,value,unit\n2024-01-01,Walk,30,min\n2024-01-02,Walk,1,h\n2024-01-03,Walk,40,min\n")
    assert pairs(reading) == [(FIRST, 30), (SECOND, 60), (THIRD, 40)]


def test_one_decimal_mark_holds_for_every_measure_of_the_one_column():
    reading = read("day;measure;value\n2024-01-01;Steps;1.250\n2024-01-01;Weight;70,5\n")
    assert (pairs(reading, "Steps"), pairs(reading, "Weight")) == ([(FIRST, 1250)], [(FIRST, 70.5)])


def test_a_column_of_slots_is_kept():
    reading = read(
        "day,slot,pulse\n2024-01-01,morning,60\n2024-01-01,day,62\n2024-01-01,2,61\n2024-01-02,morning,63\n"
    )
    values = reading.columns[0].values
    assert [(value.slot, value.value) for value in values] == [
        ("morning", 60),
        ("", 62),
        ("2", 61),
        ("morning", 63),
    ]


@pytest.mark.parametrize(("word", "slot"), [("Abend", "evening"), ("matin", "morning"), ("mediodía", "midday")])
def test_words_for_parts_of_the_day_are_slots(word, slot):
    reading = read(f"day,moment,pulse\n2024-01-01,am,60\n2024-01-01,{word} ,61\n")
    assert reading.columns[0].values[1].slot == (slot if slot != "morning" else "morning 2")


def test_a_value_its_own_table_leaves_out_is_not_counted_here():
    reading = read("date,measure,value,status\n2024-01-01,Pulse,60,recorded\n2024-01-02,Pulse,160,excluded\n")
    assert (pairs(reading), aside(reading)) == ([(FIRST, 60)], [(3, "left out there")])


@pytest.mark.parametrize(
    ("text", "units"),
    [
        pytest.param("day,weight,sleep\n,kg,h\n2024-01-01,71,7.5\n", ["kg", "h"], id="day left blank"),
        pytest.param("day,weight,sleep\nyyyy-mm-dd,[kg],(hours)\n2024-01-01,71,7.5\n", ["kg", "h"], id="brackets"),
        pytest.param("Tag;Gewicht;n\nTT.MM.JJJJ;kg;\n13.01.2024;71;7\n", ["kg", ""], id="German pattern"),
        pytest.param("when,weight,reps\n-,kg,(reps)\n2024-01-01,71,7\n", ["kg", "reps"], id="no word for days"),
        pytest.param("My log\nday,weight (lb)\n,kg\n2024-01-01,71\n", ["lb"], id="the header says it already"),
    ],
)
def test_a_row_of_units_under_the_header_gives_the_units(text, units):
    reading = read(text)
    assert [column.unit for column in reading.columns] == units
    assert len(reading.fates) == 1
    assert reading.skipped


def test_a_header_that_only_looks_like_units_stays_a_header():
    reading = read("when,min\n2024-01-01,5\n")
    assert reading.candidates == ("min",)


def test_the_day_of_a_long_table_can_need_an_order():
    error = refusal("day,measure,value\n01/02/2024,Pulse,60\n02/03/2024,Pulse,61\n")
    assert error.reason == "which day order"
    answered = read("day,measure,value\n01/02/2024,Pulse,60\n", day_order="dmy")
    assert pairs(answered) == [(date(2024, 2, 1), 60)]
