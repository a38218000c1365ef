"""A valve that travels: raise and lower from one potential, locked against each other by a break contact of the first relay."""

from specgen.design.panel.fitted import suppressors_fitted
from specgen.design.wiring.chain import chain_steps
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.load import load_element, load_symbol
from specgen.design.wiring.power import CHAIN, LOAD, PLAIN, SWITCH, X1, F, protection, suppressor, switch_element
from specgen.design.wiring.types import Joint, Step

LOCK = SWITCH - 1


def travel(draft: Draft, facts: Facts) -> None:
    """Draw up the circuit of a pair of relays.

    Notes
    -----
    The second relay is fed over the break contact of the first, so that both windings never carry current whatever the controller
    does: it takes a change-over contact of the first relay alone (common practice, no source).
    """
    if facts.kind != "relay_pair":
        return
    fuse, symbol = protection(draft, facts, 0)
    first = switch_element(draft, facts)
    what = facts.device.name.removeprefix("two of ") if facts.device is not None else "relay"
    second = draft.element(facts.own("K2"), what, unknown="" if facts.device is not None else "not sized")
    motor, drawn = load_element(draft, facts), load_symbol(facts)
    conductors = facts.place
    chain = chain_steps(draft, facts, CHAIN) if facts.own_relay and facts.chain_end == "K1" else []
    up = [
        Step(fuse, symbol, *PLAIN[0], F), *chain, Step(first, "make_contact", "11", "14", LOCK), draft.terminal(X1, "below"),
        Step(motor, drawn, "raise", "", LOAD),
    ]  # fmt: skip
    down = [
        Step(first, "break_contact", "11", "12", LOCK), Step(second, "make_contact", "11", "14", SWITCH), draft.terminal(X1, "below"),
        Step(motor, drawn, "lower", "", LOAD),
    ]  # fmt: skip
    paths = [draft.path(up, facts.rail(conductors[0])), draft.path(down, Joint(0, LOCK))]
    common = conductors[-1]
    paths.append(draft.path([draft.terminal(X1, "below"), Step(motor, drawn, "common", "", LOAD)], facts.rail(common)))
    fitted = [item for item in suppressors_fitted(facts.decided, facts.switch) if item.across == f"{facts.load}1"]
    across = [suppressor(draft, facts, item, Joint(at, X1), Joint(2, X1)) for at, item in enumerate(fitted)]
    if facts.earthed:
        paths.append(draft.path([draft.terminal(X1, "below"), Step(motor, drawn, "PE", "", LOAD)], facts.rail("PE")))
    if facts.own_relay:
        draft.leave_open(
            "-K1 needs a change-over contact: its break side feeds -K2, so that raise and lower are never on together. "
            "Where the controller's relay has none, plug-in relays take its place."
        )
    draft.circuit("power", "Power, raise and lower", paths, across)
