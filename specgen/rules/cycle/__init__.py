"""Rules about the cycle time of time-proportioned control, one a file."""
