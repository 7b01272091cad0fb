import type { NetworkSummary } from "../../shared/contracts/network.ts";
import { CLASSIFICATIONS } from "../../shared/vocabulary.ts";
import type { PictureAnswer } from "./answer-picture.ts";
import type { ReportAnswer } from "./answer-report.ts";
import type { LoadedGraph } from "./live-graph.ts";
import type { AskedReport } from "./report-question.ts";

/** A worker's report as the contract gives it. */
export function presentSummary(
  asked: AskedReport,
  graphVersion: number,
  answer: ReportAnswer,
): NetworkSummary {
  const { report, from, to, interviewed, coverage, undated, unresolvedGroupExposures } = answer;
  const { pairsPerPersonInterval, openVerdicts } = report.threshold;
  return {
    ...report,
    threshold: {
      ...report.threshold,
      pairsPerPersonInterval: pairsPerPersonInterval && [...pairsPerPersonInterval],
      openVerdicts: [...openVerdicts],
    },
    population: asked.question.population,
    n: report.threshold.n,
    from,
    to,
    asOf: asked.asOf,
    cutOff: asked.cutOff,
    graphVersion,
    window: asked.question.window,
    interviewed,
    coverage,
    meanDegreeInterviewed: answer.meanDegreeInterviewed,
    undated,
    unresolvedGroupExposures,
    trail: [...answer.trail, { day: asked.day, pairsPerPerson: report.threshold.pairsPerPerson }],
  };
}

/** A worker's picture as the contract gives it: numbers become record ids and study numbers. */
export function presentPicture(
  { store }: LoadedGraph,
  answer: PictureAnswer,
  ids: ReadonlyMap<number, string>,
) {
  const { becameCase } = store.people.columns;
  const idOf = (person: number) => store.personIds[person] ?? "";
  const isPeople = answer.level === "people";
  const nodes = answer.nodes.map(({ person, founder, rank, size, code, x, y }) => {
    const group = ids.get(founder) ?? idOf(founder);
    return {
      id: isPeople ? idOf(person) : group,
      studyNumber: store.studyNumbers[person] ?? "",
      classification: CLASSIFICATIONS[code - 1] ?? null,
      becameCase: isPeople && becameCase[person] === 1,
      group,
      groupRank: rank,
      size,
      x,
      y,
    };
  });
  const pairs = answer.pairs.map(({ pair, a, b }) => ({
    id: `pair-${pair}`,
    source: nodes[a]?.id ?? "",
    target: nodes[b]?.id ?? "",
  }));
  return { level: answer.level, nodes, pairs };
}
