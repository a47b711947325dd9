"""Solves the systems of OutsideCheckTests.cs with SciPy and counts the signs of their eigenvalues with NumPy.

Reads a JSON list of systems from standard input: size, rows, columns, values (entries at one place add up), right, symmetric.
Writes a JSON list: solution, and for symmetric systems positive, negative and smallest (magnitude of an eigenvalue over the largest).
"""
import json
import sys

import numpy
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import splu


def answer(system):
    size = system["size"]
    matrix = coo_matrix((system["values"], (system["rows"], system["columns"])), shape=(size, size))
    result = {"solution": splu(matrix.tocsc()).solve(numpy.array(system["right"])).tolist(), "positive": 0, "negative": 0, "smallest": 0.0}
    if system["symmetric"]:
        values = numpy.linalg.eigvalsh(matrix.toarray())
        result["positive"] = int((values > 0).sum())
        result["negative"] = int((values < 0).sum())
        result["smallest"] = float(abs(values).min() / abs(values).max())
    return result


json.dump([answer(system) for system in json.load(sys.stdin)], sys.stdout)
