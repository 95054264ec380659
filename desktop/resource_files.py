"""Where the files that come with the program are, installed or run from a checkout."""

from __future__ import annotations

from pathlib import Path

_INSTALLED = Path(__file__).parent / "resources"
_CHECKOUT = Path(__file__).parent.parent / "resources"


def resource(*parts: str) -> Path:
    """Path of a file that comes with the program, e.g. ``resource("fonts", "OFL.txt")``.

    Raises:
        FileNotFoundError: the program was installed without it.
    """
    for folder in (_INSTALLED, _CHECKOUT):
        path = folder.joinpath(*parts)
        if path.exists():
            return path
    raise FileNotFoundError(f"the program was installed without {'/'.join(parts)}")
