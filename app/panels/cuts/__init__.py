"""The panel of cuts: the quantity of the curves over the angle, a thickness or a constant."""
