"""Whatever the plant: a decision without a traceback, alternatives ended by rules, numbers in the Basis, rules as the figures are."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

VERDICTS = ("meets", "deviates", "open", "held")
EDGES = [
    # at the edge of what switches, without a dead time, rounding leaves no time between the switchings
    ("burner", ("{balance: {heat_capacity: 221 kJ/K, loss: 10.5 W/K to 65 W/K, surroundings: 11.1 degC to 15.3 degC, "
               "load: 0.899 kW to 1.45 kW, dead_time: 0 s, lag: 10 s}}"), "55.28 degC", ""),
    ("compressor", ("{response: {change: 21.4 K to 29 K, time_constant: 6.6 min to 9.93 min, dead_time: 0 s, rest_value: 14.5 degC, "
                   "lag: 10 s}}"), "-9.25 degC", "5 s"),
]  # fmt: skip


def text_of(make, name, plant, setpoint, tolerance, lag="", stability="relaxed", more=""):
    """Return a loop's text with a plant, setpoint and sensor of its own."""
    lines = make.loop_text(name, stability, tolerance, more=more).splitlines()
    made = []
    for line in lines:
        if line.startswith("plant: "):
            made.append(f"plant: {plant}")
        elif line.startswith("sensor: "):
            made.append(line.replace(", lag: 5 s", f", lag: {lag}" if lag else ""))
        elif line.startswith("need: "):
            before, _, after = line.partition("setpoint: ")
            made.append(f"{before}setpoint: {setpoint},{after.partition(',')[2]}")
        elif line.startswith("limits: "):
            made.append("limits: {danger_high: 400 degC, danger_low: -80 degC, on_sensor_fault: off, after_power_return: resume}")
        else:
            made.append(line)
    return "\n".join(made) + "\n"


def hold(row, tolerance):
    """Hold a record to itself."""
    assert row["verdict"] in VERDICTS
    for alternative in row["alternatives"]:
        assert alternative["chosen"] or alternative["ruled_out_by"]
    results = [figure["result"] for figure in row["basis"]]
    for section in (row["settings"], row["predicted"], row.get("limiter", {}), *row["faults"].values()):
        for name, value in section.items():
            if isinstance(value, float):
                assert any(abs(value - result) <= 1e-8 * max(abs(value), abs(result)) for result in results), name
    outcomes = {rule["rule"]: rule["outcome"] for rule in row["rules"]}
    predicted = row["predicted"]
    if row["mode"] == "on_off" and "above" in predicted:
        worst = max(predicted["above"], predicted["below"]) + predicted["measuring_error"]
        assert (outcomes["D4"] == "holds") == (worst <= tolerance * 1.001), (worst, tolerance)
        assert predicted["swing"] >= 0
        assert predicted["period"] > 0
    if row["mode"] == "time_proportioned" and "above" in predicted:
        within = max(predicted["above"], predicted["below"]) <= 0.25 * tolerance * 1.001
        assert (outcomes["C1"] == "holds") == within


@pytest.mark.parametrize(("name", "plant", "setpoint", "lag"), EDGES)
def test_at_the_edge_of_what_switches(make, name, plant, setpoint, lag):
    hold(make.record(text_of(make, name, plant, setpoint, "4 K", lag)), 4.0)


@st.composite
def spans(draw, low, high, unit):
    ends = sorted((draw(st.floats(low, high)), draw(st.floats(low, high))))
    first, last = (f"{end:.3f} {unit}" for end in ends)
    return first if draw(st.booleans()) else f"{first} to {last}"


@st.composite
def plants(draw, warm):
    dead_time = draw(st.sampled_from(["0 s", "5 s", "30 s", "20 s to 60 s"]))
    lag = draw(st.sampled_from(["", ", lag: 10 s", ", lag: 5 s to 60 s"]))
    match draw(st.sampled_from(["response", "rates", "balance"])):
        case "response":
            change, rest = (spans(60, 200, "K"), spans(5, 39, "degC")) if warm else (spans(15, 40, "K"), spans(8, 30, "degC"))
            made = f"change: {draw(change)}, time_constant: {draw(spans(3, 90, 'min'))}, rest_value: {draw(rest)}"
            return f"{{response: {{{made}, dead_time: {dead_time}{lag}}}}}"
        case "rates":
            made = f"with_output: {draw(spans(0.5, 6, 'K/min'))}, without_output: {draw(spans(0.2, 4, 'K/min'))}"
            return f"{{rates: {{{made}, dead_time: {dead_time}{lag}}}}}"
        case _:
            made = f"heat_capacity: {draw(spans(30, 900, 'kJ/K'))}, loss: {draw(spans(10, 80, 'W/K'))}"
            around = f"surroundings: {draw(spans(5, 30, 'degC'))}, load: {draw(spans(0, 1.5, 'kW'))}"
            return f"{{balance: {{{made}, {around}, dead_time: {dead_time}{lag}}}}}"


@settings(max_examples=12, deadline=None, derandomize=True)
@given(data=st.data())
def test_any_plant_is_decided(make, data):
    name = data.draw(st.sampled_from(make.elements))
    warm = "raise" in make.loop_text(name)
    tolerance = data.draw(st.sampled_from([0.6, 1.5, 4.0, 9.0]))
    setpoint = f"{data.draw(st.floats(40, 120) if warm else st.floats(-10, 7)):.3g} degC"
    lag, stability = data.draw(st.sampled_from(["", "5 s", "3 s to 90 s"])), data.draw(st.sampled_from(["steady", "relaxed"]))
    plant = data.draw(plants(warm))
    row = make.record(text_of(make, name, plant, setpoint, f"{tolerance} K", lag, stability))
    hold(row, tolerance)
    wider = make.record(text_of(make, name, plant, setpoint, f"{2 * tolerance} K", lag, stability))
    assert VERDICTS.index(wider["verdict"]) <= VERDICTS.index(row["verdict"]), "twice the tolerance is never worse"
