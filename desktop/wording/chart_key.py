"""What each mark of the chart means: in a few words beside the chart, in a sentence in a window."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Literal

Sign = Literal[
    "before", "after", "outside", "zero", "uncounted", "set aside", "middles", "middle", "middle after",
    "carried middle", "fence", "carried fence", "own fence", "half", "change", "span", "tick", "late", "began",
]  # fmt: skip

KEY_TITLE = "What the marks mean"
KEY_HINT = "Press F1 on the chart, or click here, for all the marks and lines."

SIGN_WORDS: dict[Sign, tuple[str, str]] = {
    "before": ("before", "A day, or the period chosen under the chart, of the baseline."),
    "after": ("since the change", "The same after a change."),
    "outside": (
        "outside the fences",
        "Above the baseline's upper fence, or below its lower one. Its value stands beside it if it has room.",
    ),
    "zero": ("zero", "Hollow: a zero that counts as a value."),
    "uncounted": ("not counted", "Pale: in no number, as in the days of settling in."),
    "set aside": ("set aside", "A day set aside with a reason. It is in no number."),
    "middles": ("middles", "In a long log: the middle of some weeks; its bar holds the middle half of them."),
    "middle": ("middle", "Bold: the middle of the baseline. Half of its days lie above, half below."),
    "middle after": ("middle since", "Bold and broken: the middle since the change."),
    "carried middle": ("old middle", "The baseline's middle, carried on past the change."),
    "fence": ("fences", "The edges of the soft band. A day beyond them is out of line with the baseline."),
    "carried fence": ("old fences", "The baseline's fences, carried on past the change."),
    "own fence": ("new fences", "The fences of the days since the change."),
    "half": ("middle half", "The stronger band holds the middle half of the days."),
    "change": ("change", "The first day of a change, with its name above."),
    "span": ("named days", "Hatched: days that have a name, or settling in."),
    "tick": ("no value", "Under the chart: a day that is blank, ill or away."),
    "late": ("late", "Short, under the chart: a value typed days afterwards."),
    "began": ("began about here", "The days on which the new level may have begun."),
}
"""The few words and the sentence of each sign, in the order in which they are told."""


def left_out_sentence(names: Sequence[str]) -> str:
    """Which periods the ends of the log or a change cut, so that they are in no number; ``""`` for none."""
    if not names:
        return ""
    what = "it is" if len(names) == 1 else "they are"
    listed = names[0] if len(names) == 1 else f"{', '.join(names[:-1])} and {names[-1]}"
    return f"Not counted, since {what} not whole: {listed}."
