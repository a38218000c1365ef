"""Recordings in every dialect a logger writes; what can be read in two ways is refused at its line and column."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.source.recording import Columns, header_unit, read_recording
from specgen.source.recording_text import MOST_REPORTED, RECORDING_CODES

GOOD = "t_s,out_percent,pv_degC\n0,20,46.5\n10,70,46.75\n"


def read(text, columns=None):
    return read_recording(text if isinstance(text, bytes) else text.encode(), "a.csv", columns)


def recording(text, columns=None):
    answer = read(text, columns)
    assert not answer.problems, [problem.line() for problem in answer.problems]
    return answer.recording


DIALECTS = {
    "comma": GOOD.encode(),
    "semicolon": GOOD.replace(",", ";").encode(),
    "tab": GOOD.replace(",", "\t").encode(),
    "semicolon and decimal comma": b"t_s;out_percent;pv_degC\n0;20;46,5\n10;70;46,75\n",
    "tab and decimal comma": b"t_s\tout_percent\tpv_degC\n0\t20\t46,5\n10\t70\t46,75\n",
    "CRLF": GOOD.replace("\n", "\r\n").encode(),
    "CR": GOOD.replace("\n", "\r").encode(),
    "no line end at the end": GOOD.rstrip().encode(),
    "byte order mark": b"\xef\xbb\xbf" + GOOD.encode(),
    "UTF-16 with mark": GOOD.encode("utf-16"),
    "UTF-16 big-endian without mark": GOOD.encode("utf-16-be"),
    "UTF-16 little-endian without mark": GOOD.encode("utf-16-le"),
    "Latin-1 degree sign": "t [s];out [%];pv [°C]\n0;20;46,5\n10;70;46,75\n".encode("latin-1"),
    "UTF-8 degree sign": "t [s];out [%];pv [°C]\n0;20;46,5\n10;70;46,75\n".encode(),
    "quoted": b'"t_s","out_percent","pv_degC"\n"0","20","46.5"\n"10","70","46.75"\n',
    "comments and empty lines": b"# rig 4\n// second\n\n" + GOOD.replace("\n10", "\n# step\n\n10").encode(),
    "sep line of a spreadsheet": b"sep=;\n" + GOOD.replace(",", ";").encode(),
    "blanks around cells": GOOD.replace(",", " , ").encode(),
    "empty cells behind the last": GOOD.replace("\n", ",\n").replace("degC,", "degC").encode(),
    "other columns and another order": b"alarm,pv_degC,out_percent,t_s\nno,46.5,20,0\nno,46.75,70,10\n",
    "minutes": b"t_min,out_percent,pv_degC\n0,20,46.5\n0.16666666666666666,70,46.75\n",
    "hours": b"time (h),out_percent,pv_degC\n1,20,46.5\n1.002777777777777778,70,46.75\n",
    "date and time": b"time,out_percent,pv_degC\n2026-03-04T10:00:00,20,46.5\n2026-03-04T10:00:10,70,46.75\n",
    "date, blank, time, fraction": b"time;out_percent;pv_degC\n2026-03-04 10:00:00,5;20;46,5\n2026-03-04 10:00:10,5;70;46,75\n",
    "offset from UTC": b"time,out_percent,pv_degC\n2026-03-29T01:59:55+01:00,20,46.5\n2026-03-29T03:00:05+02:00,70,46.75\n",
    "kelvin": b"t_s,out_percent,pv_K\n0,20,319.65\n10,70,319.90\n",
    "fahrenheit": b"t_s,out_percent,pv_degF\n0,20,115.7\n10,70,116.15\n",
}


@pytest.mark.parametrize("dialect", DIALECTS)
def test_one_recording_in_every_dialect(dialect):
    found = recording(DIALECTS[dialect])
    assert found.time == pytest.approx([0.0, 10.0])
    assert found.output == pytest.approx([0.2, 0.7])
    assert found.value == pytest.approx([46.5, 46.75])
    assert found.dimension.name == "temperature"


@pytest.mark.parametrize(
    ("header", "written", "base", "dimension"),
    [
        ("pv_bar", 2.5, 250_000.0, "pressure"),
        ("pv [bar absolute]", 2.5, 148_675.0, "pressure"),  # 250000 - 101325
        ("flow_m3/h", 36.0, 0.01, "flow_volume"),
        ("flow_m3_per_h", 36.0, 0.01, "flow_volume"),
        ("flow_kg/h", 3600.0, 1.0, "flow_mass"),
        ("humidity_%", 45.0, 0.45, "fraction"),
        ("acid [pH]", 6.5, 6.5, "own:pH"),
    ],
)
def test_units_of_the_value(header, written, base, dimension):
    found = recording(f"t_s,out_percent,{header}\n0,20,{written}\n10,70,{written}\n")
    assert found.value[0] == pytest.approx(base)
    assert found.written[0] == pytest.approx(written)
    assert found.dimension.name == dimension


def test_columns_by_name_with_a_unit_beside_them():
    found = recording(
        "Clock;Drive;Sensor\n0;20;3,5\n5;70;3,6\n", Columns("clock", "Drive", "Sensor", {"Clock": "min", "Drive": "%", "Sensor": "bar"})
    )
    assert found.time.tolist() == [0.0, 300.0]
    assert found.value == pytest.approx([350_000.0, 360_000.0])
    assert found.names == ("Clock", "Drive", "Sensor")


def test_a_level_in_percent_beside_the_output_is_told_by_its_name():
    found = recording("t_s,level_percent,out_percent\n0,50,20\n1,51,70\n")
    assert found.names == ("t_s", "out_percent", "level_percent")


def test_empty_cells_are_not_numbers_and_are_told():
    answer = read("t_s,out_percent,pv_degC\n0,20,46.5\n1,,46.5\n2,70,NaN\n3,70,47\n")
    assert np.isnan(answer.recording.output[1])
    assert np.isnan(answer.recording.value[2])
    assert any("2 rows with an empty cell are left out (lines 3, 4)" in note for note in answer.notes)


def test_a_last_row_cut_off_by_the_logger_is_left_out_and_told():
    answer = read(GOOD + "20,70,46.9\n30,7")
    assert np.isnan(answer.recording.value[3])
    assert any("line 5, is cut short" in note for note in answer.notes)


def test_what_was_assumed_is_told():
    notes = read(DIALECTS["Latin-1 degree sign"]).notes
    assert "the file is not UTF-8; it is read as Latin-1 (Windows-1252)" in notes
    assert "columns are separated by semicolon" in notes
    assert "numbers are read with a decimal comma" in notes


def rows(*lines):
    return "\n".join(("t_s,out_percent,pv_degC", *lines)) + "\n"


def semicolons(*lines):
    return "\n".join(("t_s;out_percent;pv_degC", *lines)) + "\n"


BAD = [
    pytest.param("", "R101", 1, 1, id="empty"),
    pytest.param("t_s,out_percent,pv_degC\n", "R101", 1, 1, id="header alone"),
    pytest.param("# only\n# comments\n", "R101", 1, 1, id="comments alone"),
    pytest.param(b"x" * (10 * 1024 * 1024 + 1), "R101", 1, 1, id="larger than 10 MiB"),
    pytest.param(b"PK\x03\x04rest of a workbook", "R102", 1, 1, id="a workbook"),
    pytest.param(b"t_s,out_percent,pv_degC\n0,2\x000,46\n", "R102", 2, 1, id="a zero byte"),
    pytest.param(b"\xff\xfet\x00,\x00u\x00", "R101", 1, 1, id="UTF-16 with a header alone"),
    pytest.param(b"\xff\xfet\x00_\x00s", "R102", 1, 1, id="half a letter of UTF-16"),
    pytest.param(b"t_s,out_percent,pv_degC\n0,20,\x81\n", "R102", 1, 1, id="in no known encoding"),
    pytest.param("0,20,46.5\n10,70,46.75\n", "R103", 1, 1, id="no header"),
    pytest.param("t_s\n0\n10\n", "R104", 1, 1, id="one column"),
    pytest.param("t_s|out_percent|pv_degC\n0|20|46\n", "R104", 1, 1, id="another separator"),
    pytest.param("t_s,pv_degC,PV_degC\n0,20,46\n", "R105", 1, 13, id="one name twice"),
    pytest.param(rows("0,20", "10,70,46.75", "20,70,47"), "R106", 2, 1, id="a cell too few"),
    pytest.param(rows("0,20,46,5", "10,70,46,75", "20,70,47"), "R106", 2, 1, id="decimal commas between commas"),
    pytest.param(rows("0,20,1,046.5", "10,70,47"), "R106", 2, 1, id="thousands between commas"),
    pytest.param(rows('0,20,"46.5', "10,70,46.75"), "R107", 2, 6, id="open quotation mark"),
    pytest.param('t_s,"out_percent,pv_degC\n0,20,46\n', "R107", 1, 5, id="open quotation mark in the header"),
    pytest.param(rows("0,20,46.5", "10,70,hot"), "R108", 3, 7, id="a word"),
    pytest.param(rows("0,20,46.5 degC", "10,70,47"), "R108", 2, 6, id="a unit in the cell"),
    pytest.param(rows("0,20,inf", "10,70,47"), "R108", 2, 6, id="infinite"),
    pytest.param(rows("0,20,1e999", "10,70,47"), "R108", 2, 6, id="too large"),
    pytest.param(rows("0:00:10,20,46", "0:00:20,70,47"), "R108", 2, 1, id="a time of day in a column of seconds"),
    pytest.param(rows('0,20,"1,046.5"', "10,70,47"), "R109", 2, 6, id="quoted thousands"),
    pytest.param(rows('0,20,"46,5"', "10,70,47"), "R109", 2, 6, id="a quoted decimal comma between commas"),
    pytest.param(semicolons("0;20;1.046,5", "10;70;47"), "R109", 2, 6, id="point and comma in one number"),
    pytest.param(semicolons("0,5;20;46.5", "10;70;47"), "R109", 2, 1, id="point and comma in one file"),
    pytest.param(semicolons("0;20;998", "10;70;1,002"), "R109", 3, 7, id="decimal or thousands"),
    pytest.param(semicolons("0;20;1 046", "10;70;1 047"), "R109", 2, 6, id="blanks between thousands"),
    pytest.param(semicolons("0;20;1'046", "10;70;1'047"), "R109", 2, 6, id="apostrophes between thousands"),
    pytest.param(semicolons("0;20;1.046.000", "10;70;1.047.000"), "R109", 2, 6, id="points between thousands"),
    pytest.param(semicolons("0;20;1,046,000", "10;70;1,047,000"), "R109", 2, 6, id="commas between thousands"),
    pytest.param("t_s,out_percent,pv\n0,20,46\n1,70,47\n", "R112", 1, 1, id="no unit at the value"),
    pytest.param("t_s,out,pv_degC\n0,20,46\n1,70,47\n", "R112", 1, 1, id="no unit at the output"),
    pytest.param("t_m,out_percent,pv_degC\n0,20,46\n1,70,47\n", "R112", 1, 1, id="metres for minutes"),
    pytest.param("t_s,out_percent,a_degC,b_degC\n0,20,46,1\n1,70,47,1\n", "R112", 1, 1, id="two values"),
    pytest.param("t_s,a_percent,b_percent\n0,20,46\n1,70,47\n", "R112", 1, 1, id="two shares without a name that tells"),
    pytest.param("t_s,out_percent,pv [degc]\n0,20,46\n1,70,47\n", "R111", 1, 17, id="wrong case"),
    pytest.param("t_s,out_percent,pv [kW]\n0,20,46\n1,70,47\n", "R111", 1, 17, id="a power"),
    pytest.param(rows("0,20,46", "10,20,46", "10,70,47"), "R113", 4, 1, id="time stands still"),
    pytest.param(rows("0,20,46", "10,20,46", "5,70,47"), "R113", 4, 1, id="time goes back"),
    pytest.param("time,out_percent,pv_degC\n2026-03-04T10:00,0,46\n04/03/2026 10:01,70,47\n", "R114", 3, 1, id="another date format"),
    pytest.param("time,out_percent,pv_degC\n2026-03-04T10:00,0,46\n2026-02-30T10:00,70,47\n", "R114", 3, 1, id="no such day"),
    pytest.param("time,out_percent,pv_degC\n2026-03-04T10:00,0,46\n2026-03-04T10:00Z,70,47\n", "R114", 3, 1, id="with and without offset"),
]


@pytest.mark.parametrize(("text", "code", "line", "column"), BAD)
def test_a_bad_recording_is_refused_at_its_place(text, code, line, column):
    answer = read(text)
    assert answer.recording is None
    first = answer.problems[0]
    assert (first.code, first.span.line, first.span.column, first.span.file) == (code, line, column, "a.csv")
    assert first.code in RECORDING_CODES


def test_every_code_is_raised_somewhere():
    raised = {case.values[1] for case in BAD} | {"R110"}
    assert raised == set(RECORDING_CODES)


def test_the_hint_helps():
    hints = {
        rows("0,20,46,5", "10,70,46,75"): "semicolons",
        "t_s,out_percent,pv [degc]\n0,20,46\n1,70,47\n": "write degC",
        rows("0,20,46.5 degC", "10,70,47"): "belongs into the header",
        "t_s,out_percent,pv\n0,20,46\n1,70,47\n": "pv_degC",
    }
    for text, hint in hints.items():
        assert hint in read(text).problems[0].hint


def test_a_column_that_is_not_there_gets_the_nearest():
    problem = read(GOOD, Columns(value="pv_degc2")).problems[0]
    assert (problem.code, problem.hint) == ("R110", "did you mean pv_degC?")
    assert read(GOOD, Columns(value="xyz")).problems[0].hint == "the columns are t_s, out_percent, pv_degC"


def test_a_named_column_without_a_unit():
    problem = read("t_s,out_percent,pv\n0,20,46\n1,70,47\n", Columns(value="pv")).problems[0]
    assert (problem.code, problem.span.column, problem.hint) == ("R111", 17, "write it behind the name, as in pv_degC")


def test_every_bad_cell_is_told_up_to_ten_of_a_kind():
    answer = read(rows(*(f"{k},20,bad{k}" for k in range(25))))
    assert len(answer.problems) == MOST_REPORTED + 1
    assert answer.problems[-1].text == "15 more problems of this kind are not listed"


def test_three_decimals_throughout_are_decimals():
    """998,125 beside 1,5 or beside other numbers with three decimals is no thousand."""
    assert recording(semicolons("0;20;65,125", "10;70;65,250")).value == pytest.approx([65.125, 65.25])
    assert recording(semicolons("0;20;65", "10;70;65,5", "20;70;65,125")).value == pytest.approx([65, 65.5, 65.125])


def test_header_units():
    assert header_unit("temp_in_degC") == ("temp_in", "degC")
    assert header_unit("pv (bar)") == ("pv", "bar")
    assert header_unit("pv") == ("pv", "")


def test_more_rows_than_a_million(monkeypatch):
    monkeypatch.setattr("specgen.source.recording_text.MOST_ROWS", 3)
    assert read(rows("0,1,2", "1,1,2", "2,1,2", "3,1,2")).problems[0].code == "R101"


@settings(max_examples=150, deadline=None)
@given(st.binary(max_size=200))
def test_no_bytes_raise(raw):
    answer = read(raw)
    assert answer.recording is not None or answer.problems


@settings(max_examples=150, deadline=None)
@given(st.lists(st.text(alphabet="0123456789.,;\t-e\"' naT:Z#+%\n", max_size=25), max_size=6), st.sampled_from([",", ";", "\t"]))
def test_no_rows_raise(lines, separator):
    answer = read(separator.join(("t_s", "out_percent", "pv_degC")) + "\n" + "\n".join(lines))
    assert answer.recording is not None or answer.problems


@settings(max_examples=50, deadline=None)
@given(st.lists(st.floats(-1e6, 1e6, allow_nan=False), min_size=2, max_size=20), st.booleans())
def test_written_numbers_come_back(values, comma):
    text = "\n".join(f"{k};0;{value:.4f}".replace(".", "," if comma else ".") for k, value in enumerate(values))
    assert recording(f"t_s;out_percent;pv_degC\n{text}\n").value == pytest.approx([round(value, 4) for value in values])
