"""A share as a bar of characters."""

from __future__ import annotations

TRACE = 0.0005
"""Share that is seen at least as a trace: what rounds to 0.1 %. [1]"""
_EIGHTHS = " ▏▎▍▌▋▊▉"


def bar(share: float, width: int, plain: bool = False) -> str:
    """Draw a share from the left.

    Parameters
    ----------
    share : float
        Below 0 and above 1 are cut. [1]
    width : int
        Cells for the share 1. [1]
    plain : bool
        Only characters of ASCII.

    Returns
    -------
    str
        ``width`` characters; a share of 0.05 % or more shows at least a trace.
    """
    share = min(max(share, 0.0), 1.0)
    if plain:
        whole = max(round(share * width), 1 if share >= TRACE else 0)
        return ("#" * whole).ljust(width)
    eighths = max(round(share * width * 8), 1 if share >= TRACE else 0)
    whole, rest = divmod(eighths, 8)
    return ("█" * whole + (_EIGHTHS[rest] if rest else "")).ljust(width)[:width]
