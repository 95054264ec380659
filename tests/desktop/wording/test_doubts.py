"""A doubt is a fact with its effect on the answer."""

import pytest

from analysis.answer import Doubt
from analysis.doubts.catalogue import CATALOGUE, MOST_SHOWN
from desktop.wording.doubts import SENTENCES, doubt_sentence
from desktop.wording.findings import findings_of, worded
from desktop.wording.telling import speech_of
from tests.desktop.wording.sweep import DOUBTED, sweep

NAMES = [look.__name__ for look in CATALOGUE]


def raised(name: str):
    review = DOUBTED[name]()
    return review, next(doubt for doubt in review.doubts if doubt.name == name)


def test_every_doubt_of_the_catalogue_has_a_sentence_and_no_other_has_one():
    assert set(SENTENCES) == set(NAMES) == set(DOUBTED)


@pytest.mark.parametrize("name", NAMES)
def test_a_doubt_is_raised_and_told_on_screen_and_in_json(name):
    review, doubt = raised(name)
    said = doubt_sentence(doubt, speech_of(review))
    assert said.endswith((".", "?"))
    assert said in findings_of(review).lines()
    assert {"name": name, "sentence": said, "alters": doubt.alters} in worded(review).to_json()["doubts"]


@pytest.mark.parametrize("name", [name for name in NAMES if SENTENCES[name][1]])
def test_a_doubt_that_is_computed_again_tells_its_effect(name):
    review, doubt = raised(name)
    fields = tuple(field for field in doubt.fields if field[0] != "untested")
    told = [doubt_sentence(Doubt(name, fields, alters), speech_of(review)) for alters in (False, True)]
    assert told[0] != told[1]
    assert told[0].endswith(SENTENCES[name][1])
    assert told[1].endswith(SENTENCES[name][2])


def test_no_effect_is_said_where_nothing_is_claimed():
    review, doubt = raised("first_days")
    assert dict(doubt.fields)["untested"] == "no claim"
    assert doubt_sentence(doubt, speech_of(review)).endswith("as in many new logs.")


@pytest.mark.parametrize("name", NAMES)
def test_the_fields_of_a_doubt_are_in_its_sentence(name):
    review, doubt = raised(name)
    said = doubt_sentence(doubt, speech_of(review))
    shown = {field: value for field, value in doubt.fields if field != "carry_over" and isinstance(value, int)}
    words = {0: "no", 1: "one"} if name == "weekdays_only" else {}
    assert all(words.get(value, str(value)) in said for value in shown.values())


def test_an_answer_that_a_doubt_alters_is_at_most_leaning():
    altered = [review for review in sweep() if any(doubt.alters for doubt in review.doubts)]
    assert altered
    assert all(review.answer.sureness in ("too early", "cannot tell", "leaning") for review in altered)


def test_no_more_than_five_doubts_are_shown():
    assert max(len(review.doubts) for review in sweep()) <= MOST_SHOWN


def test_a_doubt_without_a_sentence_is_told_apart():
    review, _ = raised("few_days")
    with pytest.raises(KeyError):
        doubt_sentence(Doubt("moon", (), alters=False), speech_of(review))
