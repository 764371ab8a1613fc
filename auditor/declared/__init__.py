"""The declared world: job and shop files, codes, materials, units."""
