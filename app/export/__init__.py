"""What leaves the program: records and envelopes as CSV, a summary as JSON. SI units; knows no Qt."""

from app.export.case_folder import CASE_FILES, folder_names, write_case
from app.export.envelope_csv import envelope_csv
from app.export.gauge_csv import gauge_csv
from app.export.summary import summary, summary_json

__all__ = [
    "CASE_FILES",
    "envelope_csv",
    "folder_names",
    "gauge_csv",
    "summary",
    "summary_json",
    "write_case",
]
