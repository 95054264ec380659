"""What other choices of days would make of the answer, in plain words."""

from __future__ import annotations

from collections.abc import Sequence

from analysis.what_if import Choice

TITLE = "Would another choice of days change it?"

_WORDS = {
    "last days before": "with only the last {days} days before the change",
    "without first week": "without the first week of the log",
    "without last week": "without the week before the change",
    "settling in": "with {days} settling-in days",
    "weekdays alone": "with weekdays alone",
    "without odd days": "without days far out of line",
    "without late days": "without the days typed afterwards",
    "missed as blank": "with missed days as not known",
    "blank as zero": "with blank days as zeros",
}


def choice_words(choice: Choice) -> str:
    """One choice, to stand behind “not” or “so”."""
    return _WORDS[choice.name].format(days=choice.days)


def what_if_sentences(choices: Sequence[Choice]) -> tuple[str, ...]:
    """How many other choices give the same answer, and which do not; nothing where there is no choice."""
    if not choices:
        return ()
    others = [choice_words(one) for one in choices if not one.holds]
    count = f"{len(choices) - len(others)} of {len(choices)}"
    if not others:
        return (f"No: the answer is the same for {count} other choices.",)
    return (f"The answer is the same for {count} other choices.", f"Not {'; not '.join(others)}.")
