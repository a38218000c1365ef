"""A table in a terminal."""

from hypothesis import given
from hypothesis import strategies as st

from specgen.core.table import aligned

cells = st.text("abc -1°", max_size=6)


@given(st.lists(st.tuples(cells, cells, cells), max_size=5))
def test_every_column_begins_at_one_place(rows):
    head = ("loop", "verdict", "decision")
    lines = aligned(head, rows).split("\n")
    assert len(lines) == len(rows) + 1
    first = max(len(row[0]) for row in [head, *rows]) + 2
    second = first + max(len(row[1]) for row in [head, *rows]) + 2
    for line, row in zip(lines, [head, *rows], strict=True):
        assert line.rstrip() == line
        padded = line.ljust(second + 6)
        assert (padded[: len(row[0])], padded[first : first + len(row[1])]) == (row[0], row[1])
        assert padded[second:].rstrip() == row[2].rstrip()
