"""One file a check."""
