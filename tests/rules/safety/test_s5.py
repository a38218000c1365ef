"""S5: what a heater needs is declared, and proven."""

import pytest


@pytest.mark.parametrize(
    ("element", "needs", "outcome"),
    [
        pytest.param("heater", ["airflow"], "holds", id="air"),
        pytest.param("heater", [], "holds", id="nothing"),
        pytest.param("heater", None, "unanswered", id="not declared"),
        pytest.param("lamp", None, "does_not_apply", id="special load, not declared"),
        pytest.param("lamp", ["flow"], "holds", id="special load, declared"),
        pytest.param("valve", None, "does_not_apply", id="no electric heat"),
    ],
)
def test_outcome(make, element, needs, outcome):
    fields = {} if element == "valve" else {"needs": needs}
    assert make.ask("S5", make.case(element, "on_off", element=fields)).outcome == outcome


def test_each_need_is_named(make):
    asked = make.case("heater", "on_off", element={"needs": ["level", "flow"]})
    assert make.ask("S5", asked).text.startswith("Proven level and flow stands in the power path")
