"""O5: the device survives its short-circuit protection."""

from specgen.core.say import Said, amperes
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import over
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import Feeder, NotFed

FAULT = "supply.prospective_fault_current"
rule = Rule(code="O5", name="Short-circuit protection", weight="must", cites=("IEC 60947-4-1 clause 8.2.5", "IEC 60947-4-3"))


def examine(case: Case) -> Finding:
    """Hold the let-through of a semiconductor's fuse, or the rating before a contact, against what the device stands.

    Where the device's data do not say what it stands, or the fault current is not declared, an open point is kept.
    """
    feeder = case.feeder
    if isinstance(case.device, Unsized) or case.device.rating is None or isinstance(feeder, NotFed):
        return rule.does_not_apply("No device of the panel carries the load's fault current.")
    if not isinstance(feeder, Feeder):
        return rule.unsized(feeder)
    survival = feeder.survival
    if survival is None:
        return rule.does_not_apply("Nothing is known to stand in the circuit.")
    fault = "" if survival.fault_current is not None else " The fault current is not declared: its breaking capacity is an open point."
    words = {"sees": Said(survival.sees, survival.dimension)}
    if survival.withstands is None:
        text = "What {name} stands is not in its data: the maker's fuse decides, an open point." + fault
        return rule.judge(holds=True, margin=None, text=text, name=case.device.name, **words)
    words["stands"] = Said(survival.withstands, survival.dimension)
    if survival.fault_current is not None:
        words["fault"] = amperes(survival.fault_current)
        fault = " Its breaking capacity has to be at least {fault}."
    margin = None  # a rating that fills a contact is no tight place
    if survival.dimension == "i2t":
        margin = over(survival.withstands, survival.sees)
        text = "The fuse lets {sees} through; {name} stands {stands}." + fault
    else:
        text = "Protection of {sees} stands before {name}, which carries {stands}." + fault
    return rule.judge(holds=survival.survives is True, margin=margin, text=text, name=case.device.name, **words)
