"""The panel of the complex plane: reflection, transmission and input impedance."""
