"""The workbook read back by another library: what was put in comes out, as text or as a number, and nothing is a formula."""

import datetime
import io
import zipfile

import openpyxl
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.render.workbook import LONGEST, workbook
from specgen.view.shapes import Cell, Column, Row, Table

DATE = datetime.date(2026, 11, 20)
COLUMNS = (Column("Part"), Column("Life", "years", number=True, export="life [year]"))


def read(content):
    return openpyxl.load_workbook(io.BytesIO(content))


def table(*rows):
    return Table("", COLUMNS, tuple(Row((Cell(text), Cell(number, number=True, export=number))) for text, number in rows))


@pytest.fixture(scope="module")
def book(files):
    return read(files["data/schedules.xlsx"])


def test_a_designation_is_text_and_a_number_a_number():
    sheet = read(workbook({"Parts": table(("=TIC101-Q1", "10.4"), ("@SUM(A1)", ""), ("http://nowhere.invalid", "-3"))}, DATE))["Parts"]
    assert [[cell.value for cell in row] for row in sheet.iter_rows()] == [
        ["Part", "life [year]"], ["=TIC101-Q1", 10.4], ["@SUM(A1)", None], ["http://nowhere.invalid", -3],
    ]  # fmt: skip
    assert {row[0].data_type for row in sheet.iter_rows()} == {"s"}
    assert sheet["B2"].data_type == "n"
    assert sheet["A4"].hyperlink is None


def test_heads_stay_and_every_column_has_a_filter():
    sheet = read(workbook({"Parts": table(("a", "1"), ("b", "2"))}, DATE))["Parts"]
    assert sheet.freeze_panes == "A2"
    assert sheet.auto_filter.ref == "A1:B3"
    assert sheet["A1"].font.bold


def test_no_row_is_a_sheet_too():
    sheet = read(workbook({"Parts": table()}, DATE))["Parts"]
    assert [[cell.value for cell in row] for row in sheet.iter_rows()] == [["Part", "life [year]"]]


def test_a_text_beyond_what_a_cell_holds_is_cut_and_says_so():
    sheet = read(workbook({"Parts": table(("x" * 40_000, "1"))}, DATE))["Parts"]
    assert len(sheet["A2"].value) == LONGEST
    assert sheet["A2"].value.endswith("…")


def test_the_same_tables_are_the_same_bytes_whatever_the_clock_says(monkeypatch):
    one = workbook({"Parts": table(("a", "1"))}, DATE)
    monkeypatch.setattr("time.time", lambda: 2_000_000_000.0)
    assert workbook({"Parts": table(("a", "1"))}, DATE) == one
    with zipfile.ZipFile(io.BytesIO(one)) as packed:
        assert {entry.date_time[0] for entry in packed.infolist()} == {1980}
    assert read(one).properties.created == datetime.datetime(2026, 11, 20)  # noqa: DTZ001  the file has no zone


@settings(max_examples=40)
@given(st.lists(st.tuples(st.text(st.characters(min_codepoint=32, exclude_categories=["Cs", "Cn"]), min_size=1, max_size=20),
                          st.floats(-1e9, 1e9)), max_size=4))  # fmt: skip
def test_any_text_and_number_come_back(rows):
    sheet = read(workbook({"A": table(*((text, repr(number)) for text, number in rows))}, DATE))["A"]
    # a reader turns _x0041_ back into a letter: the writer escapes it
    found = [(row[0].value, row[1].value) for row in sheet.iter_rows(min_row=2)]
    assert [text for text, _ in found if text is not None] == [text for text, _ in rows]
    assert [number for _, number in found if number is not None] == pytest.approx([number for _, number in rows])


def test_every_file_of_a_table_is_a_sheet_with_the_same_rows(files, book):
    names = {name.removeprefix("data/").removesuffix(".csv") for name in files if name.endswith(".csv")}
    assert {name.replace("-", " ").capitalize() for name in names} == set(book.sheetnames)
    assert {"outputs", "parts", "protection", "conductors", "terminals", "instruments", "loops"} <= names
    for name in names:
        sheet = book[name.replace("-", " ").capitalize()]
        assert sheet.max_row == files[f"data/{name}.csv"].decode().count("\r\n"), name


def test_terminals_are_those_of_the_design(book, design):
    rows = [tuple(cell.value for cell in row) for row in book["Terminals"].iter_rows(min_row=2)]
    assert [row[0] for row in rows] == [t.designation for tag in sorted(design.wirings) for t in design.wirings[tag].terminals]
    assert rows


def test_no_cell_of_the_dossier_is_a_formula(book):
    assert [cell.coordinate for sheet in book for row in sheet.iter_rows() for cell in row if cell.data_type == "f"] == []
