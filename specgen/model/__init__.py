"""What a loop file says, typed: frozen models of panel, loop, plant, element, sensor, limits and devices."""
