"""Cases for the rules of the panel: every number set by hand."""

from dataclasses import dataclass

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.core.quantity import Unit
from specgen.core.say import THIN, Phrasing
from specgen.model.traits import Traits
from specgen.rules.engine import examine_panel
from specgen.rules.panel_case import FedLoop, OutputCount, PanelCase
from specgen.sizing.conductor import Conductor, Installed
from specgen.sizing.connection import Connection
from specgen.sizing.current import LoadCurrent
from specgen.sizing.feeder import Branch, Feeder
from specgen.sizing.protection import Protection

FED = Connection("three_phase", 400.0, 440.0, 360.0)


@dataclass(frozen=True)
class Answer:
    outcome: str
    text: str
    margin: float | None
    needs: tuple


def feeder(current=14.3, rating=16.0, capacity=17.4, *, rated=13.0, branches=1, sized_for=None, setting=None, drop=None):
    """Return a feeder of equal branches: currents of one of them."""
    protection = Protection("circuit_breaker", rating, current, current if sized_for is None else sized_for, setting=setting)
    inside = Conductor(2.5e-6, 2.5e-6, None, Installed("B1", 45.0, 1), capacity, None)
    cable = None if drop is None else Conductor(2.5e-6, 2.5e-6, None, Installed("C", 30.0, 1, 20.0), capacity, drop)
    load = LoadCurrent(current * branches, rated * branches, FED, "AC-1", "AC-51")
    return Feeder(load, (Branch(1, current, protection, inside, cable),) * branches)


@pytest.fixture
def fed():
    return feeder


@pytest.fixture
def ask_panel(make):
    """Ask one rule about a panel: two heaters fed, L1 to L3 at 40, 38 and 39 A, an incomer of 50 A, 8 of 16 relay outputs used."""

    def ask(code, *, feeders=None, heats=True, panel=None, **changes):
        feeders = {"TIC-1": feeder(), "TIC-2": feeder()} if feeders is None else feeders
        made = {
            "panel": make.panel(**(panel or {})),
            "fed": tuple(FedLoop(tag, Traits(electric_heat=heats), found) for tag, found in feeders.items()),
            "lines": {"L1": 40.0, "L2": 38.0, "L3": 39.0}, "imbalance": 0.05, "carries": 45.0, "incomer": 50.0, "declared": False,
            "outputs": (OutputCount("relay", 8, 16), OutputCount("logic", 0, 0)), "wiring": load_catalogue().wiring,
        }  # fmt: skip
        found = next(finding for finding in examine_panel(PanelCase(**(made | changes))) if finding.rule == code)
        text = Phrasing(Unit("degC"), Unit("K")).fill(found.text, found.words).replace(THIN, " ")
        return Answer(found.outcome, text, found.margin, found.needs)

    return ask
