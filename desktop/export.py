"""`dayfence export JOURNAL -o FOLDER|FILE`: a journal as tables anyone can read. Nothing here imports Qt."""

from __future__ import annotations

import argparse
import os
import shutil
from collections.abc import Sequence
from pathlib import Path

from desktop.command import CommandParser, RefusedError, or_refused
from desktop.exchange.package import package_files
from desktop.exchange.plain_table import Form, plain_table
from desktop.journal.journal import Journal
from desktop.wording.page import cannot_be_written, there_already

_PRIVATE = 0o600


def main(arguments: Sequence[str]) -> int:
    """Write a journal as a table or as a folder of tables.

    Args:
        arguments: ``export`` and what follows it on the command line.

    Returns:
        0 when it is written, 2 with one sentence on stderr.
    """
    return or_refused(lambda: _export(arguments[1:]))


def _parser() -> argparse.ArgumentParser:
    parser = CommandParser(
        prog="dayfence export",
        description="Write a journal as tables: one CSV file of every value, or a folder that holds everything "
        "but the history and can be brought in again.",
    )
    parser.add_argument("journal", metavar="JOURNAL", type=Path, help="the journal")
    parser.add_argument(
        "-o",
        "--output",
        metavar="FOLDER|FILE.csv",
        type=Path,
        required=True,
        help="where to: a folder, or a CSV file",
    )
    parser.add_argument(
        "--for-spreadsheet", action="store_true", help="no text in the CSV file can run as a formula"
    )
    parser.add_argument("--decimal", choices=(".", ","), default=".", help="decimal mark of the spreadsheet")
    parser.add_argument("--force", action="store_true", help="write over a file that is there already")
    return parser


def _export(arguments: Sequence[str]) -> int:
    from desktop.storage.store import Store  # sqlite3 only where a journal is read

    options = _parser().parse_args(arguments)
    output: Path = options.output
    if output.exists() and not (options.force and output.is_file()):
        raise RefusedError(there_already(output))
    store = Store.open(options.journal, to_read=True)
    try:
        journal = store.read()
    finally:
        store.close()
    try:
        if output.suffix.lower() == ".csv":
            write_table(output, journal, "spreadsheet" if options.for_spreadsheet else "archive", options.decimal)
        else:
            write_package(output, journal)
    except OSError as error:
        raise RefusedError(cannot_be_written(output, error.strerror or "")) from None
    return 0


def write_table(path: Path, journal: Journal, form: Form = "archive", decimal: str = ".") -> None:
    """Write every value of a journal into one CSV file that only its owner may read.

    Raises:
        OSError: it cannot be written there; what was there stays.
    """
    part = path.with_name(f".{path.name}.part")
    try:
        _write(part, plain_table(journal, form, decimal))
        part.replace(path)
    except OSError:
        part.unlink(missing_ok=True)
        raise


def write_package(folder: Path, journal: Journal) -> None:
    """Write everything a journal holds but its history into a new folder, all of it or nothing.

    Raises:
        OSError: it cannot be written there, or something is there already.
    """
    part = folder.with_name(f".{folder.name}.part")
    part.mkdir(mode=0o700)
    try:
        for name, data in package_files(journal).items():
            _write(part / name, data)
        part.rename(folder)
    except OSError:
        shutil.rmtree(part, ignore_errors=True)
        raise


def _write(path: Path, data: bytes) -> None:
    with os.fdopen(os.open(path, os.O_CREAT | os.O_TRUNC | os.O_WRONLY, _PRIVATE), "wb") as file:
        file.write(data)
        file.flush()
        os.fsync(file.fileno())
