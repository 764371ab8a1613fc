"""One file a format: an Audit in, text out."""
