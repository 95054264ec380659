"""What can go wrong around a journal or a file. Errors carry fields; the wording says them."""

from __future__ import annotations

from typing import Literal, get_args

StorageReason = Literal[
    "not a journal",
    "newer version",
    "damaged",
    "read only",
    "disk full",
    "busy",
    "open already",
    "moved",
    "stale",
    "missing",
    "cannot open",
    "refused value",
    "disk error",
]
ExchangeReason = Literal[
    "missing",
    "cannot open",
    "empty",
    "not text",
    "too large",
    "not a table",
    "header alone",
    "no day column",
    "no value column",
    "no days read",
    "workbook",
    "which day column",
    "which value column",
    "which day order",
    "which century",
    "which decimal mark",
    "which name column",
    "unknown column",
    "not a package",
    "package damaged",
]


class DayfenceError(Exception):
    """Something outside the program is not as it must be; the person can do something about it.

    Attributes:
        reason: one of the reasons of the class.
        fields: what the sentence needs, by name: a path, a line, a column, the choices there are.
    """

    reasons: tuple[str, ...] = ()

    def __init__(self, reason: str, **fields: object) -> None:
        super().__init__(reason)
        self.reason = reason
        self.fields = fields

    def __str__(self) -> str:
        """The reason and its fields, for a report; people get a sentence from the wording."""
        listed = ", ".join(f"{name}={value!r}" for name, value in self.fields.items())
        return f"{self.reason} ({listed})" if listed else self.reason


class StorageError(DayfenceError):
    """A journal cannot be opened, read or written."""

    reasons = get_args(StorageReason)


class ExchangeError(DayfenceError):
    """A table cannot be read, or not without an answer from the person."""

    reasons = get_args(ExchangeReason)
