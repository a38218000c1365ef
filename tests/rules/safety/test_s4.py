"""S4: what happens after the return of supply."""

import pytest


@pytest.mark.parametrize(
    ("own", "house", "consequence", "outcome", "said"),
    [
        pytest.param("off", None, "injury", "holds", "stays off until somebody starts it, as declared", id="declared off"),
        pytest.param("resume", None, "fire", "holds", "resumes by itself, as declared", id="declared to resume"),
        pytest.param(None, "off", "fire", "holds", "stays off until somebody starts it, by the house's rule", id="by the house"),
        pytest.param("resume", "off", None, "holds", "resumes by itself, as declared", id="the loop goes first"),
        pytest.param(None, None, "injury", "unanswered", "injury", id="injury, nothing declared"),
        pytest.param(None, None, "fire", "unanswered", "fire", id="fire, nothing declared"),
        pytest.param(None, None, "product", "holds", "is taken to resume", id="product, nothing declared"),
        pytest.param(None, None, None, "holds", "is taken to resume", id="nothing declared at all"),
    ],
)
def test_outcome(make, own, house, consequence, outcome, said):
    limits = {"after_power_return": own, "consequence": consequence}
    answer = make.ask("S4", make.case("heater", "on_off", limits=limits, house={"after_power_return": house} if house else None))
    assert answer.outcome == outcome
    assert said in answer.text
    assert answer.needs == (("limits.after_power_return",) if outcome == "unanswered" else ())
