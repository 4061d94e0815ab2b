"""Graphs of networkx's G(n, p) generator by seed: reads [[n, p, seed], ...], writes lists of edges."""

import json
import sys

import networkx

json.dump([list(networkx.gnp_random_graph(n, p, seed=seed).edges()) for n, p, seed in json.load(sys.stdin)], sys.stdout)
