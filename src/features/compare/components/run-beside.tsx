import { useQuery } from "@tanstack/react-query";
import type { CompareMeasure, CompareRun } from "../../../../shared/contracts/compare.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { compareRunQuery } from "../api/get-compare-run.ts";
import { compareRunsQuery } from "../api/list-compare-runs.ts";
import { firstBaseline, type RunResult, verdictWords } from "../run-verdict.ts";
import { baselineWords, statisticWords } from "../run-words.ts";
import { runFacts } from "./run-facts.tsx";
import { envelopeWords } from "./run-table.tsx";

export type RunBesideProps = {
  investigationId: string;
  timeZone: string;
  run: CompareRun;
  /** Id of the run beside this one; from the address. */
  other: string | undefined;
  onOther: (runId: string | undefined) => void;
};

/** Another comparison beside this one, and what is different between them. */
export function RunBeside({ investigationId, timeZone, run, other, onOther }: RunBesideProps) {
  const runs = useQuery(compareRunsQuery(investigationId, 1, 100));
  const beside = useQuery({
    ...compareRunQuery(investigationId, other ?? ""),
    enabled: other !== undefined,
  });
  const choice = (runs.data?.items ?? []).filter(
    ({ id, state }) => id !== run.id && (state === "ready" || id === other),
  );
  return (
    <Section title="Side by side" subLine="with another comparison, and what changed between them">
      {choice.length === 0 && other === undefined ? (
        <p className="text-ink-2">
          There is no other comparison yet. Ask the record as it stands now, later on, to see what
          changed.
        </p>
      ) : (
        <MenuSelect
          label="beside this one"
          className="mb-3"
          value={other ?? ""}
          options={[
            { value: "", label: "none" },
            ...choice.map(({ id, name, cutOff }) => ({
              value: id,
              label: `${name} (${formatInstant(cutOff, timeZone)})`,
            })),
          ]}
          onValueChange={(id) => onOther(id || undefined)}
        />
      )}
      {other === undefined ? null : beside.isError ? (
        <ErrorState kind={errorKind(beside.error)} onRetry={() => void beside.refetch()} />
      ) : !beside.data ? (
        <LoadingState label="Opening the other comparison" rows={4} />
      ) : (
        <BothRuns run={run} beside={beside.data} timeZone={timeZone} />
      )}
    </Section>
  );
}

type BothRunsProps = { run: CompareRun; beside: CompareRun; timeZone: string };

function BothRuns({ run, beside, timeZone }: BothRunsProps) {
  const [older, newer] = run.cutOff < beside.cutOff ? [run, beside] : [beside, run];
  const [before, after] = [runFacts(older, timeZone), runFacts(newer, timeZone)];
  const changed = before.filter(({ value }, place) => value !== after[place]?.value);
  return (
    <>
      <ScrollRegion label="What was asked in both comparisons">
        <Table caption="What is different in what was asked" className="mb-5">
          <thead>
            <tr>
              <HeadCell>asked</HeadCell>
              <HeadCell>{headOf(older, run, timeZone)}</HeadCell>
              <HeadCell>{headOf(newer, run, timeZone)}</HeadCell>
            </tr>
          </thead>
          <tbody>
            {changed.map(({ name, value }) => (
              <tr key={name}>
                <HeadCell scope="row">{name}</HeadCell>
                <Cell>{value}</Cell>
                <Cell>{after.find((fact) => fact.name === name)?.value}</Cell>
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
      {older.result && newer.result ? (
        <BothMeasures
          older={older.result}
          newer={newer.result}
          heads={[headOf(older, run, timeZone), headOf(newer, run, timeZone)]}
        />
      ) : (
        <p className="text-ink-2" role="status">
          The other comparison has no figures yet; they appear here as soon as they are there.
        </p>
      )}
    </>
  );
}

function headOf(run: CompareRun, here: CompareRun, timeZone: string): string {
  const which = run.id === here.id ? "this one" : "the other";
  return `${which}, ${formatInstant(run.cutOff, timeZone)}`;
}

type BothMeasuresProps = { older: RunResult; newer: RunResult; heads: [string, string] };

function BothMeasures({ older, newer, heads }: BothMeasuresProps) {
  return (
    <ScrollRegion label="Measures of both comparisons">
      <Table caption="Measures side by side, with the first baseline of each">
        <thead>
          <tr>
            <HeadCell>measure</HeadCell>
            <HeadCell numeric>{heads[0]}</HeadCell>
            <HeadCell numeric>{heads[1]}</HeadCell>
            <HeadCell numeric>difference</HeadCell>
            <HeadCell>what may be said</HeadCell>
          </tr>
        </thead>
        <tbody>
          {newer.measures.map((measure) => {
            const before = older.measures.find(({ statistic }) => statistic === measure.statistic);
            const { name, decimals } = statisticWords[measure.statistic];
            const said = before ? verdictWords(before, older) : null;
            const saidNow = verdictWords(measure, newer);
            return (
              <tr key={measure.statistic}>
                <HeadCell scope="row" className="min-w-40">
                  {name}
                </HeadCell>
                <SideCell measure={before} result={older} decimals={decimals} />
                <SideCell measure={measure} result={newer} decimals={decimals} />
                <Cell numeric>
                  {differenceWords(before?.observed ?? null, measure.observed, decimals)}
                </Cell>
                <Cell className="min-w-56">
                  {said === null || said === saidNow ? saidNow : `was: ${said}. Now: ${saidNow}`}
                </Cell>
              </tr>
            );
          })}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}

type SideCellProps = { measure: CompareMeasure | undefined; result: RunResult; decimals: number };

function SideCell({ measure, result, decimals }: SideCellProps) {
  const first = firstBaseline(result);
  const figure = first && measure ? measure.baselines[first.baseline] : undefined;
  return (
    <Cell numeric>
      {formatNumber(measure?.observed ?? null, { decimals })}
      {first && figure ? (
        <span className="block text-sm text-ink-2">
          <span className="sr-only">{baselineWords[first.baseline].short} </span>
          {envelopeWords(figure, decimals)}
        </span>
      ) : null}
    </Cell>
  );
}

/** "+3", "−0.012", "0": newer less older. */
export function differenceWords(before: number | null, after: number | null, decimals: number) {
  if (before === null || after === null) return "—";
  const difference = after - before;
  const sign = difference > 0 ? "+" : "";
  return `${sign}${formatNumber(difference, { decimals: difference === 0 ? 0 : decimals })}`;
}
