"""What the tables of the panels have in common: their look, their keys, and how they say what is wrong."""
