"""The stacks of a job beside each other: thickness, mass, cost and worst point of each."""
