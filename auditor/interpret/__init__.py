"""Blocks to Moves."""
