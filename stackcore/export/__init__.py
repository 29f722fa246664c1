"""What leaves the program: tables of results."""

from stackcore.export.sweep_csv import CSV_HEADER, csv_rows, text_cell, write_csv

__all__ = ["CSV_HEADER", "csv_rows", "text_cell", "write_csv"]
