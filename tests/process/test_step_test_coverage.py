"""Each 95 % interval holds the true number in about 95 of 100 drawn records.

The records are made by formulas of their own, not by the response that is fitted.
"""

import numpy as np

from specgen.process.step_test import Identified, identify

SEED = 20261120
RECORDS = 400


def one_step(since, tau):
    """Hand formula: response to a unit step, 0 before it arrives."""
    return np.where(since > 0, 1 - np.exp(-np.maximum(since, 0) / tau), 0.0)


def drawn(random):
    """One noisy record: a step, a pulse or three steps; gains of both signs; even or uneven sampling; drift; dead time at no sample."""
    tau = 10 ** random.uniform(1, 3.5)
    theta = tau * random.uniform(0.05, 1.0)
    gain = random.choice([-1, 1]) * 10 ** random.uniform(0, 2.5)
    before = tau * random.uniform(0.2, 0.6)
    length = before + theta + tau * random.uniform(3.5, 7.0)
    count = int(random.integers(150, 600))
    t = np.linspace(0, length, count)
    if random.random() < 0.5:
        t[1:-1] = np.sort(random.uniform(0, length, count - 2))
    moves = [(before, random.uniform(0.3, 0.8))]
    shape = random.integers(3)
    if shape == 1:
        moves.append((before + theta + random.uniform(1.0, 2.5) * tau, -moves[0][1]))
    if shape == 2:
        moves += [(before + random.uniform(0.5, 1.5) * tau, -0.2), (before + random.uniform(1.6, 2.6) * tau, 0.25)]
    output, rise = np.full(count, 0.1), np.zeros(count)
    for at, by in moves:
        shown = t[np.searchsorted(t, at)]  # the output moves at a sample
        output += by * (t >= shown)
        rise += by * one_step(t - shown - theta, tau)
    noise = abs(gain) * 0.5 * 10 ** random.uniform(-2.5, -1.5)
    drift = abs(gain) * random.uniform(-0.05, 0.05)
    value = 20 + gain * rise + drift * t / length + noise * random.standard_normal(count)
    return (t, output, value), (gain, tau, theta)


def coverage(records, seed):
    """Share of records in which gain, tau and theta lie inside their own interval, and the share that was identified."""
    random = np.random.default_rng(seed)
    inside, identified = np.zeros(3), 0
    for _ in range(records):
        record, truth = drawn(random)
        found = identify(*record)
        if isinstance(found, Identified):
            identified += 1
            inside += [number.low <= true <= number.high for number, true in zip((found.gain, found.tau, found.theta), truth, strict=True)]
    return inside / identified, identified / records


def test_each_interval_holds_its_number_in_95_of_100_records():
    shares, identified = coverage(RECORDS, SEED)
    assert identified > 0.95  # a selection would say nothing
    assert np.all(shares >= 0.915), shares
    assert np.all(shares <= 0.985), shares
