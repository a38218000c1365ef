"""Around a burner control: the chain into its safety input, the demand for heat, and the valves it opens itself."""

from specgen.design.panel.fitted import suppressors_fitted
from specgen.design.wiring.chain import chain_steps
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.load import load_element
from specgen.design.wiring.power import draws_power, suppressor, switch_element
from specgen.design.wiring.types import Joint, Path, Step

TOP, OUT, CHAIN, BACK, END = 0, 1, 2, 70, 80
_CONTACT = {"contactor": ("pole", "1/L1", "2/T1"), "relay": ("make_contact", "11", "14")}


def burner(draft: Draft, facts: Facts) -> None:
    """Draw up what a burner control is wired to; it feeds all of it."""
    if not facts.decided.traits.burner:
        return
    own = draft.element(facts.own("K9"), "burner control, certified")
    _demand(draft, facts, own)
    if any(link.kind != "burner_control" for link in facts.chain):
        out = draft.terminal(OUT, "above")
        contacts = chain_steps(draft, facts, CHAIN)
        back = draft.terminal(BACK, "below")
        ends = Step(own, "box", "", "SC", TOP, text="safety chain"), Step(own, "box", "SI", "", END, text="safety input")
        draft.circuit("chain", "Safety chain of the burner", [draft.path([ends[0], out, *contacts, back, ends[1]], base="chain of -K9")])
    if facts.decided.safety is not None and facts.decided.safety.switch == "burner_valves":
        valve = draft.element(facts.own("Q2"), "safety shut-off valves of the burner")
        there = draft.path([Step(own, "box", "", "V", TOP, text="valves"), Step(valve, "valve_coil", "A1", "", END)], base="V of -K9")
        away = draft.path([Step(own, "box", "", "N", TOP), Step(valve, "valve_coil", "A2", "", END)], base="N of -K9")
        draft.circuit("valves", "Wiring of the burner itself", [there, away])


def _demand(draft: Draft, facts: Facts, own: str) -> None:
    """Ask for heat by a contact that the burner control feeds, where this panel does not."""
    if draws_power(facts) or facts.kind not in _CONTACT:
        return
    load = load_element(draft, facts)
    staged = facts.decided.traits.staged
    steps = [
        Step(own, "box", "", "L", TOP, text="heat demand"), draft.terminal(OUT, "above"),
        Step(switch_element(draft, facts), *_CONTACT[facts.kind], CHAIN), draft.terminal(BACK, "below"),
        Step(load, "burner", "stage 1" if staged else "L", "", END),
    ]  # fmt: skip
    paths: list[Path] = [draft.path(steps, base="L of -K9")]
    if staged:
        draft.leave_open("The output of the second stage is not sized: it switches the same circuit as the first.")
        controller = draft.element(facts.own("A1"), "controller")
        second = [
            Step(controller, "output_contact", "O2.1", "O2.2", CHAIN), draft.terminal(BACK, "below"),
            Step(load, "burner", "stage 2", "", END),
        ]  # fmt: skip
        paths.append(draft.path(second, Joint(0, CHAIN)))
    across = [item for item in suppressors_fitted(facts.decided, facts.switch) if item.across == f"{facts.load}1"]
    if across:
        # the control's own return comes to the panel for the suppressor alone
        paths.append(draft.path([Step(own, "box", "", "N", TOP), draft.terminal(BACK, "above")], base="N of -K9"))
    last = Joint(len(paths) - 1, BACK)
    draft.circuit("demand", "Demand for heat", paths, [suppressor(draft, facts, item, Joint(0, BACK), last) for item in across])
