"""Text to Blocks."""
