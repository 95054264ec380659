"""The cells of one column to values: its decimal mark, its unit, durations and pairs, settled by all cells."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from desktop.errors import ExchangeError
from desktop.exchange.number_tokens import (
    DecimalMark,
    NumberToken,
    Refusal,
    decide_decimal_mark,
    in_unit,
    read_number,
)
from desktop.exchange.table import Column
from desktop.exchange.units import impossible, unit_in_name

HALVES = ("upper", "lower")
"""What the two columns made of a column of pairs have behind its name."""

Outcome = float | Refusal | None
"""A value, why there is none, or None for a blank cell."""


@dataclass(frozen=True)
class CellsRead:
    """A column of values, or one half of a column of pairs.

    Attributes:
        name: the column's name; of a half, with ``upper`` or ``lower`` behind it.
        unit: the unit of every value, or ``""``.
        decimal: the decimal mark.
        durations: some cells were hours and minutes.
        pair: the name of the column of pairs it is a half of, else ``""``.
        outcomes: what each different text came to.
    """

    name: str
    unit: str
    decimal: DecimalMark
    durations: bool
    pair: str
    outcomes: dict[str, Outcome]


def holds_values(column: Column) -> bool:
    """Whether at least half of a column's filled cells are numbers or are meant as such."""
    filled = column.filled
    numeric = sum(number for text, number in filled.items() if _is_meant_as_number(text))
    return numeric > 0 and 2 * numeric >= sum(filled.values())


def _is_meant_as_number(text: str) -> bool:
    token = read_number(text)
    if isinstance(token, NumberToken):
        return True
    meant = ("not exact", "out of range", "other decimal mark", "unknown unit", "unclear duration")
    return token.reason in meant


def read_values(column: Column, decimal: DecimalMark | None, *, one_day: bool) -> tuple[CellsRead, ...]:
    """Read a column of values.

    Args:
        column: the column.
        decimal: the person's answer where the cells leave the decimal mark open.
        one_day: a row stands for one day, so that no duration can be longer.

    Returns:
        One column, or two where its cells are pairs.

    Raises:
        ExchangeError: ``which decimal mark``, with ``column``, ``choices`` and an ``example``.
    """
    counts = column.filled
    mark = _settle_mark(column, counts, decimal)
    tokens = {text: read_number(text, mark) for text in counts}
    read = {text: token for text, token in tokens.items() if isinstance(token, NumberToken)}
    blanks: dict[str, Outcome] = {text: None for text in column.counts if text not in counts}
    refused: dict[str, Outcome] = {text: token for text, token in tokens.items() if isinstance(token, Refusal)}
    unit = _settle_unit(column, read, counts)
    durations = any(token.kind == "duration" for token in read.values())

    def half(name: str, pair: str, value: Callable[[NumberToken], float | Refusal]) -> CellsRead:
        kept: dict[str, Outcome] = {
            text: _possible(value(token), unit, one_day=one_day) for text, token in read.items()
        }
        return CellsRead(name, unit, mark, durations, pair, blanks | refused | kept)

    if not _is_of_pairs(read, counts):
        return (half(column.name, "", lambda token: in_unit(token, unit)),)
    upper, lower = (f"{column.name} {word}" for word in HALVES)
    return (
        half(upper, column.name, lambda token: _of_pair(token, token.value)),
        half(lower, column.name, lambda token: _of_pair(token, token.second)),
    )


def _settle_mark(column: Column, texts: Sequence[str] | dict[str, int], answer: DecimalMark | None) -> DecimalMark:
    mark = decide_decimal_mark(texts) or answer
    if mark is None:
        example = min(text for text in texts if "." in text or "," in text)
        raise ExchangeError("which decimal mark", column=column.name, choices=[".", ","], example=example)
    return mark


def _settle_unit(column: Column, read: dict[str, NumberToken], counts: dict[str, int]) -> str:
    """The unit of the header, else the one most cells have, else minutes where all cells are durations."""
    if column.unit:
        return column.unit
    written: Counter[str] = Counter()
    plain = durations = 0
    for text, token in read.items():
        if token.unit:
            written[token.unit] += counts[text]
        durations += token.kind == "duration"
        plain += token.kind == "number" and not token.unit and token.value != 0
    if written:
        return min(written, key=lambda unit: (-written[unit], unit))
    if not durations:
        return ""
    return unit_in_name(column.name) or ("" if plain else "min")


def _is_of_pairs(read: dict[str, NumberToken], counts: dict[str, int]) -> bool:
    pairs = sum(counts[text] for text, token in read.items() if token.kind == "pair")
    return pairs > 0 and 2 * pairs >= sum(counts[text] for text in read)


def _of_pair(token: NumberToken, value: float) -> float | Refusal:
    if token.kind != "pair":
        return Refusal("not a pair")
    return Refusal("pair reversed") if token.value < token.second else value


def _possible(value: float | Refusal, unit: str, *, one_day: bool) -> float | Refusal:
    if isinstance(value, Refusal):
        return value
    reason = impossible(value, unit, one_day=one_day)
    return Refusal(reason) if reason else value
