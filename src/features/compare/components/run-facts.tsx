import type { CompareRun } from "../../../../shared/contracts/compare.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { populationNames } from "../../../lib/population-words.ts";
import { asOfWords, attributeWords, runExposureWords } from "../run-words.ts";

/** Each fact of a run as a name and words: what was compared, and all that is needed to redo it. */
export function runFacts(run: CompareRun, timeZone: string): { name: string; value: string }[] {
  return [
    {
      name: "people",
      value: `${populationNames[run.population]}, n = ${formatNumber(run.people)}`,
    },
    { name: "contact pairs", value: formatNumber(run.pairs) },
    { name: "exposures", value: runExposureWords(run) },
    { name: "as of", value: asOfWords(run, timeZone) },
    { name: "cut-off", value: formatInstant(run.cutOff, timeZone) },
    { name: "network version", value: formatNumber(run.graphVersion) },
    { name: "mixing by", value: run.attribute ? attributeWords[run.attribute] : "no attribute" },
    {
      name: "random networks of each kind",
      value:
        run.state === "ready" && run.reached < run.replicates
          ? `${formatNumber(run.reached)} of ${formatNumber(run.replicates)}`
          : formatNumber(run.replicates),
    },
    { name: "seed", value: String(run.seed) },
    { name: "method", value: `core ${run.coreVersion}, generator ${run.generator}` },
    { name: "asked for", value: formatInstant(run.recordedAt, timeZone) },
    { name: "by", value: run.by ?? "—" },
  ];
}

/** What a run is about and how it was made. */
export function RunFacts({ run, timeZone }: { run: CompareRun; timeZone: string }) {
  return (
    <dl className="mb-6 grid grid-cols-2 gap-x-8 gap-y-2 border-y border-rule py-3 sm:grid-cols-3 lg:grid-cols-4">
      {runFacts(run, timeZone).map(({ name, value }) => (
        <div key={name} className="min-w-0">
          <dt className="text-sm text-ink-2">{name}</dt>
          <dd className="break-words">{value}</dd>
        </div>
      ))}
    </dl>
  );
}
