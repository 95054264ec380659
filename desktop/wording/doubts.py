"""A doubt in plain words: a fact, and what it does to the answer."""

from __future__ import annotations

from collections.abc import Callable

from analysis.answer import Doubt
from desktop.wording.numbers import Speech, count

Fields = dict[str, float | str]
Told = Callable[[Fields, Speech], str]

_SAME = "Without them the answer is the same."
_OTHER = "Without them the answer is no longer sure."
_TOO_FEW = "Without them too few would be left to tell."
_SAME_WEEK = "Without that week the answer is the same."
_OTHER_WEEK = "Without that week it is not sure."


def doubt_sentence(doubt: Doubt, speech: Speech) -> str:
    """The fact of a doubt, then its effect on the answer.

    Raises:
        KeyError: a doubt without a sentence; a test looks for one.
    """
    fact, same, other = SENTENCES[doubt.name]
    fields = dict(doubt.fields)
    # Where nothing is claimed, nothing was computed again that could have been lost.
    effect = other if doubt.alters else "" if "untested" in fields else same
    if fields.get("left") == "too few" and not doubt.alters:
        effect = _TOO_FEW
    return f"{fact(fields, speech)} {effect}".strip()


def _few_days(fields: Fields, speech: Speech) -> str:
    before, after = int(fields["before"]), int(fields["after"])
    return f"Few {speech.many}: {before} before the change and {after} after."


def _no_spread(fields: Fields, speech: Speech) -> str:
    value = speech.with_unit(float(fields["value"]))
    return (
        f"No spread to measure with: half or more of the {int(fields['days'])} baseline {speech.many} "
        f"are {value}. So there are no fences."
    )


def _blank_days(fields: Fields, speech: Speech) -> str:
    return (
        f"{int(fields['blank'])} of {int(fields['periods'])} {speech.many} are blank. "
        "If those were unlike the rest, the answer could be off."
    )


def _day_to_day(_fields: Fields, speech: Speech) -> str:
    return (
        f"One {speech.one} carries over into the next, so {speech.many} count for less than their number. "
        f"Counted as separate {speech.many} the answer would look surer than it is."
    )


def _no_low_day(_fields: Fields, speech: Speech) -> str:
    return f"No low {speech.one} can stand out: the lower fence is at zero or below it."


def _slope_before(fields: Fields, speech: Speech) -> str:
    pace = speech.pace(float(fields["slope"]))
    if fields.get("shape") == "step":
        return f"A steady slope through all days, by about {pace}, would look much like this."
    return f"It was moving all along, by about {pace}, before the change and after it."


def _worst_spell(fields: Fields, _speech: Speech) -> str:
    return (
        f"The change came after the {fields['way']} week of {int(fields['weeks'])}. "
        "Some way back would likely have come anyway."
    )


def _first_days(fields: Fields, _speech: Speech) -> str:
    return f"The first week of the log was {fields['way']} than the rest of the baseline, as in many new logs."


def _odd_day(fields: Fields, speech: Speech) -> str:
    return f"{count(int(fields['days']), speech.one)} far out of line carry much of it."


def _missing_more(fields: Fields, speech: Speech) -> str:
    return (
        f"More {speech.many} are blank since the change: {int(fields['after'])} of {int(fields['after_of'])}, "
        f"{int(fields['before'])} of {int(fields['before_of'])} before."
    )


def _no_zero(fields: Fields, speech: Speech) -> str:
    return (
        f"No zero was ever written, and {int(fields['blank'])} of {int(fields['days'])} {speech.many} are blank. "
        f"Were those {speech.many} without any?"
    )


def _other_slots(fields: Fields, _speech: Speech) -> str:
    if fields["kept"]:
        return f"Only one side has readings for {fields['left_out']}, so those for {fields['kept']} are compared."
    return f"One side has no readings for {fields['left_out']}."


def _late_entries(fields: Fields, _speech: Speech) -> str:
    return f"{int(fields['late'])} of {int(fields['days'])} days were typed days afterwards."


def _weekdays_only(fields: Fields, _speech: Speech) -> str:
    ends = int(fields["weekend"])
    held = "no weekend day" if not ends else "one weekend day"
    return f"The baseline holds {held}; the days after do."


def _device_mark(fields: Fields, _speech: Speech) -> str:
    named = f" ({fields['label']})" if fields["label"] else ""
    return f"Another device or way of measuring is marked{named}."


def _close_change(fields: Fields, _speech: Speech) -> str:
    named = f"“{fields['label']}”" if fields["label"] else "Another change"
    return f"{named} is marked {count(int(fields['days']), 'day')} away. This log cannot tell the two apart."


def _several_changes(fields: Fields, _speech: Speech) -> str:
    return (
        f"{int(fields['count'])} changes are marked on the same day. This log cannot tell them apart; "
        "the answer is for all of them together."
    )


def _equal_in_row(fields: Fields, speech: Speech) -> str:
    value = speech.with_unit(float(fields["value"]))
    return f"{value} stands there {int(fields['days'])} {speech.many} in a row: exact, or put down from habit?"


def _season(fields: Fields, _speech: Speech) -> str:
    if "same" in fields:
        return "The days since are of one part of the year, those before are of all of it."
    return (
        f"The two stretches lie about {int(fields['months'])} months apart, "
        "so the season may be part of the difference."
    )


def _early_look(fields: Fields, _speech: Speech) -> str:
    days = int(fields["days"])
    return (
        f"You agreed to judge in {days} {'day' if days == 1 else 'days'}. "
        "This is an early look, and luck shows more in those."
    )


def _several_measures(fields: Fields, _speech: Speech) -> str:
    return f"{int(fields['measures'])} measures were looked at. In one of several, luck finds a move more easily."


def _round_numbers(fields: Fields, speech: Speech) -> str:
    step = int(fields["step"])
    ends = "0" if step == 10 else "0 or 5"
    return f"Nearly all values end in {ends}, so a difference under {speech.with_unit(step)} cannot be seen."


SENTENCES: dict[str, tuple[Told, str, str]] = {
    "few_days": (_few_days, "", ""),
    "no_spread": (_no_spread, "", ""),
    "blank_days": (_blank_days, "", ""),
    "day_to_day": (_day_to_day, "", ""),
    "no_low_day": (_no_low_day, "", ""),
    "slope_before": (
        _slope_before,
        "The answer holds beyond that.",
        "The change adds nothing sure to it.",
    ),
    "worst_spell": (_worst_spell, _SAME_WEEK, _OTHER_WEEK),
    "first_days": (_first_days, _SAME_WEEK, _OTHER_WEEK),
    "odd_day": (_odd_day, _SAME, _OTHER),
    "missing_more": (
        _missing_more,
        "Even if those were on the other side, the answer is the same.",
        "If those were on the other side, the answer would not be sure.",
    ),
    "no_zero": (
        _no_zero,
        "Counted as zeros, the answer is the same.",
        "Counted as zeros, the answer is another one.",
    ),
    "other_slots": (_other_slots, "", "Such days cannot be held against each other."),
    "late_entries": (_late_entries, _SAME, _OTHER),
    "weekdays_only": (
        _weekdays_only,
        "On weekdays alone the answer is the same.",
        "On weekdays alone the answer is not sure.",
    ),
    "device_mark": (
        _device_mark,
        "Without those days the answer is the same.",
        "A step of this size can come from that alone.",
    ),
    "early_look": (
        _early_look,
        "By the stricter rule for early looks the answer is the same.",
        "By the stricter rule for early looks the answer is not sure yet.",
    ),
    "several_measures": (_several_measures, "", "Counted together, the answer is not sure."),
    "close_change": (_close_change, "", ""),
    "several_changes": (_several_changes, "", ""),
    "equal_in_row": (_equal_in_row, _SAME, _OTHER),
    "season": (
        _season,
        "",
        "Held against the same weeks of the year before, the answer is not sure.",
    ),
    "round_numbers": (_round_numbers, "", ""),
}
"""For every doubt of the catalogue its fact, and its effect when it does not alter the answer and when it does."""
