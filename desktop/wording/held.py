"""Words for what one day has held."""

from __future__ import annotations

from datetime import date, datetime

from desktop.journal.records import DayNote, Entry, Measure, Record
from desktop.journal.row_change import Act
from desktop.wording.days import full_day, long_day
from desktop.wording.entry import number_text

NEVER = "Nothing was ever written down here."

_HOW: dict[Act, str] = {
    "put value": "written down",
    "clear values": "made blank",
    "set kind": "marked",
    "set aside": "set aside",
    "put back": "put back",
    "paste values": "pasted",
    "bring in table": "brought in",
    "write note": "written",
    "restore copy": "from an earlier copy",
    "put earlier back": "put back",
    "win back": "won back",
    "start journal": "from the start",
}


def held_title(day: date, measure: Measure | None) -> str:
    """Whose values are listed."""
    return f"{measure.title if measure is not None else 'Note'}, {long_day(day)}. Newest first."


def held_line(at: str, act: Act, record: Record | None, measure: Measure | None) -> str:
    """One line of the list: ``45 minutes, written down 3 March 2031, 20:15``."""
    when = datetime.fromisoformat(at)
    return f"{_what(record, measure)}, {_HOW.get(act, 'changed')} {full_day(when.date())}, {when:%H:%M}"


def _what(record: Record | None, measure: Measure | None) -> str:
    match record:
        case Entry() if record.value is None:
            return record.kind
        case Entry():
            unit = measure.unit if measure is not None else ""
            number = number_text(measure, record.value) if measure is not None and record.value is not None else ""
            aside = " (set aside)" if record.kind == "set aside" else ""
            return f"{number} {unit}".strip() + aside
        case DayNote():
            return f"“{record.text}”"
    return "nothing"
