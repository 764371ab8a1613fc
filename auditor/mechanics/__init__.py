"""Published laws on numpy arrays. Imports numpy and nothing else."""
