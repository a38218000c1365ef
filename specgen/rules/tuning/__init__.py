"""Rules about tuning, one a file."""
