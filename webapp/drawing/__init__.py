"""The drawings: one SVG of the flood line, one of each barrier, the same on page, sheet and package."""
