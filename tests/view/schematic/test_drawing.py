"""Schematics and terminal tables say the same, and no word of a drawing stands on another."""

import re
import time
from html.parser import HTMLParser

import pytest

from specgen.design.wiring.types import TERMINAL
from specgen.render.environment import environment
from specgen.view.schematic.drawing import WIDTH, identifier
from specgen.view.schematic.marks import SIZES
from specgen.view.schematic.text_width import HEIGHT, text_width
from specgen.view.terminals_page import loop_terminals

ENDS = ("name", "small", "open", "rail-end")
MIDDLES = ("rail", "letter", "name-middle", "number", "below", "pin-middle")
BOLD = ("name", "name-start", "name-middle", "head")
KINDS = {
    "": "pin", "name-start": "name", "name-middle": "name", "pin-middle": "pin", "below": "small", "letter": "small", "rail-end": "rail",
}  # fmt: skip
MOST, FURTHER = 15_000, 4_000  # bytes of a drawing, and of every further protected circuit


class Groups(HTMLParser):
    """Gathers the groups of a drawing with their attributes and words."""

    def __init__(self):
        super().__init__()
        self.groups, self.words, self.ids = {}, {}, []
        self._in = ""

    def handle_starttag(self, tag, attrs):
        found = dict(attrs)
        if "id" in found:
            self.ids.append(found["id"])
        if tag == "g":
            self._in = found["id"]
            self.groups[self._in] = found
            self.words[self._in] = []

    def handle_endtag(self, tag):
        if tag == "g":
            self._in = ""

    def handle_data(self, data):
        if self._in and data.strip():
            self.words[self._in].append(data)


def parsed(drawing):
    text = str(environment().get_template("shapes/drawing.html").module.draw(drawing))
    found = Groups()
    found.feed(text)
    return text, found


@pytest.fixture(scope="module")
def pages(drawn):
    return [(loop, wiring, *parsed(drawing)) for loop, wiring, drawing in drawn]


def test_the_identifiers_of_a_drawing_are_its_terminals_and_elements(pages):
    for loop, wiring, _, page in pages:
        elements = {element.designation for element in wiring.elements if not element.designation.endswith("-X1")}
        terminals = {terminal.designation for terminal in wiring.terminals}
        strips = {element.designation for element in wiring.elements if element.designation.endswith("-X1")}
        drawn = {group["data-designation"] for group in page.groups.values()}
        assert drawn == elements | terminals | (strips if terminals else set()), loop.tag
        assert all(group["id"] == identifier(group["data-designation"]) for group in page.groups.values())
        assert len(page.ids) == len(set(page.ids)), loop.tag
        assert all(re.fullmatch(r"[A-Za-z][A-Za-z0-9.-]*", name) for name in page.ids), page.ids


def test_the_terminal_table_says_what_the_drawing_says(pages):
    for loop, wiring, _, page in pages:
        own = f"={loop.tag.replace('-', '')}"
        table = {f"{own}{row.cells[0].text}": row.cells[2].text for row in loop_terminals(wiring).rows}
        drawing = {group["data-designation"]: group["data-potential"] for group in page.groups.values() if "data-potential" in group}
        assert table == drawing, loop.tag
        for terminal in wiring.terminals:
            assert page.words[identifier(terminal.designation)] == [terminal.designation.rpartition(":")[2]]


def test_every_symbol_carries_its_designation(pages):
    for loop, _, _, page in pages:
        own = f"={loop.tag.replace('-', '')}-"
        for name, group in page.groups.items():
            if "data-potential" not in group:
                shown = group["data-designation"]
                assert (shown.removeprefix(own[:-1]) if shown.startswith(own) else shown) in page.words[name], (loop.tag, name)


def test_every_connection_point_is_written_beside_its_symbol(pages):
    for loop, wiring, _, page in pages:
        for step in (step for circuit in wiring.circuits for path in circuit.paths for step in path.steps):
            if step.symbol in (TERMINAL, "shield", "jumper"):
                continue
            assert {step.enter, step.leave} - {""} <= set(page.words[identifier(step.element)]), (loop.tag, step)


def _motors(loop):
    return max(len(getattr(loop.decision.chosen.case.feeder, "branches", ())), 1)


def boxes(drawing):
    labels = [*drawing.labels, *(label for group in drawing.groups for label in group.labels)]
    for label in labels:
        size = SIZES[KINDS.get(label.kind, label.kind)]
        width = text_width(label.text, size) * (1.08 if label.kind in BOLD else 1.0)
        x, y = float(label.x), float(label.y)
        left = x - width if label.kind in ENDS else x - width / 2 if label.kind in MIDDLES else x
        yield label, left, y - 0.78 * size, left + width, y - 0.78 * size + 0.92 * size * HEIGHT / 1.2


def test_no_word_stands_on_another(drawn):
    found = []
    for loop, _, drawing in drawn:
        every = list(boxes(drawing))
        for index, (one, *a) in enumerate(every):
            for other, *b in every[index + 1 :]:
                if a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]:
                    found.append((loop.tag, loop.loop.element.kind, one.text, other.text))
    assert found == []


def test_every_word_stands_on_the_sheet_and_the_sheet_on_a4(drawn):
    for loop, _, drawing in drawn:
        for label, left, top, right, bottom in boxes(drawing):
            assert left >= 0, (loop.tag, label)
            assert top >= 0, (loop.tag, label)
            assert right <= float(drawing.width) + 1, (loop.tag, label)
            assert bottom <= float(drawing.height) + 1, (loop.tag, label)
        assert float(drawing.width) <= 1.1 * WIDTH, loop.tag
        # of the 173 mm by 222 mm that a sheet of A4 has left: connection points at least 2 mm high, of several motors 1.7 mm
        scale = min(173 / float(drawing.width), 222 / float(drawing.height))
        assert SIZES["pin"] * scale >= (1.98 if _motors(loop) == 1 else 1.7), loop.tag


def crossed(drawing):
    """Return the words that a wire runs through."""
    strokes = next(path.d for path in drawing.paths if path.kind == "wire")
    lines = []
    for x, y, rest in re.findall(r"M([\d.]+) ([\d.]+)([^M]*)", strokes):
        at_x, at_y = float(x), float(y)
        for command, number in re.findall(r"([VHvh])(-?[\d.]+)", rest):
            to_x = float(number) if command == "H" else at_x + float(number) if command == "h" else at_x
            to_y = float(number) if command == "V" else at_y + float(number) if command == "v" else at_y
            lines.append((min(at_x, to_x), min(at_y, to_y), max(at_x, to_x), max(at_y, to_y)))
            at_x, at_y = to_x, to_y
    for label, left, top, right, bottom in boxes(drawing):
        for a, b, c, d in lines:
            if a < right - 1 and c > left + 1 and b < bottom - 1 and d > top + 1:
                yield label.text


def test_no_wire_runs_through_a_word(drawn):
    found = [(loop.tag, loop.loop.element.kind, text) for loop, _, drawing in drawn for text in crossed(drawing)]
    assert found == []


def test_a_drawing_is_small(pages):
    for loop, _, text, _ in pages:
        assert len(text.encode()) <= MOST + FURTHER * (_motors(loop) - 1), (loop.tag, loop.loop.element.kind)


def test_current_paths_count_from_one(drawn):
    for loop, wiring, drawing in drawn:
        shown = [int(label.text) for label in drawing.labels if label.kind == "number"]
        every = [path.number for circuit in wiring.circuits for path in circuit.paths]
        assert sorted(shown) == sorted(every), loop.tag
        assert len(set(every)) == len(every), loop.tag


def test_a_coil_says_where_its_contacts_are(drawn):
    contacts = ("pole", "make_contact", "break_contact")
    seen = 0
    for loop, wiring, drawing in drawn:
        paths = [path for circuit in wiring.circuits for path in circuit.paths]
        for coil in {step.element for path in paths for step in path.steps if step.symbol == "coil"}:
            numbers = [path.number for path in paths for step in path.steps if step.element == coil and step.symbol in contacts]
            said = [label.text for label in drawing.labels if label.kind == "below"]
            assert not numbers or f"in {', '.join(map(str, dict.fromkeys(numbers)))}" in said, (loop.tag, coil)
            seen += bool(numbers)
    assert seen > 50


def test_drawing_again_gives_the_same(drawn):
    loop, wiring, drawing = drawn[0]
    from specgen.view.schematic.drawing import schematic  # noqa: PLC0415  beside its use
    from specgen.view.writer import writer_for  # noqa: PLC0415

    before = time.perf_counter()
    assert schematic(wiring, writer_for(loop)) == drawing
    # 2 ms are usual; a drawing library takes 16
    assert time.perf_counter() - before < 1.0
