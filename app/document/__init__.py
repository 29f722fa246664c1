"""The document being designed and everything that can be done with it; no toolkit."""
