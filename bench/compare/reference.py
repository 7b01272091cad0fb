"""Times of igraph and networkx on a file of pairs, as one JSON object.

Usage: reference.py FILE MEASURE[,MEASURE...] [networkx]

Needs Debian's python3-igraph, and python3-networkx for the last argument. Nothing else of the
repository needs them. Each time is the median of five runs after one that does not count (of one
run for networkx, which takes minutes), in ms, on a graph already built.
"""
import json
import statistics
import sys
import time

import igraph

RUNS = 5


def median_ms(work, runs=RUNS, warm_up=True):
    if warm_up:
        work()
    times = []
    for _ in range(runs):
        start = time.perf_counter()
        value = work()
        times.append((time.perf_counter() - start) * 1000)
    return statistics.median(times), value


def read_pairs(file):
    numbers = {}
    pairs = []
    with open(file, encoding="utf-8") as lines:
        next(lines)
        for line in lines:
            a, b = line.rstrip("\n").split(",")
            pairs.append((numbers.setdefault(a, len(numbers)), numbers.setdefault(b, len(numbers))))
    return len(numbers), pairs


def igraph_measures(n, pairs):
    graph = igraph.Graph(n=n, edges=pairs)
    m = graph.ecount()

    def replicate():
        drawn = igraph.Graph.Erdos_Renyi(n=n, m=m)
        return len(drawn.connected_components()), drawn.transitivity_undirected()

    return {
        "build": lambda: igraph.Graph(n=n, edges=pairs) and None,
        "components": lambda: len(graph.connected_components()),
        "clustering": lambda: (
            graph.transitivity_undirected(),
            graph.transitivity_avglocal_undirected(mode="zero"),
        ),
        "cores": lambda: max(graph.coreness()),
        "articulation": lambda: (len(graph.articulation_points()), len(graph.bridges())),
        "assortativity": lambda: graph.assortativity_degree(directed=False),
        "communities": lambda: graph.community_multilevel().modularity,
        "paths": lambda: (graph.average_path_length(), graph.diameter()),
        "betweenness": lambda: max(graph.betweenness()),
        "closeness": lambda: max(graph.harmonic_centrality()),
        "baseline": replicate,
    }


def networkx_measures(n, pairs):
    import networkx

    graph = networkx.Graph()
    graph.add_nodes_from(range(n))
    graph.add_edges_from(pairs)

    def build():
        built = networkx.Graph()
        built.add_nodes_from(range(n))
        built.add_edges_from(pairs)

    return {
        "build": build,
        "components": lambda: networkx.number_connected_components(graph),
        "clustering": lambda: (
            networkx.transitivity(graph),
            networkx.average_clustering(graph),
        ),
        "cores": lambda: max(networkx.core_number(graph).values()),
        "articulation": lambda: (
            sum(1 for _ in networkx.articulation_points(graph)),
            sum(1 for _ in networkx.bridges(graph)),
        ),
        "assortativity": lambda: networkx.degree_assortativity_coefficient(graph),
    }


def main():
    file, names = sys.argv[1], sys.argv[2].split(",")
    n, pairs = read_pairs(file)
    is_networkx = sys.argv[3:] == ["networkx"]
    known = (networkx_measures if is_networkx else igraph_measures)(n, pairs)
    found = {}
    for name in names:
        ms, value = median_ms(known[name], 1 if is_networkx else RUNS, not is_networkx)
        found[name] = {"ms": ms, "value": value}
    print(json.dumps(found))


main()
