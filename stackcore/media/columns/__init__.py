"""A user's own data as columns of text: read, understood, and what is not sure asked."""

from stackcore.media.columns.read import read_columns
from stackcore.media.columns.reading import Alternative, Column, ColumnsReading, Question

__all__ = ["Alternative", "Column", "ColumnsReading", "Question", "read_columns"]
