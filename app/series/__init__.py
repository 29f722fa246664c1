"""What is drawn and read of a response: curves, axes, readings, texts; no toolkit."""
