"""The page's table set into words: a row for each stretch, or in large print a column for each."""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QLineF

from desktop.page.content import PageContent, Row
from desktop.page.words import LINE, Face, Words, set_words, width_of
from desktop.wording.page import HEADS

_LEAST_GAP, _MOST_GAP = 7.5, 30.0
_SHARED = ("dates", "logged", "readings")
"""Said once for two measures on the same days."""

Cells = list[list[str]]


def wide_table(
    content: PageContent, rows: Sequence[Row], size: int, width: float
) -> tuple[list[Words], list[QLineF], float]:
    """A row for each stretch.

    Args:
        content: for the columns.
        rows: those that are shown.
        size: of the letters.
        width: of the table.

    Returns:
        Words and thin lines from (0, 0) on, and the height of the table.
    """
    heads = ["", *("" if name == "which" else HEADS[name] for name in content.columns)]
    cells: Cells = [heads]
    above: Row | None = None
    for row in rows:
        repeats = above is not None and above.head == row.head and above.cells["dates"] == row.cells["dates"]
        line = ["" if repeats else row.head]
        for name in content.columns:
            said = row.cells.get(name, "")
            same = above is not None and repeats and name in _SHARED and above.cells.get(name) == said
            line.append("" if same else said)
        cells.append(line)
        above = row
    return _set(cells, size, width, parted_from=[bool(line[0]) for line in cells])


def tall_tables(
    content: PageContent, rows: Sequence[Row], size: int, width: float
) -> list[tuple[str, list[Words], list[QLineF], float]]:
    """A column for each stretch; of two measures on the same days a cell holds both, else each has its table.

    Returns:
        For each table the short names of its measures (``""`` where there is one), and as for ``wide_table``.
    """
    names = list(dict.fromkeys(row.cells["which"] for row in rows))
    columns = [[row for row in rows if row.cells["which"] == name] for name in names]
    if len(names) == 2 and [_days_of(row) for row in columns[0]] == [_days_of(row) for row in columns[1]]:
        rows = [_both(upper, lower) for upper, lower in zip(*columns, strict=True)]
        names, columns = [" / ".join(names)], [rows]
    tables = []
    for name, shown in zip(names, columns, strict=True):
        cells: Cells = [["", *(row.head for row in shown)]]
        for column in content.columns:
            if column != "which":
                cells.append([HEADS[column], *(row.cells.get(column, "") for row in shown)])
        tables.append((name, *_set(cells, size, width, parted_from=[True] * len(cells))))
    return tables


def _both(upper: Row, lower: Row) -> Row:
    """The row of two measures on the same days: each cell holds both, parted where the line must end."""
    cells = {}
    for name, said in upper.cells.items():
        other = lower.cells.get(name, "")
        halves = (one.replace(" ", "\u00a0") for one in (said, other))
        cells[name] = said if name in _SHARED and said == other else "\u00a0/ ".join(halves)
    return Row(upper.head, cells)


def _days_of(row: Row) -> tuple[str, str]:
    return row.head, row.cells["dates"]


def _set(
    cells: Cells, size: int, width: float, parted_from: Sequence[bool]
) -> tuple[list[Words], list[QLineF], float]:
    """Set the cells; one with nothing under it, up to the next parting line, may use the lines below."""
    bold, plain = Face(size, bold=True), Face(size)
    widths, gap = _widths(cells, size, width)
    lefts = [sum(widths[:column]) + gap * column for column in range(len(widths))]
    heights = [size * LINE] * len(cells)
    placed: list[tuple[int, int, list[Words]]] = []
    spanning: list[tuple[int, int, float]] = []
    for row, line in enumerate(cells):
        for column, text in enumerate(line):
            if not text:
                continue
            face = plain if row and column else bold
            words, tall = set_words([(text, face)], widths[column] + 0.01)
            placed.append((row, column, words))
            last = row
            while last + 1 < len(cells) and not parted_from[last + 1] and not cells[last + 1][column]:
                last += 1
            if last == row:
                heights[row] = max(heights[row], tall)
            else:
                spanning.append((row, last, tall))
    for row, last, tall in spanning:
        heights[last] += max(0.0, tall - sum(heights[row : last + 1]))
    tops, rules = _parted(heights, width, parted_from)
    words = [one.moved(lefts[column], tops[row]) for row, column, cell in placed for one in cell]
    return words, rules, tops[-1]


def _parted(
    heights: Sequence[float], width: float, parted_from: Sequence[bool]
) -> tuple[list[float], list[QLineF]]:
    """The top of each row and the end of the last, with a thin line above the rows that begin a part."""
    tops, rules = [], []
    top = 0.0
    for row, height in enumerate(heights):
        if row and parted_from[row]:
            rules.append(QLineF(0.0, top + 1.5, width, top + 1.5))
            top += 3.0
        tops.append(top)
        top += height
    return [*tops, top], rules


def _widths(cells: Cells, size: int, width: float) -> tuple[list[float], float]:
    """The width of each column, and the gap between two.

    Where there is no room for every cell on one line, the heads are parted first, then the other cells.
    """
    gaps = len(cells[0]) - 1
    room = width - gaps * _LEAST_GAP
    whole = _needed(cells, size, parted_rows=0)
    if sum(whole) <= room:
        return whole, min((width - sum(whole)) / max(gaps, 1), _MOST_GAP)
    widths, least = _needed(cells, size, parted_rows=1), _needed(cells, size, parted_rows=len(cells))
    # As few columns as will do are parted: those that give most. What room is left makes parted ones wider again.
    for column in sorted(range(len(widths)), key=lambda one: least[one] - widths[one]):
        if sum(widths) <= room:
            break
        widths[column] = max(least[column], widths[column] - (sum(widths) - room))
    if sum(widths) > room:
        return [one * room / sum(widths) for one in widths], _LEAST_GAP
    for column in sorted(range(len(widths)), key=lambda one: whole[one] - widths[one]):
        widths[column] += min(whole[column] - widths[column], room - sum(widths))
    return widths, _LEAST_GAP


def _needed(cells: Cells, size: int, parted_rows: int) -> list[float]:
    """The width each column needs when the cells of the first rows may be parted at their spaces."""
    bold, plain = Face(size, bold=True), Face(size)
    needed = []
    for column in range(len(cells[0])):
        widest = 0.0
        for row, line in enumerate(cells):
            face = bold if not row or not column else plain
            pieces = line[column].split(" ") if row < parted_rows else [line[column]]
            widest = max([widest, *(width_of(piece.replace("\u00a0", " "), face) for piece in pieces)])
        needed.append(widest)
    return needed
