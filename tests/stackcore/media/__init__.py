"""Tests of the media and of the material library."""
