"""Which file: a new journal, one to open, a table to bring in. Each answer is None when the person left it."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtWidgets import QFileDialog, QWidget

JOURNAL_ENDING = ".dayfence"


def ask_new_journal(parent: QWidget, folder: Path) -> Path | None:
    """Where a new journal is to be; the ending is added where it was left out."""
    name, _ = QFileDialog.getSaveFileName(parent, "New journal", str(folder), f"Journals (*{JOURNAL_ENDING})")
    if not name:
        return None
    return Path(name) if name.endswith(JOURNAL_ENDING) else Path(name + JOURNAL_ENDING)


def ask_journal(parent: QWidget, folder: Path) -> Path | None:
    """Which journal to open."""
    kinds = f"Journals (*{JOURNAL_ENDING});;All files (*)"
    name, _ = QFileDialog.getOpenFileName(parent, "Open a journal", str(folder), kinds)
    return Path(name) if name else None


def ask_table(parent: QWidget) -> Path | None:
    """Which table to bring in."""
    kinds = "Tables (*.csv *.tsv *.txt datapackage.json);;All files (*)"
    name, _ = QFileDialog.getOpenFileName(parent, "Bring in a table", str(Path.home()), kinds)
    return Path(name) if name else None


def ask_folder(parent: QWidget, title: str, name: str) -> Path | None:
    """Where a new folder is to be made."""
    chosen, _ = QFileDialog.getSaveFileName(parent, title, str(Path.home() / name), "Folders (*)")
    return Path(chosen) if chosen else None


def ask_output(parent: QWidget, title: str, name: str, *endings: str) -> Path | None:
    """Where a file is to be written, one of these kinds; the first ending is added where none was typed."""
    kinds = ";;".join(f"{ending[1:].upper()} (*{ending})" for ending in endings)
    chosen, picked = QFileDialog.getSaveFileName(parent, title, str(Path.home() / f"{name}{endings[0]}"), kinds)
    if not chosen:
        return None
    if Path(chosen).suffix.lower() in endings:
        return Path(chosen)
    return Path(chosen + next((ending for ending in endings if f"*{ending}" in picked), endings[0]))
