"""The main window: its arrangement, its one table of actions, its files, and the one place that shows messages."""
