"""Bytes of a stranger's file to text, with limits that keep memory and time in bounds."""

from __future__ import annotations

import codecs
from dataclasses import dataclass
from pathlib import Path

from desktop.errors import ExchangeError

MOST_BYTES = 50_000_000

_WORKBOOKS = (b"PK\x03\x04", b"PK\x05\x06", b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1")
_UTF16 = (codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)


@dataclass(frozen=True)
class SourceText:
    """Text of a file; ``guessed`` says that the letters may be wrong, since nothing named the encoding."""

    text: str
    encoding: str
    guessed: bool


def file_bytes(path: Path) -> bytes:
    """The bytes of a file.

    Raises:
        ExchangeError: ``missing``, ``cannot open`` (also for a folder or device), ``too large``.
    """
    try:
        if path.exists() and not path.is_file():
            raise ExchangeError("cannot open", path=str(path))
        with path.open("rb") as file:
            source = file.read(MOST_BYTES + 1)
    except (FileNotFoundError, NotADirectoryError) as error:
        raise ExchangeError("missing", path=str(path)) from error
    except (OSError, ValueError) as error:
        raise ExchangeError("cannot open", path=str(path)) from error
    return source


def decode(source: bytes) -> SourceText:
    """Text of a file: a byte order mark decides, else UTF-8, else the Western code page as a guess.

    Raises:
        ExchangeError: ``workbook``, ``not text``, ``empty``, ``too large``.
    """
    if len(source) > MOST_BYTES:
        raise ExchangeError("too large", what="bytes", limit=MOST_BYTES, found=len(source))
    if source.startswith(_WORKBOOKS):
        raise ExchangeError("workbook")
    decoded = _decoded(source)
    if "\0" in decoded.text:
        raise ExchangeError("not text")
    text = decoded.text.replace("\ufeff", "").replace("\r\n", "\n").replace("\r", "\n")
    if not text.strip():
        raise ExchangeError("empty")
    return SourceText(text, decoded.encoding, decoded.guessed)


def _decoded(source: bytes) -> SourceText:
    marked = source.startswith((codecs.BOM_UTF8, *_UTF16))
    encoding = "utf-16" if source.startswith(_UTF16) else "utf-8"
    try:
        return SourceText(source.decode(encoding), encoding, guessed=False)
    except UnicodeDecodeError as error:
        if marked or b"\0" in source:
            raise ExchangeError("not text") from error
    try:
        return SourceText(source.decode("cp1252"), "cp1252", guessed=True)
    except UnicodeDecodeError as error:
        raise ExchangeError("not text") from error
