"""A device as the rules of the family see it, every number given in the test."""

import pytest

from specgen.sizing.device import Contact, DeviceChoice


@pytest.fixture
def device():
    def make(name="solid-state switch 25 A", *, rates=(), **changes):
        chain = tuple(Contact("the load", "load", f"contact {rate}", 14.0, 1e6, rate, 0.07, 0.03) for rate in rates)
        made = {"rating": 25.0, "current": 14.0, "poles": 3, "lines": 3, **changes}
        return DeviceChoice(name, "AC-51", "logic", chain, **made)

    return make
