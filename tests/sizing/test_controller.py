"""The controller's side: declared outputs, their gaps, and typical ones."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.coil_drive import coil_current
from specgen.sizing.controller import controller_side


def outputs(*rows, name="A"):
    return {"controllers": [{"name": name, "outputs": list(rows)}]}


def test_none_declared_is_typical_and_says_so(panel, catalogue):
    side = controller_side(panel(), catalogue, "relay")
    assert (side.rating, side.points[0].operations) == (2.0, 1e5)
    assert side.assumptions[0].field == "controllers"
    assert controller_side(panel(), catalogue, "analogue", signal="0-10 V").burden is None
    assert controller_side(panel(), catalogue, "analogue", signal="4-20 mA").burden == 500.0
    assert controller_side(panel(), catalogue, "logic").drive == pytest.approx(0.02)


def test_declared_life_holds_at_the_rating_and_below(panel, catalogue):
    side = controller_side(panel(**outputs({"kind": "relay", "rating": "5 A", "electrical_life": "2e5"})), catalogue, "relay")
    assert [(float(p.current), float(p.operations)) for p in side.points] == [(5.0, 2e5)]
    assert [a.field for a in side.assumptions] == ["controllers.A"]  # its times alone


def test_typical_life_moves_with_the_rating(panel, catalogue):
    """The typical relay's points lie at 1, 0.5, 0.25 and 0.1 of its rating."""
    side = controller_side(panel(**outputs({"kind": "relay", "rating": "4 A"})), catalogue, "relay")
    assert [float(p.current) for p in side.points] == pytest.approx([4.0, 2.0, 1.0, 0.4])
    assert "controllers.A.electrical_life" in [a.field for a in side.assumptions]


def test_gaps_are_filled_and_listed(panel, catalogue):
    made = panel(**outputs({"kind": "relay"}, {"kind": "logic"}, {"kind": "analogue"}))
    for kind in ("relay", "logic", "analogue"):
        side = controller_side(made, catalogue, kind)
        assert side.assumptions
    assert controller_side(made, catalogue, "analogue").signal == "4-20 mA"


def test_the_weakest_is_taken(panel, catalogue):
    made = panel(controllers=[
        {"name": "A", "outputs": [{"kind": "relay", "rating": "5 A"}]},
        {"name": "B", "outputs": [{"kind": "relay", "rating": "1 A"}]},
    ])  # fmt: skip
    assert controller_side(made, catalogue, "relay").controller == "B"


def test_what_no_controller_has(panel, catalogue):
    made = panel(**outputs({"kind": "analogue", "signal": "0-10 V"}))
    assert controller_side(made, catalogue, "relay").needs == ("controllers.outputs",)
    assert isinstance(controller_side(made, catalogue, "analogue", signal="4-20 mA"), Unsized)
    assert controller_side(panel(controllers=[{"name": "A"}]), catalogue, "relay").rating == 2.0


def test_coil_current(panel, catalogue):
    """5 W at 24 V; typical coils are made for 48 V at the same power, a listed one is for its own voltage."""
    coil = catalogue.contactors[0].coil
    on_48 = panel(control_supply={"voltage": "48 V", "kind": "dc", "capacity": "2 A"})
    assert coil_current(coil, "K", panel(), any_voltage=False).hold == pytest.approx(float(coil.power) / 24)
    assert coil_current(coil, "K", on_48, any_voltage=True).hold == pytest.approx(float(coil.power) / 48)
    assert isinstance(coil_current(coil, "K", on_48, any_voltage=False), Unsized)
    a_c = catalogue.contactors[1].coil
    on_230 = panel(control_supply={"voltage": "230 V", "kind": "ac", "capacity": "2 A"})
    found = coil_current(a_c, "K", on_230, any_voltage=False)
    assert (found.hold, found.inrush) == (pytest.approx(9 / 230 * 1.1), pytest.approx(75 / 230 * 1.1))
