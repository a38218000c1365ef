"""The schedules as one workbook: a sheet a table, heads that stay, filters, numbers as numbers, and no text that is computed."""

import datetime
from collections.abc import Mapping
from io import BytesIO

from xlsxwriter import Workbook
from xlsxwriter.format import Format
from xlsxwriter.worksheet import Worksheet

from specgen.view.shapes import Table

LONGEST = 32767  # characters of a cell, from memory of the file format
WIDEST = 60
_SAMPLE = 200  # rows that the widths of the columns are taken from


def workbook(tables: Mapping[str, Table], date: datetime.date) -> bytes:
    """Write tables as a workbook.

    Parameters
    ----------
    tables : mapping of str to Table
        By the name of their sheet, in order; at most 31 characters each.
    date : datetime.date
        The date the file carries: it depends on nothing else, so that the same tables always give the same bytes.

    Returns
    -------
    bytes
        The file.

    Notes
    -----
    A reference designation begins with ``=``: every text is written as text, never as a formula or a link.
    """
    made = BytesIO()
    plain = {"in_memory": True, "strings_to_formulas": False, "strings_to_urls": False, "strings_to_numbers": False}
    with Workbook(made, plain) as book:
        book.set_properties({"created": datetime.datetime(date.year, date.month, date.day)})  # noqa: DTZ001  the file has no zone
        head = book.add_format({"bold": True, "bottom": 1, "text_wrap": True, "valign": "bottom"})
        for name, table in tables.items():
            _sheet(book.add_worksheet(name), table, head)
    return made.getvalue()


def _sheet(sheet: Worksheet, table: Table, head: Format) -> None:
    heads = [column.export or column.head for column in table.columns]
    widths = [len(text) for text in heads]
    for at, text in enumerate(heads):
        sheet.write_string(0, at, text, head)
    line = 0
    for row in table.rows:
        if not row.cells:
            continue
        line += 1
        for at, (column, cell) in enumerate(zip(table.columns, row.cells, strict=True)):
            text = cell.plain
            if line <= _SAMPLE:
                widths[at] = max(widths[at], len(text))
            if column.number and text:
                sheet.write_number(line, at, float(text))
            elif text:
                sheet.write_string(line, at, text if len(text) <= LONGEST else f"{text[: LONGEST - 1]}…")
    for at, width in enumerate(widths):
        sheet.set_column(at, at, min(width, WIDEST) + 2)
    sheet.freeze_panes(1, 0)
    sheet.autofilter(0, 0, line, len(heads) - 1)
