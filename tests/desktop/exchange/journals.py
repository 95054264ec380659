"""Journals for tests of going out and coming back: one with every field filled, and any at all."""

from datetime import date

from hypothesis import strategies as st

from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Span

FULL = Journal.of(
    [
        Person("0123456789abcdef" * 2, "Ana Ünal", 'Does "it" help,\nor not?'),
        Measure(
            7, 3, "Pressure ↑", "mmHg", "score", "week", "zero", "median", "range", 110.5, 129.25, 60.125, 1e9, 2,
            "pressure", 0.1, date(2026, 12, 31), True,
        ),
        Measure(9, 4, "=Walk; long", "min", "amount", missed="zero"),
        Entry(7, date(2024, 2, 29), "morning", -0.30000000000000004, "extra", 'said "ok"\n', "−0,3", "table",
              "2026-03-09T21:04:05+02:00"),
        Entry(9, date(2024, 2, 29), value=0.0, kind="zero", original="0"),
        Entry(9, date(2024, 3, 1), kind="ill", note="'=cmd"),
        Entry(9, date(2024, 3, 2), value=31.5, kind="set aside", note="cuff slipped", original="31,5 min"),
        Change(4, date(1900, 1, 1), "new, routine", "bad spell", 14, (7, 9)),
        Change(5, date(2024, 3, 1)),
        Span(5, date(2026, 1, 2), date(2199, 12, 31), "device", "new cuff", (7,)),
        Plan(6, 7, date(2026, 1, 5), 5, 2),
        DayNote(date(2026, 1, 6), "slept\r\nbadly 😀"),
    ]
)  # fmt: skip

TEXTS = st.text(
    st.one_of(st.sampled_from("=+-@'\",;\t\r\n |\u2028٤é😀א"), st.characters(exclude_categories=["Cs"])).filter(
        lambda char: char != "\0"
    ),
    max_size=12,
)
DAYS = st.dates(date(1900, 1, 1), date(2199, 12, 31))
NUMBERS = st.floats(-1e9, 1e9).map(lambda value: value + 0.0)
KINDS = st.sampled_from(["amount", "count", "reading", "yes/no"])
EMPTY = st.sampled_from(["blank", "rest", "ill", "away"])
COUNTED = st.sampled_from(["value", "late", "extra", "set aside"])


@st.composite
def journals(draw) -> Journal:
    """Any journal of up to three measures."""
    records = [Person("0" * 32, draw(TEXTS), draw(TEXTS))]
    ids = draw(st.lists(st.integers(1, 2_000_000_000), max_size=3, unique=True))
    for place, number in enumerate(ids):
        records.append(
            Measure(
                number, place, draw(TEXTS), draw(TEXTS), draw(KINDS),
                goal_low=draw(st.none() | NUMBERS), decimals=draw(st.integers(0, 9)), pair=draw(TEXTS),
                look_day=draw(st.none() | DAYS), archived=draw(st.booleans()),
            )
        )  # fmt: skip
        keys = draw(st.lists(st.tuples(DAYS, TEXTS), max_size=4, unique=True))
        for day, slot in keys:
            value = draw(st.none() | NUMBERS)
            kind = draw(EMPTY if value is None else COUNTED)
            source = draw(st.sampled_from(["typed", "table", "sample"]))
            clock = draw(st.sampled_from(["", "2026-03-09T21:04:05"]))
            records.append(Entry(number, day, slot, value, kind, draw(TEXTS), draw(TEXTS), source, clock))
    concerned = st.lists(st.sampled_from(ids), max_size=3).map(tuple) if ids else st.just(())
    for number in range(draw(st.integers(0, 2))):
        records.append(
            Change(number + 1, draw(DAYS), draw(TEXTS), draw(st.none() | st.just("planned")), 3, draw(concerned))
        )
        first, last = sorted([draw(DAYS), draw(DAYS)])
        records.append(Span(number + 1, first, last, "away", draw(TEXTS), draw(concerned)))
    if draw(st.booleans()):
        records.append(DayNote(draw(DAYS), draw(TEXTS)))
    return Journal.of(records)
