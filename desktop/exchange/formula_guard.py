"""The apostrophe that keeps a spreadsheet from running a text as a formula, put on and taken off."""

from __future__ import annotations

_STARTS = ("=", "+", "-", "@", "\t", "\r", "\n", "'", "＝", "＋", "－", "＠")


def guarded(text: str) -> str:
    """The text, with an apostrophe in front where a spreadsheet could run it or would swallow its own.

    Source: the list of the OWASP page on CSV injection: ``= + - @``, tab, carriage return and line feed.
    """
    return f"'{text}" if _could_run(text) else text


def unguarded(text: str) -> str:
    """The text as it was before ``guarded``."""
    return text[1:] if text.startswith("'") and _could_run(text[1:]) else text


def _could_run(text: str) -> bool:
    return text.startswith(_STARTS) or text.lstrip().startswith(_STARTS)
