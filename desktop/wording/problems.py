"""An error in plain words: what is wrong, where, and what to do about it."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from pathlib import Path

from analysis.errors import AnalysisError
from desktop.errors import DayfenceError, ExchangeError, StorageError

Fields = Mapping[str, object]

_ORDERS = {
    "dmy": "day, month, year",
    "mdy": "month, day, year",
    "ymd": "year, month, day",
}
_MARKS = {".": "a point", ",": "a comma"}


def problem_sentence(error: DayfenceError | AnalysisError, *, in_command: bool = False) -> str:
    """The sentence of an error.

    Args:
        error: what went wrong.
        in_command: whether it is said on the command line, where a question names the option that answers it.

    Raises:
        KeyError: an error without a sentence; a test looks for one.
    """
    if isinstance(error, AnalysisError):
        return _ANALYSIS[error.reason](error.fields)
    if isinstance(error, StorageError):
        return _STORAGE[error.reason](error.fields)
    if isinstance(error, ExchangeError) and error.reason in _QUESTIONS:
        question, option = _QUESTIONS[error.reason]
        return f"{question(error.fields)} {option}" if in_command else question(error.fields)
    return _EXCHANGE[error.reason](error.fields)


def not_copied_sentence(error: Exception) -> str:
    """That the journal could not be copied, which is no trouble for what is being typed."""
    why = {
        "missing": " the place for it is not there",
        "disk full": " the disk is full",
        "read only": " the place for it cannot be written",
    }
    reason = why.get(error.reason, "") if isinstance(error, StorageError) else ""
    return f"No new copy of the journal could be made{':' if reason else ''}{reason}. The journal itself is saved."


def damaged_caseload_sentence(path: Path, made: str, *, is_gone: bool) -> str:
    """That a caseload cannot be opened, but a copy of it can."""
    if is_gone:
        return f"{path.name} is not where it was. The copy of {made} is whole. Open that copy in its place?"
    return (
        f"{path.name} is damaged. It was not changed. The copy of {made} is whole. Go on with that copy? The "
        "damaged file stays beside it under another name."
    )


def stranger_sentence(error: StorageError) -> str:
    """Why a journal that came from elsewhere was not read."""
    if error.reason in ("damaged", "refused value"):
        return (
            f"{_name(error.fields)} was not read: it is damaged, or holds something that no journal holds. "
            "It was not changed. Ask for another copy of it."
        )
    return problem_sentence(error)


def choice_label(reason: str, choice: object) -> str:
    """An answer to a question of the importer, as a button says it."""
    if reason == "which day order":
        return _ORDERS[str(choice)].capitalize()
    if reason == "which decimal mark":
        return "Decimal point" if choice == "." else "Decimal comma"
    if reason == "which name column":
        return f"Yes, “{choice}”" if choice else "No, one measure"
    return str(choice)


def _name(fields: Fields) -> str:
    path = str(fields.get("path", "the file"))
    return Path(path).name or path


def _listed(choices: object) -> str:
    if not isinstance(choices, Sequence) or not choices:
        return "none"
    shown = [f"“{choice}”" for choice in choices[:12]]
    return ", ".join(shown) + (f" and {len(choices) - 12} more" if len(choices) > 12 else "")


def _either(choices: object, words: Mapping[str, str]) -> str:
    assert isinstance(choices, Sequence)
    return " or ".join(words.get(str(choice), str(choice)) for choice in choices)


def _either_of(choices: object) -> str:
    assert isinstance(choices, Sequence)
    return " or ".join(f"“{choice}”" for choice in choices if choice)


def _too_large(fields: Fields) -> str:
    limit = fields.get("limit")
    where = f" (line {fields['line']})" if fields.get("line") else ""
    match fields.get("what"):
        case "bytes":
            megabytes = int(str(limit)) // 1_000_000
            return f"The file is too large: up to {megabytes} MB can be brought in. Cut it into parts."
        case "rows":
            return f"The table is too long: up to {limit:,} rows can be brought in. Cut it into parts."
        case "columns":
            return f"The table is too wide{where}: up to {limit} columns can be brought in. Leave some out."
        case _:
            return f"One cell is too long{where}: up to {limit:,} characters. Is this file a table?"


def _at_line(fields: Fields) -> str:
    return f" (line {fields['line']})" if fields["line"] else ""


def _no_days_read(fields: Fields) -> str:
    return f"No day could be read in the column “{fields['column']}”. Days look like 2031-03-04 or 4 March 2031."


_EXCHANGE: dict[str, Callable[[Fields], str]] = {
    "missing": lambda fields: f"There is no file {fields['path']}. Check the name.",
    "cannot open": lambda fields: f"{_name(fields)} cannot be read here. Check that it is a file you may open.",
    "empty": lambda _: "The file is empty: there is nothing to bring in.",
    "not text": lambda _: "This file is not text, so no table can be read from it. Save the table as CSV first.",
    "too large": _too_large,
    "not a table": lambda _: (
        "No table was found in this file. A table has one row a day: a day and a number, parted by a comma."
    ),
    "header alone": lambda _: (
        "The table has a header line and no days. Write a line for each day under it, then bring it in."
    ),
    "no day column": lambda fields: (
        f"No column of days was found among {_listed(fields['columns'])}. "
        "One column must hold days such as 2031-03-04."
    ),
    "no value column": lambda fields: f"No column of numbers was found among {_listed(fields['columns'])}.",
    "no days read": _no_days_read,
    "workbook": lambda _: (
        "This is a spreadsheet workbook. Open it in the spreadsheet, save the sheet as CSV, and bring that in."
    ),
    "not a package": lambda fields: (
        f"{_name(fields)} does not describe a journal of this program. Bring in its tables one by one."
    ),
    "package damaged": lambda fields: (
        f"The table {fields['file']}{_at_line(fields)} is not as it was written, so nothing was brought in."
    ),
    "unknown column": lambda fields: (
        f"There is no column “{fields['name']}”. The columns are {_listed(fields['choices'])}."
    ),
}

_QUESTIONS: dict[str, tuple[Callable[[Fields], str], str]] = {
    "which day column": (
        lambda fields: f"Which column holds the day: {_listed(fields['choices'])}?",
        "Say it with --day-column COLUMN.",
    ),
    "which value column": (
        lambda fields: f"Which column holds the values: {_listed(fields['choices'])}?",
        "Say it with --measure COLUMN.",
    ),
    "which name column": (
        lambda fields: (
            f"Does the column {_either_of(fields['choices'])} say what each number is about, "
            "so that each word in it is a measure of its own?"
        ),
        "Say it with --name-column COLUMN, or --name-column none.",
    ),
    "which day order": (
        lambda fields: f"The days can be read in more than one way: {_either(fields['choices'], _ORDERS)}?",
        "Say it with --day-order dmy, mdy or ymd.",
    ),
    "which century": (
        lambda fields: f"The years have two digits. Do they begin with {_either(fields['choices'], {})}?",
        "Say it with --century.",
    ),
    "which decimal mark": (
        lambda fields: (
            f"In the column “{fields['column']}” a number such as {fields['example']} can be read in two ways. "
            f"Which is the decimal mark: {_either(fields['choices'], _MARKS)}?"
        ),
        "Say it with --decimal . or --decimal , on the command line.",
    ),
}

_STORAGE: dict[str, Callable[[Fields], str]] = {
    "not a journal": lambda fields: (
        f"{_name(fields)} is not a journal of this program. "
        "If it is a table, bring it in with File, Bring in a table."
    ),
    "newer version": lambda fields: (
        f"{_name(fields)} was made by a newer version of Dayfence. It was not touched; open it with that version."
    ),
    "damaged": lambda fields: (
        f"{_name(fields)} is damaged and was not changed. Keep it, and open an earlier copy of it if you have one."
    ),
    "read only": lambda _: "You can read everything, but nothing can be changed in this place.",
    "disk full": lambda _: (
        "Not saved: the disk is full. Your earlier entries are kept. Make room, then type it again."
    ),
    "open already": lambda fields: f"{_name(fields)} is open already in another window. Use that one.",
    "busy": lambda _: (
        "Not saved: this journal is being written to by another window. Close it there and try again."
    ),
    "moved": lambda _: (
        "Not saved: the file was moved or exchanged while it was open. Nothing was written. "
        "Find it and open it again."
    ),
    "stale": lambda _: (
        "Not saved: another copy has taken this file's place since it was opened. Nothing was written. "
        "Open it again."
    ),
    "missing": lambda fields: f"There is no file {fields['path']}. It may have been moved or renamed.",
    "cannot open": lambda fields: (
        f"{fields['path']} cannot be opened or made here. "
        "Check that you may write in this folder, or choose another."
    ),
    "refused value": lambda _: "Not saved: this value is outside what a journal can hold.",
    "disk error": lambda _: "Not saved: the disk did not take it. Your earlier entries are kept. Check the disk.",
}

_ANALYSIS: dict[str, Callable[[Fields], str]] = {
    "baseline_backwards": lambda fields: (
        f"The baseline ends on {fields['last']}, before it begins on {fields['first']}. Turn the two days round."
    ),
    "baseline_after_change": lambda fields: (
        f"The baseline reaches {fields['last']}, but the change was on {fields['change']}. "
        "End the baseline before the change."
    ),
    "aim_backwards": lambda fields: (
        f"The range aimed at runs from {fields['low']:g} down to {fields['high']:g}. Turn the two round."
    ),
    "settle_negative": lambda _: "Settling-in days cannot be fewer than none.",
    "unknown_word": lambda fields: f"“{fields['value']}” is not a {fields['field']} that Dayfence knows.",
    "lengths_differ": lambda _: "The columns of the log differ in length.",
}
