"""Inputs that are not there: named, with what they would settle and how to get them."""

import pytest

from specgen.design.missing import how_to_get


def rows(row):
    return {missing["field"]: missing for missing in row["missing"]}


def test_no_plant_settles_many_rules(make):
    text = "\n".join(line for line in make.steady.splitlines() if not line.startswith("plant")) + "\n"
    row = make.record(text)
    assert row["verdict"] == "open"
    found = rows(row)["plant"]
    assert {"M9", "T1", "T2"} <= set(found["settles"])
    assert found["how"] == "a heat balance, a known response, observed rates, or a recorded step test"
    assert "predicted" in row
    assert "above" not in row["predicted"], "what is not known is absent"


def test_the_plants_own_fields(make):
    row = make.record(make.steady.replace("lag", "lag"))
    assert rows(row)["sensor.lag"] == {"field": "sensor.lag", "settles": ["I3"], "how": "data sheet of the sensor or transmitter"}


@pytest.mark.parametrize(("cut", "field", "rule"), [(", needs: [level]", "element.needs", "S5"), (", step: 0.1 K", "sensor.step", "I2"),
                                                    ("danger_high: 90 degC, ", "limits.danger_high", "S1"),
                                                    ("on_sensor_fault: off, ", "limits.on_sensor_fault", "A2")])  # fmt: skip
def test_a_must_that_lacks_its_input_opens_the_loop(make, cut, field, rule):
    row = make.record(make.relaxed.replace(cut, ""))
    assert row["verdict"] == "open"
    assert rule in rows(row)[field]["settles"]
    assert next(r for r in row["rules"] if r["rule"] == rule)["outcome"] == "unanswered"
    assert field in next(r for r in row["rules"] if r["rule"] == rule)["needs"]


def test_open_points_are_every_loops_missing_inputs(make):
    design = make.whole({"loops/a.yml": make.steady, "loops/b.yml": make.relaxed.replace("TIC-1", "TIC-3").replace(", needs: [level]", "")})
    record = make.record_of(design)
    listed = [(point["loop"], point["field"]) for point in record["open_points"] if "loop" in point]
    for row in record["loops"]:
        assert [field for tag, field in listed if tag == row["tag"]] == [missing["field"] for missing in row["missing"]]
    assert ("TIC-3", "element.needs") in listed


@pytest.mark.parametrize(
    ("field", "how"),
    [("plant.dead_time", "heat balance"), ("plant", "step test"), ("element.needs", "may heat"), ("element.min_run", "name-plate"),
     ("limits.danger_high", "hazard"), ("supply.prospective_fault_current", "supply authority"), ("nowhere", "ask")],
)  # fmt: skip
def test_each_kind_of_field_has_its_way(field, how):
    assert how in how_to_get(field)
