"""What the pages say: nothing missing, nothing faked, every claim where a reader looks for it."""

import re
from dataclasses import replace
from math import inf

import pytest

from specgen.core.diagnostic import Diagnostic, Span
from specgen.design.types import Firm
from specgen.rules.planned import PLANNED
from specgen.view.dossier import dossier_of, missing_loops
from specgen.view.frame import PAGE_ROWS
from specgen.view.pages import BUILDERS, page_paths, page_views
from specgen.view.shapes import FigureLine, Table
from specgen.view.sheet_faults import faults_section
from specgen.view.sheet_firmness import firmness_section
from specgen.view.words import DEVICES, MODES


def test_every_row_of_the_page_list_has_a_builder_and_every_builder_a_row():
    assert {row.path for row in PAGE_ROWS} == set(BUILDERS)


def test_pages_are_exactly_those_announced(pages, design):
    assert tuple(pages) == page_paths(design)


def test_navigation_leads_only_to_pages_that_are_there(pages):
    from posixpath import dirname, join, normpath  # noqa: PLC0415  beside what it is for

    for path, page in pages.items():
        for link in (*page.navigation, *page.siblings, *(link for link in (page.before, page.after) if link)):
            assert normpath(join(dirname(path), link.href)) in pages


def test_every_page_says_what_is_broken_held_and_open(pages):
    for page in pages.values():
        items = page.standing.items
        said = " ".join((item.mark.word + " " if item.mark else "") + "".join(span.text for span in item.spans) for item in items)
        assert "1 problem in the input" in said
        assert "TIC-5" in said
        assert "held TIC-3" in said
        assert "open TIC-4" in said


def test_a_dossier_without_fault_carries_no_notice(design):
    good = tuple(loop for loop in design.loops if loop.verdict in ("meets", "deviates"))
    pages = page_views(dossier_of(replace(design, loops=good, problems=())))
    assert good
    assert all(page.standing is None for page in pages)


def test_a_loop_that_cannot_be_read_is_found_by_its_tag_or_its_line(design):
    assert [(loop.tag, loop.line) for loop in missing_loops(design)] == [("TIC-5", 32)]
    text = design.sources[0].content
    name = design.sources[0].name
    nameless = replace(design, loops=(), problems=(Diagnostic(Span(name, 2, 1), "Y106", "unreadable"),))
    assert text
    assert missing_loops(nameless)[0].file == name


def test_a_panel_that_cannot_be_read_still_gives_pages(design):
    bare = replace(design, panel=None, loops=())
    pages = {page.path: page for page in page_views(dossier_of(bare))}
    assert set(pages) == {row.path for row in PAGE_ROWS}
    assert pages["index.html"].kicker == "panel.yml could not be read"
    assert "No loop could be decided" in pages["index.html"].lead.spans[0].text


def test_sections_of_a_sheet_stand_in_their_order(pages):
    titles = [section.title for section in pages["loops/TIC-1.html"].sections]
    assert titles == [
        "Decision", "Settings to enter", "What to expect", "Hardware", "Connections", "If it fails", "Cautions", "Site checks", "Basis",
    ]  # fmt: skip
    numbers = [section.number for section in pages["loops/TIC-1.html"].sections]
    assert numbers == [str(number) for number in range(1, len(titles) + 1)]


def test_the_title_says_mode_device_setting_hold_and_life(pages, loop):
    settings = loop("TIC-1").decision.chosen.case.settings
    said = pages["loops/TIC-1.html"].lead.spans[0].text
    assert said.startswith(f"Switched on-off through a contactor with a differential of {settings.differential:g}\u202fK; ")
    assert "expected to hold 5.0\u202f°C within ±" in said
    assert "of the ±1.8\u202fK allowed, switching and measuring error included; contacts last" in said


def test_what_is_claimed_to_be_held_adds_up_the_parts(pages, loop):
    """Worst excursion plus measuring error, to a tenth of a kelvin, never below the sum by more than half of that."""
    case = loop("TIC-1").decision.chosen.case
    worst = max(case.settings.enforced.above.value, case.settings.enforced.below.value) + case.error.root_sum
    said = pages["loops/TIC-1.html"].lead.spans[0].text
    claimed = float(said.partition("within ±")[2].partition("\u202f")[0])
    assert abs(claimed - worst) <= 0.05 + 1e-9


def test_a_held_loop_says_by_which_rule_and_claims_no_hold(pages, loop):
    said = pages["loops/TIC-3.html"].lead.spans[0].text
    broken = [f.rule for f in loop("TIC-3").findings if f.outcome == "broken" and f.weight == "must"]
    assert said.startswith(f"Held by {broken[0]}")
    assert "expected to leave 65.00\u202f°C by up to" in said
    assert "expected to hold" not in said


def test_an_open_loop_names_what_is_missing(pages):
    page = pages["loops/TIC-4.html"]
    assert page.lead.spans[0].text.startswith("Open until ")
    assert "plant" in [item.label for item in page.notices[0].items]


def test_both_switch_points_and_half_the_differential_are_to_be_entered(pages, loop):
    """Cooling: on above, off below the setpoint, half the differential from it each."""
    settings = loop("TIC-1").decision.chosen.case.settings
    table = next(block for block in _section(pages["loops/TIC-1.html"], "settings").blocks if isinstance(block, Table))
    entered = {row.cells[0].text: row.cells[1].text for row in table.rows}
    assert entered["action"] == "direct"
    assert entered["differential, half (d/2)"] == f"{settings.differential / 2:g}\u202fK"
    on, off = (float(entered[f"output {which} at"].partition("\u202f")[0]) for which in ("on", "off"))
    assert on - off == pytest.approx(settings.differential)
    assert (on + off) / 2 == pytest.approx(5.0)


def test_every_alternative_is_there_with_the_rule_that_ended_it(pages, design):
    for decided in design.loops:
        table = next(b for b in _section(pages[f"loops/{decided.tag}.html"], "decision").blocks if isinstance(b, Table))
        assert [row.chosen for row in table.rows].count(True) == 1
        assert table.rows[0].chosen
        shown = {(row.cells[0].text, device, row.cells[-1].text) for row in table.rows[1:] for device in row.cells[1].text.split(", ")}
        asked = {
            (MODES[r.examined.case.candidate.mode], DEVICES[r.examined.case.candidate.device], r.ruled_out_by[0])
            for r in decided.decision.rejected
        }
        assert shown == asked
        assert all(row.cells[-1].href.endswith(f"rule-book.html#{row.cells[-1].text}") for row in table.rows[1:])


def test_figures_lead_to_the_line_of_the_basis_that_computed_them(pages, loop):
    decided = loop("TIC-1")
    table = next(b for b in _section(pages["loops/TIC-1.html"], "expect").blocks if isinstance(b, Table))
    swing = next(row.cells[1] for row in table.rows if row.cells[0].text == "swing, peak to trough")
    line = int(swing.href.removeprefix("#b"))
    assert decided.basis[line - 1].value == decided.decision.chosen.case.settings.enforced.swing.value


def test_no_number_carries_the_name_of_its_dimension_for_a_unit(pages, text_of):
    for page in pages.values():
        for section in page.sections:
            said = text_of(page, section.anchor)
            assert not re.search(r"[0-9][\u202f\u00a0][a-z]+_[a-z_]+", said), said


def test_every_figure_of_the_basis_is_a_line(pages, loop):
    lines = [block for block in _section(pages["loops/TIC-1.html"], "basis").blocks if isinstance(block, FigureLine)]
    assert [line.name for line in lines] == [figure.name for figure in loop("TIC-1").basis]
    assert [line.number for line in lines] == [str(n) for n in range(1, len(lines) + 1)]
    assert all(line.source for line in lines)


def test_inputs_are_shown_as_written_with_file_and_line(pages):
    table = [b for b in _section(pages["loops/TIC-1.html"], "basis").blocks if isinstance(b, Table)][1]
    by_name = {row.cells[0].text: row.cells for row in table.rows}
    assert by_name["plant.balance.load"][1].text == "0.6 kW to 3 kW"
    assert by_name["plant.balance.load"][2].text == "loops/cold.yml:9"
    assert by_name["need"][1].text.startswith("quantity temperature, direction lower, setpoint 5 degC, tolerance 1.8 K")


def test_what_is_inherited_is_marked(pages):
    table = [b for b in _section(pages["loops/TIC-3.html"], "basis").blocks if isinstance(b, Table)][1]
    marked = {row.cells[0].text: row.cells[2].aside for row in table.rows}
    assert marked["need.tolerance"] == ""
    assert "same_as" in marked.values()


def test_a_sheet_names_every_rule_that_is_not_examined(pages, dossier, text_of):
    left = [rule.code for rule in PLANNED if rule.code not in dossier.rule_codes]
    said = text_of(pages["loops/TIC-1.html"], "basis").partition("Not examined:")[2]
    assert all(f" {code}" in said for code in left)


def test_the_rule_book_has_a_place_for_every_rule(pages):
    anchors = [row.anchor for section in pages["rule-book.html"].sections for b in section.blocks if isinstance(b, Table) for row in b.rows]
    assert sorted(anchors) == sorted({rule.code for rule in PLANNED})


def test_deviations_carry_the_designers_reason(pages, text_of):
    said = text_of(pages["deviations.html"])
    assert "The works stocks <this> contactor." in said
    assert "TIC-3" in said


def test_open_points_tell_how_to_get_them(pages):
    table = pages["open-points.html"].sections[0].blocks[0]
    row = next(row for row in table.rows if row.cells[1].text == "plant")
    assert row.cells[0].text == "TIC-4"
    assert row.cells[3].text


def test_the_title_block_leaves_room_to_sign(pages):
    fields = {field.label: field.text for field in pages["loops/TIC-1.html"].fields}
    assert fields["Panel"] == "T-1"
    assert fields["Revision, date"] == "B, 2026-02-03"
    assert fields["Sheet"] == "TIC-1"
    assert fields["Drawn"] == fields["Checked"] == fields["Approved"] == ""


def test_own_pages_are_under_their_own_heading(pages, text_of):
    assert "Handing over" in text_of(pages["index.html"], "own-pages")


def _section(page, anchor):
    return next(section for section in page.sections if section.anchor == anchor)


def test_a_panel_that_is_held_is_said_on_every_page(design):
    held = replace(design, loops=design.loops[:1], problems=(), panel_design=replace(design.panel_design, verdict="held"))
    for page in page_views(dossier_of(held)):
        assert page.standing.kind == "held"
        assert "the panel" in [span.text for item in page.standing.items for span in item.spans]


def test_what_the_panels_rules_found_is_on_the_overview(pages, design):
    shown = {item.label for block in _section(pages["index.html"], "panel").blocks for item in getattr(block, "items", ())}
    assert {f.rule for f in design.panel_design.findings if f.outcome != "does_not_apply"} <= shown


def test_rules_that_one_missing_input_leaves_open_share_a_line(pages, loop):
    """TIC-4 has no plant: every must that asks for it stands in one line, each with its link."""
    items = _section(pages["loops/TIC-4.html"], "decision").blocks[1].items
    unanswered = [f.rule for f in loop("TIC-4").findings if f.outcome == "unanswered" and f.weight == "must"]
    shared = next(item for item in items if item.mark and item.mark.word == "unanswered, must")
    assert len(unanswered) > 1
    assert {shared.label, *(span.text for span in shared.spans if span.href)} == set(unanswered)
    assert all(item.mark.word != "unanswered, must" for item in items if item is not shared and item.mark)


def test_the_limiter_stands_beside_the_loop_with_its_numbers(pages, loop):
    limiter = loop("TIC-2").safety.limiter
    tables = [block for block in _section(pages["loops/TIC-2.html"], "faults").blocks if isinstance(block, Table)]
    table = next(table for table in tables if table.caption == "Independent of the loop")
    rows = {row.cells[0].text: row.cells[1].text for row in table.rows}
    assert rows["limiter set at"] == "88.0\u202f°C"
    assert rows["true value when it acts"] == f"{limiter.acts_at:.1f}\u202f°C"


def test_the_input_nearest_to_a_change_stands_first(dossier, loop):
    """By hand: a dead time that changes the decision at 1.2 times is nearer than a tolerance that does at half."""
    far = Firm("need.tolerance", "tolerance", "change", 1.8, "1.8 K", 0.9, "held", None, "", 0.3)
    near = Firm("plant.dead_time", "dead time", "time", 40.0, "40 s", None, "", 48.0, "time-proportioned", 0.08)
    still = Firm("plant.load", "load", "power", 600.0, "0.6 kW", None, "", None, "", inf)
    section = firmness_section(dossier.writers["TIC-1"], replace(loop("TIC-1"), firmness=(far, still, near)), "6")
    rows = [[cell.text for cell in row.cells] for row in section.blocks[1].rows]
    assert rows == [
        ["dead time", "40 s", "–", "–", "48\u202fs", "time-proportioned"],
        ["tolerance", "1.8 K", "0.9\u202fK", "held", "–", "–"],
    ]
    assert section.blocks[2].spans[0].text.endswith("load.")


def test_a_value_below_absolute_zero_is_not_printed_as_one(dossier, loop):
    case = loop("TIC-1").decision.chosen.case
    unreal = replace(case, faults=replace(case.faults, on=replace(case.faults.on, settles_at=-300.0)))
    decided = loop("TIC-1")
    decided = replace(decided, decision=replace(decided.decision, chosen=replace(decided.decision.chosen, case=unreal)))
    table = faults_section(dossier.writers["TIC-1"], decided, "5").blocks[0]
    assert table.rows[0].cells[1].text == "beyond what is real"
