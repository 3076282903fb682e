"""Floodwall sections per unit length: loads on them, stability, seepage, and the screening of options."""
