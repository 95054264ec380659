"""Every line of the table of cautions one below, at and one above its number, in both units; written by hand."""

import json
import re
from datetime import date, timedelta

import pytest

from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person
from desktop.resource_files import resource
from desktop.wording.caution_table import OwnCautions, caution_lines, emergency_numbers, kind_and_unit, line_met
from desktop.wording.entry_cautions import CAUTION_WORDS, PLAN_FIRST, caution_for, caution_sentences
from tests.desktop.wording.readability import grade
from tests.desktop.wording.test_plain_words import BANNED

DAY = date(2026, 3, 10)
NOTHING = OwnCautions()
HEART = OwnCautions(heart_failure=True)


def journal_of(title: str, unit: str, *values: float, kind: str = "value") -> Journal:
    """A measure with these values on the days up to DAY."""
    entries = [
        Entry(1, DAY - timedelta(len(values) - 1 - place), value=value, kind=kind)
        for place, value in enumerate(values)
    ]
    return Journal.of([Person("0" * 32), Measure(1, 0, title, unit), *entries])


def words(title: str, unit: str, *values: float, own: OwnCautions = NOTHING, kind: str = "value") -> str:
    met = line_met(journal_of(title, unit, *values, kind=kind), 1, DAY, "", own)
    return met.words if met else ""


@pytest.mark.parametrize(
    ("title", "unit", "value", "said"),
    [
        ("Upper pressure", "mmHg", 179, ""),
        ("Upper pressure", "mmHg", 180, "pressure high"),
        ("Upper pressure", "mmHg", 181, "pressure high"),
        ("Upper pressure", "kPa", 23.9, ""),
        ("Upper pressure", "kPa", 24.0, "pressure high"),
        ("Upper pressure", "kPa", 24.1, "pressure high"),
        ("Lower pressure", "mmHg", 119, ""),
        ("Lower pressure", "mmHg", 120, "pressure high"),
        ("Lower pressure", "mmHg", 121, "pressure high"),
        ("Lower pressure", "kPa", 15.9, ""),
        ("Lower pressure", "kPa", 16.0, "pressure high"),
        ("Lower pressure", "kPa", 16.1, "pressure high"),
        ("BP upper", "mmHg", 89, "pressure low"),
        ("BP upper", "mmHg", 90, ""),
        ("BP upper", "mmHg", 91, ""),
        ("Systolic", "kPa", 11.9, "pressure low"),
        ("Systolic", "kPa", 12.0, ""),
        ("Systolic", "kPa", 12.1, ""),
        ("BP lower", "mmHg", 59, "pressure low"),
        ("BP lower", "mmHg", 60, ""),
        ("BP lower", "mmHg", 61, ""),
        ("Diastolic", "kPa", 7.9, "pressure low"),
        ("Diastolic", "kPa", 8.0, ""),
        ("Diastolic", "kPa", 8.1, ""),
        ("Glucose", "mg/dL", 53, "glucose very low"),
        ("Glucose", "mg/dL", 54, "glucose low"),
        ("Glucose", "mg/dL", 55, "glucose low"),
        ("Blood sugar", "mmol/L", 2.9, "glucose very low"),
        ("Blood sugar", "mmol/L", 3.0, "glucose low"),
        ("Blood sugar", "mmol/L", 3.1, "glucose low"),
        ("Glucose", "mg/dL", 69, "glucose low"),
        ("Glucose", "mg/dL", 70, ""),
        ("Glucose", "mg/dL", 71, ""),
        ("Blood sugar", "mmol/L", 3.8, "glucose low"),
        ("Blood sugar", "mmol/L", 3.9, ""),
        ("Blood sugar", "mmol/L", 4.0, ""),
        ("Glucose", "mg/dL", 239, ""),
        ("Glucose", "mg/dL", 240, "glucose high"),
        ("Glucose", "mg/dL", 241, "glucose high"),
        ("Blood sugar", "mmol/L", 13.2, ""),
        ("Blood sugar", "mmol/L", 13.3, "glucose high"),
        ("Blood sugar", "mmol/L", 13.4, "glucose high"),
        ("Glucose", "mg/dL", 299, "glucose high"),
        ("Glucose", "mg/dL", 300, "glucose very high"),
        ("Glucose", "mg/dL", 301, "glucose very high"),
        ("Blood sugar", "mmol/L", 16.6, "glucose high"),
        ("Blood sugar", "mmol/L", 16.7, "glucose very high"),
        ("Blood sugar", "mmol/L", 16.8, "glucose very high"),
        ("Oxygen", "%", 91, "oxygen very low"),
        ("Oxygen", "%", 92, "oxygen very low"),
        ("Oxygen", "%", 93, "oxygen low"),
        ("SpO2", "percent", 94, "oxygen low"),
        ("SpO2", "percent", 95, ""),
        ("Temperature", "°C", 37.9, ""),
        ("Temperature", "°C", 38.0, "fever"),
        ("Temperature", "°C", 38.1, "fever"),
        ("Temperature", "°F", 100.3, ""),
        ("Temperature", "°F", 100.4, "fever"),
        ("Temperature", "°F", 100.5, "fever"),
        ("Temperature", "°C", 39.3, "fever"),
        ("Temperature", "°C", 39.4, "temperature high"),
        ("Temperature", "°C", 39.5, "temperature high"),
        ("Temperature", "°F", 102.9, "fever"),
        ("Temperature", "°F", 103.0, "temperature high"),
        ("Temperature", "°F", 103.1, "temperature high"),
        ("Temperature", "°C", 39.9, "temperature high"),
        ("Temperature", "°C", 40.0, "temperature very high"),
        ("Temperature", "°C", 40.1, "temperature very high"),
        ("Temperature", "°F", 103.9, "temperature high"),
        ("Temperature", "°F", 104.0, "temperature very high"),
        ("Temperature", "°F", 104.1, "temperature very high"),
        ("Temperature", "°C", 34.9, "temperature very low"),
        ("Temperature", "°C", 35.0, ""),
        ("Temperature", "°C", 35.1, ""),
        ("Temperature", "°F", 94.9, "temperature very low"),
        ("Temperature", "°F", 95.0, ""),
        ("Temperature", "°F", 95.1, ""),
    ],
)
def test_a_value_at_a_line_and_on_either_side_of_it(title, unit, value, said):
    assert words(title, unit, value) == said
    assert words(title, unit, value, kind="set aside") == said
    assert words(title, unit, value, kind="extra") == said


@pytest.mark.parametrize("unit", ["bpm", "per minute"])
@pytest.mark.parametrize(
    ("values", "said"),
    [
        ((101,), ""),
        ((101, 101), ""),
        ((100, 100, 100), ""),
        ((101, 101, 101), "rate high"),
        ((101, 99, 101, 99, 101), "rate high"),
        ((101, 101, 80, 80, 80, 101), ""),
        ((60, 60, 60), ""),
        ((59, 59), ""),
        ((59, 61, 59, 59), "rate low"),
        ((101, 101, 101, 80), ""),
    ],
)
def test_a_heart_rate_speaks_only_after_three_of_five_days(unit, values, said):
    assert words("Resting heart rate", unit, *values) == said


@pytest.mark.parametrize(
    ("unit", "values", "said"),
    [
        ("kg", (80, 81.3), ""),
        ("kg", (80, 81.4), "weight gain"),
        ("kg", (80, 81.5), "weight gain"),
        ("lb", (176, 178.9), ""),
        ("lb", (176, 179), "weight gain"),
        ("lb", (176, 179.1), "weight gain"),
        ("kg", (80, 81, 81.5, 82), ""),
        ("kg", (80, 81, 81.5, 82.1), "weight gain"),
        ("kg", (80, 81, 81.5, 81.9), ""),
        ("lb", (176, 178, 179, 180.4), ""),
        ("lb", (176, 178, 179, 180.5), "weight gain"),
        ("lb", (176, 178, 179, 180.3), ""),
        ("kg", (80, 80.4, 80.8, 81.1, 81.5, 81.9, 82.2), ""),
        ("kg", (80, 80.4, 80.8, 81.1, 81.5, 81.9, 82.3), "weight gain"),
        ("kg", (80, 80.4, 80.8, 81.1, 81.5, 81.9, 82.4), "weight gain"),
        ("lb", (176, 177, 178, 179, 180, 180.5, 180.9), ""),
        ("lb", (176, 177, 178, 179, 180, 180.5, 181), "weight gain"),
        ("lb", (176, 177, 178, 179, 180, 180.5, 181.1), "weight gain"),
        ("kg", (90,), ""),
    ],
)
def test_weight_speaks_only_where_heart_failure_was_declared(unit, values, said):
    assert words("Weight", unit, *values, own=HEART) == said
    assert words("Weight", unit, *values) == ""


def test_the_clinics_own_gain_takes_the_place_of_every_other():
    own = OwnCautions(heart_failure=True, gain=1.0, gain_days=2)
    assert words("Weight", "kg", 80, 80.5, 80.9, own=own) == ""
    assert words("Weight", "kg", 80, 80.5, 81.0, own=own) == "own gain"
    assert words("Weight", "kg", 78, 80, 80.5, 80.9, own=own) == ""


def test_an_own_limit_takes_the_place_of_the_table():
    own = OwnCautions(low=100, high=150)
    said = [words("Upper pressure", "mmHg", value, own=own) for value in (99, 100, 101, 149, 150, 151, 185)]
    assert said == ["own low", "", "", "", "", "own high", "own high"]
    assert words("Upper pressure", "mmHg", 185, own=OwnCautions(high=190)) == ""
    assert words("Anything", "points", 3, own=OwnCautions(high=2)) == "own high"


def test_cautions_can_be_switched_off_for_a_measure():
    assert words("Upper pressure", "mmHg", 200, own=OwnCautions(off=True)) == ""


@pytest.mark.parametrize(
    ("title", "unit"),
    [
        ("Cholesterol", "mg/dL"),
        ("Upper pressure", "bar"),
        ("Glucose", ""),
        ("Exercise", "minutes"),
        ("Battery", "%"),
    ],
)
def test_a_measure_that_is_none_of_the_table_says_nothing(title, unit):
    assert kind_and_unit(Measure(1, 0, title, unit)) is None
    assert words(title, unit, 500) == ""


def test_nothing_is_said_below_every_line_and_of_a_day_without_a_value():
    journal = journal_of("Upper pressure", "mmHg", 128)
    assert caution_for(journal, 1, DAY, "", NOTHING, "911") is None
    assert caution_for(journal, 1, DAY + timedelta(1), "", NOTHING, "911") is None


def test_the_number_is_the_one_the_person_chose_and_none_is_guessed():
    journal = journal_of("Upper pressure", "mmHg", 185)
    assert "call 999 now" in caution_for(journal, 1, DAY, "", NOTHING, "999")
    unchosen = caution_for(journal, 1, DAY, "", NOTHING, "")
    assert "call your emergency number now" in unchosen
    assert not re.search(r"\b(911|999|112|000|111)\b", unchosen)


def test_111_is_never_bare():
    assert [number for _, number in emergency_numbers() if "111" in number] == ["111 in New Zealand"]
    assert {"911", "999", "112", "000"} <= {number for _, number in emergency_numbers()}


def every_caution() -> list[str]:
    said = []
    for line in caution_lines():
        for unit in line.limit:
            title = {"weight": "Weight", "oxygen": "Oxygen"}.get(line.kind, line.kind)
            assert kind_and_unit(Measure(1, 0, title, unit)) == (line.kind, unit)
    for name in CAUTION_WORDS:
        met = line_met(journal_of("x", "steps", 5.0), 1, DAY, "", OwnCautions(high=4.0))
        said.append(caution_sentences(type(met)(name, 4.0, "steps", 3), 5.0, "999"))
    return said


def test_every_line_has_words_and_every_word_a_line():
    own = {"own low", "own high", "own gain"}
    assert {line.words for line in caution_lines()} | own == set(CAUTION_WORDS)


def test_every_line_names_its_source():
    table = json.loads(resource("cautions.json").read_text("utf-8"))
    assert all(len(line["source"]) > 10 for line in [*table["lines"], *table["numbers"]])


def test_every_caution_defers_to_the_plan():
    assert all(said.endswith(PLAN_FIRST) for said in every_caution())


def test_every_caution_can_be_read_after_eight_years_of_school():
    assert {said: round(grade(said), 1) for said in every_caution() if grade(said) > 8} == {}


@pytest.mark.parametrize("banned", [*BANNED, r"you have (?!chest|short|heart|few)", r"don't worry", r"\bok\b"])
def test_no_caution_reassures_or_judges(banned):
    assert [said for said in every_caution() if re.search(banned, said, re.IGNORECASE)] == []
