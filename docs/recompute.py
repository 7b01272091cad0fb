"""Checks a downloaded comparison with networkx: python3 docs/recompute.py FILE [REPLICATES]

Observed figures must agree to nine digits. Baselines are drawn anew by networkx, with other random
numbers, so their means must agree within five standard errors. Prints one line a figure; ends with
1 if any differs.
"""

import json
import random
import sys

import networkx as nx

TOLERANCE = 1e-9
MOST_STANDARD_ERRORS = 5


def figures(graph):
    """The figures that networkx defines as the file does; None where undefined."""
    groups = [len(group) for group in nx.connected_components(graph)]
    degrees = dict(graph.degree())
    ends = [degrees[u] for pair in graph.edges() for u in pair]
    paths = sum(d * (d - 1) for d in degrees.values())
    return {
        "groups": len(groups),
        "largestGroup": max(groups, default=0),
        "isolates": nx.number_of_isolates(graph),
        "sizeSquares": sum(s * s for s in groups) / graph.number_of_nodes(),
        "triangles": sum(nx.triangles(graph).values()) // 3,
        "transitivity": nx.transitivity(graph) if paths else None,
        "averageClustering": nx.average_clustering(graph),
        "degreeAssortativity": assortativity(graph, degrees) if len(set(ends)) > 1 else None,
    }


def assortativity(graph, degrees):
    """Pearson correlation of the degrees at the two ends of a pair."""
    xs = [degrees[u] for u, v in graph.edges()] + [degrees[v] for u, v in graph.edges()]
    ys = [degrees[v] for u, v in graph.edges()] + [degrees[u] for u, v in graph.edges()]
    mean = sum(xs) / len(xs)
    shared = sum((x - mean) * (y - mean) for x, y in zip(xs, ys))
    return shared / sum((x - mean) ** 2 for x in xs)


def random_mixing(graph, seed):
    """G(n, m): as many people and pairs, the pairs anywhere."""
    return nx.gnm_random_graph(graph.number_of_nodes(), graph.number_of_edges(), seed=seed)


def same_degrees(graph, seed):
    """Everybody keeps their number of pairs: swaps, proposals that change nothing included."""
    chance = random.Random(seed)
    pairs = [tuple(pair) for pair in graph.edges()]
    there = {frozenset(pair) for pair in pairs}
    for _ in range(100 * len(pairs)):
        i, j = chance.randrange(len(pairs)), chance.randrange(len(pairs))
        (a, b), (c, d) = pairs[i], pairs[j]
        if chance.random() < 0.5:
            c, d = d, c
        if i == j or a == d or c == b:
            continue
        if frozenset((a, d)) in there or frozenset((c, b)) in there:
            continue
        there -= {frozenset((a, b)), frozenset((c, d))}
        there |= {frozenset((a, d)), frozenset((c, b))}
        pairs[i], pairs[j] = (a, d), (c, b)
    drawn = nx.Graph()
    drawn.add_nodes_from(graph)
    drawn.add_edges_from(pairs)
    return drawn


def mean_and_error(values):
    mean = sum(values) / len(values)
    spread = sum((value - mean) ** 2 for value in values) / max(1, len(values) - 1)
    return mean, (spread / len(values)) ** 0.5


def main(path, replicates):
    with open(path, encoding="utf8") as file:
        comparison = json.load(file)
    graph = nx.Graph()
    graph.add_nodes_from(person["studyNumber"] for person in comparison["people"])
    graph.add_edges_from(comparison["pairs"])
    table = {one["statistic"]: one for one in comparison["result"]["measures"]}
    differs = False

    def say(name, what, theirs, ours, agree):
        nonlocal differs
        differs = differs or not agree
        print(f"{'same' if agree else 'DIFFERS':8}{name:22}{what:18}{theirs} {ours}")

    for name, ours in figures(graph).items():
        theirs = table[name]["observed"]
        both = theirs is not None and ours is not None
        agree = abs(theirs - ours) <= TOLERANCE * max(1, abs(ours)) if both else theirs == ours
        say(name, "observed", theirs, ours, agree)

    samplers = {"gnm": random_mixing, "degreePreserving": same_degrees}
    drawn = {one["baseline"] for one in comparison["result"]["baselines"] if one["drawn"]}
    for baseline, sample in samplers.items():
        if baseline not in drawn:
            continue
        rows = [figures(sample(graph, seed)) for seed in range(replicates)]
        for name in figures(graph):
            told = table[name]["baselines"].get(baseline)
            values = [row[name] for row in rows if row[name] is not None]
            if told is None or told["mean"] is None or not values:
                continue
            mean, error = mean_and_error(values)
            defined = sum(told["histogram"]["counts"])
            whole = (error**2 + (told["sd"] or 0) ** 2 / defined) ** 0.5
            agree = abs(mean - told["mean"]) <= MOST_STANDARD_ERRORS * whole + TOLERANCE
            say(name, baseline, told["mean"], mean, agree)
    return 1 if differs else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1], int(sys.argv[2]) if len(sys.argv) > 2 else 199))
