"""Rules about direction and safe state, one a file."""
