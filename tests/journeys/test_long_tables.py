"""A long table at the window: read off the screen's thread, and stopped by the person."""

import threading
from functools import partial

from PySide6.QtWidgets import QProgressDialog, QWidget

from desktop.exchange.bring_in import read_file
from desktop.exchange.reading import Reading
from desktop.screens.bring_in_preview import lines_set_aside, summary_of
from desktop.screens.reading_table import StoppedError, TableReader, read_with_questions


def test_a_table_is_read_off_the_screens_thread(qtbot, tmp_path):
    table = tmp_path / "log.csv"
    table.write_text("day,minutes\n2024-01-01,30\n")
    threads = []

    def watched(*given, **answers):
        threads.append(threading.current_thread())
        return read_file(*given, **answers)

    parent = QWidget()
    qtbot.addWidget(parent)
    assert isinstance(read_with_questions(parent, table.name, partial(watched, table)), Reading)
    assert threads
    assert threads[0] is not threading.main_thread()


def test_progress_is_told_and_reaches_the_end(qtbot, tmp_path):
    table = tmp_path / "log.csv"
    table.write_text("day,minutes\n2024-01-01,30\n")
    reader = TableReader()
    shares = []
    reader.advanced.connect(shares.append)
    with qtbot.waitSignal(reader.ended) as ended:
        reader.start(partial(read_file, table), {})
    assert isinstance(ended.args[0], Reading)
    assert shares == sorted(shares)
    assert len(shares) >= 4


def test_a_stopped_reading_ends_without_a_table(qtbot, tmp_path):
    table = tmp_path / "log.csv"
    table.write_text("day,minutes\n2024-01-01,30\n")
    reader = TableReader()
    reader.stop()
    with qtbot.waitSignal(reader.ended) as ended:
        reader.start(partial(read_file, table), {})
    assert isinstance(ended.args[0], StoppedError)


def test_stop_leaves_the_window_as_it_was(qtbot, tmp_path, monkeypatch):
    table = tmp_path / "log.csv"
    table.write_text("day,minutes\n2024-01-01,30\n")
    parent = QWidget()
    qtbot.addWidget(parent)
    pressed = threading.Event()

    def slow(path, *, told, **answers):
        told(0.1)
        assert pressed.wait(10)
        told(0.5)
        return read_file(path, **answers)

    def stop(progress: QProgressDialog, value: int) -> None:
        plain(progress, value)
        if value == 10:
            progress.canceled.emit()
            pressed.set()

    plain = QProgressDialog.setValue
    monkeypatch.setattr(QProgressDialog, "setValue", stop)
    assert read_with_questions(parent, table.name, partial(slow, table)) is None


def test_a_preview_tells_every_line_set_aside_up_to_a_limit(tmp_path):
    table = tmp_path / "log.csv"
    table.write_text("day,minutes\n2024-01-01,30\n2024-01-02,\n" + "2024-01-03,~5\n" + "soon,1\n" * 300)
    reading = read_file(table)
    assert "304 lines read" not in summary_of("log.csv", reading)
    assert summary_of("log.csv", reading).startswith(
        "log.csv: 303 lines read, 1 kept, 1 with a day and no value, 301 set aside."
    )
    told = lines_set_aside(reading)
    assert told[0] == "line 4: its value is not one exact number: ~5"
    assert (len(told), told[-1]) == (201, "and 101 more")
