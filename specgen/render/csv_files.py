"""Tables as CSV files (RFC 4180): units in the heads, numbers as numbers, nothing a spreadsheet would compute.

A text cell that begins with ``=``, ``+``, ``-``, ``@``, a tab or a line end is written with an apostrophe in front.
That holds for reference designations too: a spreadsheet takes ``=TIC101-Q1`` for the difference of two cells and shows
a number. A program that reads the file drops the apostrophe; ``record.json`` has the bare designations.
"""

from specgen.view.shapes import Table

COMPUTED = ("=", "+", "-", "@", "\t", "\r", "\n")
_QUOTED = frozenset(',"\r\n')


def csv_bytes(table: Table) -> bytes:
    r"""Write a table as a CSV file, UTF-8, lines ended by CR LF.

    Examples
    --------
    >>> from specgen.view.shapes import Cell, Column, Row
    >>> columns = (Column("Loop", export="loop"), Column("Life", "years", number=True, export="life [year]"))
    >>> csv_bytes(Table("", columns, (Row((Cell("=T1"), Cell("10.4", number=True, export="-10.4"))),)))
    b"loop,life [year]\r\n'=T1,-10.4\r\n"
    """
    lines = [",".join(_quoted(column.export or column.head) for column in table.columns)]
    for row in table.rows:
        cells = zip(table.columns, row.cells, strict=True)
        lines.append(",".join(cell.plain if column.number else _quoted(harmless(cell.plain)) for column, cell in cells))
    return ("\r\n".join(lines) + "\r\n").encode()


def harmless(text: str) -> str:
    """Put an apostrophe before text that a spreadsheet would compute.

    Examples
    --------
    >>> harmless("@SUM(A1)"), harmless("oil")
    ("'@SUM(A1)", 'oil')
    """
    return f"'{text}" if text.startswith(COMPUTED) else text


def _quoted(text: str) -> str:
    if _QUOTED.isdisjoint(text):
        return text
    return '"' + text.replace('"', '""') + '"'
