"""M3: what only switches never takes a continuous signal."""

from specgen.rules.base import Case, Finding, Rule

rule = Rule(code="M3", name="A switch does not throttle", weight="must")

SWITCHES = {"relay": "relay", "contactor": "contactor", "ssr": "solid-state switch"}
FOLLOWERS = {"power_controller": "power controller", "signal": "signal"}


def examine(case: Case) -> Finding:
    """Match output and device: a power controller makes any electric heat analogue; a bare signal needs an element that reads it."""
    mode, device = case.candidate.mode, case.candidate.device
    if mode == "three_point":
        return rule.judge(holds=device == "relay_pair", text="A three-point output is a pair of relays, one to raise and one to lower.")
    if mode == "analogue":
        if device == "power_controller":
            able = case.traits.electric_heat
            return rule.judge(
                holds=able,
                text="A power controller makes the electric heat follow a continuous output."
                if able
                else "A power controller throttles electric heat; this element is none.",
            )
        if device == "signal":
            able = case.traits.analogue_input
            return rule.judge(
                holds=able, text="The element reads the signal itself." if able else "The element has no input that could read a signal."
            )
        named = SWITCHES.get(device, "pair of relays")
        return rule.judge(holds=False, text="A {device} knows on and off; it cannot follow a continuous output.", device=named)
    if device in SWITCHES:
        return rule.judge(holds=True, text="A {device} takes pulses.", device=SWITCHES[device])
    return rule.judge(
        holds=False, text="A {device} is not made for an output that is only on or off.", device=FOLLOWERS.get(device, "pair of relays")
    )
