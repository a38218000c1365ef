"""Pure functions of the process: cycles, ripple, worst cases, tuning, margins, simulation, step tests, faults."""
