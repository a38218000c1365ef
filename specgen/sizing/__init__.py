"""What a candidate would need: settings, device, contacts, error of measurement; each sized, or unsized with its reason."""
