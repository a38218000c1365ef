"""S8: the cautions that a loop's kind, medium and consequence bring, by code basis."""

import pytest

from specgen.catalogue.cautions import caution_for, cautions
from specgen.rules.hazards import HAZARDS, hazards_of


@pytest.mark.parametrize(
    ("element", "changes", "hazards"),
    [
        pytest.param(
            "heater", {"limits": {"consequence": "fire"}}, {"mains", "fire", "hot_surface", "dry_firing", "restart"}, id="heater in air",
        ),
        pytest.param(
            "heater", {"element": {"needs": ["level"]}, "limits": {"after_power_return": "off"}},
            {"mains", "fire", "hot_surface", "dry_firing", "scald"}, id="heater in liquid, off after return",
        ),
        pytest.param(
            "compressor", {"element": {"refrigerant_circuit": "yes"}}, {"mains", "refrigerant", "moving", "restart"}, id="refrigerant",
        ),
        pytest.param("compressor", {}, {"mains", "moving", "restart"}, id="no refrigerant declared"),
        pytest.param("burner", {"limits": {"consequence": "injury"}}, {"injury", "gas", "hot_surface", "restart"}, id="burner"),
        pytest.param("valve", {"element": {"medium": "steam"}}, {"steam", "hot_surface", "moving", "restart"}, id="steam valve"),
        pytest.param("valve", {"element": {"medium": "oil"}}, {"oil", "hot_surface", "moving", "restart"}, id="hot oil"),
        pytest.param("inverter", {"element": {"voltage": "400 V", "phases": "3"}}, {"mains", "moving", "stored", "restart"}, id="drive"),
        pytest.param("solenoid", {"need": {"direction": "lower"}, "limits": {"danger_high": None}}, {"restart"}, id="small cold valve"),
    ],
)  # fmt: skip
def test_hazards(make, element, changes, hazards):
    assert set(hazards_of(make.case(element, "on_off", **changes))) == hazards


@pytest.mark.parametrize(("setpoint", "low", "there"), [("60 degC", None, False), ("38 degC", None, True), ("60 degC", "45 degC", True)])
def test_bacteria_only_where_water_is_held_warm(make, setpoint, low, there):
    need = {"setpoint": setpoint, **({"range": f"{low} to {setpoint}"} if low else {})}
    case = make.case("heater", "on_off", need=need, element={"needs": ["flow"]})
    assert ("bacteria" in hazards_of(case)) is there
    assert "bacteria" not in hazards_of(make.case("heater", "on_off", need=need))


def test_it_names_every_hazard_and_says_who_decides(make):
    answer = make.ask("S8", make.case("burner", "on_off"))
    assert answer.outcome == "holds"
    assert "explosion and poisoning by gas" in answer.text
    assert answer.text.endswith("decide.")


def test_it_has_nothing_to_say_where_nothing_is_declared(make):
    case = make.case("solenoid", "on_off", need={"direction": "lower"}, limits={"after_power_return": "off", "danger_high": None})
    assert make.ask("S8", case).outcome == "does_not_apply"


@pytest.mark.parametrize("hazard", HAZARDS)
@pytest.mark.parametrize("basis", ["iec", "north_america"])
def test_every_hazard_has_a_caution_under_every_code_basis(hazard, basis):
    assert caution_for(hazard, basis) is not None


def test_every_caution_belongs_to_a_hazard_and_none_has_two_for_one_basis():
    assert {caution.hazard for caution, _ in cautions()} == set(HAZARDS)
    seen = [(caution.hazard, basis) for caution, _ in cautions() for basis in ("iec", "north_america") if caution.basis in ("any", basis)]
    assert len(seen) == len(set(seen))


CLEARANCE = (
    "complies", "compliant", "is safe", "are safe", "safe to", "no danger", "no risk", "sufficient", "approved", "certifies", "PL d",
    "PL e", "SIL 1", "SIL 2", "SIL 3", "guarantee",
)  # fmt: skip


@pytest.mark.parametrize(("caution", "row"), cautions(), ids=lambda found: getattr(found, "id", ""))
def test_a_caution_begins_with_the_hazard_ends_with_who_decides_and_clears_nothing(caution, row):
    last = caution.whole.rstrip(".").rpartition(". ")[2]
    assert caution.whole.startswith(caution.head)
    assert "decide" in last
    assert "licensed" in last or "hygienist" in last
    assert not [said for said in CLEARANCE if said in caution.whole]
    assert row.standing in ("from memory", "common practice")
