"""`dayfence review`: the answer without a window, or one sentence on what is in its way."""

from __future__ import annotations

import json
import os
import sqlite3
import subprocess
import sys
from datetime import datetime
from pathlib import Path

import pytest
import statsmodels.api as sm

from desktop.__main__ import main
from desktop.errors import StorageError
from desktop.models.ready_made import make_sample
from desktop.storage.schema import APPLICATION_ID
from desktop.storage.store import Store
from tests.analysis.test_review import KEYS, STRETCH_KEYS

ROOT = Path(__file__).parents[2]
NILE = ("--period", "year", "--baseline", "1871..1898", "--change", "1899=dam")
ABOUT_THE_LOG = {"measure", "unit", "kind", "period", "rows", "stretches", "findings", "caution"}
ANSWER_KEYS = KEYS - ABOUT_THE_LOG - {"doubts", "switches", "comparisons"}


def nile(shape: str) -> str:
    frame = sm.datasets.nile.load_pandas().data
    match shape:
        case "with an index column":
            return frame.to_csv()
        case "without one":
            return frame.to_csv(index=False)
        case "years as whole numbers":
            return frame.astype({"year": int}).to_csv(index=False)
    return frame.set_index("year")["volume"].to_csv()


@pytest.fixture
def review(capsys, tmp_path, monkeypatch):
    """Run the command in an empty folder: exit code, what it said, what it refused with."""
    monkeypatch.chdir(tmp_path)

    def run(*arguments: object) -> tuple[int, str, str]:
        code = main(["review", *map(str, arguments)])
        out, err = capsys.readouterr()
        return code, out, err

    return run


@pytest.fixture
def answer(review):
    """The JSON of an answer."""

    def run(*arguments: object) -> dict:
        code, out, err = review(*arguments, "--json")
        assert (code, err) == (0, "")
        return json.loads(out)

    return run


@pytest.fixture
def walks(tmp_path) -> Path:
    path = tmp_path / "walks.csv"
    days = [f"2031-03-{day:02d},{value}" for day, value in enumerate([20, 25, 18, 30, 15, 22, 24] * 2, 1)]
    days += [f"2031-03-{day:02d},{value}" for day, value in enumerate([38, 41, 35, 44, 29, 33, 47] * 2, 15)]
    path.write_text("day,minutes\n" + "\n".join(days) + "\n")
    return path


@pytest.mark.parametrize("shape", ["with an index column", "without one", "as a series", "years as whole numbers"])
def test_the_nile_moved_by_260_less_and_four_years_are_outside(answer, tmp_path, shape):
    (tmp_path / "nile.csv").write_text(nile(shape))
    shown = answer("nile.csv", *NILE)
    baseline = shown["stretches"][0]
    assert (baseline["lower_fence"], baseline["upper_fence"]) == (693.75, 1495.75)
    assert shown["carried"]["below"] == ["1907-01-01", "1913-01-01", "1940-01-01", "1941-01-01"]
    assert shown["carried"]["above"] == []
    assert shown["shift"]["estimate"] == -260
    assert shown["shift"]["share_of_pairs"] == pytest.approx(0.0989583, abs=5e-8)
    assert shown["sureness"] in ("fairly sure", "as sure as a log can be")
    assert shown["direction"] == "less"
    assert shown["rows"] == {"read": 100, "kept": 100, "set_aside": []}


def test_every_key_of_the_contract_is_there(answer, tmp_path):
    (tmp_path / "nile.csv").write_text(nile("without one"))
    shown = answer("nile.csv", *NILE, "--change", "1950=second dam")
    assert set(shown) >= KEYS
    assert all(set(stretch) >= STRETCH_KEYS for stretch in shown["stretches"])
    assert all(set(one) >= ANSWER_KEYS | {"stretch", "against"} for one in shown["comparisons"])
    assert len(shown["comparisons"]) == 3


def test_the_answer_in_words_is_that_of_the_json(review, answer, walks):
    code, out, err = review(walks, "--change", "2031-03-15=stairs")
    assert (code, err) == (0, "")
    told = " ".join(out.split())
    assert all(
        " ".join(line.split()) in told for line in answer(walks, "--change", "2031-03-15=stairs")["findings"]
    )
    assert "does not replace medical advice" in told
    assert max(map(len, out.splitlines())) <= 78


def test_rows_set_aside_are_told_with_their_line(review, tmp_path):
    lines = [f"2031-03-{day:02d},{day}" for day in range(1, 10)]
    (tmp_path / "log.csv").write_text("day,n\n" + "\n".join([*lines, *["no day,5"] * 25]) + "\n")
    _, out, _ = review("log.csv")
    assert "25 rows of 34 set aside" in out
    assert "  line 11: " in out
    assert "  and 5 more" in out


def test_the_options_say_how_the_log_is_to_be_read(answer, walks):
    shown = answer(
        walks, "--kind", "amount", "--missed", "zero", "--combine", "max", "--aim", "20..30", "--settle", "2",
        "--change", "2031-03-08=fruit", "--change", "2031-03-15=stairs", "--worth", "5", "--today", "2031-03-27",
        "--measure", "minutes", "--day-order", "ymd", "--decimal", ".",
    )  # fmt: skip
    assert (shown["measure"], shown["kind"]) == ("minutes", "amount")
    assert [stretch["first"] for stretch in shown["stretches"]] == ["2031-03-01", "2031-03-10", "2031-03-17"]
    assert shown["stretches"][-1]["last"] == "2031-03-27"
    assert shown["goal"] is not None


def test_a_missed_day_that_is_zero_makes_an_amount(answer, walks):
    assert answer(walks, "--missed", "zero")["kind"] == "amount"
    assert answer(walks)["kind"] == "reading"


def test_the_same_input_gives_the_same_output(review, walks):
    arguments = (walks, "--change", "2031-03-15=stairs", "--json")
    assert review(*arguments) == review(*arguments)


# What is refused.

BINARY = bytes(range(256)) * 4
SEVERAL = "day,minutes,steps\n" + "".join(f"2031-03-{day:02d},{day},{day * 100}\n" for day in range(1, 15))
EITHER_ORDER = "day,minutes\n" + "".join(f"0{day}/0{day % 5 + 1}/2031,{day}\n" for day in range(1, 9))
EITHER_MARK = "day;steps\n" + "".join(f"2031-03-{day:02d};{day},{500 + day}\n" for day in range(1, 9))
PLAIN = "day,minutes\n2031-03-01,5\n2031-03-02,6\n"
CASES = {
    "empty": (b"", (), "is empty"),
    "a text": (b"Dear diary,\nit rained all day.\n", (), "No column of days"),
    "one word": (b"hello", (), "No "),
    "binary": (BINARY, (), "not text"),
    "a workbook": (b"PK\x03\x04" + bytes(200), (), "spreadsheet workbook"),
    "an unknown column": (SEVERAL.encode(), ("--measure", "depth"), "“minutes”, “steps”"),
    "several columns": (SEVERAL.encode(), (), "“minutes”, “steps”? Say it with --measure"),
    "either order": (EITHER_ORDER.encode(), (), "--day-order dmy, mdy"),
    "either mark": (EITHER_MARK.encode(), (), "--decimal"),
    "a bad kind": (PLAIN.encode(), ("--kind", "weight"), "--kind"),
    "a bad day": (PLAIN.encode(), ("--change", "3 March=x"), "--change"),
    "a day that is not": (PLAIN.encode(), ("--today", "2031-02-30"), "2031-02-30"),
    "a bad range": (PLAIN.encode(), ("--baseline", "2031"), "2031-03-01..2031-03-28"),
    "a bad aim": (PLAIN.encode(), ("--aim", "better"), "--aim"),
    "an aim backwards": (PLAIN.encode(), ("--aim", "60..40"), "from 60 down to 40"),
    "bad settling-in": (PLAIN.encode(), ("--settle", "-1"), "--settle"),
    "a bad amount": (PLAIN.encode(), ("--worth", "much"), "--worth"),
    "no number": (PLAIN.encode(), ("--worth", "nan"), "--worth"),
    "an unknown option": (PLAIN.encode(), ("--bogus",), "--bogus"),
    "a baseline backwards": (PLAIN.encode(), ("--baseline", "2031-03..2031-01"), "Turn the two days round"),
    "a baseline into a change": (
        PLAIN.encode(), ("--baseline", "2031-03-01..2031-03-02", "--change", "2031-03-02"), "before the change",
    ),
    "half a journal": (b"SQLite format 3\x00", (), "is not a journal"),
}  # fmt: skip


def refused(result: tuple[int, str, str]) -> str:
    """The one sentence, when the command is refused as it must be."""
    code, out, err = result
    assert (code, out) == (2, "")
    assert err.count("\n") == 1
    assert err.rstrip("\n").endswith((".", "?"))
    assert "Traceback" not in err
    assert "Error" not in err
    return err


@pytest.mark.parametrize("case", CASES)
def test_what_cannot_be_answered_is_refused_in_one_sentence(review, tmp_path, case):
    source, options, part = CASES[case]
    (tmp_path / "log.csv").write_bytes(source)
    assert part in refused(review("log.csv", *options))


def test_a_missing_file_a_folder_and_no_file_at_all_are_refused(review, tmp_path):
    (tmp_path / "logs").mkdir()
    assert "There is no file lost.csv" in refused(review("lost.csv"))
    assert "logs cannot be read here" in refused(review("logs"))
    assert refused(review(".")).startswith(". cannot be read here")
    assert "FILE|JOURNAL" in refused(review())


@pytest.mark.parametrize(
    ("source", "option"), [(EITHER_ORDER, ("--day-order", "dmy")), (EITHER_MARK, ("--decimal", ","))]
)
def test_the_option_that_is_named_settles_the_question(answer, tmp_path, source, option):
    (tmp_path / "log.csv").write_text(source)
    assert answer("log.csv", *option)["rows"]["kept"] == 8


def database(path: Path, application: int, version: int) -> bytes:
    connection = sqlite3.connect(path)
    connection.execute("CREATE TABLE other (a)")
    connection.execute(f"PRAGMA application_id = {application}")
    connection.execute(f"PRAGMA user_version = {version}")
    connection.commit()
    connection.close()
    return path.read_bytes()


@pytest.mark.parametrize(
    ("application", "version", "part"),
    [(42, 1, "is not a journal of this program"), (APPLICATION_ID, 99, "was made by a newer version")],
)
def test_a_journal_that_is_not_ours_to_read_is_left_untouched(review, tmp_path, application, version, part):
    path = tmp_path / "other.dayfence"
    was = database(path, application, version)
    assert part in refused(review(path))
    assert path.read_bytes() == was
    assert [one.name for one in tmp_path.iterdir()] == ["other.dayfence"]


# A journal.


@pytest.fixture
def sample(tmp_path) -> Path:
    path = tmp_path / "sample.dayfence"
    make_sample(path, lambda: datetime(2031, 6, 2, 8, 0))
    return path


def test_a_journal_of_several_measures_names_them(review, sample):
    said = refused(review(sample))
    assert "“Walking”, “Sleep”, “Upper pressure”, “Lower pressure”" in said
    assert "--measure" in said
    assert "“Walking”" in refused(review(sample, "--measure", "Swimming"))


def test_a_measure_of_a_journal_is_answered_with_the_journals_own_changes(answer, sample):
    shown = answer(sample, "--measure", "Walking")
    assert (shown["measure"], shown["unit"], shown["kind"]) == ("Walking", "minutes", "amount")
    assert [stretch["label"] for stretch in shown["stretches"]] == [None, "off the bus one stop early"]
    assert shown["direction"] == "more"
    store = Store.open(sample)
    kept = store.read()
    store.close()
    assert shown["rows"]["read"] == len(kept.entries[1])
    assert shown["stretches"][1]["change"] == kept.changes_of(1)[0].day.isoformat()


def test_reading_a_journal_changes_no_byte_of_it(review, sample):
    was = sample.read_bytes()
    code, _, _ = review(sample, "--measure", "Sleep", "--period", "week", "--change", "2031-05-01=more")
    assert code == 0
    assert sample.read_bytes() == was


# As a program of its own.


def run(
    *arguments: str, folder: Path, out: int = subprocess.PIPE, **environment: str
) -> subprocess.CompletedProcess:
    bare = {"PATH": os.environ["PATH"], "PYTHONPATH": str(ROOT), "LANG": "C", **environment}
    command = [sys.executable, "-m", "desktop", "review", *arguments]
    return subprocess.run(
        command, cwd=folder, env=bare, stdout=out, stderr=subprocess.PIPE, text=True, timeout=60, check=False
    )


def test_it_runs_from_any_folder_and_leaves_nothing_there(tmp_path, walks):
    folder = tmp_path / "elsewhere"
    folder.mkdir()
    done = run(str(walks), "--change", "2031-03-15=stairs", "--json", folder=folder)
    assert (done.returncode, done.stderr) == (0, "")
    assert json.loads(done.stdout)["direction"] == "more"
    assert list(folder.iterdir()) == []


def test_two_runs_with_other_hash_seeds_print_the_same(tmp_path, walks):
    printed = {
        run(str(walks), "--change", "2031-03-15=x", "--json", folder=tmp_path, PYTHONHASHSEED=seed).stdout
        for seed in ("1", "2")
    }
    assert len(printed) == 1


def test_a_terminal_without_the_letters_gets_escapes(tmp_path, walks):
    said = run(str(walks), "--baseline", "2031-03-01..2031-03-14", folder=tmp_path, PYTHONIOENCODING="ascii")
    shown = run(str(walks), "--change", "2031-03-15=café", "--json", folder=tmp_path, PYTHONIOENCODING="ascii")
    assert (said.returncode, said.stderr) == (0, "")
    assert json.loads(shown.stdout)["stretches"][1]["label"] == "café"


def test_a_reader_that_goes_away_is_no_error(tmp_path, walks):
    read_end, write_end = os.pipe()
    os.close(read_end)
    done = run(str(walks), "--json", folder=tmp_path, out=write_end)
    os.close(write_end)
    assert (done.returncode, done.stderr) == (0, "")


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="this system has no /dev/full")
def test_an_answer_that_cannot_be_written_out_says_so(tmp_path, walks):
    with Path("/dev/full").open("w") as full:
        done = run(str(walks), "--json", folder=tmp_path, out=full.fileno())
    assert done.returncode == 2
    assert done.stderr.startswith("The answer cannot be written out: ")
    assert done.stderr.count("\n") == 1


def test_help_is_shown_and_exits_well(tmp_path):
    done = run("--help", folder=tmp_path)
    assert done.returncode == 0
    assert "--day-order" in done.stdout


def test_a_damaged_journal_is_refused_and_kept(review, sample):
    sample.write_bytes(sample.read_bytes()[:5000])
    was = sample.read_bytes()
    assert "is damaged and was not changed" in refused(review(sample, "--measure", "Walking"))
    assert sample.read_bytes() == was
    with pytest.raises(StorageError):
        Store.open(sample)


def test_the_text_ends_with_the_change_the_fences_and_the_days_outside(review, tmp_path):
    (tmp_path / "nile.csv").write_text(nile("without one"))
    code, out, _ = review("nile.csv", *NILE)
    assert code == 0
    block = " ".join(out.partition("In numbers\n")[2].split())
    assert block.startswith(
        "Baseline, 1871 to 1898: 28 years, middle 1130, fences 693.8 and 1495.8. "
        "After “dam”, 1899 to 1970: 72 years, middle 842.5, fences 526 and 1154. "
        "Years outside the fences in the baseline: none. "
        "Years outside the old fences since: 1907 (692), 1913 (456), 1940 (676), 1941 (649). "
    )


def test_the_label_of_a_change_is_told(review, walks):
    _, out, _ = review(walks, "--change", "2031-03-15=stairs")
    assert "After “stairs”, 15 March to 28 March: 14 days" in " ".join(out.split())
    _, out, _ = review(walks, "--baseline", "2031-03-01..2031-03-14")
    assert "After, 15 March to 28 March: 14 days" in " ".join(out.split())


def test_few_days_have_no_fences_and_the_text_says_why(review, tmp_path):
    (tmp_path / "a.csv").write_text("day,minutes\n2031-03-01,5\n2031-03-02,7\n")
    _, out, _ = review("a.csv")
    assert "2 days, middle 6; no fences, since there are too few." in " ".join(out.split())
    (tmp_path / "b.csv").write_text("day,n\n" + "".join(f"2031-03-{day:02d},5\n" for day in range(1, 15)))
    _, out, _ = review("b.csv")
    assert "no fences, since too many values are alike." in " ".join(out.split())


def test_without_a_window_no_menu_is_named(review, answer, walks):
    _, out, _ = review(walks)
    assert "mark the day of a change with --change DAY=LABEL." in " ".join(out.split())
    assert "(Log" not in out
    assert not [line for line in answer(walks)["findings"] if "(Log" in line]


@pytest.mark.parametrize(
    ("given", "said"),
    [
        (["reveiw", "x.csv"], "There is no command “reveiw”. The nearest is dayfence review; it has a --help."),
        (["Export"], "There is no command “Export”. The nearest is dayfence export; it has a --help."),
        (
            ["sing", "x.csv"],
            "There is no command “sing”. There are dayfence review, page and export; each has a --help.",
        ),
    ],
)
def test_a_misspelt_command_is_answered_with_the_nearest(capsys, tmp_path, monkeypatch, given, said):
    monkeypatch.chdir(tmp_path)
    assert main(given) == 2
    assert capsys.readouterr() == ("", f"{said}\n")


def test_an_unknown_option_of_the_window_is_one_sentence(capsys):
    with pytest.raises(SystemExit) as ended:
        main(["--sampel"])
    assert ended.value.code == 2
    assert capsys.readouterr() == ("", "Unrecognized arguments: --sampel. See dayfence --help.\n")
