"""Parts of one kind as a table that takes pasted blocks."""
