"""Loops with their real elements, devices and feeders; what they control is left out, which the panel does not ask."""

import json
from types import SimpleNamespace

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.panel import panel_of
from specgen.design.types import DecidedLoop, Decision, Design, Examined
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.model.traits import traits_of
from specgen.process.box import Unmodelled
from specgen.rules.base import Case
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.device_choice import devices_by_rating
from specgen.sizing.feeder import feeder_of
from specgen.source.read import read_text

PANEL = {
    "panel": {"reference": "PNL-1", "title": "Lines", "revision": "A", "status": "for review", "date": "2026-01-01"},
    "supply": {"voltage": "400 V", "phases": "3", "frequency": "50 Hz"},
    "enclosure": {"height": "1800 mm", "width": "800 mm", "depth": "400 mm", "ambient": "5 degC to 35 degC"},
}
LOOP = {
    "service": "something warm",
    "need": {"quantity": "temperature", "direction": "raise", "setpoint": "65 degC", "tolerance": "1.5 K"},
    "sensor": {"kind": "pt100", "class": "A", "step": "0.1 K"},
}
NOT_ASKED = Unsized("not asked here")
MODES = {"power_controller": "analogue", "signal": "analogue", "relay_pair": "three_point"}
CATALOGUE = load_catalogue()


def merged(base, changes):
    made = {key: {**base[key], **value} if isinstance(base.get(key), dict) else value for key, value in changes.items()}
    return {**base, **made}


def panel(**changes):
    made, problems = read_model(Panel, merged(PANEL, changes))
    assert not problems, problems
    return made


def decided(tag, element, shop, device="contactor", **changes):
    """Return a loop as decided, by the device named."""
    documents, problems = read_text(json.dumps({"tag": tag, **LOOP, "element": element, **changes}), "loops/a.yml")
    reading = read_loops(documents)
    assert not problems
    assert not reading.problems, reading.problems
    read = reading.loops[0]
    traits = traits_of(read.loop.element)
    candidate = Candidate(MODES.get(device, "on_off"), device)
    found = devices_by_rating(candidate, read.loop, shop, traits, CATALOGUE)
    choice = found if isinstance(found, Unsized) else found[0]
    feeder = feeder_of(device, choice, read.loop, shop, traits, CATALOGUE)
    box = Unmodelled("no plant")
    case = Case(read.loop, shop, traits, candidate, box, choice, NOT_ASKED, NOT_ASKED, NOT_ASKED, NOT_ASKED, feeder)
    return DecidedLoop(read, traits, box, Decision(Examined(case, ()), "", (), by_designer=False), (), "open", (), (), ())


def heater(power, voltage="400 V", phases="3"):
    return {"kind": "resistive_heater", "power": power, "voltage": voltage, "phases": phases, "needs": []}


def compressor(current):
    least = {"min_run": "180 s", "min_rest": "120 s", "starts_per_hour": "6"}
    return {"kind": "fixed_speed_compressor", "current": current, "voltage": "400 V", "phases": "3", **least}


def design(loops, shop):
    return Design(shop, tuple(loops), (), (), "", "", "meets", panel_of(loops, shop, CATALOGUE))


@pytest.fixture(scope="session")
def shop():
    return SimpleNamespace(
        panel=panel, decided=decided, heater=heater, compressor=compressor, design=design, catalogue=CATALOGUE,
        panel_of=lambda loops, made: panel_of(loops, made, CATALOGUE),
    )  # fmt: skip
