"""The tables of a journal file and of a caseload file, as each version declares them.

This text is what every file of a version holds and is compared with at opening, so it never changes: a new
version is a new migration.
"""

from __future__ import annotations

APPLICATION_ID = int.from_bytes(b"DyFc", "big")
"""Bytes 68 to 71 of the header of every journal."""

CASELOAD_ID = int.from_bytes(b"DyFk", "big")
"""The same of every caseload."""

_SHORT_TEXT = 400
_LONG_TEXT = 16_000
_CLOCK = "[0-9][0-9][0-9][0-9]-[01][0-9]-[0-3][0-9]T[0-2][0-9]:[0-5][0-9]:[0-5][0-9]*"


def _text(name: str, limit: int = _SHORT_TEXT) -> str:
    # length() of a text stops at its first zero byte, so the bytes are counted.
    return (
        f'"{name}" TEXT NOT NULL CHECK (length(CAST("{name}" AS BLOB)) <= {limit}'
        f" AND instr(CAST(\"{name}\" AS BLOB), x'00') = 0)"
    )


def _day(name: str, null: str = "NOT NULL") -> str:
    # Without a modifier date() takes 30 February as it stands; the pattern keeps words such as 'now' from it.
    return (
        f'"{name}" TEXT {null} CHECK ("{name}" GLOB \'[0-9][0-9][0-9][0-9]-[01][0-9]-[0-3][0-9]\''
        f' AND date("{name}", \'+0 days\') IS "{name}"'
        f" AND \"{name}\" BETWEEN '1900-01-01' AND '2199-12-31')"
    )


def _clock(name: str, otherwise: str = "") -> str:
    return (
        f'"{name}" TEXT NOT NULL CHECK (({otherwise}"{name}" GLOB \'{_CLOCK}\')'
        f' AND length(CAST("{name}" AS BLOB)) <= 40 AND instr(CAST("{name}" AS BLOB), x\'00\') = 0)'
    )


def _number(name: str) -> str:
    return f'"{name}" REAL CHECK ("{name}" BETWEEN -1e9 AND 1e9)'


def _whole(name: str, low: int, high: int) -> str:
    return f'"{name}" INTEGER NOT NULL CHECK ("{name}" BETWEEN {low} AND {high})'


def _word(name: str, words: str, null: str = "NOT NULL") -> str:
    return f'"{name}" TEXT {null} CHECK ("{name}" IN ({words}))'


_ID = '"id" INTEGER PRIMARY KEY CHECK ("id" BETWEEN 1 AND 2000000000)'
_ONE_MEASURE = '"measure" INTEGER NOT NULL REFERENCES "measure" ("id") DEFERRABLE INITIALLY DEFERRED'
# Ids with a comma between them: '' or '3' or '3,5'.
_MEASURES = (
    '"measures" TEXT NOT NULL CHECK (length(CAST("measures" AS BLOB)) <= 4000'
    " AND instr(CAST(\"measures\" AS BLOB), x'00') = 0"
    " AND \"measures\" NOT GLOB '*[^0-9,]*' AND \"measures\" NOT GLOB '[0,]*'"
    " AND \"measures\" NOT GLOB '*,' AND \"measures\" NOT GLOB '*,[0,]*')"
)


def _table(name: str, *parts: str, options: str = "STRICT") -> str:
    return f'CREATE TABLE "{name}" (\n    ' + ",\n    ".join(parts) + f"\n) {options}"


def _history(tables: str) -> tuple[str, ...]:
    return (
        _table(
            "history",
            '"seq" INTEGER PRIMARY KEY AUTOINCREMENT',
            '"step" INTEGER NOT NULL CHECK ("step" BETWEEN 1 AND "seq")',
            _clock("at"),
            _word("kind", "'do', 'undo', 'redo'"),
            _text("act"),
            '"of" INTEGER CHECK ("of" BETWEEN 1 AND "step" - 1)',
            _word("tbl", tables),
            _text("key", 1000),
            '"before" TEXT',
            '"after" TEXT',
            '"chain" BLOB NOT NULL CHECK (length("chain") = 16)',
            'CHECK (("of" IS NULL) = ("kind" = \'do\'))',
            'CHECK ("before" IS NOT NULL OR "after" IS NOT NULL)',
        ),
        """CREATE TRIGGER "history_stays" BEFORE DELETE ON "history"
BEGIN SELECT RAISE(ABORT, 'the history only grows'); END""",
        """CREATE TRIGGER "history_as_written" BEFORE UPDATE ON "history"
BEGIN SELECT RAISE(ABORT, 'the history only grows'); END""",
        # INSERT OR REPLACE takes a row away without asking the trigger on DELETE.
        """CREATE TRIGGER "history_in_order" BEFORE INSERT ON "history"
WHEN EXISTS (SELECT 1 FROM "history" WHERE "seq" >= NEW."seq")
BEGIN SELECT RAISE(ABORT, 'the history only grows'); END""",
    )


VERSION_1: tuple[str, ...] = (
    _table(
        "person",
        '"journal_id" TEXT NOT NULL CHECK (length(CAST("journal_id" AS BLOB)) = 32'
        " AND instr(CAST(\"journal_id\" AS BLOB), x'00') = 0"
        " AND \"journal_id\" NOT GLOB '*[^0-9a-f]*')",
        _text("name"),
        _text("question", _LONG_TEXT),
    ),
    'CREATE UNIQUE INDEX "one_person" ON "person" ((1))',
    """CREATE TRIGGER "person_stays" BEFORE DELETE ON "person"
BEGIN SELECT RAISE(ABORT, 'the person record stays'); END""",
    _table(
        "measure",
        _ID,
        _whole("position", 0, 1_000_000),
        _text("title"),
        _text("unit"),
        _word("kind", "'amount', 'count', 'reading', 'score', 'yes/no'"),
        _word("period", "'day', 'week', 'month', 'year'"),
        _word("missed", "'zero', 'blank'"),
        _word("combine", "'sum', 'mean', 'median', 'first', 'last', 'max', 'min'", null=""),
        _word("aim", "'more', 'less', 'none', 'range'"),
        _number("goal_low"),
        _number("goal_high"),
        _number("likely_low"),
        _number("likely_high"),
        _whole("decimals", 0, 9),
        _text("pair"),
        '"worth" REAL CHECK ("worth" > 0 AND "worth" <= 1e9)',
        _day("look_day", null=""),
        _whole("archived", 0, 1),
        'CHECK ("goal_low" <= "goal_high")',
        'CHECK ("likely_low" <= "likely_high")',
    ),
    _table(
        "entry",
        _ONE_MEASURE,
        _day("day"),
        _text("slot"),
        _number("value"),
        _word("kind", "'value', 'zero', 'blank', 'rest', 'ill', 'away', 'set aside', 'late', 'extra'"),
        _text("note", _LONG_TEXT),
        _text("original", _LONG_TEXT),
        _word("source", "'typed', 'table', 'sample'"),
        _clock("entered_at", otherwise="\"entered_at\" = '' OR "),
        'PRIMARY KEY ("measure", "day", "slot")',
        "CHECK ((\"value\" IS NULL) = (\"kind\" IN ('blank', 'rest', 'ill', 'away')))",
        'CHECK ("kind" <> \'zero\' OR "value" = 0)',
        options="STRICT, WITHOUT ROWID",
    ),
    _table(
        "change",
        _ID,
        _day("day"),
        _text("label", _LONG_TEXT),
        _word("why", "'bad spell', 'planned', 'advised', 'other'", null=""),
        _whole("settle_days", 0, 3650),
        _MEASURES,
    ),
    _table(
        "span",
        _ID,
        _day("first"),
        _day("last"),
        _word("kind", "'ill', 'away', 'device', 'other'"),
        _text("label", _LONG_TEXT),
        _MEASURES,
        'CHECK ("first" <= "last")',
    ),
    _table(
        "plan",
        _ID,
        _ONE_MEASURE,
        _day("first"),
        _whole("times", 0, 7),
        _whole("spare", 0, 7),
    ),
    _table("note", _day("day"), _text("text", _LONG_TEXT), 'PRIMARY KEY ("day")'),
    *_history("'person', 'measure', 'entry', 'change', 'span', 'plan', 'note'"),
)
"""The statements that make a version-1 journal, in order."""

VERSION_2: tuple[str, ...] = (
    f'ALTER TABLE "measure" ADD COLUMN {_number("limit_low")}',
    f'ALTER TABLE "measure" ADD COLUMN {_number("limit_high")}',
    f"ALTER TABLE \"measure\" ADD COLUMN {_text('limit_words', _LONG_TEXT)} DEFAULT ''",
)
"""From version 1: the limits the person's clinic gave them."""

CASELOAD_VERSION_1: tuple[str, ...] = (
    _table(
        "coach",
        '"caseload_id" TEXT NOT NULL CHECK (length(CAST("caseload_id" AS BLOB)) = 32'
        " AND instr(CAST(\"caseload_id\" AS BLOB), x'00') = 0"
        " AND \"caseload_id\" NOT GLOB '*[^0-9a-f]*')",
        _text("name"),
        _text("folder", _LONG_TEXT),
    ),
    'CREATE UNIQUE INDEX "one_coach" ON "coach" ((1))',
    """CREATE TRIGGER "coach_stays" BEFORE DELETE ON "coach"
BEGIN SELECT RAISE(ABORT, 'the coach record stays'); END""",
    _table(
        "client",
        _ID,
        '"journal_id" TEXT NOT NULL UNIQUE CHECK (length(CAST("journal_id" AS BLOB)) = 32'
        " AND instr(CAST(\"journal_id\" AS BLOB), x'00') = 0"
        " AND \"journal_id\" NOT GLOB '*[^0-9a-f]*')",
        _text("code"),
        '"doing" INTEGER CHECK ("doing" BETWEEN 1 AND 2000000000)',
        '"outcome" INTEGER CHECK ("outcome" BETWEEN 1 AND 2000000000)',
        _day("next_session", null=""),
        _day("looked_on", null=""),
        _text("looked_reasons", 1000),
        _whole("ended", 0, 1),
    ),
    _table(
        "session",
        '"client" INTEGER NOT NULL REFERENCES "client" ("id") DEFERRABLE INITIALLY DEFERRED',
        _day("day"),
        _text("agreed", _LONG_TEXT),
        _whole("times", 0, 7),
        _whole("spare", 0, 7),
        _text("note", _LONG_TEXT),
        'PRIMARY KEY ("client", "day")',
        options="STRICT, WITHOUT ROWID",
    ),
    *_history("'coach', 'client', 'session'"),
    # What was made out of each file the last time, so that it is not read again while it stays as it is.
    # It can be made again at any time, so it is in no history.
    _table(
        "seen",
        _text("file", 1000),
        _text("stamp", 1000),
        _text("facts", 1_000_000),
        'PRIMARY KEY ("file")',
        options="STRICT, WITHOUT ROWID",
    ),
)
"""The statements that make a version-1 caseload, in order."""
