"""Templates hold no logic: their syntax trees know output, if, for, macros and calls of shapes, and nothing else."""

import html
from pathlib import Path

import pytest
from jinja2 import nodes
from jinja2.exceptions import UndefinedError

from specgen.render.environment import SHAPES, TEMPLATES, environment, escaped

ALLOWED = (
    nodes.Template, nodes.Output, nodes.TemplateData, nodes.If, nodes.For, nodes.Name, nodes.Getattr, nodes.Macro, nodes.Call,
    nodes.FromImport, nodes.Or, nodes.Getitem,
)  # fmt: skip
CALLABLE = {"draw", "mark", "side", "spans", "standing", "symbols"}
NAMES = sorted(path.relative_to(TEMPLATES).as_posix() for path in Path(TEMPLATES).rglob("*.html"))


def tree(name):
    return environment().parse((Path(TEMPLATES) / name).read_text(encoding="utf-8"))


@pytest.mark.parametrize("name", NAMES)
def test_no_arithmetic_no_comparison_no_filter(name):
    root = tree(name)
    imported = {id(node.template) for node in root.find_all(nodes.FromImport)}  # the name of a file is the one constant
    for node in root.find_all(nodes.Node):
        assert isinstance(node, ALLOWED) or id(node) in imported, f"{name}:{node.lineno}: {type(node).__name__}"


@pytest.mark.parametrize("name", NAMES)
def test_only_shapes_are_called_and_only_draw_is_looked_up(name):
    for call in tree(name).find_all(nodes.Call):
        called = call.node.node if isinstance(call.node, nodes.Getitem) else call.node
        assert isinstance(called, nodes.Name)
        assert called.name in CALLABLE
    for looked_up in tree(name).find_all(nodes.Getitem):
        assert looked_up.node.name == "draw"


LOGIC = ["{{ a + 1 }}", "{% if a > 1 %}{% endif %}", "{{ a|upper }}", "{{ a.b() }}", "{% set a = 1 %}", "{{ a ~ b }}"]


@pytest.mark.parametrize("source", LOGIC)
def test_the_walk_finds_what_it_is_for(source):
    """The check can fail: each of these has a node that is not allowed, or a call that is none of a shape's."""
    found = list(environment().parse(source).find_all(nodes.Node))
    calls = [node for node in found if isinstance(node, nodes.Call)]
    assert any(not isinstance(node, ALLOWED) for node in found) or any(not isinstance(call.node, nodes.Name) for call in calls)


def test_there_is_one_template_a_shape():
    assert {f"shapes/{name}.html" for name in SHAPES} <= set(NAMES)


def test_a_name_that_a_view_lacks_is_an_error():
    with pytest.raises((UndefinedError, AttributeError)):
        environment().from_string("{{ nothing }}").render()
    with pytest.raises((UndefinedError, AttributeError)):
        environment().from_string("{{ view.nothing }}").render(view=object())


@pytest.mark.parametrize("letter", list("&<>'\""))
def test_each_special_letter_is_escaped_wherever_it_stands(letter):
    for text in (letter, f"a{letter}", f"{letter}b", f"a{letter}b"):
        drawn = environment().from_string("{{ text }}").render(text=text)
        assert drawn == html.escape(text).replace("&quot;", "&#34;").replace("&#x27;", "&#39;")
        assert drawn == str(escaped(text)) != text
