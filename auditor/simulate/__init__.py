"""Moves to Samples: the tool's outline, the remaining stock, engagement."""

from auditor.simulate.follow import simulate

__all__ = ["simulate"]
