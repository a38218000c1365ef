"""Whatever bytes a file holds, reading them ends soon and raises nothing."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.source import excerpt, read_bytes, read_table, read_text
from specgen.source.codes import SOURCE_CODES
from specgen.source.parser import PlainParser

PIECES = st.sampled_from(
    ["a", "b: ", ": ", "- ", "\n", "\n  ", "\n    ", "\t", "{", "}", "[", "]", ", ", "'", '"', "&x ", "*x", "!", "!!str ", "? ", "|\n",
     ">-\n", "#", " #2", "---\n", "\n---\n", "...\n", "%YAML", "<<: ", "\\", "~", "null", "@", "`", "\u65e5", "\ufeff", "\x00", "\x85",
     "\u2028", "6 kW", "\r", "\r\n"]
)  # fmt: skip
YAMLISH = st.lists(PIECES, max_size=40).map("".join)


def check(text, found):
    documents, problems = found
    lines = text.removeprefix("\ufeff").replace("\r\n", "\n").replace("\r", "\n").split("\n")
    assert documents or problems
    for problem in problems:
        assert problem.code in SOURCE_CODES
        assert problem.line().isprintable()
        assert 1 <= problem.span.line <= len(lines)
        assert problem.span.column >= 1
        assert "^" in excerpt(problem.span, text)
    for document in documents:
        check_values(document, document.data, ())
        if any(problem.severity == "error" for problem in problems):
            continue
        assert document.sound
        for path, span in document.spans.items():
            assert span.column - 1 + span.length <= len(lines[span.line - 1]) or span.length == 1, path


def check_values(document, value, path):
    if isinstance(value, dict):
        for key, inner in value.items():
            assert isinstance(key, str)
            check_values(document, inner, (*path, key))
    elif isinstance(value, list):
        for place, inner in enumerate(value):
            check_values(document, inner, (*path, place))
    else:
        assert isinstance(value, str)


@given(YAMLISH)
@settings(max_examples=400)
def test_text_like_yaml(text):
    check(text, read_text(text, "a.yml"))
    read_table(text, "a.yml")


@given(YAMLISH)
@settings(max_examples=150)
def test_without_libyaml(text):
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr("specgen.source.compose.parser_for", PlainParser)
        check(text, read_text(text, "a.yml"))


@given(st.text(max_size=200))
def test_any_text(text):
    check(text, read_text(text, "a.yml"))


@given(st.binary(max_size=200))
def test_any_bytes(raw):
    documents, problems = read_bytes(raw, "a.yml")
    assert documents or problems


PLAIN = st.text(st.characters(min_codepoint=0x21, max_codepoint=0x7E), min_size=1, max_size=12).filter(
    lambda text: text not in ("~", "null", "Null", "NULL", "<<")
)
TREE = st.recursive(
    PLAIN, lambda inner: st.lists(inner, min_size=1, max_size=4) | st.dictionaries(PLAIN, inner, min_size=1, max_size=4), max_leaves=20
)


def written(value, indent):
    """Write a tree as a person would, every scalar in single quotes."""
    quoted = "'{}'".format
    pad = "  " * indent
    if isinstance(value, str):
        return " " + quoted(value.replace("'", "''"))
    if isinstance(value, list):
        return "".join(f"\n{pad}-{written(inner, indent + 1)}" for inner in value)
    return "".join(f"\n{pad}{quoted(key.replace(chr(39), chr(39) * 2))}:{written(inner, indent + 1)}" for key, inner in value.items())


@given(st.dictionaries(PLAIN, TREE, min_size=1, max_size=4))
def test_what_was_written_is_read(tree):
    text = written(tree, 0)
    documents, problems = read_text(text, "a.yml")
    assert problems == []
    assert documents[0].data == tree
    lines = text.split("\n")
    for path, span in documents[0].spans.items():
        value = tree
        for step in path:
            value = value[step]
        if isinstance(value, str):
            assert lines[span.line - 1][span.column - 1 :][: span.length] == "'" + value.replace("'", "''") + "'"


HARD = {
    "brackets": "[", "braces": "{", "items": "- ", "keys": "? ", "quote": ('"', "a "), "plain": "a ", "lines": "a\n", "blanks": " ",
    "newlines": "\n", "pairs": "a: ", "anchors": "&a ", "documents": "---\n", "stars": ("a: [", "*a, "), "bangs": "!", "hashes": " #2",
    "copies": ("a: &a [b]\nc: [", "*a, "), "commas": ("a: [", ","), "numbered": ("a: [", "b #2\n, "), "percent": "%\n", "tabs": "\t",
    "twice": "a: 1\n", "empty": "a:\n", "commented": "#\n", "dots": "...\n", "folded": ("a: b\n", "  - c\n"), "colons": ":",
    "backslashes": ('a: "', "\\\\"), "blocks": ("a: |\n", " b\n"), "carriage": "\r", "dashes": "-", "long keys": ("? ", "a"),
}  # fmt: skip


def filled(name, size):
    """Return ``size`` letters: a head, and one thing over and over."""
    head, again = HARD[name] if isinstance(HARD[name], tuple) else ("", HARD[name])
    return (head + again * (size // len(again)))[:size]


@pytest.mark.parametrize("name", HARD)
def test_a_file_of_nothing_but(name):
    """How long a whole mebibyte takes is measured in ``tests/benchmarks/test_reading_time.py``."""
    check_shape(read_bytes(filled(name, 2**14).encode(), "a.yml"))


def check_shape(found):
    documents, problems = found
    assert documents or problems
    assert {problem.code for problem in problems} <= SOURCE_CODES.keys()
