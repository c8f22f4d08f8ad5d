"""Floor 0: errors, constants, array shapes, lane status, files. Knows no chemistry."""
