"""Rules about the panel as a whole, one a file."""
