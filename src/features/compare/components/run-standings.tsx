import { STANDINGS, type Standing } from "../../../../shared/core/index.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { Tag, type TagTone } from "../../../components/ui/tag.tsx";
import { formatNumber } from "../../../lib/formatters.ts";
import { wordFor } from "../../../lib/words.ts";
import { comparisonReason, comparisonWords, standingWords } from "../comparison-words.ts";
import type { RunResult } from "../run-verdict.ts";
import { attributeWords, baselineWords } from "../run-words.ts";

const tones: Record<Standing, TagTone> = {
  show: "kelp",
  warn: "ochre",
  grey: "quiet",
  refuse: "coral",
};

/** Which comparisons this record allows, and why not the others. */
export function RunStandings({ result }: { result: RunResult }) {
  const ordered = STANDINGS.flatMap((standing) =>
    result.comparisons.filter((one) => one.standing === standing),
  );
  return (
    <Section title="What may be compared" subLine="by how this network was seen">
      <ScrollRegion label="What may be compared">
        <Table caption="Comparisons and whether this record allows them" hideCaption>
          <thead>
            <tr>
              <HeadCell>comparison, and why it is not simply shown</HeadCell>
              <HeadCell>here</HeadCell>
            </tr>
          </thead>
          <tbody>
            {ordered.map(({ key, standing, reasons, instead }) => (
              <tr key={key}>
                <HeadCell scope="row" className={standing === "grey" ? "text-ink-2" : ""}>
                  {comparisonWords[key]}
                  {reasons.length > 0 ? (
                    <span className="block text-sm text-ink-2">
                      {sentence(reasons)}
                      {instead ? ` Look at ${comparisonWords[instead]} instead.` : ""}
                    </span>
                  ) : null}
                </HeadCell>
                <Cell>
                  <Tag tone={tones[standing]}>{standingWords[standing]}</Tag>
                </Cell>
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
      <h3 className="mt-5 mb-1 text-[0.9375rem]">Random networks drawn</h3>
      <ul>
        {result.baselines.map(({ baseline, standing, reasons, drawn, parameters }) => (
          <li key={baseline} className="border-t border-rule py-1.5 last:border-b">
            <strong className="me-2">{baselineWords[baseline].short}</strong>
            <Tag tone={drawn ? tones[standing] : "coral"}>
              {drawn ? standingWords[standing] : "not drawn"}
            </Tag>
            <span className="ms-2 text-sm text-ink-2">
              {baselineWords[baseline].held}.{reasons.length > 0 ? ` ${sentence(reasons)}` : ""}
              {drawn ? parameterWords(parameters) : ""}
            </span>
          </li>
        ))}
      </ul>
    </Section>
  );
}

/** Reasons as one sentence. */
function sentence(reasons: readonly string[]): string {
  const text = reasons.map(comparisonReason).join("; ");
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}

const parameterNames: Readonly<Record<string, string>> = {
  burnIn: "burn-in",
  burnInPerPair: "burn-in per pair",
  interviews: "interviews",
  missing: "people without a value",
  p: "p",
  q: "recall q",
  sigma: "share named before their interview σ",
};

function parameterWords(parameters: RunResult["baselines"][number]["parameters"]): string {
  const told = Object.entries(parameters).flatMap(([key, value]) => {
    // How many were reached stands over the table.
    if (value === null || key === "reached") return [];
    const shown =
      typeof value === "string"
        ? wordFor(attributeWords, value)
        : Number.isInteger(value)
          ? formatNumber(value)
          : String(Number(value.toPrecision(4)));
    const name = wordFor(parameterNames, key).replace(/[A-Z]/g, (one) => ` ${one.toLowerCase()}`);
    return [`${name} ${shown}`];
  });
  return told.length > 0 ? ` Drawn with ${told.join(", ")}.` : "";
}
