import { useQuery } from "@tanstack/react-query";
import { useEffect, useMemo, useRef } from "react";
import { paths } from "../../../app/paths.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { groupCode, groupPlaces } from "../../../lib/group-places.ts";
import { largestGroupsQuery } from "../../../lib/groups-query.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import type { NetworkQuestion } from "../../../lib/network-summary-query.ts";
import { populationNames } from "../../../lib/population-words.ts";
import { useSession } from "../../../lib/session-context.ts";
import { networkGraphQuery } from "../api/get-network-graph.ts";
import { useNear } from "../use-near.ts";
import { isReversed, type Population, type QuestionChange } from "../use-question.ts";
import { NetworkPicture } from "./network-picture.tsx";
import { populationOptions } from "./question-controls.tsx";

export type PictureSectionProps = {
  question: NetworkQuestion;
  drawn: Population;
  group: string | undefined;
  onChange: (change: QuestionChange) => void;
};

/** The network picture under its heading, with whom it draws; fetched when it comes near. */
export function PictureSection({ question, drawn, group, onChange }: PictureSectionProps) {
  const { id, timeZone } = useInvestigation();
  const { rooms } = useSession();
  const [nearRef, near] = useNear();
  const asked = { ...question, population: drawn };
  const graph = useQuery({
    ...networkGraphQuery(id, asked, group),
    enabled: near && !isReversed(question),
  });
  const groups = useQuery({ ...largestGroupsQuery(id), enabled: near });
  const places = useMemo(() => groupPlaces(groups.data?.items ?? []), [groups.data]);
  const personTo = rooms.includes("trace")
    ? (personId: string) => paths.person(id, personId)
    : undefined;
  useScrollTo(group);

  return (
    <div ref={nearRef} id="network-picture" className="scroll-mt-4">
      <Section
        title="Network picture"
        subLine={
          graph.data
            ? `cut-off ${formatInstant(graph.data.cutOff, timeZone)}, version ${formatNumber(graph.data.graphVersion)}`
            : undefined
        }
        actions={
          <MenuSelect
            label="draw"
            size="small"
            options={populationOptions}
            value={drawn}
            onValueChange={(value) => onChange({ drawn: value })}
          />
        }
      >
        {group ? (
          <Notice
            className="mb-3"
            title={`Group ${groupCode(group)}`}
            actions={
              <Button size="small" onClick={() => onChange({ group: undefined })}>
                Draw everyone
              </Button>
            }
          >
            is drawn alone.
          </Notice>
        ) : null}
        {graph.isError ? (
          <ErrorState
            kind={errorKind(graph.error)}
            title={group && errorKind(graph.error) === "not-found" ? "No such group" : undefined}
            onRetry={() => void graph.refetch()}
          >
            {group && errorKind(graph.error) === "not-found"
              ? "It may have joined a larger group since. Draw everyone, or choose it anew."
              : undefined}
          </ErrorState>
        ) : graph.data && !groups.isPending ? (
          <NetworkPicture
            graph={graph.data}
            places={places}
            population={populationNames[drawn]}
            alone={group !== undefined}
            onGroup={(value) => onChange({ group: value })}
            personTo={personTo}
            fitKey={JSON.stringify([drawn, group])}
          />
        ) : (
          <LoadingState label="Loading the picture" rows={6} />
        )}
      </Section>
    </div>
  );
}

/** A link that names a group leads to the picture, which lies far down the page. */
function useScrollTo(group: string | undefined): void {
  const first = useRef(group);
  useEffect(() => {
    if (first.current) document.getElementById("network-picture")?.scrollIntoView();
  }, []);
}
