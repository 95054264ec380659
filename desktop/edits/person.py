"""Whose journal it is."""

from __future__ import annotations

from dataclasses import replace

from desktop.edits.edit import Edit, edit_putting
from desktop.journal.journal import Journal


def set_person(journal: Journal, *, name: str | None = None, question: str | None = None) -> Edit:
    """Change the person's name or question; what is left out stays."""
    person = journal.person
    changed = replace(
        person,
        name=person.name if name is None else name,
        question=person.question if question is None else question,
    )
    return edit_putting(journal, "set person", [changed])
