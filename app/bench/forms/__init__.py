"""Forms of the parts of a case, generated from the declarations of the project model."""
