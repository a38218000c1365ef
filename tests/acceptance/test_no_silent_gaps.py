"""For every loop of the demo device, protection, conductor, terminals and controller output are sized, or open with a reason."""

from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.design.record import record_of
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import NotFed

DESIGN = load_design(Path(__file__).parents[2])
RECORD = record_of(DESIGN)
TAGS = [loop.tag for loop in DESIGN.loops]


def decided(tag):
    return next(loop for loop in DESIGN.loops if loop.tag == tag)


def rows(schedule, tag):
    return [row for row in RECORD["schedules"][schedule] if row.get("loop") == tag or tag in row.get("loops", ())]


@pytest.mark.parametrize("tag", TAGS)
def test_the_device_is_chosen_or_open(tag):
    case = decided(tag).decision.chosen.case
    output = next(row for row in RECORD["loops"] if row["tag"] == tag)["output"]
    if isinstance(case.device, Unsized):
        assert case.device.because
        return
    assert output["controller_output"] in ("relay", "logic", "analogue", "relay_pair")
    assert rows("outputs", tag)[0]["controller_output"] == output["controller_output"]
    assert output["device"] == "signal" or 0 < output["current"] <= output["rating"]


@pytest.mark.parametrize("tag", TAGS)
def test_what_is_fed_is_protected_and_wired(tag):
    feeder = decided(tag).decision.chosen.case.feeder
    protection, conductors = rows("protection", tag), rows("conductors", tag)
    if isinstance(feeder, NotFed):
        assert feeder.because
    elif isinstance(feeder, Unsized):
        assert feeder.because
        assert any(point["loop"] == tag for point in RECORD["open_points"])
    else:
        assert protection
        assert conductors
        assert all(row["design_current"] <= row["rating"] for row in protection)
        assert all(row["protection"] <= row["capacity"] for row in conductors if "capacity" in row and "protection" in row)


@pytest.mark.parametrize("tag", TAGS)
def test_every_loop_has_its_terminals_and_its_instrument(tag):
    terminals = [row["terminal"] for row in rows("terminals", tag)]
    assert terminals or DESIGN.wirings[tag].open_points
    assert len(terminals) == len(set(terminals))
    assert rows("instruments", tag)
