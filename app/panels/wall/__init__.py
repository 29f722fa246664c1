"""The wall drawing: the stack seen from the side, the wave coming from the left."""
