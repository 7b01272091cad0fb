import { useQuery } from "@tanstack/react-query";
import { useEffect, useMemo, useRef } from "react";
import { paths } from "../../../app/paths.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { VersionWords } from "../../../components/network-report/version-words.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { groupCode, groupPlaces } from "../../../lib/group-places.ts";
import { largestGroupsQuery } from "../../../lib/groups-query.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import type { NetworkQuestion } from "../../../lib/network-summary-query.ts";
import { useSession } from "../../../lib/session-context.ts";
import { networkGraphQuery } from "../api/get-network-graph.ts";
import { useNear } from "../use-near.ts";
import { type Drawn, isReversed, type QuestionChange } from "../use-question.ts";
import { NetworkPicture } from "./network-picture.tsx";
import { PictureTools } from "./picture-tools.tsx";

export type PictureSectionProps = {
  question: NetworkQuestion;
  drawn: Drawn;
  onChange: (change: QuestionChange) => void;
};

/** The network picture under its heading, with what it draws; fetched when it comes near. */
export function PictureSection({ question, drawn, onChange }: PictureSectionProps) {
  const { id, timeZone } = useInvestigation();
  const { rooms } = useSession();
  const [nearRef, near] = useNear();
  const { group } = drawn;
  const asked: NetworkQuestion =
    drawn.exposures === "all"
      ? { population: drawn.population, window: "all", asOf: question.asOf }
      : { ...question, population: drawn.population };
  const graph = useQuery({
    ...networkGraphQuery(id, asked, group),
    enabled: near && !isReversed(asked),
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
          graph.data ? (
            <>
              cut-off {formatInstant(graph.data.cutOff, timeZone)},{" "}
              <VersionWords
                graphVersion={graph.data.graphVersion}
                updating={graph.isFetching && !graph.isPending}
              />
            </>
          ) : undefined
        }
      >
        <div className="mb-2">
          <PictureTools drawn={drawn} onChange={onChange} />
        </div>
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
          <PictureError
            error={graph.error}
            ofGroup={group !== undefined}
            onRetry={() => void graph.refetch()}
          />
        ) : graph.data && !groups.isPending ? (
          <NetworkPicture
            graph={graph.data}
            places={places}
            drawn={drawn}
            onGroup={(value) => onChange({ group: value })}
            personTo={personTo}
          />
        ) : (
          <LoadingState label="Loading the picture" rows={6} />
        )}
      </Section>
    </div>
  );
}

type PictureErrorProps = { error: Error; ofGroup: boolean; onRetry: () => void };

function PictureError({ error, ofGroup, onRetry }: PictureErrorProps) {
  const kind = errorKind(error);
  if (kind !== "not-found" || !ofGroup) return <ErrorState kind={kind} onRetry={onRetry} />;
  return (
    <ErrorState kind={kind} title="No such group">
      It may have joined a larger group since. Draw everyone, or choose it anew in Review.
    </ErrorState>
  );
}

/** A link that names a group leads to the picture, which lies far down the page. */
function useScrollTo(group: string | undefined): void {
  const first = useRef(group);
  useEffect(() => {
    if (!first.current) return;
    // After the frame of the page has set a new page to its top.
    const frame = requestAnimationFrame(() =>
      document.getElementById("network-picture")?.scrollIntoView(),
    );
    return () => cancelAnimationFrame(frame);
  }, []);
}
