"""Words of a copy to hand over: exactly what goes, and what stays."""

from __future__ import annotations

from collections.abc import Iterable

from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Record, Span
from desktop.wording.days import full_day
from desktop.wording.numbers import count

STAYS = "The history, earlier copies, and every measure and day that is not listed stay here."
SAME = "Let the copy be known as the same journal"
NOT_SECRET = "The copy is an ordinary file: whoever has it can read it."


def goes_lines(records: Iterable[Record]) -> list[str]:
    """What is in the copy, one line each."""
    listed = list(records)
    lines: list[str] = []
    for measure in (record for record in listed if isinstance(record, Measure)):
        entries = [one for one in listed if isinstance(one, Entry) and one.measure == measure.id]
        days = sorted(one.day for one in entries)
        between = f", {full_day(days[0])} to {full_day(days[-1])}" if days else ""
        words = sum(bool(one.note) for one in entries)
        noted = f", {count(words, 'remark')}" if words else ""
        lines.append(f"{measure.title}: {count(len(entries), 'value')}{between}{noted}")
    for change in (record for record in listed if isinstance(record, Change)):
        lines.append(f"the change of {full_day(change.day)}: {change.label or 'no label'}")
    for span in (record for record in listed if isinstance(record, Span)):
        lines.append(f"named days from {full_day(span.first)}: {span.label or span.kind}")
    notes = sum(isinstance(record, DayNote) for record in listed)
    if notes:
        lines.append(f"{count(notes, 'note')} about days")
    for person in (record for record in listed if isinstance(record, Person)):
        parts = [text for text in (person.name, person.question) if text]
        lines += [f"your name and question: {', '.join(parts)}"] if parts else []
    return lines
