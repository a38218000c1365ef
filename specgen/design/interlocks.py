"""The interlock chain of a loop as ordered data: drawing, terminals, parts and checks all take it from here."""

from dataclasses import dataclass
from typing import Literal

from specgen.design.designation import designation
from specgen.rules.base import Case
from specgen.rules.declared import field
from specgen.sizing.feeder import Feeder
from specgen.sizing.limiter import SWITCHES, AlarmDesign, LimiterDesign, Switch

Kind = Literal["emergency_stop", "overload", "cut_out", "proof", "limiter", "pair", "burner_control"]


@dataclass(frozen=True, slots=True)
class Interlock:
    """One contact of the chain.

    ``designation`` is complete; ``acts_on`` are the designations that lose their supply when it opens. ``returns`` tells what closes it
    again. ``because`` names the rule or declaration that asks for it.
    """

    designation: str
    kind: Kind
    what: str
    contact: str
    returns: str
    acts_on: tuple[str, ...]
    because: str


@dataclass(frozen=True, slots=True)
class Own:
    """A part that the chain brings along: product aspect, what it is, rating [A] where it has one, quantity."""

    product: str
    what: str
    rating: float | None
    quantity: int


# the products of the chain never depend on what else is there, so that nothing is renumbered when something is added
PROOFS = {"airflow": ("B4", "airflow switch"), "level": ("B5", "level switch"), "flow": ("B6", "flow switch")}
CUT_OUT = "B7"
PAIR = "K8"
BURNER_CONTROL = "K9"
_OPENS = "normally closed, opens to stop"
_PROVES = "closed only while proven, opens to stop"


def switches_off(case: Case, limiter: LimiterDesign | None) -> Switch | None:
    """Return what -Q2 is: the limiter's switching device, or that of the proofs that a heater needs; None where there is none."""
    if limiter is not None:
        return limiter.switch
    return "contactor" if case.traits.electric_heat and _needs(case) else None


def chain_of(case: Case, limiter: LimiterDesign | None, pairs: tuple[str, ...] = ()) -> tuple[Interlock, ...]:
    """Return the chain in the order in which it is wired: what stops everything first, what switches last.

    Parameters
    ----------
    case : Case
        The chosen candidate's.
    limiter : LimiterDesign or None
        The loop's.
    pairs : tuple of str
        Tags of the loops that must never be on together with this one (rule A5).
    """
    tag = case.loop.tag
    ends = (designation(tag, _end(case, limiter)),)
    made: list[Interlock] = []

    def add(name: str, kind: Kind, what: str, contact: str, returns: str, because: str) -> None:
        made.append(Interlock(name, kind, what, contact, returns, ends, because))

    if _can_hurt(case):
        stop = designation(case.panel.panel.reference, "S1")
        add(stop, "emergency_stop", "emergency-stop group of the panel", _OPENS, "unlatching, then a start by hand",
            "common practice; whether one is needed, and where, the risk assessment decides")  # fmt: skip
    feeder = case.feeder
    if case.traits.motor and isinstance(feeder, Feeder):
        for number in range(len(feeder.branches)):
            # F2 is the limiter's
            overload = designation(tag, f"F{number + 2}" if number else "F1")
            add(overload, "overload", "auxiliary contact of the motor's overload release", _OPENS, "a reset by hand", "IEC 60947-4-1")
    if case.traits.may_refrigerate and field(case, "element.refrigerant_circuit") is True:
        add(designation(tag, CUT_OUT), "cut_out", "high-pressure cut-out", _OPENS, "a reset by hand", "rule S6")
    for need in _needs(case):
        product, what = PROOFS[need]
        add(designation(tag, product), "proof", f"{what}: proven {need}", _PROVES, "the proof itself", "rule S5")
    if limiter is not None:
        again = "a reset by hand at -S2, once the value has come back" if limiter.resets == "manual" else "the value's return"
        add(designation(tag, "F2"), "limiter", "limiter's contact", _OPENS, again, "rule S1" if not limiter.declared else "limits.limiter")
    for other in pairs:
        add(designation(other, PAIR), "pair", f"{other} is on", "opens while the other loop is on", "the other loop going off", "rule A5")
    if case.traits.burner:
        add(designation(tag, BURNER_CONTROL), "burner_control", "certified burner control: this chain is its safety input",
            "lets the burner start only while the chain is closed", "its own sequence", "rule M7")  # fmt: skip
    return tuple(made)


def own_parts(case: Case, limiter: LimiterDesign | None, alarm: AlarmDesign | None, pairs: tuple[str, ...] = ()) -> tuple[Own, ...]:
    """Return the parts that limiter, alarm and chain bring along, one a designation."""
    found: list[Own] = []
    quantity = case.loop.need.quantity
    measured = quantity if quantity != "other" else case.loop.unit.symbol
    if limiter is not None:
        found.append(Own("F2", f"limiter, {measured}, {limiter.resets} reset", None, 1))
        found.append(Own("B2", f"sensor of the limiter, its own, {limiter.sensor} typical", None, 1))
        if limiter.resets == "manual":
            found.append(Own("S2", "reset of the limiter, by hand", None, 1))
    switch = switches_off(case, limiter)
    if switch is not None:
        whose = "limiter" if limiter is not None else "interlock chain"
        found.append(Own("Q2", f"switching device of the {whose}: {SWITCHES[switch]}", None, 1))
    if alarm is not None:
        found.append(Own("B3", f"sensor of the independent alarm, {alarm.sensor} typical", None, 1))
        found.append(Own("P1", f"alarm lamp and horn, {alarm.side}, independent of the loop", None, 1))
    found += [Own(PROOFS[need][0], PROOFS[need][1], None, 1) for need in _needs(case)]
    if case.traits.may_refrigerate and field(case, "element.refrigerant_circuit") is True:
        found.append(Own(CUT_OUT, "high-pressure cut-out", None, 1))
    if pairs:
        found.append(Own(PAIR, f"interlock relay against {', '.join(pairs)}", None, 1))
    if case.traits.burner:
        found.append(Own(BURNER_CONTROL, "burner control, certified", None, 1))
    return tuple(found)


def _needs(case: Case) -> tuple[str, ...]:
    declared = field(case, "element.needs")
    return tuple(str(need) for need in declared) if isinstance(declared, tuple) else ()


def _can_hurt(case: Case) -> bool:
    traits = case.traits
    drive = traits.analogue_input and not traits.valve
    return traits.heats or traits.motor or drive or case.loop.limits.consequence in ("injury", "fire")


def _end(case: Case, limiter: LimiterDesign | None) -> str:
    """Return the product that the chain takes the supply from."""
    if switches_off(case, limiter) is not None:
        return "Q2"
    if case.traits.burner:
        return BURNER_CONTROL
    return {"relay": "K1", "relay_pair": "K1", "signal": "M1"}.get(case.candidate.device, "Q1")
