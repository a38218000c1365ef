"""S6: the high-pressure cut-out."""

import pytest


@pytest.mark.parametrize(
    ("element", "fields", "outcome"),
    [
        pytest.param("compressor", {"refrigerant_circuit": "yes", "high_pressure_cutout": "yes"}, "holds", id="present"),
        pytest.param("compressor", {"refrigerant_circuit": "yes", "high_pressure_cutout": "no"}, "broken", id="absent"),
        pytest.param("compressor", {"refrigerant_circuit": "yes"}, "unanswered", id="not declared"),
        pytest.param("compressor", {"refrigerant_circuit": "no"}, "does_not_apply", id="no refrigerant"),
        pytest.param("compressor", {}, "does_not_apply", id="absent means no"),
        pytest.param("inverter", {"refrigerant_circuit": "yes", "high_pressure_cutout": "no"}, "broken", id="variable speed too"),
        pytest.param("heater", {}, "does_not_apply", id="no machine"),
    ],
)
def test_outcome(make, element, fields, outcome):
    assert make.ask("S6", make.case(element, "on_off", element=fields)).outcome == outcome
