"""A quantity over two axes at once: frequency by angle, or by a thickness or a constant."""
