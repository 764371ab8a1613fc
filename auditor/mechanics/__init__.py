"""Published laws of turning on numpy arrays. Imports numpy and nothing else.

Reading the docstrings: ``array_like (...), mm`` is a number or an array in that unit; all arguments written
``(...)`` broadcast against each other and the result has the joint shape. NaN in gives NaN out, silently: a row
where a figure does not apply stays such a row. An impossible number (a negative feed) raises ``ValueError``.
Inside a law angles are radians; at its border they are degrees. Where a law was measured or may be trusted
stands beside it as a `ValidRange`: ask it which rows lie inside.
"""
