"""Site checks as ordered data: what to do, what to expect, how near, and what a deviation means."""

from collections.abc import Iterator

from specgen.core.say import Said
from specgen.design.check import GROUPS, Check, Group
from specgen.design.checks_cold import cold_checks
from specgen.design.checks_energise import energise_checks
from specgen.design.checks_running import first_run_checks, hand_over_checks
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel


def site_checks(decided: DecidedLoop, panel: Panel) -> tuple[Check, ...]:
    """Return the checks of a loop in the order in which they are done.

    Parameters
    ----------
    decided : DecidedLoop
        The loop.
    panel : Panel
        The panel it stands in.

    Returns
    -------
    tuple of Check
        Group by group; an open loop has those that can be done, and those whose expected value is not known say so.
    """
    return (
        *energise_checks(decided, panel),
        *cold_checks(decided),
        *first_run_checks(decided),
        *hand_over_checks(decided, panel),
    )


def panel_checks(panel: Panel) -> tuple[Check, ...]:
    """Return the checks of the panel as a whole, before those of any loop."""
    return tuple(_panel_checks(panel))


def _panel_checks(panel: Panel) -> Iterator[Check]:
    own = panel.panel.reference
    supply, control = panel.supply, panel.control_supply
    isolator = "the panel's own isolator" if supply.isolator else "the isolator upstream: this panel has none of its own"
    yield Check(
        f"{own}.energise.isolation",
        "energise",
        f"Lock off {isolator}, prove dead between all conductors and to earth",
        "dead",
        meaning="A voltage that is left comes from another supply: find and isolate it before anything else.",
    )
    yield Check(
        f"{own}.energise.bonding",
        "energise",
        "Continuity from the incoming earth to door, mounting plate and every socket",
        Said(0.1, "resistance"),
        bound="or less",
        meaning="More is a joint that is painted, loose or missing.",
    )
    yield Check(
        f"{own}.energise.insulation",
        "energise",
        "Insulation of the incoming conductors to earth, 500 V d.c., electronics unplugged",
        "1 MΩ",
        bound="or more",
        meaning="Less is damp or a damaged conductor: split the circuits and measure each.",
    )
    yield Check(
        f"{own}.energise.voltage",
        "energise",
        "Voltage of the supply before the panel is switched on",
        Said(supply.voltage, "voltage"),
        tolerance=Said(supply.voltage * supply.tolerance, "voltage"),
        meaning="Outside, every heater's power and every figure of the sheets is another: change supply.tolerance and decide again.",
    )
    if supply.phases > 1:
        yield Check(
            f"{own}.energise.rotation",
            "energise",
            "Rotation of the phases at the incomer",
            "clockwise, L1 L2 L3",
            meaning="Motors turn backwards: exchange two incoming conductors, never two at one motor only.",
        )
    yield Check(
        f"{own}.energise.control",
        "energise",
        "Voltage of the control supply, all coils on",
        Said(control.voltage, "voltage"),
        tolerance=Said(0.1 * control.voltage, "voltage"),
        meaning="Less is overload: see rule E4.",
    )
    yield Check(
        f"{own}.cold.stop",
        "cold",
        "Press every emergency stop in turn",
        "every chain opens and stays open until a start by hand",
        meaning="A chain that closes by itself is wired past its latch: do not go on.",
    )


__all__ = ["GROUPS", "Check", "Group", "panel_checks", "site_checks"]
