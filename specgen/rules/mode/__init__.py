"""Rules about mode, one a file."""
