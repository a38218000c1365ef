"""Candidates: every pair of mode and output that the trade uses."""

from dataclasses import dataclass
from typing import Literal

from specgen.model.loop import Mode, Output

Device = Output

ORDER: tuple[Device, ...] = ("relay", "contactor", "ssr", "power_controller", "signal", "relay_pair")


@dataclass(frozen=True, slots=True)
class Candidate:
    """One way to drive the element."""

    mode: Mode
    device: Device


CANDIDATES = (
    Candidate("on_off", "relay"),
    Candidate("on_off", "contactor"),
    Candidate("on_off", "ssr"),
    Candidate("time_proportioned", "relay"),
    Candidate("time_proportioned", "contactor"),
    Candidate("time_proportioned", "ssr"),
    Candidate("analogue", "power_controller"),
    Candidate("analogue", "signal"),
    Candidate("three_point", "relay_pair"),
)


@dataclass(frozen=True, slots=True)
class Unsized:
    """Why something could not be computed, and the fields that would settle it (paths such as ``plant.dead_time``)."""

    because: str
    needs: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Assumption:
    """Something taken for granted: the field it stands for, the value used, and why."""

    field: str
    value: str
    why: str


ControllerOutputKind = Literal["relay", "logic", "analogue", "relay_pair"]


@dataclass(frozen=True, slots=True)
class NoCandidate(Unsized):
    """The pair is not considered at all: nobody would wire it (a relay for a motor)."""


@dataclass(frozen=True, slots=True)
class Unsuited(Unsized):
    """The kind of device does not suit the element at all; the mode's own rules (M2 to M4) say so."""
