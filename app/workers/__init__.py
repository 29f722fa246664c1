"""Calculations beside the window: a snapshot goes in, the newest answer comes out."""
