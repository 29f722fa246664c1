"""Tests of the reading of columns."""
