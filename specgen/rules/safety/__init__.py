"""Rules about safety, one a file."""
