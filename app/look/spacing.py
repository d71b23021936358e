"""One grid for all distances, in device-independent pixels."""

GAP = 4
SPACE = 8
WIDE = 16
#: Height of a row in the outline, of a field and of a button.
ROW = 28
FIELD = 24
RADIUS = 4
ICON = 16
OUTLINE_WIDTH = 286
