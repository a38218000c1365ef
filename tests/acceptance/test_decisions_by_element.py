"""What is decided for every kind of element, from small loops with believable numbers."""

import pytest

SWITCHED = ("compressor", "fan", "pump", "burner")
SIGNALLED = ("valve", "drive fan", "drive pump", "drive compressor", "modulating burner")
THROTTLED = ("lamp", "silicon carbide", "disilicide", "transformer")


def broken(row, weight="must"):
    return [rule["rule"] for rule in row["rules"] if rule["outcome"] == "broken" and rule["weight"] == weight]


def ended(row, mode, device):
    return next(a["ruled_out_by"] for a in row["alternatives"] if (a["mode"], a["device"]) == (mode, device))


@pytest.mark.parametrize("stability", ["steady", "relaxed"])
@pytest.mark.parametrize("name", SWITCHED)
def test_machines_and_burners_are_switched(make, name, stability):
    row = make.record(make.loop_text(name, stability, "12 K" if name == "burner" else "4 K"))
    assert row["mode"] == "on_off"
    assert not broken(row)
    rule = "M1" if name == "compressor" else "M7"
    for alternative in row["alternatives"]:
        if alternative["mode"] == "time_proportioned":
            assert rule in alternative["ruled_out_by"], alternative


@pytest.mark.parametrize("name", SWITCHED)
def test_machines_keep_their_starts(make, name):
    row = make.record(make.loop_text(name, "relaxed", "12 K" if name == "burner" else "4 K"))
    starts = 6 if name == "compressor" else 10
    assert row["predicted"]["starts_per_hour"] <= starts * 1.001


@pytest.mark.parametrize("output", ["contactor", "ssr"])
def test_a_heater_is_time_proportioned(make, output):
    row = make.record(make.loop_text("heater", "steady", more=f"choose: {{output: {output}, because: Shown here.}}\n"))
    assert (row["mode"], row["output"]["device"]) == ("time_proportioned", output)
    assert not broken(row)
    assert row["output"]["controller_output"] == ("relay" if output == "contactor" else "logic")


@pytest.mark.parametrize("output", ["contactor", "ssr"])
def test_relaxed_takes_on_off_where_its_excursion_fits(make, output):
    more = f"choose: {{output: {output}, because: Shown here.}}\n"
    fits = make.record(make.loop_text("heater", "relaxed", "5 K", more=more))
    assert (fits["mode"], fits["output"]["device"]) == ("on_off", output)
    assert max(fits["predicted"]["above"], fits["predicted"]["below"]) + fits["predicted"]["measuring_error"] <= 5.0 * 1.001
    tight = make.record(make.loop_text("heater", "relaxed", "1.5 K", more=more))
    assert (tight["mode"], tight["output"]["device"]) == ("time_proportioned", output)


@pytest.mark.parametrize("stability", ["steady", "relaxed"])
def test_a_solenoid_valve(make, stability):
    row = make.record(make.loop_text("solenoid", stability))
    assert row["mode"] in (("on_off",) if stability == "relaxed" else ("on_off", "time_proportioned"))
    assert row["output"]["device"] in ("relay", "ssr", "contactor")
    assert not broken(row)


@pytest.mark.parametrize("name", SIGNALLED)
def test_what_reads_a_signal_gets_one(make, name):
    row = make.record(make.loop_text(name))
    assert (row["mode"], row["output"]["device"], row["output"]["controller_output"]) == ("analogue", "signal", "analogue")
    assert not broken(row)
    assert "M2" in ended(row, "on_off", "contactor")
    assert row["settings"]["signal"] == ("0-10 V" if name == "drive pump" else "4-20 mA")


def test_a_motor_valve_is_three_point(make):
    row = make.record(make.loop_text("motor valve"))
    assert (row["mode"], row["output"]["device"], row["output"]["controller_output"]) == ("three_point", "relay_pair", "relay_pair")
    assert not broken(row)
    assert row["settings"]["neutral_zone"] > 0


@pytest.mark.parametrize("name", THROTTLED)
def test_loads_that_must_not_be_switched_whole(make, name):
    row = make.record(make.loop_text(name))
    assert (row["mode"], row["output"]["device"]) == ("analogue", "power_controller")
    assert not broken(row)
    for alternative in row["alternatives"]:
        if alternative["device"] in ("relay", "contactor", "ssr"):
            assert "M8" in alternative["ruled_out_by"], alternative


def test_action_follows_the_direction(make):
    for name in make.elements:
        row = make.record(make.loop_text(name))
        assert row["action"] == ("direct" if "lower" in make.loop_text(name) else "reverse"), name
        assert all(a["ruled_out_by"] for a in row["alternatives"] if not a["chosen"])
        assert [a["ruled_out_by"] for a in row["alternatives"] if a["chosen"]] == [[]]
