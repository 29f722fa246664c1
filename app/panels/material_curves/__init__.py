"""What the chosen materials are over frequency, drawn together."""
