"""Figures of the report, as marks on a sheet."""
