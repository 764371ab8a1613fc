"""Fixed cycles: one file a family, each turns a call into strokes."""
