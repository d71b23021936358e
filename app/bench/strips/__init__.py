"""Quantities over time at the gauges."""
