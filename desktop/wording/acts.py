"""What a person did, in a few words, for Undo and Redo."""

from __future__ import annotations

from datetime import date

from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Span
from desktop.journal.row_change import Act, RowChange, Step
from desktop.wording.days import MONTHS
from desktop.wording.entry import number_text
from desktop.wording.numbers import count

_PHRASES: dict[Act, str] = {
    "start journal": "the new journal",
    "set person": "the name or question",
    "add measure": "the new measure",
    "set measure": "the measure's settings",
    "remove measure": "the removed measure",
    "put value": "the value",
    "clear values": "the cleared days",
    "set kind": "the kind of day",
    "set aside": "the day set aside",
    "put back": "the day put back",
    "write note": "the note",
    "paste values": "the pasted block",
    "bring in table": "the table brought in",
    "mark change": "the change",
    "edit change": "the edited change",
    "remove change": "the removed change",
    "mark span": "the named days",
    "remove span": "the removed named days",
    "restore copy": "the earlier copy put in place",
    "put earlier back": "the earlier value put back",
    "win back": "the days won back",
    "set plan": "the plan of days a week",
    "start caseload": "the new caseload",
    "set coach": "the caseload's settings",
    "add clients": "the new clients",
    "set client": "the client's settings",
    "write session": "the session",
    "remove session": "the removed session",
    "mark looked at": "the mark that a client was looked at",
}
"""For acts whose records say no more."""


def act_phrase(step: Step, journal: Journal) -> str:
    """What a step did: ``30 minutes on 4 May``, ``the change “earlier bus”``, ``12 days of the pasted block``."""
    if step.act in ("restore copy", "win back"):
        return _PHRASES[step.act]
    if len(step.changes) > 1 and step.act in ("paste values", "bring in table", "clear values"):
        entries = sum(isinstance(change.record, Entry) for change in step.changes)
        return f"{_PHRASES[step.act]}, {count(entries, 'day')}"
    return _record_phrase(step.changes[0], journal) or _PHRASES[step.act]


def plain_act_phrase(act: Act) -> str:
    """What an act did, without the record: ``the session``, ``the client's settings``."""
    return _PHRASES[act]


def _record_phrase(change: RowChange, journal: Journal) -> str:
    match change.record:
        case Entry() as entry:
            measure = journal.measures.get(entry.measure)
            on = f"on {_short(entry.day)}"
            if measure is None or change.after is None:
                return f"the day made blank {on}"
            if entry.value is None or entry.kind == "set aside":
                return f"{entry.kind} {on}"
            return f"{number_text(measure, entry.value)} {measure.unit}".strip() + f" {on}"
        case Measure() as measure:
            return f"the measure “{measure.title}”"
        case Change() as marked:
            return f"the change “{marked.label}”" if marked.label else f"the change on {_short(marked.day)}"
        case Span() as span:
            return f"the named days “{span.label or span.kind}”"
        case DayNote() as note:
            return f"the note on {_short(note.day)}"
    return ""


def _short(day: date) -> str:
    return f"{day.day} {MONTHS[day.month - 1]}"
