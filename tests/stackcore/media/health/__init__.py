"""Tests of the health check of media."""
