"""A field that nothing reads is a promise not kept: each is read somewhere, or stands in a table that says where it will be."""

import ast
import re
import types
from functools import cache
from pathlib import Path
from typing import get_args

import pytest
from pydantic import BaseModel

from specgen.model.documents import DOCUMENTS, SET_BY_READER

PACKAGE = Path(__file__).parents[2] / "specgen"
READERS = ("process", "sizing", "rules", "design", "view", "exchange", "catalogue")
PATH = re.compile(r"(need|plant|sensor|element|limits|alarms|choose|cable)(\.[a-z][a-z0-9_]*)+\Z")
# field -> where its use comes; an entry that is read after all fails its test and must go
LATER: dict[str, str] = {
    "by": "issue of a revision: who confirmed a row",
    "coil_current": "rule O6: what the controller's output can drive",
    "duration": "rule M12: defrosts",
    "earthing": "rule E1: protection",
}


def models(annotation):
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        yield annotation
        for field in annotation.model_fields.values():
            yield from models(field.annotation)
    elif not isinstance(annotation, type) or isinstance(annotation, types.GenericAlias):
        for part in get_args(annotation):
            yield from models(part)


@cache
def fields():
    """Return every field's name in the program with one place it stands in."""
    found = {}
    for model, _ in DOCUMENTS.values():
        for part in models(model):
            for name in part.model_fields:
                if name not in SET_BY_READER or part is not DOCUMENTS["loop"][0]:
                    found.setdefault(name, f"{part.__module__}.{part.__name__}")
    return found


class _Reads(ast.NodeVisitor):
    """Gathers attributes that are read and names given to getattr; of rules also the paths that they ask for."""

    def __init__(self):
        self.names = set()
        self.paths = set()

    def visit_Attribute(self, node):
        if isinstance(node.ctx, ast.Load):
            self.names.add(node.attr)
        self.generic_visit(node)

    def visit_Call(self, node):
        if isinstance(node.func, ast.Name) and node.func.id == "getattr":
            self.names |= {a.value for a in node.args if isinstance(a, ast.Constant) and isinstance(a.value, str)}
        self.generic_visit(node)

    def visit_For(self, node):
        # for name in ("stroke_time", ...): getattr(element, name)
        if isinstance(node.iter, ast.Tuple):
            self.names |= {a.value for a in node.iter.elts if isinstance(a, ast.Constant) and isinstance(a.value, str)}
        self.generic_visit(node)

    def visit_Constant(self, node):
        if isinstance(node.value, str) and PATH.match(node.value):
            self.paths |= set(node.value.split("."))


def reads(paths):
    found = set()
    for path in paths:
        visitor = _Reads()
        visitor.visit(ast.parse(path.read_text(encoding="utf-8")))
        found |= visitor.names | (visitor.paths if "rules" in path.parts else set())
    return found


def properties_of_models():
    """Return what each property of a model reads of the model itself."""
    found = {}
    for path in (PACKAGE / "model").glob("*.py"):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.FunctionDef) and any(isinstance(d, ast.Name) and d.id == "property" for d in node.decorator_list):
                own = {n.attr for n in ast.walk(node) if isinstance(n, ast.Attribute)}
                own |= {a.value for n in ast.walk(node) if isinstance(n, ast.Tuple) for a in n.elts if isinstance(a, ast.Constant)}
                found.setdefault(node.name, set()).update(own)
    return found


@cache
def read_somewhere():
    names = reads([PACKAGE / "model" / "traits.py", *(path for reader in READERS for path in (PACKAGE / reader).rglob("*.py"))])
    own = properties_of_models()
    while more := {inner for name, inside in own.items() if name in names for inner in inside} - names:
        names |= more
    return names


@pytest.mark.parametrize("name", sorted(fields()))
def test_every_field_is_read(name):
    where = fields()[name]
    if name in LATER:
        assert name not in read_somewhere(), f"{name} is read now: take it out of the table"
    else:
        assert name in read_somewhere(), f"nothing reads {name} of {where}"


def test_the_table_names_real_fields_only():
    assert set(LATER) <= set(fields())
    assert all(LATER.values())


def test_a_field_that_nothing_reads_would_be_seen():
    assert "no_such_field" not in read_somewhere()
    assert reads([Path(__file__)]) >= {"elts", "attr"}
