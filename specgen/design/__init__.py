"""The aggregate: every loop with its decision, findings, figures and open points; the panel's totals; the record."""
