"""Coverage of the step test's intervals over 4000 records, and the time of a fit."""

import runpy
import time
from pathlib import Path

import numpy as np
import pytest

pytestmark = pytest.mark.benchmark


def test_coverage_over_4000_records():
    coverage = runpy.run_path(str(Path(__file__).parents[1] / "process" / "test_step_test_coverage.py"))["coverage"]
    begin = time.perf_counter()
    shares, identified = coverage(4000, 7)
    each = (time.perf_counter() - begin) / 4000
    print(
        f"\ngain {shares[0]:.4f}, tau {shares[1]:.4f}, theta {shares[2]:.4f} inside; {identified:.4f} identified; {1e3 * each:.1f} ms a fit"
    )
    assert np.all((shares >= 0.93) & (shares <= 0.97))
