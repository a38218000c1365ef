"""The pages of the whole panel: every number from the design, every sum right, every rule on its page."""

from dataclasses import replace
from math import inf, sqrt

import pytest

from specgen.design.types import Firm
from specgen.view.conductors_page import conductors_table
from specgen.view.dossier import dossier_of
from specgen.view.firmness_drawing import firmness_drawing, nearest_change
from specgen.view.firmness_page import NOT_ASKED
from specgen.view.frame import Place
from specgen.view.heat_page import by_source, control_supply_table, losses_table, shed_at_limit, waterfall
from specgen.view.load_page import contributions_table, kind_of_current
from specgen.view.pages import page_views
from specgen.view.panel_page import UNREAD
from specgen.view.panel_rules import RULE_PAGES, panel_writer
from specgen.view.parts_page import order_table, parts_table
from specgen.view.protection_page import protection_table
from specgen.view.shapes import Drawing, List, Table

PLACE = Place("load.html")
OF_THE_PANEL = ("load.html", "heat.html", "protection.html", "conductors.html", "parts.html")


def blocks(page, kind):
    return [block for section in page.sections for block in section.blocks if isinstance(block, kind)]


def cells(table, *heads):
    """Return the cells below some heads, row by row."""
    at = [[column.head for column in table.columns].index(head) for head in heads]
    return [[row.cells[index] for index in at] for row in table.rows if row.cells]


@pytest.fixture(scope="module")
def panel(design):
    return design.panel_design


def test_every_rule_of_the_panel_stands_on_its_page_and_is_linked_from_the_overview(pages, panel):
    bore = {finding.rule for finding in panel.findings if finding.outcome != "does_not_apply"}
    assert {"E1", "E2", "E3", "E4", "E5", "E6"} <= bore
    for rule in bore:
        labels = {item.label for block in blocks(pages[RULE_PAGES[rule]], List) for item in block.items}
        assert rule in labels, rule
    overview = next(section for section in pages["index.html"].sections if section.anchor == "panel")
    linked = {item.label: [span.href for span in item.spans if span.href] for block in overview.blocks for item in block.items}
    assert {rule: RULE_PAGES[rule] in linked[rule] for rule in bore} == dict.fromkeys(bore, True)


def test_line_currents_by_hand(panel, text_of, pages):
    """TIC-2 and TIC-3: 6 kW at 400 V and 10 percent more draw 1.1 x 6000/(sqrt3 x 400) = 9.526 A from every line."""
    by_tag = {load.tag: load for load in panel.placed}
    for tag in ("TIC-2", "TIC-3"):
        assert by_tag[tag].current == pytest.approx(1.1 * 6000 / (sqrt(3) * 400), rel=1e-9)
    assert "TIC-2" in text_of(pages["load.html"], "loops")
    assert "9.5" in text_of(pages["load.html"], "loops")


def test_what_each_loop_draws_is_in_its_conductors_alone(dossier, panel):
    table = contributions_table(dossier, PLACE)
    rows = {row.cells[0].text: row for row in table.rows}
    names = [column.head for column in table.columns]
    for load in panel.placed:
        for name in panel.demand.currents:
            cell = rows[load.tag].cells[names.index(name)]
            assert cell.plain == (f"{load.current:.9g}" if name in load.place else "")
    assert kind_of_current(replace(panel.placed[0], resistive=True, distorted=False)) == "in phase"
    assert kind_of_current(replace(panel.placed[0], resistive=False, distorted=True)) == "far from a sine"


def test_the_parts_of_a_line_add_up_to_its_bar(pages, panel):
    """Projections on the direction of a sum of phasors add up to its size, so that the last division leaves the bar whole."""
    drawing = blocks(pages["load.html"], Drawing)[0]
    widths = {
        label.text: float(box.width) for label, box in zip((x for x in drawing.labels if x.kind == "end"), drawing.boxes, strict=False)
    }
    most = max(panel.demand.currents.values())
    longest = max(widths.values())
    for name, current in panel.demand.currents.items():
        assert widths[name] == pytest.approx(longest * current / most, abs=0.9)


def test_the_losses_add_up(dossier, panel):
    heat = panel.interior
    assert sum(by_source(heat).values()) == pytest.approx(heat.loss)
    table = losses_table(dossier, PLACE)
    together = sum(float(row.cells[-1].plain) for row in table.rows)
    shared = sum(loss.watts for loss in heat.losses if not loss.loop)
    assert together + shared == pytest.approx(heat.loss)
    for row in table.rows:
        assert sum(float(cell.plain or 0) for cell in row.cells[2:-1]) == pytest.approx(float(row.cells[-1].plain))


def test_the_waterfall_ends_at_what_is_missing_or_to_spare(dossier, design, panel):
    """By hand: what the enclosure sheds at its limit is 5.5 W/(m2 K) of painted steel times the effective surface times 45 - 30 K."""
    heat = panel.interior
    assert shed_at_limit(heat, design.panel) == pytest.approx(5.5 * heat.surface * 15)
    writer = panel_writer(dossier)
    left = heat.loss - heat.cooling - 5.5 * heat.surface * 15
    texts = [label.text for label in waterfall(writer, heat, design.panel).labels]
    assert ("missing" if left > 0 else "to spare") in texts
    assert writer.say(abs(left), "power") in texts
    if heat.shortfall is not None:
        assert left == pytest.approx(heat.shortfall)


def test_a_panel_too_hot_says_what_would_do(dossier, design, panel):
    """Ten times the losses are missing their cooling; watts, area and air are said, each as the design has them."""
    hot = replace(panel.interior, interior=99.0, shortfall=600.0, surface_needed=20.5, air=0.05)
    bent = replace(dossier, design=replace(design, panel_design=replace(panel, interior=hot)))
    page = {page.path: page for page in page_views(bent)}["heat.html"]
    said = page.lead.spans[0].text
    assert "above its limit of 45\u202f°C" in said
    assert "600\u202fW of cooling, or 20.5\u202fm² of effective surface, or 180\u202fm³/h of air from outside" in said


def test_a_held_panel_says_by_what_where_it_belongs(dossier, design, panel):
    """E5 alone is broken: the overview and the page of heat say so first, the page of the load does not."""
    broken = tuple(replace(f, outcome="broken" if f.rule == "E5" else "holds", weight="must") for f in panel.findings)
    pages = {page.path: page for page in page_views(replace(dossier, design=replace(design, panel_design=replace(panel, findings=broken))))}
    section = next(section for section in pages["index.html"].sections if section.anchor == "panel")
    for notice in (section.blocks[0], *pages["heat.html"].notices):
        assert (notice.kind, notice.head) == ("held", "The panel is held:")
        assert [item.label for item in notice.items] == ["E5"]
        assert "effective surface" in notice.items[0].spans[0].text
    assert pages["load.html"].notices == ()


def test_the_control_supply_adds_up(dossier, panel):
    rows = control_supply_table(dossier).rows
    assert sum(float(row.cells[2].plain) for row in rows) == pytest.approx(panel.control.continuous)
    assert sum(float(row.cells[3].plain) for row in rows) == pytest.approx(panel.control.inrush)


def test_each_protection_rises_from_load_to_conductor(dossier, panel):
    table = protection_table(dossier, PLACE)
    assert table.rows[0].chosen
    assert float(table.rows[0].cells[3].plain) == pytest.approx(panel.incoming.carries, rel=1e-8)
    found = cells(table, "Device", "Ib", "In", "Iz")[1:]
    assert [row[0].text for row in found] == [row.designation for row in panel.protection]
    for _, load, rated, carries in found:
        assert float(load.plain) <= float(rated.plain) * (1 + 1e-9) <= float(carries.plain) * (1 + 1e-9)


def test_the_weakest_conductor_behind_a_protection_counts(dossier, panel):
    """A cable of 9 A behind wiring of 17 A: nine is what counts."""
    first = panel.conductors[0]
    cable = replace(first, designation="=X-W1", capacity=9.0)
    bent = replace(panel, conductors=(replace(first, capacity=17.0), cable, *panel.conductors[1:]))
    table = protection_table(replace(dossier, design=replace(dossier.design, panel_design=bent)), PLACE)
    by_name = {name.text: carries.plain for name, carries in cells(table, "Device", "Iz")}
    assert by_name[first.start] == "9"


def test_conductors_are_listed_as_designed(dossier, panel):
    table = conductors_table(dossier, PLACE)
    assert len(table.rows) == len(panel.conductors)
    for row, (start, end, size, carries) in zip(panel.conductors, cells(table, "From", "To", "Size", "Iz"), strict=True):
        assert (start.text, end.text) == (row.start, row.end)
        assert size.text == f"{row.size * 1e6:g}\u202fmm²"
        assert float(carries.plain) == pytest.approx(row.capacity)


def test_what_is_ordered_is_what_stands_somewhere(dossier, panel):
    ordered = order_table(dossier)
    quantity = sum(int(row.cells[0].text) for row in ordered.rows if row.cells)
    names = [name for row in ordered.rows if row.cells for name in row.cells[3].text.split(", ")]
    assert quantity == sum(part.quantity for part in panel.parts)
    assert sorted(names) == sorted(part.designation for part in panel.parts)
    assert [row.cells[0].text for row in parts_table(dossier).rows] == [part.designation for part in panel.parts]


def test_pages_of_a_panel_that_could_not_be_read_say_so(design):
    bare = replace(design, panel=None, panel_design=None, loops=())
    pages = {page.path: page for page in page_views(dossier_of(bare))}
    for path in OF_THE_PANEL:
        assert pages[path].lead.spans[0].text == UNREAD
        assert pages[path].sections == ()


FAR = Firm("need.tolerance", "tolerance", "change", 1.8, "1.8 K", 0.9, "held", None, "", 0.3)
NEAR = Firm("plant.dead_time", "dead time", "time", 40.0, "40 s", 20.0, "held", 44.0, "time-proportioned", 0.041)
STILL = Firm("plant.load", "load", "power", 600.0, "0.6 kW", None, "", None, "", inf)


def test_how_firm_is_not_claimed_where_it_was_not_asked(pages):
    assert pages["firmness.html"].lead.spans[0].text == NOT_ASKED
    assert pages["firmness.html"].sections == ()


def test_the_register_orders_the_inputs_of_all_loops(dossier, loop):
    """A dead time that changes the decision 10 percent up is nearer than a tolerance that does at half."""
    loops = (replace(loop("TIC-1"), firmness=(FAR, STILL)), replace(loop("TIC-2"), firmness=(NEAR,)))
    bent = replace(dossier, design=replace(dossier.design, loops=loops))
    page = {page.path: page for page in page_views(bent)}["firmness.html"]
    rows = [[cell.text for cell in row.cells] for row in blocks(page, Table)[0].rows]
    assert rows == [
        ["TIC-2", "dead time", "40 s", "20\u202fs", "held", "44\u202fs", "time-proportioned"],
        ["TIC-1", "tolerance", "1.8 K", "0.9\u202fK", "held", "–", "–"],
    ]
    said = "".join(span.text for span in page.lead.spans)
    assert said == (
        "2 inputs of 3 would change a decision within a factor of ten; nearest is the dead time of TIC-2, declared as 40 s; "
        "at 44\u202fs: time-proportioned."
    )
    assert [(item.label, item.spans[0].text) for item in blocks(page, List)[0].items] == [("TIC-1", "load")]


def test_the_shorter_bar_is_the_nearer_change(dossier):
    """The longest way drawn is half an axis, a factor of 2: the dead time's 0.041 is 14 percent of the tolerance's 0.3."""
    writer = dossier.writers["TIC-1"]
    drawing = firmness_drawing([("dead time", writer, NEAR), ("tolerance", writer, FAR), ("load", writer, STILL)], "As drawn.")
    near, far = (float(box.width) for box in drawing.boxes)
    assert near / far == pytest.approx(0.041 / 0.3, rel=0.02)
    assert nearest_change(writer, NEAR) == "44\u202fs: time-proportioned"
    assert firmness_drawing([("load", writer, STILL)], "Nothing.") is None
