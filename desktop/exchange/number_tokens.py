"""One number as a person or a spreadsheet writes it, read strictly: nothing is guessed.

Which of "." and "," is the decimal mark is decided by all the cells of a column together.
"""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal, NamedTuple

from desktop.exchange.units import convert_time, known_unit

DecimalMark = Literal[".", ","]
Kind = Literal["number", "duration", "pair"]

LARGEST = 1e9
"""No daily value is larger; a number beyond it is a telephone number, a code or a slip."""

_LONGEST = 60
_BLANK = frozenset({"", "-", "–", "—", "na", "n/a", "n.a.", "#n/a", "null"})
_MARKS = str.maketrans(
    {
        "\u2212": "-",
        "\u00a0": " ",
        "\u2007": " ",
        "\u2009": " ",
        "\u202f": " ",
        "\u2019": "'",
        "\uff0e": ".",
        "\uff0c": ",",
        "\u066b": ",",
        "\u066c": ".",
    }
)
_PLAIN = re.compile(r"-?[0-9]+", re.ASCII)
_PLAIN_POINT = re.compile(r"-?[0-9]{1,9}\.[0-9]{1,9}")
_SHOWS_POINT = re.compile(r"-?[0-9]+\.(?:[0-9]{1,2}|[0-9]{4,20})")
_NUMBER = re.compile(r"([+-]?)([0-9][0-9.,' ]*[0-9]|[0-9]|[.,][0-9]+)\s*(.*)", re.DOTALL)
_WORD = re.compile(r"[^\W\d_]{1,15}\.?")
_NOT_EXACT = re.compile(r"(?:[~≈<>≤≥]=?|(?:ca|about|approx|circa|etwa|env)\.?\s)\s*[+-]?[.,]?[0-9].*", re.I)
_PAIR = re.compile(r"([0-9]{2,3})\s?/\s?([0-9]{2,3})\s*(.*)")
_CLOCK = re.compile(r"([0-9]{1,3}):([0-5][0-9])(?::([0-5][0-9]))?")
_HOURS = re.compile(r"([0-9]{1,3})\s?(?:h|hrs?|std|hours?)\.?\s?([0-5]?[0-9])\s?(?:m|mn|mins?|minutes?)?\.?", re.I)
_WRITTEN: dict[DecimalMark, re.Pattern[str]] = {
    ".": re.compile(
        r"[0-9]+(?:\.[0-9]+)?|\.[0-9]+|[1-9][0-9]{0,2}(?:(?:,[0-9]{3})+|(?:[ '][0-9]{3})+)(?:\.[0-9]+)?"
    ),
    ",": re.compile(
        r"[0-9]+(?:,[0-9]+)?|,[0-9]+|[1-9][0-9]{0,2}(?:(?:\.[0-9]{3})+|(?:[ '][0-9]{3})+)(?:,[0-9]+)?"
    ),
}
_EITHER = re.compile(r"[1-9][0-9]{0,2}[.,][0-9]{3}")


class NumberToken(NamedTuple):
    """A number that could be read.

    Attributes:
        kind: a ``duration`` is in minutes; a ``pair`` has ``second``.
        value: the number, or the upper of a pair.
        unit: the unit written behind it, or ``""``.
        second: the lower of a pair.
    """

    kind: Kind
    value: float
    unit: str = ""
    second: float = 0.0


@dataclass(frozen=True, slots=True)
class Refusal:
    """Why a text is not taken as a value; ``reason`` is an id, not a sentence."""

    reason: str


def plain_marks(text: str) -> str:
    """The text with one kind of digit, minus, blank and apostrophe, and no blanks around it."""
    if not text.isascii():
        text = text.translate(_MARKS)
        if not text.isascii():
            text = "".join(_digit(char) for char in text)
    return text.strip()


def _digit(char: str) -> str:
    value = unicodedata.decimal(char, None)
    return char if value is None else str(value)


def is_blank(text: str) -> bool:
    """Whether a cell says that there is no value: empty, a dash, ``NA``, ``n/a`` or ``null``."""
    return text.strip().casefold() in _BLANK


def decide_decimal_mark(tokens: Iterable[str]) -> DecimalMark | None:
    """The decimal mark that all cells of a column together show, or None where that is open.

    It is open when every marked number could be a count of thousands (``1.234``, ``12,500``), and when
    one cell shows a decimal point and another a decimal comma. Without any mark it is ".".
    """
    shown: set[DecimalMark] = set()
    undecided = False
    for token in tokens:
        if _SHOWS_POINT.fullmatch(token):
            shown.add(".")
        elif "." in token or "," in token or not token.isascii():
            body = _body(plain_marks(token))
            mark = _mark_shown(body)
            if mark:
                shown.add(mark)
            elif _EITHER.fullmatch(body):
                undecided = True
    if len(shown) == 1:
        return shown.pop()
    return None if shown or undecided else "."


def _body(text: str) -> str:
    match = _NUMBER.fullmatch(text)
    return match.group(2) if match else ""


def _mark_shown(body: str) -> DecimalMark | None:
    if ("." not in body and "," not in body) or _EITHER.fullmatch(body):
        return None
    marks: tuple[DecimalMark, DecimalMark] = (".", ",")
    fitting = [mark for mark in marks if _WRITTEN[mark].fullmatch(body)]
    return fitting[0] if len(fitting) == 1 else None


def read_number(text: str, decimal: DecimalMark = ".") -> NumberToken | Refusal:
    """Read one cell.

    Args:
        text: the cell; thousands marks, a known unit behind it and any decimal digits are allowed.
        decimal: the decimal mark of its column.

    Returns:
        The number, duration or pair; or why not: ``blank``, ``not exact``, ``not a number``,
        ``other decimal mark``, ``unknown unit``, ``unclear duration``, ``out of range``.
    """
    if len(text) < 10 and _PLAIN.fullmatch(text):
        return NumberToken("number", float(text) + 0.0)
    if decimal == "." and _PLAIN_POINT.fullmatch(text):
        return NumberToken("number", float(text) + 0.0)
    if is_blank(text):
        return Refusal("blank")
    if len(text) > _LONGEST:
        return Refusal("not a number")
    text = plain_marks(text)
    return _read_timed(text) or _read_pair(text) or _read_amount(text, decimal)


def _read_timed(text: str) -> NumberToken | Refusal | None:
    match = _CLOCK.fullmatch(text) or _HOURS.fullmatch(text)
    if match is None:
        return None
    hours, minutes, *rest = match.groups()
    if int(hours) > 24:
        return Refusal("unclear duration")
    seconds = int(rest[0]) if rest and rest[0] else 0
    return NumberToken("duration", int(hours) * 60.0 + int(minutes) + seconds / 60.0)


def _read_pair(text: str) -> NumberToken | None:
    match = _PAIR.fullmatch(text)
    if match is None or match.group(2) == "10":
        return None
    unit = known_unit(match.group(3))
    if match.group(3) and not unit:
        return None
    return NumberToken("pair", float(match.group(1)), unit, float(match.group(2)))


def _read_amount(text: str, decimal: DecimalMark) -> NumberToken | Refusal:
    match = _NUMBER.fullmatch(text)
    if match is None:
        return Refusal("not exact" if _NOT_EXACT.fullmatch(text) else "not a number")
    sign, body, behind = match.groups()
    unit = known_unit(behind)
    if behind and not unit:
        return Refusal("unknown unit" if _WORD.fullmatch(behind) else "not a number")
    if not _WRITTEN[decimal].fullmatch(body):
        other: DecimalMark = "," if decimal == "." else "."
        return Refusal("other decimal mark" if _WRITTEN[other].fullmatch(body) else "not a number")
    group = "," if decimal == "." else "."
    value = float(sign + body.replace(group, "").replace(" ", "").replace("'", "").replace(",", "."))
    return NumberToken("number", value + 0.0, unit) if abs(value) <= LARGEST else Refusal("out of range")


def read_typed(text: str, unit: str = "") -> float | Refusal:
    """Read what a person typed for one measure; a single comma or point is always the decimal mark.

    Args:
        text: as typed.
        unit: the unit of the measure in the person's words; ``1:05`` needs one of minutes or hours.

    Returns:
        The value in that unit; or why not: the reasons of ``read_number``, and ``pair``,
        ``duration without unit``, ``other unit``.
    """
    plain = plain_marks(text)
    decimal: DecimalMark = "," if "," in plain else "."
    if plain.count(".") + plain.count(",") > 1:
        return Refusal("not a number")
    token = read_number(plain, decimal)
    return token if isinstance(token, Refusal) else in_unit(token, known_unit(unit) or unit.strip())


def in_unit(token: NumberToken, unit: str) -> float | Refusal:
    """The value of a number or duration in the unit of its measure, or why it has none there."""
    if token.kind == "pair":
        return Refusal("pair")
    written = "min" if token.kind == "duration" else token.unit
    if not written or (written == unit and token.kind == "number"):
        return token.value
    value = convert_time(token.value, written, unit)
    if value is not None:
        return value
    return Refusal("duration without unit" if token.kind == "duration" else "other unit")
