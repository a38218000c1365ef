"""Pages of a panel that shows American units: no SI unit on any page but where a file is quoted, and the record as it was."""

import re
from dataclasses import fields, is_dataclass, replace
from pathlib import Path

import pytest

from specgen.core.say import THIN
from specgen.design.project import load_design
from specgen.design.record import record_of
from specgen.view.dossier import dossier_of
from specgen.view.in_units import in_units
from specgen.view.pages import page_views
from specgen.view.shapes import Cell, Column, FigureLine, Row, Table

PROJECT = Path(__file__).parent / "project_us"
METRIC = re.compile(
    "(?<![\\w.])[0-9][0-9.\u202f]*[\u202f\u00a0 ]"
    "(?:°C|degC|K|K/min|K/W|m³/h|m3/h|bar|mbar|k?Pa|mm|cm|m|mm²|m²|kg|[kM]?J/K|k?W/K|l/min|l|kg/h)(?![\\w/²³])"
)
AMERICAN = re.compile("(?<![\\w.])[0-9][0-9.\u202f]*[\u202f\u00a0 ](?:°F|degF|psi|ft|ft²|inch|gal/min|hp|lb|Btu/°F)(?![\\w/²³])")
OWN_WORDS = "Plating tank, 90 m from the boiler"


@pytest.fixture(scope="module")
def american():
    return load_design(PROJECT, remember=False)


@pytest.fixture(scope="module")
def american_pages(american):
    return {page.path: page for page in page_views(dossier_of(american))}


def texts(part):
    """Return every text for a reader, but what quotes a file and the formulas, whose constants have units of their own."""
    if isinstance(part, tuple):
        return [text for one in part for text in texts(one)]
    if isinstance(part, Table):
        quoted = {index for index, column in enumerate(part.columns) if column.quoted}
        told = [cell for row in part.rows for index, cell in enumerate(row.cells) if index not in quoted]
        return [text for one in (*told, *part.columns, *part.notes) for text in texts(one)] + [row.heading for row in part.rows]
    if isinstance(part, FigureLine):
        return [part.name, part.filled, part.result, part.case]
    if not is_dataclass(part):
        return []
    found = []
    for field in fields(part):
        value = getattr(part, field.name)
        found += [value] if isinstance(value, str) else texts(value)
    return found


def test_no_page_mixes_units(american_pages):
    for path, page in american_pages.items():
        for text in [*texts((page.lead, page.notices, page.sections)), page.kicker]:
            found = METRIC.search(text.replace(OWN_WORDS, ""))
            assert found is None, f"{path}: {text}"


def test_si_pages_hold_no_american_units(pages):
    for path, page in pages.items():
        for text in texts((page.lead, page.notices, page.sections)):
            assert AMERICAN.search(text) is None, f"{path}: {text}"


def test_each_quantity_is_in_its_american_unit(american_pages, text_of):
    """15 kW at 480 V and 10 percent more draw 19.8 A, by 1.25 24.8 A: a breaker of 25 A before 10 AWG; the cable is 80 ft long."""
    sheet = american_pages["loops/TIC-11.html"]
    assert f"hold 140.0{THIN}°F" in sheet.lead.spans[0].text
    conductors = text_of(american_pages["conductors.html"], "conductors")
    assert "10 AWG" in conductors
    assert f"80{THIN}ft" in conductors
    assert f"90{THIN}psi" in american_pages["loops/PIC-12.html"].lead.spans[0].text
    assert f"10{THIN}hp" in american_pages["loops/PIC-12.html"].kicker
    assert f"20.0{THIN}gal/min" in american_pages["loops/FIC-13.html"].lead.spans[0].text
    heat = text_of(american_pages["heat.html"], "interior")
    assert f"4{THIN}ft × 3{THIN}ft × 1{THIN}ft" in heat
    assert f"104{THIN}°F outside" in heat
    assert f"113{THIN}°F" in heat


def test_what_the_designer_says_in_words_is_left_alone(american_pages):
    assert american_pages["loops/TIC-11.html"].kicker.startswith(OWN_WORDS)
    rows = [row for section in american_pages["load.html"].sections for b in section.blocks if isinstance(b, Table) for row in b.rows]
    assert OWN_WORDS in {row.cells[1].text for row in rows}


def test_inputs_are_quoted_as_they_were_written(american_pages):
    basis = american_pages["loops/TIC-11.html"].sections[-1]
    table = next(block for block in basis.blocks if isinstance(block, Table) and block.caption == "Inputs")
    written = {row.cells[0].text: row.cells[1].text for row in table.rows}
    assert "step 0.1 K" in written["sensor"]


def test_the_record_is_the_same_whatever_the_pages_show(american):
    metric = replace(american, panel=american.panel.model_copy(update={"show": "si"}))
    assert record_of(metric) == record_of(american)


def test_a_panel_written_in_american_units_can_show_si(american):
    """140 degF are 60 degC, 90 psi 6.2 bar, 20 gal/min 4.54 m3/h."""
    metric = replace(american, panel=american.panel.model_copy(update={"show": "si"}))
    pages = {page.path: page for page in page_views(dossier_of(metric))}
    assert f"hold 60.0{THIN}°C" in pages["loops/TIC-11.html"].lead.spans[0].text
    assert f"6.21{THIN}bar" in pages["loops/PIC-12.html"].lead.spans[0].text
    assert f"4.54{THIN}m³/h" in pages["loops/FIC-13.html"].lead.spans[0].text


def test_a_quoted_column_is_passed_over():
    table = Table("", (Column("Input"), Column("As written", quoted=True)), (Row((Cell("5 m"), Cell("5 m"))),))
    told = in_units(table, lambda text: text.replace("5 m", "16.4 ft"))
    assert [cell.text for cell in told.rows[0].cells] == ["16.4 ft", "5 m"]
    assert in_units(table, None) is table
