"""O11: residual current."""

import pytest


@pytest.mark.parametrize(
    ("fill", "outcome"), [("mineral_insulated", "holds"), ("dry_element", "does_not_apply"), (None, "does_not_apply")]
)
def test_outcome(make, fill, outcome):
    answer = make.ask("O11", make.case("heater", "on_off", element={"fill": fill}))
    assert answer.outcome == outcome
    if outcome == "holds":
        assert "residual-current protection" in answer.text


def test_nothing_else_leaks_so(make):
    assert make.ask("O11", make.case("compressor", "on_off")).outcome == "does_not_apply"
