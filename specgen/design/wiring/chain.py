"""The interlock chain as steps of a path: what stands in the field goes out and comes back over terminals."""

from specgen.design.designation import designation
from specgen.design.interlocks import Interlock
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.types import Step

_SYMBOLS = {
    "emergency_stop": "emergency_stop", "overload": "overload_contact", "cut_out": "cut_out", "proof": "proof",
    "limiter": "limiter_contact", "pair": "break_contact",
}  # fmt: skip
_PINS = {"overload": ("95", "96"), "limiter": ("11", "12")}
_SHARED = ("emergency_stop", "pair")  # contacts of an element that other loops' circuits use too
_IN_THE_FIELD = ("cut_out", "proof")


def chain_steps(draft: Draft, facts: Facts, row: int) -> list[Step]:
    """Return the chain's contacts in order from a row on; a burner control at its end is left to the circuit that ends in it."""
    made: list[Step] = []
    for link in facts.chain:
        if link.kind == "burner_control":
            continue
        contact = _contact(draft, facts, link, row + len(made) + (link.kind in _IN_THE_FIELD))
        if link.kind in _IN_THE_FIELD:
            out = draft.terminal(row + len(made), "below")
            made += [out, contact, draft.terminal(row + len(made) + 2, "above")]
        else:
            made.append(contact)
    return made


def _contact(draft: Draft, facts: Facts, link: Interlock, row: int) -> Step:
    limiter = facts.decided.limiter
    figures = (("at", limiter.set, "value"),) if link.kind == "limiter" and limiter is not None and limiter.set is not None else ()
    what = {"emergency_stop": "emergency stop", "limiter": "limiter", "overload": "overload"}.get(link.kind, link.what)
    name = draft.element(link.designation, what, *figures)
    enter, leave = _PINS.get(link.kind, ("1", "2"))
    if link.kind in _SHARED:
        # a contact of its own for each loop: which, is for whoever designs what they share
        own = designation(draft.tag, "").strip("=-")
        enter, leave = f"{own}.1", f"{own}.2"
    return Step(name, _SYMBOLS[link.kind], enter, leave, row)
