"""Problems as values: one line each, in the order of their places."""

from specgen.core.diagnostic import Diagnostic, Span


def test_one_line():
    problem = Diagnostic(Span("loops/a.yml", 14, 14, 5), "Q103", "'1,5 K' has a decimal comma; write a point", "write 1.5 K")
    assert problem.line() == "loops/a.yml:14:14: error Q103: '1,5 K' has a decimal comma; write a point"
    assert Diagnostic(Span("a", 1, 1), "X1", "t", severity="warning").line() == "a:1:1: warning X1: t"


def test_in_the_order_of_files_lines_and_columns():
    places = [Span("b", 1, 1), Span("a", 10, 1), Span("a", 2, 7), Span("a", 2, 3)]
    ordered = sorted(Diagnostic(span, "X1", "t") for span in places)
    assert [(p.span.file, p.span.line, p.span.column) for p in ordered] == [("a", 2, 3), ("a", 2, 7), ("a", 10, 1), ("b", 1, 1)]


def test_the_same_problem_told_twice_is_one():
    one, other = (Diagnostic(Span("a", 1, 1), "X1", "t", "h") for _ in range(2))
    assert len({one, other}) == 1
