"""Several measures looked at: what their chances are worth together."""

from __future__ import annotations

from collections.abc import Sequence


def holm(chances: Sequence[float]) -> tuple[float, ...]:
    """Chances adjusted so that luck makes a claim for any of the measures as seldom as for one alone.

    Valid however the measures hang together.

    Args:
        chances: the chance by luck of each measure, in any order.

    Returns:
        The adjusted chances, in the same order.

    Source: Holm (1979), Scand. J. Stat. 6:65-70.
    """
    adjusted = [1.0] * len(chances)
    most = 0.0
    for place, at in enumerate(sorted(range(len(chances)), key=lambda one: chances[one])):
        most = max(most, min(1.0, (len(chances) - place) * chances[at]))
        adjusted[at] = most
    return tuple(adjusted)
