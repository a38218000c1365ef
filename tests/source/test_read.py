"""Documents and problems of one file."""

import copy
import pickle

import pytest
import yaml

from specgen.core.diagnostic import Span
from specgen.source import read_bytes, read_table, read_text, span_of
from specgen.source.codes import SOURCE_CODES
from specgen.source.parser import PlainParser, parser_for
from specgen.source.wording import plain_words


@pytest.fixture(params=["installed", "plain"])
def either_parser(request, monkeypatch):
    """With libyaml and without."""
    monkeypatch.setattr("specgen.source.compose.parser_for", parser_for if request.param == "installed" else PlainParser)


def codes(text):
    return [(problem.code, problem.span.line, problem.span.column) for problem in read_text(text, "a.yml")[1]]


def data(text):
    return [document.data for document in read_text(text, "a.yml")[0]]


@pytest.mark.usefixtures("either_parser")
class TestData:
    def test_every_scalar_is_text(self):
        text = "on: no\ncount: 012\ntime: 1:30\nlife: 1e3\ndate: 2026-11-20\nhex: 0x1F\nquoted: '6 kW'\nplain: 6 kW\n"
        assert data(text) == [
            {
                "on": "no",
                "count": "012",
                "time": "1:30",
                "life": "1e3",
                "date": "2026-11-20",
                "hex": "0x1F",
                "quoted": "6 kW",
                "plain": "6 kW",
            }
        ]

    def test_nested(self):
        text = "need:\n  tolerance: {above: 2 K, below: 0.5 K}\nplant:\n  - {what: air}\n  -\n    what: herbs\nnotes: [a, 'b, c']\n"
        assert data(text) == [
            {
                "need": {"tolerance": {"above": "2 K", "below": "0.5 K"}},
                "plant": [{"what": "air"}, {"what": "herbs"}],
                "notes": ["a", "b, c"],
            }
        ]

    def test_long_text(self):
        assert data("a: >\n  one\n  two\nb: |\n  one\n  two\nc: one\n  two\n") == [{"a": "one two\n", "b": "one\ntwo\n", "c": "one two"}]

    def test_places(self):
        document = read_text("need:\n  setpoint: 65 degC   # hot\n  bodies: [{mass: 6 kg}, x]\n", "loops/a.yml")[0][0]
        assert document.spans["need", "setpoint"] == Span("loops/a.yml", 2, 13, 7)
        assert document.key_spans["need", "setpoint"] == Span("loops/a.yml", 2, 3, 8)
        assert document.spans["need", "bodies"] == Span("loops/a.yml", 3, 11, 17)
        assert document.spans["need", "bodies", 0, "mass"] == Span("loops/a.yml", 3, 19, 4)
        assert document.spans["need", "bodies", 1] == Span("loops/a.yml", 3, 26, 1)
        assert document.spans["need",].line == 2
        assert document.spans[()].line == 1

    def test_columns_count_letters_not_bytes(self):
        document = read_text('{"größe": "\u65e5\u672c", b: 1}', "a.yml")[0][0]
        assert document.spans["b",] == Span("a.yml", 1, 20, 1)
        assert document.spans["größe",] == Span("a.yml", 1, 11, 4)

    def test_place_of_a_missing_field_is_its_section_s_key(self):
        document = read_text("tag: T\nneed:\n  setpoint: 65 degC\nplant: [a]\n", "a.yml")[0][0]
        assert span_of(document, ("need", "tolerance", "above")) == Span("a.yml", 2, 1, 4)
        assert span_of(document, ("plant", 0, "what")) == Span("a.yml", 4, 9, 1)
        assert span_of(document, ("plant", 3)) == Span("a.yml", 4, 1, 5)
        assert span_of(document, ("sensor", "kind")) == document.spans[()]
        assert span_of(document, ("need", "setpoint")) == Span("a.yml", 3, 13, 7)

    def test_documents_are_cut_at_their_lines(self):
        text = "# head\n---\na: 1\n--- # second\nb: 2\n...\n---\n---\n--- {c: 3}\n---\n"
        documents, problems = read_text(text, "a.yml")
        assert [(document.data, document.line, document.index) for document in documents] == [
            ({"a": "1"}, 3, 0), ({"b": "2"}, 5, 1), ({"c": "3"}, 9, 2),
        ]  # fmt: skip
        assert documents[1].spans["b",].line == 5
        assert not problems

    def test_a_broken_document_loses_itself_alone(self):
        text = 'tag: A\n---\ntag: "B\nneed: x\n---\ntag: C\n---\n{tag: D\n---\ntag: E\n'
        documents, problems = read_text(text, "a.yml")
        assert [(document.data["tag"], document.index, document.line) for document in documents] == [("A", 0, 1), ("C", 2, 6), ("E", 4, 10)]
        assert [(problem.code, problem.span.line) for problem in problems] == [("Y106", 3), ("Y106", 8)]

    def test_aliases_are_written_out(self):
        documents, problems = read_text("a: &x {q: [1, 2]}\nb: *x\nc: &y 5 K\nd: [*y, *x]\n", "a.yml")
        assert not problems
        found = documents[0].data
        assert found["b"] == found["a"] == found["d"][1]
        assert found["b"] is not found["a"], "a copy, so that changing one leaves the other"
        assert span_of(documents[0], ("b", "q", 0)) == Span("a.yml", 2, 1, 1)

    @pytest.mark.parametrize("text", ["", "\n\n", "# nothing\n", "---\n", "---\n# x\n---\n"])
    def test_nothing_written(self, text):
        assert codes(text) == [("Y105", 1, 1)]


PROBLEMS = [
    ("a: 1\nb: 2\na: 3\n", "Y108", 3, 1),
    ("s: {a: 1, a: 2}\n", "Y108", 1, 11),
    ("a:\n\tb: 1\n", "Y107", 2, 1),
    ("a:\n  b: 1\n \tc: 1\n", "Y107", 3, 2),
    ("a: !!python/object/apply:os.system [x]\n", "Y111", 1, 4),
    ("a: !x 1\n", "Y111", 1, 4),
    ("a: !!str x\n", "Y111", 1, 4),
    ("a: !h!x 1\n", "Y111", 1, 4),
    ("a: !<tag:x> {b: 1}\n", "Y111", 1, 4),
    ("a: ! 1\n", "Y111", 1, 4),
    ("!x a: 1\n", "Y111", 1, 1),
    ("a: &a {b: 1}\nc:\n  <<: *a\n", "Y112", 3, 3),
    ("? [a, b]\n: c\n", "Y113", 1, 3),
    ("{{a: b}: c}\n", "Y113", 1, 2),
    ("a: &x y\n*x : b\n", "Y113", 2, 1),
    ('"": b\n', "Y113", 1, 1),
    ("a:\n", "Y114", 1, 1),
    ("a: ''\n", "Y114", 1, 1),
    ("s:\n  a: ~\n", "Y114", 2, 3),
    ("s: {a: , b: 1}\n", "Y114", 1, 5),
    ("s: {a, b: 1}\n", "Y114", 1, 5),
    ("s:\n  -\n  - b\n", "Y114", 2, 4),
    ("a: null\n", "Y114", 1, 1),
    ("- a\n", "Y115", 1, 1),
    ("just text\n", "Y115", 1, 1),
    ("a: *b\n", "Y116", 1, 4),
    ("a: &a [*a]\n", "Y110", 1, 8),
    ("%YAML 1.1\n---\na: 1\n", "Y117", 1, 1),
    ("a: 1\n...\n%TAG ! x\n---\nb: 1\n", "Y117", 3, 1),
    ("a: x\x00y\n", "Y104", 1, 5),
    ("a: 1\nb: x\u2028y\n", "Y104", 2, 5),
    ("a: x\u202ey\n", "Y104", 1, 5),
    ("a: 1\n\ufeffb: 1\n", "Y104", 2, 1),
    ("a: \ud800\n", "Y104", 1, 4),
    ('a: "x\\0y"\n', "Y104", 1, 4),
    ('"a\\e": y\n', "Y104", 1, 1),
    ("service: Cabinet: air\n", "Y106", 1, 17),
    ("a:\n    b: 2\n  c: 3\n", "Y106", 3, 3),
    ("a: {b: 1, c: 2\nd: 3\n", "Y106", 1, 4),
    ("a: [1, 2\nd: 3\n", "Y106", 1, 4),
    ("a: @x\n", "Y106", 1, 4),
    ("a: %x\n", "Y106", 1, 4),
    ("a: 1\nfoo\nb: 2\n", "Y106", 2, 1),
    ("a: *\n", "Y106", 1, 5),
    ("a: - b\n", "Y106", 1, 4),
    ("{a: 1} x\n", "Y106", 1, 8),
    ("a: 'x\nb: 1\n", "Y106", 1, 4),
    ("a: [b, , c]\n", "Y106", 1, 8),
    ("a:\n- b\n - c\n", "Y121", 3, 2),
]


@pytest.mark.usefixtures("either_parser")
@pytest.mark.parametrize(("text", "code", "line", "column"), PROBLEMS)
def test_problem_is_named_with_its_place(text, code, line, column):
    assert (code, line, column) in [(*found,) for found in codes(text)]
    assert {found[0] for found in codes(text)} == {code}, "one cause, one code"


@pytest.mark.parametrize("text", [row[0] for row in PROBLEMS])
def test_a_problem_is_a_sentence_with_a_hint(text):
    for problem in read_text(text, "a.yml")[1]:
        assert problem.text
        assert problem.hint
        assert "\n" not in problem.text + problem.hint
        assert problem.line().isprintable()


def test_a_backslash_in_double_quotes():
    problem = read_text('tag: A\nservice: "a\\q"\n', "a.yml")[1][0]
    assert (problem.code, problem.span.line, problem.text) == ("Y106", 2, "a backslash stands in double quotes")


def test_problems_come_in_the_order_of_the_file():
    found = codes("a: 1\na: 2\n---\n%x\n---\nb:\nc: !x 1\n")
    assert [code for code, _, _ in found] == ["Y108", "Y106", "Y114", "Y111"]


def test_the_first_of_two_keys_is_kept_and_named():
    documents, problems = read_text("tag: A\nneed:\n  setpoint: 65 degC\n  range: x\n  setpoint: {a: 1, a: 2}\n", "a.yml")
    assert documents[0].data == {"tag": "A", "need": {"setpoint": "65 degC", "range": "x"}}
    assert [problem.text for problem in problems] == ["'setpoint' is written twice; first in line 3", "'a' is written twice"]
    assert documents[0].spans["need", "setpoint"].line == 3
    assert not documents[0].sound


def test_a_key_without_value_is_left_out():
    documents, problems = read_text("tag: A\nneed:\n  lag:\n  range: ~\nlist: [a, '', b]\n", "a.yml")
    assert documents[0].data == {"tag": "A", "need": {}, "list": ["a", "", "b"]}
    assert [problem.code for problem in problems] == ["Y114"] * 3
    assert ("need", "lag") not in documents[0].spans


def test_a_number_sign_that_cuts_text_is_a_warning():
    documents, problems = read_text("service: Pump #2\nlag: 8 s # 2 of them\nquoted: 'Pump #2'\nlist: [a] #2\n", "a.yml")
    assert [(problem.severity, problem.code, problem.span.line) for problem in problems] == [("warning", "Y122", 1)]
    assert documents[0].data["service"] == "Pump"
    assert documents[0].sound


class TestLimits:
    def levels(self, depth):
        return "a: " + "{a: " * (depth - 1) + "x" + "}" * (depth - 1)

    def test_32_levels_are_read_and_33_are_not(self):
        assert codes(self.levels(32)) == []
        assert [code for code, _, _ in codes(self.levels(33))] == ["Y109"]

    @pytest.mark.parametrize("text", ["[" * 3000, "{" * 3000, "- " * 3000, "? " * 3000, "a: " + "{a: " * 3000, "[" * 500 + "]" * 500])
    def test_thousands_of_levels_are_refused(self, text):
        assert {code for code, _, _ in codes(text)} <= {"Y109", "Y113"}
        assert codes(text)

    @pytest.mark.parametrize(("around", "found"), [(11, []), (12, ["Y109"])])
    def test_an_alias_counts_as_deep_as_it_stands(self, around, found):
        """The document is one level, the lists around the alias the next, what it refers to twenty more: 1 + 11 + 20 = 32."""
        text = "a: &a " + "[" * 20 + "x" + "]" * 20 + "\nb: " + "[" * around + "*a" + "]" * around + "\n"
        assert [code for code, _, _ in codes(text)] == found

    @pytest.mark.parametrize(("aliases", "found"), [(9, []), (10, ["Y110"])])
    def test_10000_values_from_aliases(self, aliases, found):
        """Each alias of a list of 1,023 brings 1,024 values: nine make 9,216, ten make 10,240."""
        text = f"a: &a [{', '.join('x' * 1023)}]\nb: [{', '.join(['*a'] * aliases)}]\n"
        assert [code for code, _, _ in codes(text)] == found

    def test_a_bomb_is_refused(self):
        rows = ["a0: &a0 [x, x, x, x, x, x, x, x, x, x]"]
        rows += [f"a{n}: &a{n} [{', '.join([f'*a{n - 1}'] * 10)}]" for n in range(1, 12)]
        assert [code for code, _, _ in codes("\n".join(rows))] == ["Y110"]

    def test_many_values_written_out_are_no_expansion(self):
        assert codes("a: [" + ", ".join("x" * 20_000) + "]") == []

    def test_one_mebibyte(self):
        start = b"a: 1\n#"
        assert read_bytes(start + b"x" * (2**20 - len(start)), "a.yml")[1] == []
        assert [problem.code for problem in read_bytes(start + b"x" * 2**20, "a.yml")[1]] == ["Y102"]
        assert [problem.code for problem in read_text("#" * (2**20 + 1), "a.yml")[1]] == ["Y102"]


class TestBytes:
    def test_byte_order_mark_and_line_ends(self):
        documents, problems = read_bytes(b"\xef\xbb\xbfa: 1\r\nb: 2\rc: 3\r\n---\r\nd: 4", "a.yml")
        assert not problems
        assert [document.data for document in documents] == [{"a": "1", "b": "2", "c": "3"}, {"d": "4"}]
        assert documents[0].spans["c",] == Span("a.yml", 3, 4, 1)
        assert documents[1].line == 5

    def test_latin_1_is_named(self):
        documents, problems = read_bytes(b"tag: A\r\narea: Sp\xfclung\n", "a.yml")
        assert not documents
        assert problems[0].line() == "a.yml:2:9: error Y103: the byte FC is not UTF-8; in Latin-1 it is '\u00fc'"

    def test_column_counts_letters_before_the_bad_byte(self):
        assert read_bytes("ü: ".encode() + b"\xb0", "a.yml")[1][0].span == Span("a.yml", 1, 4)

    @pytest.mark.parametrize("codec", ["utf-16", "utf-16-le", "utf-16-be", "utf-32"])
    def test_wider_encodings(self, codec):
        assert {problem.code for problem in read_bytes("tag: A\n".encode(codec), "a.yml")[1]} <= {"Y103", "Y104"}


class TestTable:
    def test_list(self):
        document, problems = read_table("# rows\n- {id: a, value: 1.50}\n", "a.yml")
        assert document.data == [{"id": "a", "value": "1.50"}]
        assert not problems

    def test_one_document(self):
        document, problems = read_table("a: 1\n---\nb: 2\n", "a.yml")
        assert document.data == {"a": "1"}
        assert [(problem.code, problem.span.line) for problem in problems] == [("Y119", 3)]

    def test_strict(self):
        assert [problem.code for problem in read_table("- {a: 1, a: 2}\n", "a.yml")[1]] == ["Y108"]
        assert read_table("", "a.yml")[0] is None


def test_a_document_survives_pickle_and_copy():
    document = read_text("need: {setpoint: 65 degC}\n", "a.yml")[0][0]
    for other in (pickle.loads(pickle.dumps(document)), copy.deepcopy(document)):  # noqa: S301 - made one line above
        assert other.data == document.data
        assert dict(other.spans) == dict(document.spans)
        assert len(other.key_spans) == 2
    assert "2 places" in repr(document.key_spans)


def test_each_code_has_one_sentence():
    assert len(set(SOURCE_CODES.values())) == len(SOURCE_CODES)
    assert all(sentence.endswith(".") for sentence in SOURCE_CODES.values())


def test_an_error_without_a_place_is_placed_at_the_document():
    problem = plain_words(yaml.YAMLError("odd"), ["a"], "a.yml", 7)
    assert problem.line() == "a.yml:7:1: error Y106: the text cannot be read as YAML"


def test_an_error_that_the_table_does_not_know_is_repeated():
    mark = yaml.Mark("a", 0, 0, 0, None, None)
    problem = plain_words(yaml.MarkedYAMLError("while dreaming", None, "an odd thing was met", mark), ["a"], "a.yml", 7)
    assert problem.text == "this is no readable YAML (while dreaming an odd thing was met)"
