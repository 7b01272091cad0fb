import {
  attributeAssortativity,
  colemanHomophily,
  eiIndex,
  type Graph,
  mixingCounts,
} from "../../shared/core/index.ts";
import type { Take } from "./collect-reasons.ts";
import type { Attribute } from "./read-network.ts";

/** Homophily of one class: share of link ends that stay inside, and that against two baselines. */
export type ClassFigures = {
  readonly insideShare: number | null;
  readonly original: number | null;
  readonly corrected: number | null;
};

export type AttributeFigures = {
  readonly assortativity: number | null;
  readonly ei: number | null;
  /** By value of the attribute. */
  readonly coleman: Record<string, ClassFigures>;
  /** People without a value, and pairs with one of them: in none of the figures. */
  readonly leftOut: { readonly people: number; readonly pairs: number };
};

/** Who mixes with whom by one column of the people file. */
export function attributeFigures(
  graph: Graph,
  { values, classOf }: Attribute,
  take: Take,
): AttributeFigures {
  const counts = mixingCounts(graph, classOf, values.length);
  const coleman = colemanHomophily(counts).map((homophily, group) => {
    const path = `attribute.coleman.${values[group]}`;
    const figures: ClassFigures = {
      insideShare: take(`${path}.insideShare`, homophily.insideShare),
      original: take(`${path}.original`, homophily.original),
      corrected: take(`${path}.corrected`, homophily.corrected),
    };
    return [values[group] ?? "", figures] as const;
  });
  return {
    assortativity: take("attribute.assortativity", attributeAssortativity(counts)),
    ei: take("attribute.ei", eiIndex(counts).value),
    coleman: Object.fromEntries(coleman),
    leftOut: { people: counts.peopleLeftOut, pairs: counts.pairsLeftOut },
  };
}
