"""Finds the rules, asks each of them about a case, and answers for those that do not apply or lack an input."""

import hashlib
import importlib
import re
from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources
from typing import Any

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.pair_case import PairCase
from specgen.rules.panel_case import PanelCase

FAMILIES = "AMDCVOEIST"
_FILE = re.compile(r"([a-z])([0-9]+)_[a-z0-9_]+\.py\Z")


@dataclass(frozen=True, slots=True)
class LoadedRule:
    """A rule as found in its file: the declaration, what it does, and its plain sentence and explanation."""

    rule: Rule
    examine: Callable[[Any], Finding]  # rules of scope panel and pair are asked about a PanelCase and a PairCase
    applies: Callable[[Any], bool] | None
    sentence: str
    explanation: str
    examine_loop: Callable[[Case], Finding] | None = None


@lru_cache(maxsize=1)
def all_rules() -> tuple[LoadedRule, ...]:
    """Return every rule of the book in the order of families and numbers.

    A rule is a file in a folder below ``specgen/rules``; adding one touches no list.
    """
    found: list[LoadedRule] = []
    for folder in resources.files("specgen.rules").iterdir():
        if not folder.is_dir():
            continue
        for file in folder.iterdir():
            if _FILE.match(file.name):
                module = importlib.import_module(f"specgen.rules.{folder.name}.{file.name[:-3]}")
                sentence, _, more = (module.__doc__ or "").strip().partition("\n")
                about = (module.examine.__doc__ or "").strip()
                found.append(
                    LoadedRule(
                        module.rule, module.examine, getattr(module, "applies", None), sentence.partition(": ")[2] or sentence,
                        (more.strip() + "\n\n" + about).strip(), getattr(module, "examine_loop", None),
                    )
                )
    return tuple(sorted(found, key=lambda loaded: place_of(loaded.rule.code)))


def place_of(code: str) -> tuple[int, int]:
    """Return where a rule stands in the book.

    Examples
    --------
    >>> sorted(["S1", "M10", "M2", "A1"], key=place_of)
    ['A1', 'M2', 'M10', 'S1']
    """
    return FAMILIES.index(code[0]), int(code[1:])


@lru_cache(maxsize=1)
def rules_digest() -> str:
    """Return a short digest of every rule's source: it changes when a rule does."""
    digest = hashlib.sha256()
    root = resources.files("specgen.rules")
    names: list[tuple[str, bytes]] = [(f.name, f.read_bytes()) for f in root.iterdir() if f.name.endswith(".py")]
    for folder in root.iterdir():
        if folder.is_dir():
            names += [(f"{folder.name}/{f.name}", f.read_bytes()) for f in folder.iterdir() if f.name.endswith(".py")]
    for name, content in sorted(names):
        digest.update(name.encode() + b"\0" + content.replace(b"\r\n", b"\n") + b"\0")
    return digest.hexdigest()[:16]


def examine_all(case: Case) -> tuple[Finding, ...]:
    """Ask every rule of scope loop about one case."""
    return tuple(ask(loaded, case) for loaded in all_rules() if loaded.rule.scope == "loop")


def examine_panel(case: PanelCase) -> tuple[Finding, ...]:
    """Ask every rule of scope panel about the panel."""
    asked = (loaded for loaded in all_rules() if loaded.rule.scope == "panel")
    return tuple(
        loaded.rule.does_not_apply() if loaded.applies is not None and not loaded.applies(case) else loaded.examine(case)
        for loaded in asked
    )


def examine_pair(case: PairCase) -> tuple[Finding, ...]:
    """Ask every rule of scope pair about two loops."""
    return tuple(loaded.examine(case) for loaded in all_rules() if loaded.rule.scope == "pair")


def no_pair() -> tuple[Finding, ...]:
    """Answer the rules of scope pair for a loop that has no counterpart."""
    said = "No other loop acts on the same body the other way."
    return tuple(loaded.rule.does_not_apply(said) for loaded in all_rules() if loaded.rule.scope == "pair")


def examine_own(case: Case) -> tuple[Finding, ...]:
    """Ask the rules of scope panel that also hold a loop of their own about it, by what is known of this loop alone."""
    return tuple(loaded.examine_loop(case) for loaded in all_rules() if loaded.examine_loop is not None)


def ask(loaded: LoadedRule, case: Case) -> Finding:
    """Ask one rule about a case; what does not apply or lacks an input is answered for it."""
    if loaded.applies is not None and not loaded.applies(case):
        return loaded.rule.does_not_apply()
    missing = tuple(path for path in loaded.rule.needs if not _declared(case.loop, path))
    if missing:
        return loaded.rule.unanswered("{missing} not declared", missing, missing=_listed(missing))
    return loaded.examine(case)


def _declared(loop: object, path: str) -> bool:
    here = loop
    for step in path.split("."):
        here = getattr(here, step, None)
        if here is None:
            return False
    return True


def _listed(paths: tuple[str, ...]) -> str:
    return paths[0] + " is" if len(paths) == 1 else ", ".join(paths[:-1]) + " and " + paths[-1] + " are"
