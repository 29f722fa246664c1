"""How everything looks: colours and line styles as plain values, the palette, the settings file."""
