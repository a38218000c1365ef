"""Pages as views: frozen text, numbers ready to print, flags and tuples, built of six shapes from a design."""
