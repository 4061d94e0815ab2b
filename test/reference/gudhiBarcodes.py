"""Barcodes of node-filtered clique complexes by GUDHI, for comparison.

Reads one JSON list of {"n", "edges", "values", "top"} and writes the list of barcodes, each a list
of [birth, death] per dimension 0..top, sorted, an infinite death as null.
"""

import json
import sys

import gudhi


def barcode(graph):
    values, top = graph["values"], graph["top"]
    tree = gudhi.SimplexTree()
    for node in range(graph["n"]):
        tree.insert([node], filtration=values[node])
    for u, v in graph["edges"]:
        tree.insert([u, v], filtration=max(values[u], values[v]))
    tree.expansion(top + 1)
    tree.compute_persistence(homology_coeff_field=2, min_persistence=0, persistence_dim_max=True)
    bars = []
    for dimension in range(top + 1):
        pairs = [[b, None if d == float("inf") else d] for b, d in tree.persistence_intervals_in_dimension(dimension)]
        bars.append(sorted(pairs, key=lambda pair: (pair[0], float("inf") if pair[1] is None else pair[1])))
    return bars


json.dump([barcode(graph) for graph in json.load(sys.stdin)], sys.stdout)
