"""What every other package stands on: diagnostics, quantities, figures."""
