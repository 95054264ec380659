"""`dayfence` and `python -m desktop`: a command without a window, or the window."""

from __future__ import annotations

import sys
from collections.abc import Sequence


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
    from desktop.app import main as open_window

    return open_window(given)


if __name__ == "__main__":
    sys.exit(main())
