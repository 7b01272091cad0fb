import type { Direction, Statistic, UndefinedReason } from "../../../shared/core/index.ts";
import type { Observation } from "./observe.ts";

/** What one more pair between known people can do to each figure. Source: methods C.3.4. */
export const DIRECTION_OF: Readonly<Record<Statistic, Direction>> = {
  people: "up",
  pairs: "up",
  groups: "down",
  largestGroup: "up",
  isolates: "down",
  meanSmallGroup: "either",
  meanSmallGroupOfPerson: "either",
  sizeSquares: "up",
  meanDegree: "up",
  degreeVariance: "either",
  maxDegree: "up",
  triangles: "up",
  transitivity: "either",
  averageClustering: "either",
  degreeAssortativity: "either",
  attributeAssortativity: "either",
  ei: "either",
  modularity: "either",
};

/** Why a figure has no value on the observed network. */
export function whyUndefined(statistic: Statistic, { network }: Observation): UndefinedReason {
  const { people, length: pairs } = network;
  if (people === 0) return "no_people";
  switch (statistic) {
    case "meanSmallGroup":
    case "meanSmallGroupOfPerson":
      return "one_group";
    case "meanDegree":
    case "maxDegree":
      return "no_one_interviewed";
    case "degreeVariance":
      return "one_value";
    case "transitivity":
      return "no_two_paths";
    case "degreeAssortativity":
      return pairs === 0 ? "no_pairs" : "equal_degrees";
    case "attributeAssortativity":
    case "ei":
    case "modularity":
      return pairs === 0 ? "no_pairs" : "no_values";
    default:
      return "no_values";
  }
}
