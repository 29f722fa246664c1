"""The window of Slabwright: what is designed, how it is shown, and how it is changed by hand."""
