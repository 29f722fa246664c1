"""The job's materials, the library they can be taken from, and what speaks against them."""
