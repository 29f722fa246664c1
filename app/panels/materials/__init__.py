"""The job's materials, and the library they can be taken from."""
