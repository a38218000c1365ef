"""Panels, loops and the packaged catalogue, read by the real models."""

import copy

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.document import Document

PANEL = {
    "panel": {"reference": "PNL-1", "title": "Sizing", "revision": "A", "status": "for review", "date": "2026-01-01"},
    "supply": {"voltage": "400 V", "phases": "3", "frequency": "50 Hz"},
    "enclosure": {"height": "1800 mm", "width": "800 mm", "depth": "400 mm", "ambient": "5 degC to 35 degC"},
}
LOOP = {
    "tag": "TIC-1",
    "service": "cabinet",
    "need": {"quantity": "temperature", "direction": "raise", "setpoint": "65 degC", "tolerance": "1.5 K"},
    "sensor": {"kind": "pt100", "class": "A", "step": "0.1 K"},
    "element": {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"},
}


def _merged(base, changes):
    data = copy.deepcopy(base)
    for key, value in changes.items():
        data[key] = {**data[key], **value} if isinstance(value, dict) and isinstance(data.get(key), dict) and "kind" not in value else value
    return data


@pytest.fixture
def panel():
    def make(**changes):
        made, problems = read_model(Panel, _merged(PANEL, changes))
        assert made is not None, problems
        return made

    return make


@pytest.fixture
def loop():
    def make(element=None, **changes):
        data = _merged(LOOP, changes)
        if element is not None:
            data["element"] = element
        reading = read_loops([Document("a.yml", 0, 1, data, {}, {})])
        assert not reading.problems, reading.problems
        return reading.loops[0].loop

    return make


@pytest.fixture(scope="session")
def catalogue():
    return load_catalogue()
