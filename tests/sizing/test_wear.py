"""How long a chain of contacts lasts, by arithmetic."""

from math import inf

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.contact_life import years_of_life
from specgen.sizing.device import Contact, DeviceChoice
from specgen.sizing.wear import allowed_per_hour, hours_per_year, weakest


def contact(what, life):
    return Contact(what, "load", what, 5.0, life, 600.0, 0.02, 0.015)


def choice(*contacts):
    return DeviceChoice("device", "AC-1", "relay", contacts, 1)


def test_the_weakest_of_a_chain():
    found = weakest(choice(contact("relay", 3e5), contact("contactor", 1e6), contact("sensor", None)))
    assert (found.contact.what, found.operations) == ("relay", 3e5)
    assert weakest(choice(contact("thyristor", None))) is None
    assert weakest(choice()) is None
    assert weakest(Unsized("no device")) is None


def test_hours_of_the_loop_or_the_panel(loop, panel):
    shop = panel(duty={"hours_per_day": "8 h", "days_per_year": "200"})
    assert hours_per_year(loop(), shop) == pytest.approx(1600)
    own = loop(need={"duty": {"hours_per_day": "24 h", "days_per_year": "365"}})
    assert hours_per_year(own, shop) == pytest.approx(8760)
    assert hours_per_year(loop(), panel()) == pytest.approx(4000), "16 h on 250 days where nothing is written"


def test_a_million_operations_at_100000_a_year_are_ten_years():
    assert years_of_life(1e6, 1e5) == pytest.approx(10)
    assert years_of_life(1e6, 0.0) == inf


@pytest.mark.parametrize(("operations", "years"), [(1e5, 10), (2.5e6, 15), (4e4, 1)])
def test_what_is_allowed_an_hour_gives_the_life_asked_for(loop, panel, operations, years):
    """ISO 13849-1 annex C: n_op from hours, days and the time between operations; the same arithmetic backwards."""
    rate = allowed_per_hour(operations, panel(house={"contact_life": f"{years} year"}), loop())
    assert rate == pytest.approx(operations / years / 4000)
    assert years_of_life(operations, rate * 4000) == pytest.approx(years)
