"""Seconds per swap of a plain loop over GUDHI: barcode of the swapped order, then its bottleneck distances.

Reads {"n", "edges", "values", "top", "swaps": [[u, v], ...]} and writes the list of seconds. The
barcode of the recorded order is computed once beforehand and is not counted.
"""

import json
import sys
import time

import gudhi

graph = json.load(sys.stdin)
top = graph["top"]


def diagrams(values):
    tree = gudhi.SimplexTree()
    for node, value in enumerate(values):
        tree.insert([node], filtration=value)
    for u, v in graph["edges"]:
        tree.insert([u, v], filtration=max(values[u], values[v]))
    tree.expansion(top + 1)
    tree.compute_persistence(homology_coeff_field=2, min_persistence=0, persistence_dim_max=True)
    return [tree.persistence_intervals_in_dimension(k) for k in range(top + 1)]


recorded = diagrams(graph["values"])
seconds = []
for u, v in graph["swaps"]:
    values = list(graph["values"])
    values[u], values[v] = values[v], values[u]
    start = time.perf_counter()
    for before, after in zip(recorded, diagrams(values)):
        gudhi.bottleneck_distance(before, after)
    seconds.append(time.perf_counter() - start)
json.dump(seconds, sys.stdout)
