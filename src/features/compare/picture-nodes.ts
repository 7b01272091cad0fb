import type { NetworkGraph } from "../../../shared/contracts/network.ts";
import { CLASSIFICATIONS, type Classification } from "../../../shared/vocabulary.ts";
import { markText } from "../../components/person-mark/mark-text.ts";
import type { PersonMarkInput } from "../../components/person-mark/person-mark-input.ts";
import { type GroupPlaces, groupCode, groupColor } from "../../lib/group-places.ts";

/** A person or a group as picture, table and panel show it. */
export type PictureNode = {
  id: string;
  level: NetworkGraph["level"];
  /** Study number of a person, code of a group. */
  label: string;
  group: string;
  groupLabel: string;
  /** Place of the group in the colour set. */
  color: number | "rest";
  mark: PersonMarkInput;
  /** What the mark shows, in words. */
  words: string;
  /** Contact pairs drawn at this person. */
  pairs: number;
  /** People of a group; 1 for a person. */
  size: number;
  x: number;
  y: number;
};

/**
 * The nodes of a picture in the order of the table: the largest group first, then by label. Colours
 * go by the groups' places in the whole record, so that a group keeps its colour when drawn alone.
 */
export function pictureNodes(graph: NetworkGraph, places: GroupPlaces): PictureNode[] {
  const pairs = new Map<string, number>();
  for (const { source, target } of graph.pairs) {
    pairs.set(source, (pairs.get(source) ?? 0) + 1);
    pairs.set(target, (pairs.get(target) ?? 0) + 1);
  }
  const isPeople = graph.level === "people";
  return [...graph.nodes]
    .sort(
      (one, other) =>
        one.groupRank - other.groupRank ||
        one.studyNumber.localeCompare(other.studyNumber, undefined, { numeric: true }),
    )
    .map((node) => {
      const code = groupCode(node.group);
      const color = groupColor(places, node.group);
      const mark: PersonMarkInput = {
        classification: known(node.classification) ?? "contact",
        wasContact: node.becameCase,
        group: color,
      };
      return {
        id: node.id,
        level: graph.level,
        label: isPeople ? node.studyNumber : code,
        group: node.group,
        groupLabel: code,
        color,
        mark,
        words: known(node.classification) === null ? "not classified" : markText(mark),
        pairs: pairs.get(node.id) ?? 0,
        size: node.size,
        x: node.x,
        y: node.y,
      };
    });
}

function known(classification: string | null): Classification | null {
  return CLASSIFICATIONS.find((value) => value === classification) ?? null;
}
