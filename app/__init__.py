"""The window and the command line of Striketrace. Mechanics live in `solver`."""

# The one place of the version: pyproject.toml reads it from here without importing anything.
__version__ = "0.1.0"
