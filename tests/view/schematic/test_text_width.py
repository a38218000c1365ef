"""Widths of words: never narrower than the faces that the style sheet names."""

from hypothesis import given
from hypothesis import strategies as st

from specgen.view.schematic.text_width import text_width, wrapped

LETTERS = st.text(st.characters(min_codepoint=33, max_codepoint=126), min_size=1, max_size=12)


@given(LETTERS, LETTERS)
def test_widths_add_up_and_grow_with_size(one, other):
    both = text_width(one + other, 10)
    assert abs(both - text_width(one, 10) - text_width(other, 10)) < 1e-9
    assert text_width(one, 12) > text_width(one, 10) > 0


@given(st.lists(LETTERS, min_size=1, max_size=8))
def test_wrapping_keeps_every_word_in_order_and_every_line_in_its_width(words):
    lines = wrapped(" ".join(words), 10, 80, 100)
    assert " ".join(lines).split() == words
    assert all(text_width(line, 10) <= 80 or " " not in line for line in lines)


def test_what_does_not_fit_is_cut_with_an_ellipsis():
    assert wrapped("a b c d", 10, 5, 2) == ("a", "b…")
