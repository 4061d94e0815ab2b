"""Seconds per swap of loops over GUDHI: barcode of the swapped order, then its bottleneck distances.

Reads {"n", "edges", "values", "top", "swaps": [[u, v], ...], "seconds"} and writes, for every swap
begun within that many seconds, the seconds of each way to the barcode and of the distances:

  plain      the complex is built anew
  collapsed  its edges are collapsed before it is expanded (Boissonnat, Pritam 2020). That keeps the
             barcodes of this filtration in every dimension: nodes keep their own values, and at each
             value the collapsed graph has the components and the homology of the graph that it
             replaces. Every swap is checked; `disagreements` counts those with another barcode.
  kept       the complex is built once, and only its values are assigned anew

The barcode of the recorded order is computed once beforehand and is not counted.
"""

import json
import resource
import sys
import time

import gudhi
import numpy

graph = json.load(sys.stdin)
top = graph["top"]
nodes = numpy.arange(graph["n"]).reshape(1, -1)
edges = numpy.array(graph["edges"]).reshape(-1, 2).T


def skeleton(values):
    tree = gudhi.SimplexTree()
    tree.insert_batch(nodes, values)
    tree.insert_batch(edges, numpy.maximum(values[edges[0]], values[edges[1]]))
    return tree


def diagrams(tree):
    tree.compute_persistence(homology_coeff_field=2, min_persistence=0, persistence_dim_max=True)
    return [tree.persistence_intervals_in_dimension(k) for k in range(top + 1)]


def plain(values):
    tree = skeleton(values)
    tree.expansion(top + 1)
    return diagrams(tree)


def collapsed(values):
    tree = skeleton(values)
    tree.collapse_edges()
    tree.expansion(top + 1)
    return diagrams(tree)


def kept(values):
    whole.reset_filtration(float("-inf"), 0)
    for node, value in enumerate(values):
        whole.assign_filtration([node], value)
    whole.make_filtration_non_decreasing()
    return diagrams(whole)


def bars(barcode):
    return [sorted(map(tuple, intervals)) for intervals in barcode]


recorded_values = numpy.array(graph["values"], dtype=float)
whole = skeleton(recorded_values)
whole.expansion(top + 1)
recorded = plain(recorded_values)
ways = {"plain": plain, "collapsed": collapsed, "kept": kept}
seconds = {name: [] for name in [*ways, "distances"]}
disagreements = 0
began = time.perf_counter()
for u, v in graph["swaps"]:
    if time.perf_counter() - began > graph["seconds"]:
        break
    values = recorded_values.copy()
    values[u], values[v] = recorded_values[v], recorded_values[u]
    found = {}
    for name, way in ways.items():
        start = time.perf_counter()
        found[name] = way(values)
        seconds[name].append(time.perf_counter() - start)
    start = time.perf_counter()
    for before, after in zip(recorded, found["plain"]):
        gudhi.bottleneck_distance(before, after)
    seconds["distances"].append(time.perf_counter() - start)
    wanted = bars(found["plain"])
    disagreements += any(bars(found[name]) != wanted for name in ways)
peak = 1024 * resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
json.dump({**seconds, "disagreements": disagreements, "bytes": peak}, sys.stdout)
