"""Rules about valves and three-point control, one a file."""
