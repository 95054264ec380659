"""`dayfence page FILE -o page.pdf`: the page for an appointment without a window."""

from __future__ import annotations

import argparse
import os
from collections.abc import Sequence
from datetime import date
from pathlib import Path

from analysis import Review
from desktop.command import DAYS_EPILOG, Asked, CommandParser, RefusedError, add_log_options, asked_of, or_refused
from desktop.display import missing_for_drawing
from desktop.wording.page import cannot_be_written, there_already

ENDINGS = (".pdf", ".html", ".svg", ".png")


def main(arguments: Sequence[str]) -> int:
    """Write the page, or its chart alone, into a file.

    Args:
        arguments: ``page`` and what follows it on the command line.

    Returns:
        0 with a file, 2 with one sentence on stderr and no file.
    """
    return or_refused(lambda: _page(arguments[1:]))


def _parser() -> argparse.ArgumentParser:
    parser = CommandParser(
        prog="dayfence page",
        description="Write the page for an appointment: the answer, the numbers, the chart, on one sheet. "
        "Two measures that are written down together, such as upper and lower pressure, share a page.",
        epilog=f"{DAYS_EPILOG} A file that is there already is kept, unless --force is given.",
    )
    add_log_options(parser)
    parser.add_argument(
        "-o",
        "--output",
        metavar="FILE",
        required=True,
        type=_output,
        help="where to: .pdf or .html for the page, .svg or .png for its chart alone",
    )
    parser.add_argument("--paper", choices=("a4", "letter"), default="a4", help="size of the sheet")
    parser.add_argument("--large-print", action="store_true", help="larger letters, on two sheets")
    parser.add_argument("--question", metavar="TEXT", help="my question for the appointment")
    parser.add_argument("--force", action="store_true", help="write over a file that is there already")
    return parser


def _is_there(output: Path) -> bool:
    """Whether something would be written over; a folder that may not be looked into is told when writing."""
    try:
        return output.exists()
    except OSError:
        return False


def _page(arguments: Sequence[str]) -> int:
    options = _parser().parse_args(arguments)
    output: Path = options.output
    if _is_there(output) and not options.force:
        raise RefusedError(there_already(output))
    asked = asked_of(options, with_pair=True)
    reviews = [one.reviewed(options) for one in asked]
    lacking = missing_for_drawing()
    if lacking is not None:
        raise RefusedError(lacking)
    try:
        _draw(output, asked, reviews, options)
    except OSError as error:
        raise RefusedError(cannot_be_written(output, error.strerror or "")) from None
    return 0


def _draw(output: Path, asked: Sequence[Asked], reviews: Sequence[Review], options: argparse.Namespace) -> None:
    """Draw the page and write it; Qt is read only here, when all that was asked has been understood."""
    from PySide6.QtGui import QGuiApplication

    from desktop.faces import load_faces
    from desktop.page.content import Subject, content_of
    from desktop.page.files import chart_svg, pdf_of, png_of, write_file
    from desktop.page.html import html_of
    from desktop.page.layout import lay_out

    application = QGuiApplication.instance()
    if application is None:
        os.environ["QT_QPA_PLATFORM"] = "offscreen"
        application = QGuiApplication(["dayfence"])
    load_faces()
    subjects = [Subject(one.measure, one.log, answer) for one, answer in zip(asked, reviews, strict=True)]
    content = content_of(asked[0].journal, subjects, date.today(), options.question)
    match output.suffix.lower():
        case ".pdf":
            data = pdf_of(lay_out(content, options.paper, large_print=options.large_print))
        case ".html":
            data = html_of(content)
        case ".svg":
            data = chart_svg(content)
        case _:
            data = png_of(content)
    write_file(output, data)


def _output(text: str) -> Path:
    path = Path(text)
    if path.suffix.lower() not in ENDINGS:
        raise argparse.ArgumentTypeError(f"“{text}” does not end in {', '.join(ENDINGS[:-1])} or {ENDINGS[-1]}")
    return path
