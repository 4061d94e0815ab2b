"""Writes graphs in the file formats of networkx; JSON from stdin to stdout."""

import io
import json
import sys
import warnings

import networkx as nx
from networkx.readwrite import json_graph

warnings.simplefilter("ignore")


def graph_of(given):
    graph = nx.DiGraph() if given["directed"] else nx.Graph()
    for name, entry, kind in given["nodes"]:
        graph.add_node(name, entry=entry, kind=kind)
    for source, target, weight in given["edges"]:
        graph.add_edge(source, target, weight=weight)
    return graph


def binary(write, graph):
    stream = io.BytesIO()
    write(graph, stream)
    return stream.getvalue().decode("utf-8")


def texts(given):
    graph = graph_of(given)
    # What Pajek's vertex lines hold in networkx are texts: entries go elsewhere.
    bare = graph_of({**given, "nodes": [[name, 0, ""] for name, _, _ in given["nodes"]]})
    for _, values in bare.nodes(data=True):
        values.clear()
    return {
        "graphml": "\n".join(nx.generate_graphml(graph)),
        "gexf": "\n".join(nx.generate_gexf(graph)),
        "gml": "\n".join(nx.generate_gml(graph)),
        "json": json.dumps(json_graph.node_link_data(graph)),
        "net": "\n".join(nx.generate_pajek(bare)),
    }


print(json.dumps([texts(given) for given in json.load(sys.stdin)]))
