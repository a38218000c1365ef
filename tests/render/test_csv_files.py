"""CSV files: read back by a reader of RFC 4180, numbers as numbers, nothing that a spreadsheet would compute."""

import csv
import io

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.render.csv_files import COMPUTED, csv_bytes, harmless
from specgen.view.shapes import Cell, Column, Row, Table


def rows_of(content):
    return list(csv.reader(io.StringIO(content.decode("utf-8"), newline=""), strict=True))


@given(st.lists(st.text(st.characters(exclude_categories=["Cs"])), min_size=2, max_size=2))
def test_any_text_is_read_back(texts):
    table = Table("", (Column("a"), Column("b")), (Row(tuple(Cell(text) for text in texts)),))
    assert rows_of(csv_bytes(table))[1] == [harmless(text) for text in texts]


@pytest.mark.parametrize("name", ["loops", "outputs", "open-points", "assumptions"])
def test_every_line_has_the_fields_of_its_head(files, name):
    content = files[f"data/{name}.csv"]
    assert content.count(b"\n") == content.count(b"\r\n")
    rows = rows_of(content)
    assert len(rows) > 1
    assert {len(row) for row in rows} == {len(rows[0])}
    assert len(set(rows[0])) == len(rows[0])


def test_numbers_are_numbers_and_units_stand_in_the_head(files, design):
    rows = rows_of(files["data/loops.csv"])
    at = rows[0].index("contact life [year]")
    lives = {row[0]: row[at] for row in rows[1:]}
    cold = next(loop for loop in design.loops if loop.tag == "TIC-1")
    assert float(lives["TIC-1"]) == pytest.approx(cold.decision.chosen.case.settings.contact_life, rel=1e-8)


def test_nothing_begins_with_what_a_spreadsheet_computes(files):
    for name, content in files.items():
        if not name.endswith(".csv"):
            continue
        for row in rows_of(content):
            for cell in row:
                assert not cell.startswith(COMPUTED) or float(cell) < 0, f"{name}: {cell}"


def test_designations_and_user_text_stand_behind_an_apostrophe(files):
    text = files["data/outputs.csv"].decode()
    assert "'=TIC1-Q1" in text
    assert "'@SUM(A1), trace heating" in text
