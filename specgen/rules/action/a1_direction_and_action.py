"""A1: raising the value by more output is reverse acting, lowering it is direct acting."""

from specgen.rules.base import Case, Finding, Rule

rule = Rule(code="A1", name="Action follows from direction", weight="must")


def examine(case: Case) -> Finding:
    """Refuse electric heat that is said to lower a temperature: with the wrong action the output drives to one end and stays there."""
    if case.loop.raises:
        return rule.judge(holds=True, text="More output raises the value: reverse acting, the output rises as the value falls.")
    if case.traits.electric_heat and case.loop.need.quantity == "temperature":
        return rule.judge(
            holds=False,
            text="need.direction says that more output lowers the temperature, and the element turns its power into heat: the output would "
            "drive to one end and stay there.",
        )
    return rule.judge(holds=True, text="More output lowers the value: direct acting, the output rises with the value.")
