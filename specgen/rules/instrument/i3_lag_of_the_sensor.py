"""I3: the sensor's lag is below a fifth of the time constant."""

from math import isinf

from specgen.core.say import seconds
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import over

rule = Rule(code="I3", name="Lag of the sensor", weight="should", needs=("sensor.lag",))

SHARE = 0.2


def examine(case: Case) -> Finding:
    """Compare the longest lag with the shortest time constant: a slow sensor hides the swing from controller and reader alike."""
    box = case.box
    if isinstance(box, Unmodelled):
        return rule.unsized(box)
    plants = [box.plant_at(point) for point in box.ends("loss", "capacity", "sensor_lag")]
    lag, tau = max(plant.sensor_lag for plant in plants), min(plant.tau for plant in plants)
    if isinf(tau):
        return rule.does_not_apply("The value does not settle and has no time constant to compare the sensor's lag with.")
    return rule.judge(
        holds=lag < SHARE * tau,
        margin=over(SHARE * tau, lag),
        text="The sensor lags by {lag}; a fifth of the shortest time constant of {tau} is {limit}.",
        lag=seconds(lag), tau=seconds(tau), limit=seconds(SHARE * tau),
    )  # fmt: skip
