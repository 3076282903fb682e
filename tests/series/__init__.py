"""Tests of stage and level series: readers, traps, ages, interpolation."""
