"""The schedules of terminals and instruments in the record."""

from specgen.design.record import record_of

LIMITED = """tag: PIC-9
service: Receiver
need: {quantity: pressure, direction: raise, setpoint: 6 bar, tolerance: 0.5 bar}
sensor: {kind: transmitter, range: 0 bar to 10 bar, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.01 bar}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: 9 bar, limiter: {set: 8 bar}, on_sensor_fault: off, after_power_return: resume, consequence: product}
"""


def test_a_loop_s_instruments_in_its_own_unit(make):
    rows = record_of(make.whole({"loops/a.yml": LIMITED}))["schedules"]["instruments"]
    own, limiter, proof = rows
    # the transmitter alone: 0.5 % of 10 bar, the input's part is less than a tenth of that
    assert 0.05 <= own.pop("error") < 0.06
    assert own == {"loop": "PIC-9", "designation": "=PIC9-B1", "sensor": "transmitter", "serves": "loop", "range": [0.0, 10.0],
                   "signal": "4-20 mA"}  # fmt: skip
    assert limiter == {"loop": "PIC-9", "designation": "=PIC9-B2", "sensor": "transmitter", "serves": "limiter", "set": 8.0}
    assert (proof["designation"], proof["sensor"], proof["serves"]) == ("=PIC9-B5", "level switch", "interlock")


def test_terminals_of_a_loop_worked_by_hand(make):
    """A heater of three lines, its level switch and limiter, a transmitter of two wires: power, control, sensor, limiter's sensor."""
    rows = record_of(make.whole({"loops/a.yml": LIMITED}))["schedules"]["terminals"]
    assert [row["terminal"] for row in rows] == [f"=PIC9-X1:{number}" for number in range(1, 13)]
    assert [row["circuit"] for row in rows] == ["power"] * 4 + ["control"] * 2 + ["sensor"] * 3 + ["limiter"] * 3
    assert [row["outside"].removeprefix("=PIC9-") for row in rows] == [
        "E1:U", "E1:V", "E1:W", "E1:PE", "B5:1", "B5:2", "B1:+", "B1:−", "B1:shield", "B2:+", "B2:−", "B2:shield",
    ]  # fmt: skip
    assert rows[6]["inside"] == "=PIC9-F90:2"
    assert rows[7]["inside"] == "=PIC9-A1:I1+"
    assert rows[10]["inside"] == "=PIC9-F2:I1+"
    assert {row["loop"] for row in rows} == {"PIC-9"}


def test_a_dossier_without_loops_has_empty_schedules(make):
    schedules = record_of(make.whole({}))["schedules"]
    assert (schedules["terminals"], schedules["instruments"]) == ([], [])
