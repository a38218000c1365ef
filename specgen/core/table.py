"""A plain table for a terminal."""

from collections.abc import Sequence


def aligned(head: Sequence[str], rows: Sequence[Sequence[str]]) -> str:
    """Return rows under a head, columns aligned, the last one as long as it is.

    Examples
    --------
    >>> print(aligned(("loop", "verdict"), [("TIC-101", "meets"), ("T-2", "open")]))
    loop     verdict
    TIC-101  meets
    T-2      open
    """
    widths = [max(len(row[column]) for row in [head, *rows]) for column in range(len(head))]
    lines = ["  ".join(cell.ljust(width) for cell, width in zip(row, widths, strict=True)).rstrip() for row in [head, *rows]]
    return "\n".join(lines)
