"""Tests of app.panels.conditions."""
