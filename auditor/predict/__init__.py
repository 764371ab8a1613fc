"""Mechanics applied to Samples: Loads."""
