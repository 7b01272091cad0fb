import { lazy, Suspense, useCallback, useMemo, useState } from "react";
import type { NetworkGraph } from "../../../../shared/contracts/network.ts";
import { coloredGroups } from "../../../components/person-mark/group-colors.ts";
import { MarkLegend } from "../../../components/person-mark/mark-legend.tsx";
import type { PersonMarkInput } from "../../../components/person-mark/person-mark-input.ts";
import { Caution } from "../../../components/ui/caution.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { FigureWithTable } from "../../../components/ui/figure-with-table.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import { type GroupPlaces, groupCode } from "../../../lib/group-places.ts";
import { populationNames } from "../../../lib/population-words.ts";
import { type PictureNode, pictureNodes } from "../picture-nodes.ts";
import type { Drawn } from "../use-question.ts";
import { NodePanel } from "./node-panel.tsx";
import { NodesTable } from "./nodes-table.tsx";

const NetworkCanvas = lazy(() =>
  import("./network-canvas.tsx").then((module) => ({ default: module.NetworkCanvas })),
);

export type NetworkPictureProps = {
  graph: NetworkGraph;
  places: GroupPlaces;
  drawn: Drawn;
  onGroup: (group: string) => void;
  personTo?: (id: string) => string;
};

const marks: readonly PersonMarkInput[] = [
  { classification: "confirmed" },
  { classification: "probable" },
  { classification: "suspected" },
  { classification: "confirmed", wasContact: true },
  { classification: "contact" },
  { classification: "not_a_case" },
];

/** The network as a picture with its legend, and the same people as a table one key away. */
export function NetworkPicture({ graph, places, drawn, onGroup, personTo }: NetworkPictureProps) {
  const everyone = useMemo(() => pictureNodes(graph, places), [graph, places]);
  const nodes = useMemo(
    () => (drawn.unpaired ? everyone : everyone.filter(isPaired)),
    [everyone, drawn.unpaired],
  );
  const [selected, setSelected] = useState<string | null>(null);
  const select = useCallback((id: string | null) => setSelected(id), []);
  const chosen = nodes.find(({ id }) => id === selected) ?? null;
  if (nodes.length === 0) {
    return (
      <EmptyState title={everyone.length === 0 ? "Nobody to draw" : "No contact pair to draw"}>
        {everyone.length === 0
          ? "No one of this population is on record as of the chosen day."
          : "People without a contact pair can be drawn too; see above."}
      </EmptyState>
    );
  }
  const description = inWords(nodes, graph, drawn);
  return (
    <FigureWithTable
      label="Network picture"
      table={<NodesTable nodes={nodes} personTo={personTo} onGroup={onGroup} />}
      notes={
        <div className="space-y-3 pt-1">
          <p className="text-sm text-ink-2">{description}</p>
          {graph.level === "people" ? (
            <MarkLegend marks={marks} groups={legendGroups(nodes)} layout="row" />
          ) : (
            <p className="text-sm text-ink-2">
              Too many people to draw each: a disc is a connected group, its area the number of its
              people. Draw one alone to see who is in it.
            </p>
          )}
          <Caution>
            A line is a contact, not an infection. High position in this network often means a long
            interview, a caring job or a large household; do not use it for blame, penalties or to
            decide care. A contact network identifies people even without names.
          </Caution>
        </div>
      }
    >
      <Suspense fallback={<LoadingState label="Loading the picture" rows={6} />}>
        <NetworkCanvas
          nodes={nodes}
          pairs={graph.pairs}
          description={`Network picture: ${description}`}
          selected={chosen?.id ?? null}
          onSelect={select}
          fitKey={JSON.stringify(drawn)}
        />
      </Suspense>
      <NodePanel node={chosen} personTo={personTo} onGroup={drawn.group ? undefined : onGroup} />
    </FigureWithTable>
  );
}

/** A group always has pairs; they are just not drawn. */
function isPaired({ level, pairs }: PictureNode): boolean {
  return level === "groups" || pairs > 0;
}

function inWords(nodes: readonly PictureNode[], graph: NetworkGraph, drawn: Drawn): string {
  const population = populationNames[drawn.population];
  if (graph.level === "groups") {
    const people = nodes.reduce((sum, { size }) => sum + size, 0);
    return `${formatCount(nodes.length, "connected group", "connected groups")} with ${formatCount(people, "person", "people")}, of ${population}.`;
  }
  const unpaired = graph.nodes.length - new Set(graph.pairs.flatMap(endsOf)).size;
  const exposures = drawn.exposures === "all" ? "all exposures" : "exposures as chosen above";
  const left = drawn.unpaired ? "drawn too" : "not drawn";
  return (
    `${formatCount(nodes.length, "person", "people")} of ${population} with ` +
    `${formatCount(graph.pairs.length, "contact pair", "contact pairs")}, ${exposures}; ` +
    `${formatCount(unpaired, "person has", "people have")} no contact pair among them and ` +
    `${unpaired === 1 ? "is" : "are"} ${left}.`
  );
}

function endsOf({ source, target }: NetworkGraph["pairs"][number]): string[] {
  return [source, target];
}

/** Codes of the drawn groups that have a colour, in the order of the colours. */
function legendGroups(nodes: readonly PictureNode[]): string[] {
  const codes: string[] = [];
  for (const { color, group, pairs } of nodes) {
    if (typeof color === "number" && color < coloredGroups && pairs > 0) {
      codes[color] = groupCode(group);
    }
  }
  return codes;
}
