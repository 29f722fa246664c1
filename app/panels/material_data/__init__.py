"""Constants and curves of the materials that are chosen, side by side."""
