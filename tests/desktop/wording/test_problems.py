"""Every error has a sentence, and every question of the command line names the option that answers it."""

from __future__ import annotations

import ast
from datetime import date
from pathlib import Path
from typing import get_args

import pytest

from analysis import AnalysisError
from desktop.command import _review_parser
from desktop.errors import ExchangeError, ExchangeReason, StorageError, StorageReason
from desktop.wording.problems import choice_label, problem_sentence

ROOT = Path(__file__).parents[3]
FIELDS: dict[str, object] = {
    "path": "/home/someone/walks.csv",
    "columns": ["a", "b"],
    "choices": ["a", "b"],
    "column": "minutes",
    "example": "1,005",
    "name": "steps",
    "limit": 65_536,
    "what": "bytes",
    "line": 12,
    "file": "entries.csv",
    "first": date(2031, 3, 3),
    "last": date(2031, 3, 1),
    "change": date(2031, 3, 2),
    "low": 60.0,
    "high": 40.0,
    "value": "minute",
    "field": "period",
}


def raised_in(folder: str, name: str) -> set[str]:
    """The first argument of every call of an error's class."""
    calls = [
        node
        for path in (ROOT / folder).rglob("*.py")
        for node in ast.walk(ast.parse(path.read_text("utf-8")))
        if isinstance(node, ast.Call) and getattr(node.func, "id", "") == name and node.args
    ]
    return {call.args[0].value for call in calls if isinstance(call.args[0], ast.Constant)}


ANALYSIS_REASONS = sorted(raised_in("analysis", "AnalysisError"))
ERRORS = [
    *(StorageError(reason, **FIELDS) for reason in get_args(StorageReason)),
    *(ExchangeError(reason, **FIELDS) for reason in get_args(ExchangeReason)),
    *(ExchangeError("too large", **FIELDS | {"what": what}) for what in ("rows", "columns", "cell")),
    *(AnalysisError(reason, **FIELDS) for reason in ANALYSIS_REASONS),
]
QUESTIONS = [reason for reason in get_args(ExchangeReason) if reason.startswith("which ")]


def sentence(error, **how) -> str:
    if error.reason == "which day order":
        error.fields["choices"] = ["dmy", "mdy"]
    if error.reason == "which decimal mark":
        error.fields["choices"] = [".", ","]
    return problem_sentence(error, **how)


@pytest.mark.parametrize("error", ERRORS, ids=lambda error: f"{type(error).__name__} {error.reason}")
def test_every_error_has_a_sentence(error):
    for in_command in (False, True):
        said = sentence(error, in_command=in_command)
        assert said[0].isupper() or said[0] in "“/" or said.startswith(Path(str(FIELDS["path"])).name)
        assert said.endswith((".", "?"))
        assert "\n" not in said
        assert error.reason not in ("", said)


def test_the_reasons_looked_at_are_those_that_are_raised():
    assert {"baseline_backwards", "baseline_after_change", "settle_negative"} <= set(ANALYSIS_REASONS)
    assert raised_in("desktop/exchange", "ExchangeError") <= set(get_args(ExchangeReason))
    assert raised_in("desktop/storage", "StorageError") <= set(get_args(StorageReason))


def test_an_error_without_a_sentence_is_told_apart():
    with pytest.raises(KeyError):
        problem_sentence(StorageError("something new"))


@pytest.mark.parametrize("reason", QUESTIONS)
def test_a_question_of_the_command_names_an_option_that_exists(reason):
    error = ExchangeError(reason, **FIELDS)
    asked, said = sentence(error), sentence(error, in_command=True)
    assert asked.endswith("?")
    assert said.startswith(asked)
    options = [word.rstrip(".,") for word in said.removeprefix(asked).split() if word.startswith("--")]
    known = {option for action in _review_parser()._actions for option in action.option_strings}
    assert options
    assert set(options) <= known


@pytest.mark.parametrize(
    ("reason", "choice", "label"),
    [
        ("which day order", "dmy", "Day, month, year"),
        ("which decimal mark", ",", "Decimal comma"),
        ("which decimal mark", ".", "Decimal point"),
        ("which day column", "date", "date"),
        ("which century", 1900, "1900"),
    ],
)
def test_an_answer_is_a_button_in_words(reason, choice, label):
    assert choice_label(reason, choice) == label


def test_many_columns_are_cut_short_and_counted():
    said = problem_sentence(ExchangeError("no value column", columns=[f"c{place}" for place in range(40)]))
    assert "“c11” and 28 more" in said
    assert "“c12”" not in said


def test_the_error_itself_keeps_its_fields_for_a_report():
    assert str(StorageError("missing", path="/tmp/x")) == "missing (path='/tmp/x')"
    assert str(StorageError("busy")) == "busy"
