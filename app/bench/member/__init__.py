"""The member as drawn, with its ground and load: the drawing is the editor."""
