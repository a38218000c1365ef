"""The rule book: one rule a file in a folder a family, the engine that finds and walks them, and the order of choice."""
