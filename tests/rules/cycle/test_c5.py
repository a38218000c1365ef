"""C5: the longest of the house's series for contacts, the shortest for solid state."""

import pytest


@pytest.mark.parametrize(
    ("cycle", "most", "outcome"),
    [
        pytest.param(30.0, 40.0, "holds", id="longest within 40 s"),
        pytest.param(45.0, 45.0, "holds", id="at the limit"),
        pytest.param(20.0, 40.0, "broken", id="shorter than need be"),
        pytest.param(45.0, 40.0, "broken", id="longer than allowed"),
        pytest.param(1.0, 0.5, "broken", id="none is short enough"),
        pytest.param(300.0, float("inf"), "holds", id="nothing bounds it"),
    ],
)
def test_contacts(make, cycle, most, outcome):
    settings = make.proportioned(cycle_time=cycle, most=most)
    assert make.ask("C5", make.case("heater", "time_proportioned", settings=settings)).outcome == outcome


@pytest.mark.parametrize(
    ("cycle", "least", "outcome"),
    [
        pytest.param(2.0, 1.5, "holds", id="shortest from 1.5 s"),
        pytest.param(1.0, 1.0, "holds", id="at the limit"),
        pytest.param(5.0, 1.5, "broken", id="longer than need be"),
        pytest.param(300.0, 301.0, "broken", id="none is long enough"),
    ],
)
def test_solid_state(make, cycle, least, outcome):
    settings = make.proportioned(cycle_time=cycle, least=least, contact_life=None)
    assert make.ask("C5", make.case("heater", "time_proportioned", "ssr", settings=settings)).outcome == outcome


def test_the_house_has_its_own_series(make):
    settings = make.proportioned(cycle_time=25.0, most=40.0)
    case = make.case("heater", "time_proportioned", settings=settings, house={"cycle_time_series": ["12.5", "25", "50"]})
    assert make.ask("C5", case).outcome == "holds"


def test_the_right_one_is_named(make):
    case = make.case("heater", "time_proportioned", settings=make.proportioned(cycle_time=20.0, most=40.0))
    assert make.ask("C5", case).text.endswith("within the 40 s that control allows: 30 s; 20 s is set.")


def test_unanswered_and_not_asked(make):
    assert make.ask("C5", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C5", make.case("heater", "on_off")).outcome == "does_not_apply"
