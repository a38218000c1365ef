"""Rules about the output device and its hardware, one a file."""
