import { z } from "zod";
import { type CompareRunInput, compareRunInput } from "../../../shared/contracts/compare.ts";
import type { NetworkQuestion } from "../../lib/network-summary-query.ts";
import { typedNumber } from "../../lib/typed-number.ts";

/** What the boxes of the form hold. */
export type RunValues = {
  name: string;
  population: CompareRunInput["population"];
  window: NetworkQuestion["window"];
  from: string;
  to: string;
  asOf: string;
  attribute: string;
  replicates: string;
  seed: string;
};

/** A form that starts from the question of the page. */
export function startValues(question: NetworkQuestion): RunValues {
  const { population, window, from = "", to = "", asOf = "" } = question;
  return {
    name: "",
    // The baseline through the same interviews is worked out on everybody on record.
    population: population === "interviewed" ? "all" : population,
    window,
    from,
    to,
    asOf,
    attribute: "",
    replicates: "999",
    seed: "1",
  };
}

type Typed = Partial<Record<keyof RunValues, string>>;

const blank = (text: string | undefined) => (text?.trim() ? text : undefined);

/** The contract, behind what is typed: blank days are open, days count with a free range only. */
export const runForm = z
  .preprocess((typed) => {
    const { name, population, window, from, to, asOf, attribute, replicates, seed } =
      typed as Typed;
    const free = window === "free";
    return {
      name,
      population,
      ...(free ? { from: blank(from), to: blank(to) } : { window }),
      asOf: blank(asOf),
      attribute: blank(attribute) ?? null,
      replicates: typedNumber(replicates ?? ""),
      seed: typedNumber(seed ?? "") ?? "",
    };
  }, compareRunInput)
  .superRefine(({ window, from, to }, context) => {
    if (window !== undefined) return;
    if (from === undefined && to === undefined) {
      context.addIssue({ code: "custom", path: ["from"], message: "required" });
    } else if (from !== undefined && to !== undefined && from > to) {
      context.addIssue({ code: "custom", path: ["to"], message: "last_before_first" });
    }
  });
