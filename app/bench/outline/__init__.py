"""The outline of a case: rows, and what a person does with parts."""
