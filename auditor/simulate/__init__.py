"""Moves to Samples: the tool's outline, the remaining stock, engagement."""
