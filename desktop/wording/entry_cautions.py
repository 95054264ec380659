"""What is said when a value just kept meets a line of the table; of any other nothing is said."""

from __future__ import annotations

from datetime import date

from desktop.journal.journal import Journal
from desktop.wording.caution_table import Met, OwnCautions, line_met
from desktop.wording.numbers import count, plain

PLAN_FIRST = "Your plan from your clinician and local guidance come first."
"""Closes every caution."""

CAUTION_WORDS: dict[str, str] = {
    "pressure high": (
        "You typed {value}; the line is {limit} or more. Sit still for a minute or two and measure again. If it "
        "is still this high, call your clinician today. If you have chest pain, short breath or back pain, if "
        "you feel weak or numb, or if you cannot speak or see well, call {number} now. Do not wait."
    ),
    "pressure low": (
        "You typed {value}. Do you feel faint, dizzy or confused? If so, sit or lie down and call your "
        "clinician today. If you pass out or feel worse, call {number} now."
    ),
    "glucose very low": (
        "You typed {value}, which is very low. Follow your plan for low sugar now: the log can wait. Have "
        "someone stay with you. If you pass out, have a fit or cannot swallow, they must call {number} at once."
    ),
    "glucose low": "You typed {value}, which is low. Follow your plan for low sugar now: the log can wait.",
    "glucose very high": (
        "You typed {value}; the line is {limit} or more. Follow your sick-day plan. If it stays this high, if "
        "you throw up, breathe fast or feel confused, call {number} now."
    ),
    "glucose high": (
        "You typed {value}; the line is {limit} or more. Check your ketones if your plan says so. Follow your "
        "sick-day plan."
    ),
    "oxygen very low": (
        "You typed {value}. Sit still, warm your hand and measure again. If it is still {limit} or less, call "
        "{number} now. Go by how you feel, too: the meter is less exact on dark or cold skin."
    ),
    "oxygen low": (
        "You typed {value}. Sit still, warm your hand and measure again. If it is still {limit} or less, call "
        "your clinician today. If it is hard to breathe, call {number} now."
    ),
    "temperature very high": (
        "You typed {value}. Measure again. If it is still {limit} or more, call {number} now. Do so at once if "
        "you feel confused, have a stiff neck, a rash or a fit, or if it is hard to breathe."
    ),
    "temperature high": (
        "You typed {value}. Measure again. If it is still {limit} or more, call your clinician today. If you "
        "feel confused, have a stiff neck, a rash or a fit, or if it is hard to breathe, call {number} now."
    ),
    "fever": (
        "You typed {value}; a fever starts at {limit}. If you have few defences, as with cancer drugs, call "
        "your care team at once. If you feel confused, have a stiff neck, a rash or a fit, or if it is hard to "
        "breathe, call {number} now."
    ),
    "temperature very low": (
        "You typed {value}. Measure again. If it is still below {limit}, call {number} now. Keep warm."
    ),
    "rate high": (
        "On three or more of your last five days this was above {limit}, which is more than most adults have at "
        "rest. Tell your clinician. If you faint, or have chest pain or short breath, call {number} now."
    ),
    "rate low": (
        "On three or more of your last five days this was below {limit}, which is less than most adults have at "
        "rest. Tell your clinician. If you faint, or have chest pain or short breath, call {number} now."
    ),
    "weight gain": (
        "This is {limit} or more above your lowest weight of {ago}. Your clinic asked you to watch for this: "
        "call it today. If it is hard to breathe, call {number} now."
    ),
    "own high": (
        "You typed {value}, which is above your own limit of {limit}. Do what you agreed on for it. If you feel "
        "very ill, call {number} now."
    ),
    "own low": (
        "You typed {value}, which is below your own limit of {limit}. Do what you agreed on for it. If you feel "
        "very ill, call {number} now."
    ),
    "own gain": (
        "This is {limit} or more above your lowest weight of {ago}: your own limit. Do what you agreed on for "
        "it. If it is hard to breathe, call {number} now."
    ),
}
"""What each line says, by the words it names."""


def caution_sentences(met: Met, value: float, number: str) -> str:
    """What is said of a line that is met.

    Args:
        met: the line.
        value: what was typed.
        number: the emergency number the person chose, ``""`` for none.
    """
    ago = "the day before" if met.days == 1 else f"the last {count(met.days, 'day')}"
    said = CAUTION_WORDS[met.words].format(
        value=_with_unit(value, met.unit),
        limit=_with_unit(met.limit, met.unit),
        number=number or "your emergency number",
        ago=ago,
    )
    return f"{said} {PLAN_FIRST}"


def _with_unit(value: float, unit: str) -> str:
    return f"{plain(value, 4)} {unit}".strip()


def caution_for(journal: Journal, measure: int, day: date, slot: str, own: OwnCautions, number: str) -> str | None:
    """What is said of a value just kept, or None.

    Raises:
        KeyError: no such measure.
    """
    met = line_met(journal, measure, day, slot, own)
    entry = journal.entry(measure, day, slot)
    if met is None or entry is None or entry.value is None:
        return None
    title = journal.measures[measure].title
    words = f" Your clinic's words: “{own.words}”." if own.words and met.words in ("own low", "own high") else ""
    return f"{title}: {caution_sentences(met, entry.value, number)}{words}"
