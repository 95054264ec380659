"""`dayfence page`: the page without a window, or one sentence on what is in its way."""

from __future__ import annotations

import os
import subprocess
import sys
import xml.etree.ElementTree as ET
from datetime import date, datetime
from pathlib import Path

import pytest
from pypdf import PdfReader

from desktop.__main__ import main
from desktop.models.ready_made import make_sample
from desktop.wording.days import full_day
from tests.desktop.page.reading import pdf_text
from tests.desktop.test_command import refused

ROOT = Path(__file__).parents[3]


@pytest.fixture
def page(capsys, tmp_path, monkeypatch):
    """Run the command in a folder of its own: exit code, what it said, what it refused with."""
    monkeypatch.chdir(tmp_path)

    def run(*arguments: object) -> tuple[int, str, str]:
        code = main(["page", *map(str, arguments)])
        out, err = capsys.readouterr()
        return code, out, err

    return run


@pytest.fixture
def walks(tmp_path) -> Path:
    path = tmp_path / "walks.csv"
    days = [f"2031-03-{day:02d},{value}" for day, value in enumerate([20, 25, 18, 30, 15, 22, 24] * 2, 1)]
    days += [f"2031-03-{day:02d},{value}" for day, value in enumerate([38, 41, 35, 44, 29, 33, 47] * 2, 15)]
    path.write_text("day,minutes\n" + "\n".join(days) + "\n")
    return path


@pytest.fixture
def pressure(tmp_path) -> Path:
    path = tmp_path / "pressure.csv"
    rows = [f"2031-03-{day:02d},{148 + day % 5 - 9 * (day > 14)}/{88 + day % 3}" for day in range(1, 29)]
    path.write_text("day,bp\n" + "\n".join(rows) + "\n")
    return path


@pytest.fixture
def sample(tmp_path) -> Path:
    path = tmp_path / "sample.dayfence"
    make_sample(path, lambda: datetime(2031, 6, 2, 8, 0))
    return path


def text_of(path: Path) -> str:
    return pdf_text(path.read_bytes())


def test_a_table_becomes_a_page_with_the_options_of_review(page, walks, tmp_path):
    options = ("--change", "2031-03-15=stairs", "--aim", "20..40", "--kind", "amount", "--settle", "2")
    assert page(walks, *options, "-o", "page.pdf", "--question", "Is this enough?") == (0, "", "")
    said = text_of(tmp_path / "page.pdf")
    for part in (
        "minutes 1 to 28 March 2031", "My question today: Is this enough?", "Settling in", "In goal",
        "Change: stairs, 15 March.", "from a table", f"printed {full_day(date.today())}",
    ):  # fmt: skip
        assert part in said


@pytest.mark.parametrize(("paper", "size"), [("a4", (595, 842)), ("letter", (612, 792))])
@pytest.mark.parametrize(("large", "sheets"), [((), 1), (("--large-print",), 2)])
def test_paper_and_large_print(page, walks, tmp_path, paper, size, large, sheets):
    assert page(walks, "-o", "page.pdf", "--paper", paper, *large)[0] == 0
    pages = PdfReader(tmp_path / "page.pdf").pages
    assert len(pages) == sheets
    assert (round(pages[0].mediabox.width), round(pages[0].mediabox.height)) == size


@pytest.mark.parametrize("name", ["page.html", "chart.svg", "chart.png", "PAGE.PDF"])
def test_the_ending_says_what_is_written(page, walks, tmp_path, name):
    assert page(walks, "-o", name) == (0, "", "")
    data = (tmp_path / name).read_bytes()
    begins = {".html": b"<!DOCTYPE html>", ".svg": b"<?xml", ".png": b"\x89PNG", ".pdf": b"%PDF"}
    assert data.startswith(begins[Path(name).suffix.lower()])
    if name.endswith("svg"):
        assert ET.fromstring(data).tag.endswith("svg")


def test_a_column_of_pairs_is_one_page_by_any_of_its_names(page, pressure, tmp_path):
    for place, options in enumerate([(), ("--measure", "bp"), ("--measure", "bp lower")]):
        assert page(pressure, *options, "-o", f"{place}.pdf", "--change", "2031-03-15=new dose") == (0, "", "")
        said = text_of(tmp_path / f"{place}.pdf")
        assert "bp upper: It moved" in said
        assert "bp lower: This log cannot tell" in said
        assert "the average of its readings, day 1 included" in said


def test_a_measure_of_a_journal_brings_the_one_written_down_with_it(page, sample, tmp_path):
    was = sample.read_bytes()
    assert page(sample, "--measure", "Lower pressure", "-o", "page.pdf") == (0, "", "")
    said = text_of(tmp_path / "page.pdf")
    assert "Upper and lower pressure, mmHg" in said
    assert "Upper pressure: It moved" in said
    assert "Change: dose change, as directed" in said
    assert sample.read_bytes() == was


def test_a_journal_of_several_measures_names_them(page, sample):
    assert "“Walking”, “Sleep”" in refused(page(sample, "-o", "page.pdf"))


def test_the_same_numbers_are_on_the_page_as_in_the_answer(page, walks, tmp_path, capsys):
    assert main(["review", str(walks), "--change", "2031-03-15=stairs"]) == 0
    headline = capsys.readouterr().out.partition("\n")[0]
    page(walks, "--change", "2031-03-15=stairs", "-o", "page.pdf")
    assert headline in text_of(tmp_path / "page.pdf")


def test_a_file_that_is_there_is_kept_unless_forced(page, walks, tmp_path):
    (tmp_path / "page.pdf").write_bytes(b"precious")
    assert "--force" in refused(page(walks, "-o", "page.pdf"))
    assert (tmp_path / "page.pdf").read_bytes() == b"precious"
    assert page(walks, "-o", "page.pdf", "--force")[0] == 0
    assert (tmp_path / "page.pdf").read_bytes().startswith(b"%PDF")


@pytest.mark.parametrize(
    ("arguments", "part"),
    [
        (("walks.csv",), "-o/--output"),
        (("walks.csv", "-o", "page.doc"), ".pdf, .html, .svg or .png"),
        (("walks.csv", "-o", "nowhere/page.pdf"), "nowhere/page.pdf cannot be written: No such file or directory"),
        (("lost.csv", "-o", "page.pdf"), "There is no file lost.csv"),
        (("walks.csv", "-o", "page.pdf", "--paper", "a3"), "--paper"),
        (("walks.csv", "-o", "page.pdf", "--json"), "--json"),
        (("walks.csv", "-o", "page.pdf", "--measure", "depth"), "depth"),
        (("walks.csv", "-o", "page.pdf", "--baseline", "2031-03..2031-01"), "Turn the two days round"),
    ],
)
def test_what_cannot_be_done_is_refused_in_one_sentence_and_no_file(page, walks, tmp_path, arguments, part):
    assert part in refused(page(*arguments))
    assert [one.name for one in tmp_path.iterdir()] == ["walks.csv"]


def test_a_machine_that_cannot_draw_is_told_what_it_lacks(page, walks, monkeypatch):
    monkeypatch.setattr("desktop.page.command.missing_for_drawing", lambda: "Drawing needs libEGL.so.1.")
    assert refused(page(walks, "-o", "page.pdf")) == "Drawing needs libEGL.so.1.\n"


def run(*arguments: str, folder: Path) -> subprocess.CompletedProcess:
    bare = {"PATH": os.environ["PATH"], "PYTHONPATH": str(ROOT), "LANG": "C"}
    command = [sys.executable, "-m", "desktop", "page", *arguments]
    return subprocess.run(command, cwd=folder, env=bare, capture_output=True, text=True, timeout=60, check=False)


def test_it_runs_without_any_display(walks, tmp_path):
    done = run("walks.csv", "-o", "page.pdf", "--change", "2031-03-15=stairs", folder=tmp_path)
    assert (done.returncode, done.stdout, done.stderr) == (0, "", "")
    assert "It moved" in text_of(tmp_path / "page.pdf")
    assert sorted(one.name for one in tmp_path.iterdir()) == ["page.pdf", "walks.csv"]


def test_help_is_shown_without_qt(tmp_path):
    done = run("--help", folder=tmp_path)
    assert done.returncode == 0
    for part in ("--day-order", "--large-print", "--force", "my question"):
        assert part in done.stdout
