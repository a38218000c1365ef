"""What the sizes fit around a loop's devices, by designation: suppressors across coils, relays before them, the control circuit's own."""

from collections.abc import Iterator
from dataclasses import dataclass

from specgen.design.panel.schedules import load_letter
from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import DeviceChoice, Suppressor

FUSE = "F90"
"""Protection of the loop's own control circuits; far from F1, F2 and the further circuits' F3, F4 and so on."""
COIL = "the coil of "


@dataclass(frozen=True, slots=True)
class Fitted:
    """A suppressor by its product aspect, the product whose coil it lies across, and what it is."""

    product: str
    across: str
    part: Suppressor


def suppressors_fitted(decided: DecidedLoop, switch: DeviceChoice | None) -> tuple[Fitted, ...]:
    """Return every suppressor of a loop, in the order of its numbers: the device's, then those of the chain's own contactor."""
    device, pair = decided.decision.chosen.case.device, decided.decision.chosen.case.candidate.device == "relay_pair"
    made: list[Fitted] = []

    def fit(across: str, part: Suppressor) -> None:
        made.append(Fitted(f"R{len(made) + 1}", across, part))

    if not isinstance(device, Unsized):
        targets = list(_coils(decided, device))
        for part in device.suppressors:
            if part.across == "the element":
                # both windings of an actuator that travels
                for _ in range(2 if pair else 1):
                    fit(f"{load_letter(decided)}1", part)
                continue
            name = part.across.removeprefix(COIL)
            target = next((item for item in targets if item[1] == name), None)
            if target is None:
                # of a relay that only a contactor of its own output would need
                continue
            targets.remove(target)
            fit(target[0], part)
            if pair and target[0] == "K1":
                fit("K2", part)
    for part in switch.suppressors if switch is not None else ():
        # the chain drives its contactor itself: no relay stands between; a load that is a coil has its own already
        if switch is not None and part.across == f"{COIL}{switch.name}":
            fit("Q2", part)
    return tuple(made)


def _coils(decided: DecidedLoop, device: DeviceChoice) -> Iterator[tuple[str, str]]:
    kind = decided.decision.chosen.case.candidate.device
    letter = "K1" if kind in ("relay", "relay_pair") else "Q1"
    yield letter, device.name.removeprefix("two of ")
    for number, contact in enumerate(contact for contact in device.chain if contact.role == "interposing"):
        yield interposing_product(kind, number), contact.name
    if device.isolator:
        yield "Q3", device.isolator


def interposing_product(kind: str, number: int) -> str:
    """Return the product of a relay before the device: after the device's own -K1, or -K1 and -K2 of a pair.

    Examples
    --------
    >>> interposing_product("contactor", 0), interposing_product("relay", 0), interposing_product("relay_pair", 0)
    ('K1', 'K2', 'K3')
    """
    return f"K{number + {'relay': 2, 'relay_pair': 3}.get(kind, 1)}"
