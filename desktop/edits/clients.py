"""What a coach does in a caseload, as the records it changes."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace
from datetime import date

from desktop.edits.edit import Edit, edit_putting
from desktop.edits.ids import Ids
from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.row_change import RowChange


def set_coach(caseload: Caseload, coach: Coach) -> Edit:
    """Another name, or another folder."""
    return edit_putting(caseload, "set coach", [coach])


def add_clients(caseload: Caseload, ids: Ids, found: Iterable[tuple[str, str]]) -> Edit:
    """A client for each journal that has none; codes that are taken get a number.

    Args:
        caseload: as it stands.
        ids: gives ids that were never used.
        found: the journal's id, and a word for the client.
    """
    taken = {client.code for client in caseload.clients.values()}
    new: dict[str, Client] = {}
    for journal_id, word in found:
        if caseload.client_of(journal_id) is None and journal_id not in new:
            code = _free(word.strip() or "client", taken)
            taken.add(code)
            new[journal_id] = Client(ids.new("client"), journal_id, code)
    return edit_putting(caseload, "add clients", new.values())


def set_client(caseload: Caseload, client: Client) -> Edit:
    """Another code, other measures, another next session, or the end of the coaching."""
    return edit_putting(caseload, "set client", [client])


def mark_looked_at(caseload: Caseload, client: int, today: date, reasons: str) -> Edit:
    """The client was looked at, with the marks of everything there was to see.

    Raises:
        KeyError: no such client.
    """
    looked = replace(caseload.clients[client], looked_on=today, looked_reasons=reasons)
    return edit_putting(caseload, "mark looked at", [looked])


def write_session(caseload: Caseload, session: CoachingSession, client: Client | None = None) -> Edit:
    """What was agreed and noted in a session; an empty one is removed.

    Args:
        caseload: as it stands.
        session: as it is to be.
        client: with the next session that was agreed on, as part of the same act.

    Raises:
        ValueError: more spare days than days in the plan.
    """
    if session.spare > session.times:
        raise ValueError("a plan cannot have more spare days than days")
    held = caseload.find(session)
    is_empty = not (session.agreed or session.note or session.times)
    following = edit_putting(caseload, "set client", [client] if client is not None else [])
    if is_empty:
        removed = (RowChange(held, None),) if held is not None else ()
        return Edit("remove session" if removed else "set client", (*removed, *following.changes))
    written = edit_putting(caseload, "write session", [session])
    return Edit("write session" if written else "set client", (*written.changes, *following.changes))


def _free(word: str, taken: set[str]) -> str:
    number = 1
    code = word
    while code in taken:
        number += 1
        code = f"{word} {number}"
    return code
