"""What stops a solution: one sentence for a person."""


class SolveError(Exception):
    """A case that cannot be solved as described. Its text says what is wrong, where, and what would be right."""
