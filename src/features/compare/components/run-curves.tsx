import { useState } from "react";
import type { Baseline } from "../../../../shared/contracts/compare.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { comparisonReason } from "../comparison-words.ts";
import { CurveChart } from "../plots/curve-chart.tsx";
import { type Curve, curvePoints, curveTable, outsideWords } from "../plots/curve-data.ts";
import { PlotFrame } from "../plots/plot-frame.tsx";
import { firstBaseline, formatP, isOpen, type RunResult } from "../run-verdict.ts";
import { baselineWords } from "../run-words.ts";

export type RunCurvesProps = { result: RunResult; fileStem: string };

/** Numbers of pairs and sizes of groups against those of the random networks of one kind. */
export function RunCurves({ result, fileStem }: RunCurvesProps) {
  const drawn = result.baselines.filter(
    ({ baseline, drawn: isDrawn }) =>
      isDrawn && (result.degrees.baselines[baseline] || result.sizes.baselines[baseline]),
  );
  const [chosen, setChosen] = useState<Baseline | null>(
    () => bestForCurves(drawn, result) ?? drawn[0]?.baseline ?? null,
  );
  const one = drawn.find(({ baseline }) => baseline === chosen);
  const greyed = one ? !isOpen(one) : false;
  const law = result.comparisons.find(({ key }) => key === "degree_law");
  const lawsHold = law?.standing === "show" || law?.standing === "warn";
  // Laws that may not be held against this record are left out of the picture, and said why.
  const degrees = lawsHold ? result.degrees : { ...result.degrees, binomial: null, poisson: null };
  return (
    <>
      {drawn.length > 0 && chosen ? (
        <div className="mb-3">
          <MenuSelect
            label="random networks"
            value={chosen}
            options={drawn.map((each) => ({
              value: each.baseline,
              label: `${baselineWords[each.baseline].short}${isOpen(each) ? "" : " (greyed)"}`,
            }))}
            onValueChange={setChosen}
          />
          {one && one.reasons.length > 0 ? (
            <Caution className="mt-2">
              {greyed ? "Greyed: " : "Take care: "}
              {one.reasons.map(comparisonReason).join("; ")}.
            </Caution>
          ) : null}
        </div>
      ) : null}
      <div className="grid grid-cols-1 gap-x-10 lg:grid-cols-2">
        <Section title="Contact pairs of a person">
          <CurvePlot
            label="People by their number of contact pairs"
            curve={degrees}
            names={{ at: "contact pairs of a person", observed: "people" }}
            {...{ baseline: chosen, greyed, first: 0, fileStem: `${fileStem}-numbers-of-pairs` }}
          />
          {law && !lawsHold ? (
            <Caution>
              The binomial and Poisson laws are left out:{" "}
              {law.reasons.map(comparisonReason).join("; ")}.
            </Caution>
          ) : null}
        </Section>
        <Section title="Sizes of connected groups">
          <CurvePlot
            label="Connected groups by their number of people"
            curve={result.sizes}
            names={{ at: "people in a group", observed: "groups" }}
            growing
            {...{ baseline: chosen, greyed, first: 1, fileStem: `${fileStem}-group-sizes` }}
          />
          <Caution>
            Groups found by calculation are suggestions; an epidemiologist decides what a cluster
            is.
          </Caution>
        </Section>
      </div>
    </>
  );
}

/** An open baseline with bands for both curves; one that keeps numbers of pairs has none for them. */
function bestForCurves(drawn: RunResult["baselines"], result: RunResult): Baseline | undefined {
  const first = firstBaseline(result);
  const withBands = drawn.filter(({ baseline }) => result.degrees.baselines[baseline]);
  if (first && withBands.some(({ baseline }) => baseline === first.baseline)) return first.baseline;
  return (withBands.find(isOpen) ?? withBands[0] ?? first)?.baseline;
}

type CurvePlotProps = {
  label: string;
  curve: Curve;
  names: { at: string; observed: string };
  baseline: Baseline | null;
  greyed: boolean;
  first: 0 | 1;
  growing?: boolean;
  fileStem: string;
};

function CurvePlot(props: CurvePlotProps) {
  const { label, curve, names, baseline, greyed, first, growing = false, fileStem } = props;
  const points = curvePoints(curve, baseline, first);
  const bands = baseline ? curve.baselines[baseline] : undefined;
  const p = bands && bands.p !== null ? ` The curve as a whole: p = ${formatP(bands.p)}.` : "";
  const sentence = `${outsideWords(points, names.at)}${p}`.trim();
  const withLaws = points.some(({ binomial }) => binomial !== undefined);
  return (
    <PlotFrame
      label={label}
      summary={sentence || `${points.length} points`}
      table={curveTable(points, curve, names)}
      fileStem={fileStem}
      notes={
        <div className="text-sm text-ink-2">
          {sentence ? <strong className="font-bold text-ink">{sentence} </strong> : null}
          {baseline && !bands
            ? "Random networks of this kind keep these numbers as they are on record: no bands. "
            : ""}
          {bands?.quickLook ? "A quick look: fewer than 999 random networks. " : ""}
          Points: on record
          {points.length === curve.observed.length ? "; the last one, that many or more" : ""}.
          {bands ? " Shaded: 95 % at each point." : ""}
          {bands?.globalLow ? " Dashed: 95 % for the curve as a whole." : ""}
          {withLaws ? " Ochre: the binomial law, dotted the Poisson law, of random mixing." : ""}
          {growing ? " Both axes shrink what is large." : ""}
        </div>
      }
    >
      <CurveChart
        points={points}
        atLabel={names.at}
        valueLabel={names.observed}
        greyed={greyed}
        growing={growing}
      />
    </PlotFrame>
  );
}
