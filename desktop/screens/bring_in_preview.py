"""What a preview of a table says, put together from what was read."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from desktop.exchange.reading import Reading
from desktop.wording.bring_in import Preview, aside_line, preview_sentences

MOST_SHOWN = 200
"""So many lines set aside are listed; the rest are counted."""


def summary_of(name: str, reading: Reading) -> str:
    """What was read of a file of this name."""
    days = [day for column in reading.columns if column.values for day in _ends(column.values.days)]
    aside = len(reading.set_aside)
    return preview_sentences(
        name,
        Preview(
            len(reading.fates),
            len(reading.fates.others) - aside,
            aside,
            (min(days), max(days)) if days else None,
            len(reading.several_a_day),
            reading.encoding_guessed,
            [(column.name, column.unit) for column in reading.columns if column.durations],
        ),
    )


def _ends(days: Sequence[date]) -> tuple[date, date]:
    return min(days), max(days)


def lines_set_aside(reading: Reading) -> list[str]:
    """Every line or cell set aside, with its line number and why, in the order of the file."""
    refused = [fate for column in reading.columns for fate in column.refused]
    aside = {fate.line: fate for fate in [*reading.set_aside, *refused]}
    lines = [aside_line(fate.line, fate.reason, fate.text) for _, fate in sorted(aside.items())[:MOST_SHOWN]]
    return [*lines, f"and {len(aside) - MOST_SHOWN} more"] if len(aside) > MOST_SHOWN else lines
