"""The power path of a loop: from the supply over protection and switches to terminals and load."""

from collections.abc import Sequence

from specgen.design.panel.fitted import Fitted, suppressors_fitted
from specgen.design.panel.schedules import numbered
from specgen.design.wiring.chain import chain_steps
from specgen.design.wiring.draft import Draft, behind
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.load import load_element, load_pins, load_symbol
from specgen.design.wiring.types import Across, Joint, Path, Rail, Step

# rows of a power circuit, closed up where nothing stands in one
F, Q3, Q2, CHAIN, SWITCH, X1, LOAD = 0, 1, 2, 10, 40, 50, 60
POLES = (("1/L1", "2/T1"), ("3/L2", "4/T2"), ("5/L3", "6/T3"))
PLAIN = (("1", "2"), ("3", "4"), ("5", "6"))
RELAY = (("11", "14"), ("21", "24"), ("31", "34"))
_PROTECTIONS = {
    "circuit_breaker": "breaker", "fuse": "fuse", "motor_starter": "motor_breaker", "semiconductor_fuse": "fuse",
}  # fmt: skip
_SAID = {
    "circuit_breaker": "circuit breaker", "fuse": "fuse", "motor_starter": "motor protective breaker",
    "semiconductor_fuse": "semiconductor fuse",
}  # fmt: skip
_SWITCHES = {"contactor": "pole", "ssr": "semiconductor", "power_controller": "power_controller", "relay": "make_contact"}


def power(draft: Draft, facts: Facts) -> None:
    """Draw up the power circuits; none where the element takes nothing from this panel."""
    if not draws_power(facts):
        return
    conductors = facts.place
    live = tuple(name for name in conductors if name not in ("N", facts.control_names[1]))
    returns = tuple(name for name in conductors if name not in live)
    if len(facts.branches) > 1:
        rails = _common(draft, facts, live)
        for number in range(len(facts.branches)):
            _branch(draft, facts, number, rails, returns, switched=False)
        return
    rails = [facts.rail(name) for name in live]
    _branch(draft, facts, 0, rails, returns, switched=True)


def draws_power(facts: Facts) -> bool:
    """Tell whether the load is fed over this panel, or would be if it could be sized."""
    if facts.kind == "relay_pair":
        return False
    if facts.feeder is not None or facts.switches_in_panel:
        return True
    traits = facts.decided.traits
    if traits.burner or (traits.analogue_input and getattr(facts.loop.element, "voltage", None) is None):
        return False
    return not (traits.valve and traits.analogue_input)


def _common(draft: Draft, facts: Facts, live: Sequence[str]) -> list[Rail]:
    """Draw up what several protected circuits share: the switches, which carry them all."""
    columns = [_switching(draft, facts, at, len(live)) for at in range(len(live))]
    paths, rails = [], []
    for name, steps in zip(live, columns, strict=True):
        feed = facts.rail(name)
        last = steps[-1] if steps else None
        rails.append(feed if last is None else Rail(behind(name, last.element), last.foot))
        if last is not None:
            paths.append(draft.path(steps, feed, rails[-1]))
    draft.circuit("switching", "Power, common to the circuits", paths)
    return rails


def _switching(draft: Draft, facts: Facts, at: int, count: int) -> list[Step]:
    """Return the switches in one live conductor, the loop's own last."""
    made: list[Step] = []
    if facts.device is not None and facts.device.isolator:
        made.append(Step(draft.element(facts.own("Q3"), f"isolates: {facts.device.isolator}"), "pole", *POLES[at], Q3))
    if facts.switches_in_panel:
        made.append(Step(chain_switch(draft, facts), "pole", *POLES[at], Q2))
    if facts.own_relay and facts.chain_end == "K1" and at == 0:
        made += chain_steps(draft, facts, CHAIN)
    if facts.kind in _SWITCHES and at in _switched(facts, count):
        made.append(Step(switch_element(draft, facts), _SWITCHES[facts.kind], *(RELAY if facts.kind == "relay" else POLES)[at], SWITCH))
    return made


def _switched(facts: Facts, count: int) -> tuple[int, ...]:
    """Return which of the live conductors the device opens; of three with two poles the middle one stays closed."""
    poles = facts.device.poles if facts.device is not None and facts.kind in ("ssr", "power_controller") else count
    if count == len(POLES) and poles == 2:  # noqa: PLR2004  two poles
        return (0, 2)
    return tuple(range(min(poles, count)))


def chain_switch(draft: Draft, facts: Facts) -> str:
    """Enter the contactor of the interlock chain and return its designation."""
    if facts.switch is not None:
        return draft.element(facts.own("Q2"), facts.switch.name)
    draft.leave_open("-Q2 is not sized: no listed contactor is rated for this load in its utilisation category.")
    return draft.element(facts.own("Q2"), "contactor of the interlock chain", unknown="not sized")


def switch_element(draft: Draft, facts: Facts) -> str:
    """Enter the loop's own switching device and return its designation."""
    product = "K1" if facts.kind in ("relay", "relay_pair") else "Q1"
    words = {"ssr": "solid-state switch", "power_controller": "power controller", "contactor": "contactor"}.get(facts.kind, "relay")
    if facts.device is None:
        draft.leave_open(f"-{product} is not sized: {facts.unsized}")
        return draft.element(facts.own(product), words, unknown="not sized")
    name = facts.device.name.removeprefix("two of ")
    return draft.element(facts.own(product), name)


def protection(draft: Draft, facts: Facts, number: int) -> tuple[str, str]:
    """Enter the protection of a circuit; return its designation and symbol."""
    name = facts.own(numbered("F", number))
    if number >= len(facts.branches):
        draft.leave_open(f"-{numbered('F', number)} is not sized: {getattr(facts.case.feeder, 'because', '')}")
        return draft.element(name, "protection", unknown="not sized"), "breaker"
    chosen = facts.branches[number].protection
    what = f"{_SAID[chosen.kind]}{f' {chosen.curve}' if chosen.curve else ''}"
    figures = [("", chosen.rating, "current")] + ([("set to", chosen.setting, "current")] if chosen.setting is not None else [])
    return draft.element(name, what, *figures), _PROTECTIONS[chosen.kind]


def _branch(draft: Draft, facts: Facts, number: int, rails: Sequence[Rail], returns: Sequence[str], *, switched: bool) -> None:
    name, symbol = protection(draft, facts, number)
    load = load_element(draft, facts, number)
    drawn = load_symbol(facts)
    pins = load_pins(facts, len(rails), returns)
    marks = POLES if symbol == "motor_breaker" else PLAIN
    paths: list[Path] = []
    for at, rail in enumerate(rails):
        steps = [Step(name, symbol, *marks[at], F)]
        steps += _switching(draft, facts, at, len(rails)) if switched else []
        steps += [draft.terminal(X1, "below"), Step(load, drawn, pins[at], "", LOAD)]
        paths.append(draft.path(steps, rail))
    for at, conductor in enumerate(returns, len(rails)):
        steps = [draft.terminal(X1, "below"), Step(load, drawn, pins[at], "", LOAD)]
        paths.append(draft.path(steps, facts.rail(conductor)))
    across = _across_load(draft, facts) if len(paths) == 2 else []  # noqa: PLR2004  there and back
    _second_stage(draft, facts, paths, load, drawn)
    if facts.earthed:
        earth = [draft.terminal(X1, "below"), Step(load, drawn, "PE", "", LOAD)]
        paths.append(draft.path(earth, facts.rail("PE")))
    words = "Power" if len(facts.branches) < 2 else f"Power, circuit {number + 1}"  # noqa: PLR2004  the first of several
    draft.circuit("power", words, paths, across)


def _across_load(draft: Draft, facts: Facts) -> list[Across]:
    target = f"{facts.load}1"
    fitted = [item for item in suppressors_fitted(facts.decided, facts.switch) if item.across == target]
    return [suppressor(draft, facts, item, Joint(0, X1), Joint(1, X1)) for item in fitted]


def suppressor(draft: Draft, facts: Facts, item: Fitted, first: Joint, last: Joint | None = None) -> Across:
    """Enter a suppressor and lay it across a coil, or between two conductors."""
    name = draft.element(facts.own(item.product), item.part.part)
    return Across(name, suppressor_symbol(item.part.part), first, last)


def suppressor_symbol(part: str) -> str:
    """Return the symbol of a suppressor by what it is.

    Examples
    --------
    >>> suppressor_symbol("diode with Zener diode"), suppressor_symbol("RC unit 100 nF, 100 ohm"), suppressor_symbol("varistor")
    ('diode', 'rc', 'varistor')
    """
    return "diode" if part.startswith("diode") else "rc" if part.startswith("RC") else "varistor"


def _second_stage(draft: Draft, facts: Facts, paths: list[Path], load: str, drawn: str) -> None:
    """Add the second stage of a burner, switched by another output of the controller."""
    if not facts.decided.traits.staged:
        return
    draft.leave_open("The output of the second stage is not sized: it switches the same circuit as the first.")
    controller = draft.element(facts.own("A1"), "controller")
    steps = [
        Step(controller, "output_contact", "O2.1", "O2.2", SWITCH), draft.terminal(X1, "below"), Step(load, drawn, "stage 2", "", LOAD),
    ]  # fmt: skip
    paths.append(draft.path(steps, Joint(0, SWITCH)))
