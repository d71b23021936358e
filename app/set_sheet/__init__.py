"""The set sheet: resistances and drops varied together, and what set to stop at. Its page prints without Qt."""
