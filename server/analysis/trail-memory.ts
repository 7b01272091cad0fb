import type { ReportAnswer } from "./answer-report.ts";
import type { CutOff, ReportQuestion } from "./report-question.ts";
import type { TrailPoint } from "./trail.ts";

/** Values kept; a year of days for each of some questions. */
const MOST_KEPT = 2_000;

/**
 * Trail values already worked out. What was known at the end of a past day does not change with
 * what is recorded later, so after each interview only the report itself is computed anew.
 */
export class TrailMemory {
  readonly #values = new Map<string, number | null>();
  readonly #basis = new Map<string, string>();

  /** Forgets everything: entries may have been loaded that are older than what was worked out. */
  clear(): void {
    this.#values.clear();
  }

  #key(question: ReportQuestion, day: string): string {
    const { population, window, from, to, presetDays, declaredPopulation } = question;
    return JSON.stringify([population, window, from, to, presetDays, declaredPopulation, day]);
  }

  /** The question, asking for those days only that are not known yet. */
  reduce(question: ReportQuestion): ReportQuestion {
    const missing = question.trail.filter((c) => !this.#values.has(this.#key(question, c.day)));
    return { ...question, trail: missing };
  }

  /**
   * Keeps what an answer brought.
   * @returns false when values kept earlier rest on another basis; they are forgotten then
   */
  keep(question: ReportQuestion, answer: ReportAnswer): boolean {
    const basis = this.#basis.get(question.population) ?? answer.basis;
    if (basis !== answer.basis || this.#values.size > MOST_KEPT) this.#values.clear();
    this.#basis.set(question.population, answer.basis);
    for (const point of answer.trail) {
      this.#values.set(this.#key(question, point.day), point.pairsPerPerson);
    }
    return question.trail.every((cutOff) => this.#values.has(this.#key(question, cutOff.day)));
  }

  /** The trail of a question whose days are all known. */
  of(question: ReportQuestion): TrailPoint[] {
    return question.trail.map(({ day }: CutOff) => ({
      day,
      pairsPerPerson: this.#values.get(this.#key(question, day)) ?? null,
    }));
  }
}
