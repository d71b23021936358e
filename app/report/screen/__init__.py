"""The workspace Report: choices on the left, the pages on the right."""
