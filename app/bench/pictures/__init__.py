"""What all pictures of the Bench share: axes, curves, labels, cursors, export."""
