"""What the window shows, one folder a panel; `tables` is what the tables among them share."""
