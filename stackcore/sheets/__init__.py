"""Impedance sheets without thickness: one kind a file, behind the contract in `base`."""
