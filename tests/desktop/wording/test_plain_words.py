"""Every sentence is short and plain, blames nobody, claims no cause and calls no reading safe."""

from __future__ import annotations

import re
from functools import cache
from typing import get_args

import pytest

from analysis.doubts.catalogue import CATALOGUE
from desktop.wording.cautions import CAUTION
from desktop.wording.entry import KIND_WORDS, refusal_sentence
from desktop.wording.findings import worded
from desktop.wording.help import ABOUT, KEY_GROUPS
from desktop.wording.worked_out import worked_out
from tests.desktop.wording.readability import grade, syllables
from tests.desktop.wording.sweep import sweep
from tests.desktop.wording.test_problems import ERRORS, sentence

HARDEST = 8.0
BANNED = (
    r"caused by", r"worked(?! out)", r"significan", r"fail", r"normal", r"\bsafe", r"\bfine\b", r"great job",
    r"well done", r"danger", r"diagnos", r"congratulat", r"\bgood\b", r"\bbad\b", r"\bhealthy\b", r"should have",
    r"\bproof\b", r"\bproves?\b", r"\bstreak",
)  # fmt: skip
REFUSALS = ("pair", "not exact", "unknown unit", "other unit", "out of range", "unclear duration", "unknown")


@cache
def findings() -> frozenset[str]:
    return frozenset(line for review in sweep() for line in worded(review).findings)


@cache
def others() -> frozenset[str]:
    problems = [sentence(error, in_command=said) for error in ERRORS for said in (False, True)]
    refused = [refusal_sentence(reason, "12x") for reason in REFUSALS]
    keys = [what for _, group in KEY_GROUPS for _, what in group]
    helped = [line for line in (*keys, *ABOUT.splitlines(), CAUTION) if line]
    return frozenset([*problems, *refused, *helped])


def test_the_formula_gives_the_published_grade():
    # A worked example that is often printed: 13 words, 24 syllables, grade 11.3.
    text = "The Australian platypus is seemingly a hybrid of a mammal and reptilian creature."
    assert sum(map(syllables, text.rstrip(".").split())) == 24
    assert grade(text) == pytest.approx(11.3, abs=0.05)


@pytest.mark.parametrize(
    ("word", "expected"),
    [("moved", 1), ("middle", 2), ("likely", 2), ("minutes", 2), ("baseline", 2), ("days", 1), ("before", 2),
     ("difference", 3), ("outside", 2), ("fences", 2), ("probably", 3), ("1871", 1), ("stretches", 2)],
)  # fmt: skip
def test_syllables_are_counted_by_ear(word, expected):
    # "base-line" has a silent e inside, which the rule hears: it errs towards harder.
    assert syllables(word) in (expected, 3 if word == "baseline" else expected)


def test_the_sweep_is_broad():
    assert len(findings()) > 1000
    assert {doubt.name for review in sweep() for doubt in review.doubts} == {look.__name__ for look in CATALOGUE}
    words = {review.answer.sureness for review in sweep()}
    assert len(words) == 6


def test_every_finding_can_be_read_after_eight_years_of_school():
    # The unit is the person's own word: here it is taken as one syllable, as in "steps".
    templates = {re.sub(r"\b(?:minutes?|mmHg)\b", "steps", line) for line in findings()}
    assert {line: round(grade(line), 1) for line in templates if grade(line) > HARDEST} == {}


def test_every_problem_and_help_can_be_read_after_eight_years_of_school():
    plain = [line for line in others() if "copyright" not in line and "PySide6" not in line]
    assert {line: round(grade(line), 1) for line in plain if grade(line) > HARDEST} == {}


@pytest.mark.parametrize("phrase", BANNED)
def test_a_phrase_that_judges_or_claims_too_much_is_nowhere(phrase):
    said = re.compile(phrase, re.IGNORECASE)
    everything = [*findings(), *others(), *KIND_WORDS.values()]
    assert [line for line in everything if said.search(line)] == []


def test_the_trade_word_for_the_middle_is_kept_for_how_it_was_worked_out():
    assert [line for line in [*findings(), *others()] if "median" in line.lower()] == []
    assert all(any("median" in line for line in worked_out(review)) for review in sweep())


def test_a_cause_is_named_only_to_say_that_none_can_be_told():
    named = {line for line in findings() if "caus" in line}
    assert len(named) == 1
    assert "cannot tell what caused" in named.pop()


def test_every_line_is_a_whole_sentence():
    assert [line for line in findings() if not re.fullmatch(r"[A-Z0-9−“].*[.?]", line)] == []
    assert [
        line for line in findings() if re.search(r"  |None\b(?! of)|nan|\binf\b|\.\.|\{|−0\b(?!\.)", line)
    ] == []


def test_one_of_a_thing_is_never_many():
    wrong = re.compile(r"\b(?<![.\d−])1 (?:days|weeks|months|years|minutes|steps|times)\b(?! of)")
    of_one = re.compile(r"of 1 (?:days|weeks|months|years)")
    assert [line for line in findings() if wrong.search(of_one.sub("", line))] == []


def test_a_chance_is_always_told_out_of_a_hundred():
    chances = [line for line in findings() if "by luck in" in line]
    assert chances
    assert all(re.search(r"in (?:about|fewer than|more than) \d+ of 100 logs", line) for line in chances)


def test_the_sureness_words_are_the_five_of_the_analysis():
    from analysis.questions.did_it_move import Sureness

    said = {
        line.split(":")[0].lower() for line in findings() if " before, " in line and "after. If nothing" in line
    }
    assert said == set(get_args(Sureness)) - {"too early"}
