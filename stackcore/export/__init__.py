"""What leaves the program: tables of results."""

from stackcore.export.sweep_csv import CSV_HEADER, csv_rows, text_cell, write_csv
from stackcore.export.wide_csv import wide_header, write_wide_csv

__all__ = ["CSV_HEADER", "csv_rows", "text_cell", "wide_header", "write_csv", "write_wide_csv"]
