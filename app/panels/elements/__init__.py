"""The element table: the lay-up of one stack, read and typed row by row."""
