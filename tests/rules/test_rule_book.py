"""The book as a whole: every rule whole in its file, tested, in the plan, and blind to kinds."""

import ast
import re
from itertools import product
from pathlib import Path

import pytest

import specgen.rules
from specgen.model.traits import TRAITS
from specgen.rules.engine import all_rules, examine_all
from specgen.rules.planned import FAMILY_NAMES, PLANNED, not_examined
from specgen.sizing.candidate import CANDIDATES

RULES = Path(specgen.rules.__file__).parent
TESTS = Path(__file__).parent
FILES = sorted(p for p in RULES.glob("*/*.py") if p.name != "__init__.py")
ALL = sorted(RULES.rglob("*.py"))
KINDS = sorted({name.split()[0] for name in TRAITS})
ELEMENTS = ("heater", "lamp", "burner", "two_stage", "compressor", "inverter", "blower", "valve", "cold_valve", "motor_valve", "solenoid")


def code_of(path):
    return path.name.partition("_")[0].upper()


def tree_of(path):
    return ast.parse(path.read_text(encoding="utf-8"))


def imported(tree):
    for node in ast.walk(tree):
        if isinstance(node, ast.ImportFrom):
            yield node.module or ""
        elif isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)


def test_the_engine_finds_every_file_and_no_code_twice():
    codes = [loaded.rule.code for loaded in all_rules()]
    assert sorted(codes) == sorted(code_of(path) for path in FILES)
    assert len(codes) == len(set(codes))


@pytest.mark.parametrize("path", FILES, ids=code_of)
def test_a_rule_is_whole(path):
    module = tree_of(path)
    first = (ast.get_docstring(module) or "").partition("\n")[0]
    planned = next(rule for rule in PLANNED if rule.code == code_of(path))
    loaded = next(loaded for loaded in all_rules() if loaded.rule.code == planned.code)
    assert first == f"{planned.code}: {planned.sentence}."
    assert (loaded.rule.weight, loaded.rule.scope) == (planned.weight, planned.scope)
    assert loaded.rule.name
    assert loaded.rule.cites
    assert loaded.explanation


@pytest.mark.parametrize("path", FILES, ids=code_of)
def test_a_rule_has_its_mirrored_test(path):
    test = TESTS / path.parent.name / f"test_{code_of(path).lower()}.py"
    assert test.is_file()
    text = test.read_text(encoding="utf-8")
    assert f'make.ask("{code_of(path)}"' in text or (f'"{code_of(path)}"' in text)
    # what can be broken is seen to break
    if "holds=True" not in path.read_text(encoding="utf-8") and "rule.judge" in path.read_text(encoding="utf-8"):
        assert '"broken"' in text


@pytest.mark.parametrize("path", ALL, ids=lambda path: path.name)
def test_no_kind_is_named(path):
    """Rules ask traits; a one-word kind may stand in a sentence, but never alone as a value."""
    text = path.read_text(encoding="utf-8")
    assert not [kind for kind in KINDS if "_" in kind and re.search(rf"\b{kind}\b", text)]
    tree = tree_of(path)
    for node in ast.walk(tree):
        if isinstance(node, ast.Constant) and isinstance(node.value, str):
            assert node.value not in KINDS
        if isinstance(node, ast.Attribute):
            assert node.attr != "kind"
        if isinstance(node, ast.Name):
            assert node.id not in KINDS
    assert "specgen.model.element" not in set(imported(tree))


@pytest.mark.parametrize("path", FILES, ids=code_of)
def test_no_rule_imports_another(path):
    families = {folder.name for folder in RULES.iterdir() if folder.is_dir()}
    for module in imported(tree_of(path)):
        if module.startswith("specgen.rules."):
            assert module.split(".")[2] not in families, module


@pytest.mark.parametrize("path", FILES, ids=code_of)
def test_a_rule_stays_small(path):
    assert len(path.read_text(encoding="utf-8").splitlines()) <= 130


def test_the_plan_is_complete_in_its_numbers():
    """Every family counts from 1 without a gap, and each has a name."""
    for family in {rule.code[0] for rule in PLANNED}:
        numbers = [int(rule.code[1:]) for rule in PLANNED if rule.code[0] == family]
        assert numbers == list(range(1, len(numbers) + 1)), family
        assert FAMILY_NAMES[family]


def test_what_is_not_examined_is_what_has_no_file():
    found = {code_of(path) for path in FILES}
    assert {rule.code for rule in not_examined(found)} == {rule.code for rule in PLANNED} - found


def sized(make, candidate):
    if candidate.mode == "on_off":
        return make.on_off()
    if candidate.mode == "time_proportioned":
        return make.proportioned()
    return make.continuous() if candidate.mode == "analogue" else make.stepped()


@pytest.mark.parametrize("element", ELEMENTS)
@pytest.mark.parametrize("known", [False, True], ids=["nothing computed", "everything computed"])
def test_every_rule_answers_every_candidate(make, element, known):
    """No case makes a rule fail, every sentence fills, a broken rule is below its limit and one that holds is not."""
    plant = {"response": {"change": "130 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "20 degC"}} if known else None
    faults = make.faults(on=(150.0, True, None), off=(20.0, None, None), on_danger=900.0)
    for candidate, stability in product(CANDIDATES, ("steady", "relaxed")):
        figures = {"settings": sized(make, candidate), "on_off": make.on_off(), "faults": faults} if known else {}
        case = make.case(element, candidate.mode, candidate.device, plant=plant, need={"stability": stability}, **figures)
        for finding in examine_all(case):
            answer = make.said(finding, case)
            assert answer.text
            if answer.margin is not None and finding.weight != "note":
                assert (answer.margin >= 1 - 1e-3) == (answer.outcome == "holds"), (finding.rule, answer)
            assert (answer.outcome == "unanswered") or not answer.needs
