"""Loads on floodwalls and stop-log closures: pressure, force, moment and checks, for many states at once."""

__version__ = "0.1.0"
