"""Rules about the instrument, one a file."""
