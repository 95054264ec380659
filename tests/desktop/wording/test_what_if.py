"""Other choices of days in plain words."""

import re

import pytest

from analysis import Choice
from desktop.wording.what_if import _WORDS, choice_words, what_if_sentences
from tests.desktop.wording.readability import grade

SAME = Choice("without first week", None, "fairly sure", "more", True)
OTHER = Choice("settling in", 7, "leaning", "more", False)


def test_an_answer_that_holds_says_so_once():
    assert what_if_sentences([SAME, SAME]) == ("No: the answer is the same for 2 of 2 other choices.",)
    assert what_if_sentences([]) == ()


def test_the_choices_that_give_another_answer_are_named():
    assert what_if_sentences([SAME, OTHER, Choice("weekdays alone", None, "leaning", "more", False)]) == (
        "The answer is the same for 1 of 3 other choices.",
        "Not with 7 settling-in days; not with weekdays alone.",
    )


@pytest.mark.parametrize("name", _WORDS)
def test_every_choice_can_be_read_after_eight_years_of_school(name):
    words = choice_words(Choice(name, 14, "leaning", "more", False))
    assert "{" not in words
    assert not re.search("None", words)
    assert grade(f"Not {words}.") <= 8
