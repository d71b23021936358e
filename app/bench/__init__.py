"""The Bench: set up a blow and watch it."""
