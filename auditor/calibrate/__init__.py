"""A material's force factor fitted to a logged spindle load."""
