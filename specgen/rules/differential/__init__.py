"""Rules about the differential of on-off control, one a file."""
