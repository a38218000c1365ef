"""I4: what an open circuit looks like."""

import pytest

TRANSMITTER = {"kind": "transmitter", "range": "0 degC to 150 degC", "accuracy": "0.5 percent"}


@pytest.mark.parametrize(
    ("sensor", "outcome", "way"),
    [
        pytest.param({"kind": "pt100"}, "holds", "up-scale", id="resistance thermometer"),
        pytest.param({"kind": "ntc", "r25": "10 kohm", "beta": "3950 K"}, "holds", "down-scale", id="thermistor"),
        pytest.param({"kind": "thermocouple_K"}, "holds", "up-scale", id="thermocouple"),
        pytest.param({**TRANSMITTER, "signal": "4-20 mA"}, "holds", "down-scale", id="live zero"),
        pytest.param({**TRANSMITTER, "signal": "1-5 V"}, "holds", "down-scale", id="live zero in volts"),
        pytest.param({**TRANSMITTER, "signal": "0-20 mA"}, "broken", "looks like a reading", id="dead zero"),
        pytest.param({**TRANSMITTER, "signal": "0-10 V"}, "broken", "looks like a reading", id="dead zero in volts"),
        pytest.param(TRANSMITTER, "unanswered", "depends on the transmitter's signal", id="signal not declared"),
    ],
)
def test_outcome(make, sensor, outcome, way):
    answer = make.ask("I4", make.case("heater", "on_off", sensor=sensor))
    assert answer.outcome == outcome
    assert way in answer.text
