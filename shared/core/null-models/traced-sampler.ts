import type { RandomStream } from "../random/random-stream.ts";
import { checkPeople, PairBuffer, type SampledNetwork, type Sampler } from "./sampled-network.ts";

/** How people came to be interviewed and what their interviews could record. */
export type TracedDesign = {
  /** n, people in the population from which contacts are drawn. */
  readonly population: number;
  /** i, interviews. */
  readonly interviews: number;
  /** p, chance that two people are contacts. */
  readonly pairProbability: number;
  /** q, chance that a true contact is named in an interview; 1 where unknown. */
  readonly recall: number;
  /** σ, chance that the next person interviewed is one already named, when there is one. */
  readonly tracedShare: number;
};

function check(design: TracedDesign): void {
  checkPeople(design.population);
  const { interviews, population } = design;
  if (!Number.isSafeInteger(interviews) || interviews < 0 || interviews > population) {
    throw new RangeError("interviews must be a whole number from 0 to the population");
  }
  for (const key of ["pairProbability", "recall", "tracedShare"] as const) {
    if (!(design[key] >= 0 && design[key] <= 1)) throw new RangeError(`${key}: from 0 to 1`);
  }
}

/** A growing list of people from which any one is taken out in one step. */
class Pool {
  people = new Int32Array(64);
  length = 0;
  /** Place of each person in `people`, −1 = not in it. */
  places = new Int32Array(64).fill(-1);

  clear(): void {
    for (let k = 0; k < this.length; k++) this.places[this.people[k]!] = -1;
    this.length = 0;
  }

  add(person: number): void {
    if (person >= this.places.length) {
      const places = new Int32Array(2 * person + 2).fill(-1);
      places.set(this.places);
      this.places = places;
    }
    if (this.length === this.people.length) {
      const people = new Int32Array(2 * this.length);
      people.set(this.people);
      this.people = people;
    }
    this.places[person] = this.length;
    this.people[this.length++] = person;
  }

  /** Takes a person out; no effect when they are not in it. */
  remove(person: number): void {
    const place = this.places[person] ?? -1;
    if (place < 0) return;
    const last = this.people[--this.length]!;
    this.people[place] = last;
    this.places[last] = place;
    this.places[person] = -1;
  }
}

/**
 * Traced random mixing: what the same interviews would have recorded had people mixed at random.
 * Interviews are simulated one after another and true contacts drawn only when they are asked for:
 * with probability σ, if anyone named is not yet interviewed, the next is one of them, else anyone
 * not interviewed; their true contacts are those already drawn with earlier interviewed people plus
 * each person not yet interviewed with probability p; each is named with probability q. The
 * recorded network is the interviewed people and the pairs named, a pair named by either end once.
 *
 * People whom nothing has touched yet are alike, so they are only counted; a person gets a number
 * when a contact or an interview first reaches them. Recorded people are numbered 0, 1, 2, … as they
 * come on record.
 *
 * Assumes equal activity, one recall for all and a uniform choice among people named.
 *
 * @throws RangeError for a design outside its ranges
 *
 * Cost: O(i·(c + 1)) a draw. Source: methods C.7.6 (parametric bootstrap of the tracing design);
 * jumps as in Batagelj & Brandes 2005.
 */
export function tracedSampler(design: TracedDesign): Sampler {
  check(design);
  const { population, interviews, pairProbability: p, recall: q, tracedShare } = design;
  const scale = Math.log1p(-p);
  /** Touched and not interviewed; those of them who were named. */
  const touched = new Pool();
  const named = new Pool();
  /** Latest true contact drawn with an earlier interviewed person, by person; −1 = none. */
  let latest = new Int32Array(64);
  /** Number on record by person, −1 = not recorded. */
  let recorded = new Int32Array(64);
  let flags = new Uint8Array(64);
  const drawn = new PairBuffer(64);
  /** Contact drawn before this one with the same later end; whether the first end named it. */
  let previous = new Int32Array(64);
  let told = new Uint8Array(64);
  const out = new PairBuffer(64);
  const reached: number[] = [];
  let people = 0;
  let onRecord = 0;

  const newPerson = (): number => {
    if (people === latest.length) {
      const size = 2 * people;
      const latestNext = new Int32Array(size);
      latestNext.set(latest);
      latest = latestNext;
      const recordedNext = new Int32Array(size);
      recordedNext.set(recorded);
      recorded = recordedNext;
      const flagsNext = new Uint8Array(size);
      flagsNext.set(flags);
      flags = flagsNext;
    }
    latest[people] = -1;
    recorded[people] = -1;
    touched.add(people);
    return people++;
  };

  const record = (person: number): number => {
    if (recorded[person]! < 0) {
      flags[onRecord] = 0;
      recorded[person] = onRecord++;
    }
    return recorded[person]!;
  };

  const rememberContact = (earlier: number, later: number, isTold: boolean): void => {
    const at = drawn.length;
    drawn.push(earlier, later);
    if (at >= previous.length) {
      const previousNext = new Int32Array(2 * previous.length);
      previousNext.set(previous);
      previous = previousNext;
      const toldNext = new Uint8Array(2 * told.length);
      toldNext.set(told);
      told = toldNext;
    }
    previous[at] = latest[later]!;
    told[at] = isTold ? 1 : 0;
    latest[later] = at;
  };

  const nextInterviewed = (random: RandomStream, left: number): number => {
    // The order of the two questions is part of what a seed means.
    if (named.length > 0 && random.next() < tracedShare) {
      return named.people[random.below(named.length)]!;
    }
    const at = random.below(left);
    return at < touched.length ? touched.people[at]! : newPerson();
  };

  const isNamed = (random: RandomStream) => q === 1 || random.next() < q;

  return {
    sample(random: RandomStream): SampledNetwork {
      touched.clear();
      named.clear();
      drawn.length = 0;
      out.length = 0;
      people = 0;
      onRecord = 0;
      for (let interview = 0; interview < interviews; interview++) {
        const person = nextInterviewed(random, population - interview);
        touched.remove(person);
        named.remove(person);
        const own = record(person);
        flags[own] = 1;
        for (let at = latest[person]!; at >= 0; at = previous[at]!) {
          // Named by the earlier end already: asking again adds nothing to the record.
          if (told[at] !== 0 || !isNamed(random)) continue;
          out.push(recorded[drawn.a[at]!]!, own);
        }
        if (p === 0) continue;
        const others = population - interview - 1;
        const known = touched.length;
        reached.length = 0;
        let strangers = 0;
        for (
          let at = p === 1 ? 0 : Math.floor(Math.log(1 - random.next()) / scale);
          at < others;
          at += p === 1 ? 1 : 1 + Math.floor(Math.log(1 - random.next()) / scale)
        ) {
          if (at < known) reached.push(touched.people[at]!);
          else strangers++;
        }
        for (let k = 0; k < strangers; k++) reached.push(newPerson());
        for (const contact of reached) {
          const isTold = isNamed(random);
          rememberContact(person, contact, isTold);
          if (!isTold) continue;
          if (recorded[contact]! < 0) {
            record(contact);
            named.add(contact);
          }
          out.push(own, recorded[contact]!);
        }
      }
      return { people: onRecord, a: out.a, b: out.b, length: out.length, isInterviewed: flags };
    },
  };
}
