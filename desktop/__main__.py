"""`dayfence` and `python -m desktop`: a command without a window, or the window."""

from __future__ import annotations

import sys
from collections.abc import Sequence
from difflib import get_close_matches
from pathlib import Path

COMMANDS = ("review", "page", "export")


def main(arguments: Sequence[str] | None = None) -> int:
    """Start what the command line asks for and return the exit code."""
    given = list(sys.argv[1:] if arguments is None else arguments)
    if given and given[0] == "review":
        from desktop.command import main as run_review  # Without Qt, so that it runs where no window can.

        return run_review(given)
    if given and given[0] == "page":
        from desktop.page.command import main as run_page

        return run_page(given)
    if given and given[0] == "export":
        from desktop.export import main as run_export

        return run_export(given)
    unknown = _unknown_command(given)
    if unknown:
        sys.stderr.write(f"{unknown}\n")
        return 2
    from desktop.app import main as open_window

    return open_window(given)


def _unknown_command(given: Sequence[str]) -> str:
    """What is wrong where the first word is neither a command nor a journal to open; ``""`` where all is well."""
    if not given or given[0].startswith("-") or (len(given) == 1 and Path(given[0]).suffix):
        return ""
    word = given[0]
    near = get_close_matches(word.lower(), COMMANDS, n=1)
    is_alone = len([one for one in given if not one.startswith("-")]) == 1
    if Path(word).exists() or (is_alone and not near):
        return ""
    if near:
        return f"There is no command “{word}”. The nearest is dayfence {near[0]}; it has a --help."
    return f"There is no command “{word}”. There are dayfence review, page and export; each has a --help."


if __name__ == "__main__":
    sys.exit(main())
