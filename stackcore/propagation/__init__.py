"""Plane waves through a stack. `solve` is the only door; what it returns is a `Response`."""

from stackcore.propagation.response import Response
from stackcore.propagation.solve import solve

__all__ = ["Response", "solve"]
