import { useQuery } from "@tanstack/react-query";
import { lazy, Suspense } from "react";
import { Link, useParams, useSearchParams } from "react-router-dom";
import type { CompareRun } from "../../../../shared/contracts/compare.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind, errorWords } from "../../../lib/api-error.ts";
import { useCutOff } from "../../../lib/cut-off-context.ts";
import { fieldWords } from "../../../lib/field-words.ts";
import { formatInstant, formatNumber, formatPart } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { populationNames } from "../../../lib/population-words.ts";
import { useEndCompareRun } from "../api/end-compare-run.ts";
import { compareRunQuery } from "../api/get-compare-run.ts";
import { plainLink } from "../components/plain-link.ts";
import { RunActions } from "../components/run-actions.tsx";
import { RunBeside } from "../components/run-beside.tsx";
import { RunFacts } from "../components/run-facts.tsx";
import { RunProgress } from "../components/run-progress.tsx";
import { RunSeen } from "../components/run-seen.tsx";
import { RunStandings } from "../components/run-standings.tsx";
import { RunTable } from "../components/run-table.tsx";
import { mayChange, runStateWords } from "../run-words.ts";
import { useNear } from "../use-near.ts";

const RunCurves = lazy(() =>
  import("../components/run-curves.tsx").then(({ RunCurves: curves }) => ({ default: curves })),
);

/** One comparison: what was seen, what may be compared, the table, the plots, another beside it. */
export function Component() {
  const { id, timeZone } = useInvestigation();
  const { runId = "" } = useParams();
  const [search, setSearch] = useSearchParams();
  const answer = useQuery(compareRunQuery(id, runId));
  const run = answer.data;
  const other = search.get("with")?.slice(0, 64) || undefined;
  useCutOff(
    run
      ? { cutOff: run.cutOff, graphVersion: run.graphVersion, updating: run.state === "running" }
      : null,
  );
  return (
    <RoomPage
      title={run?.name ?? "Comparison"}
      tabTitle="Comparison"
      subLine={
        run
          ? `comparison of ${populationNames[run.population]}, n = ${formatNumber(run.people)}, cut-off ${formatInstant(run.cutOff, timeZone)}, ${runStateWords(run)}`
          : undefined
      }
    >
      <p className="mb-3" data-print="hide">
        <Link to={paths.compare(id)} className={plainLink}>
          All comparisons
        </Link>
      </p>
      {answer.isError && !run ? (
        <ErrorState kind={errorKind(answer.error)} onRetry={() => void answer.refetch()} />
      ) : !run ? (
        <LoadingState label="Opening the comparison" rows={10} />
      ) : (
        <>
          <RunState investigationId={id} run={run} />
          {run.state === "running" ? null : <RunActions investigationId={id} run={run} />}
          <RunFacts run={run} timeZone={timeZone} />
          {run.result ? <RunFigures run={run} result={run.result} /> : null}
          {run.result ? (
            <RunBeside
              {...{ investigationId: id, timeZone, run, other }}
              onOther={(next) =>
                setSearch(next ? { with: next } : {}, { replace: true, preventScrollReset: true })
              }
            />
          ) : null}
        </>
      )}
    </RoomPage>
  );
}

/** What stands above a run that is not simply ready. */
function RunState({ investigationId, run }: { investigationId: string; run: CompareRun }) {
  const end = useEndCompareRun(investigationId);
  if (run.state === "running") {
    return (
      <div className="mb-5 max-w-3xl">
        <RunProgress
          run={run}
          label="Drawing random networks"
          cancelling={end.isPending}
          onCancel={mayChange(run) ? () => end.mutate({ runId: run.id, act: "cancel" }) : undefined}
        />
        {end.isError ? (
          <Notice tone="error" title="Not stopped." className="mt-2">
            {errorWords(end.error)}.
          </Notice>
        ) : null}
        <p className="mt-2 text-sm text-ink-2">
          It goes on when you leave this page; everybody who may open Compare can watch it.
        </p>
      </div>
    );
  }
  if (run.state === "failed") {
    return (
      <Notice tone="error" title="Not worked out." className="mb-4">
        {fieldWords(run.failure ?? undefined) ?? "The server could not finish it"}. Nothing was
        changed; it can be run again.
      </Notice>
    );
  }
  if (run.state === "cancelled") {
    return (
      <Notice tone="info" title="Cancelled." className="mb-4">
        {run.result
          ? `Figures rest on the ${formatNumber(run.reached)} random networks of each kind drawn until then.`
          : "No figures were kept. It can be run again."}
      </Notice>
    );
  }
  if (run.reached < run.replicates) {
    return (
      <Notice tone="warn" title="Time ran out." className="mb-4">
        {formatPart(run.reached, run.replicates)} random networks of each kind were drawn, and every
        figure below rests on those.
      </Notice>
    );
  }
  return null;
}

type RunFiguresProps = { run: CompareRun; result: NonNullable<CompareRun["result"]> };

function RunFigures({ run, result }: RunFiguresProps) {
  const fileStem = `comparison-version-${run.graphVersion}-seed-${run.seed}`;
  const { seen } = result;
  // The drawing library is heavy, and the table above is what one comes for.
  const [curvesRef, near] = useNear();
  return (
    <>
      <RunSeen run={run} seen={seen} />
      <RunStandings result={result} />
      <Section
        title="Measures"
        subLine={`${populationNames[run.population]}, n = ${formatNumber(run.people)}; ${formatNumber(run.reached)} random networks of each kind; open a row for its plot`}
      >
        <RunTable result={result} reached={run.reached} fileStem={fileStem} />
        <Caution className="mt-2">
          A difference from random mixing can come from how people were traced. Compare only within
          interviewed people
          {seen.state === "complete"
            ? " where a network was not seen whole"
            : ` (share interviewed: ${formatPart(seen.interviewed, seen.n)})`}
          . It describes recorded contacts and does not say whether the outbreak will grow.
        </Caution>
        <Caution className="mt-1">
          Most contact pairs, a place in the largest group or in many triangles often mean a long
          interview, a caring job or a large household. Not for blame, penalties or to decide care.
        </Caution>
        <p className="mt-1 text-sm text-ink-2">
          p is two-sided; 95 % is the middle of the random networks. Greyed columns are shown to be
          read, and take no part in what may be said; “kept” is what a kind of random network holds
          fixed. “Taken alone”: p is 0.05 or less by itself, and not once all rows are allowed for
          (Holm). “—” means not worked out; it is not 0.
        </p>
      </Section>
      <div ref={curvesRef}>
        {near ? (
          <Suspense fallback={<LoadingState label="Opening the plots" rows={6} />}>
            <RunCurves result={result} fileStem={fileStem} />
          </Suspense>
        ) : (
          <LoadingState label="Opening the plots" rows={6} />
        )}
      </div>
    </>
  );
}
