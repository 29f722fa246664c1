"""Walls as they are built, sized for the job's band and angle, ready to be put into a stack."""
