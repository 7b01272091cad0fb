import { type GroupEvent, LivingGroups } from "./living-groups.ts";
import type { PairSpans } from "./pair-spans.ts";

export type FilmInput = {
  /** When each person enters, in the unit of the spans; null = all there from the start. */
  readonly enteredAt: Float64Array | null;
  /** People, numbered as the ends of the spans. */
  readonly n: number;
  readonly spans: PairSpans;
  /** Ascending instants at which the film stops; what happened up to and at each is in it. */
  readonly frames: Float64Array;
};

export type FilmFrame = {
  readonly at: number;
  readonly people: number;
  readonly pairs: number;
  /** Connected groups, people without a pair included. */
  readonly groups: number;
  readonly largest: number;
  /** Pairs beyond those that hold the groups together: m − n + groups. */
  readonly cycleRank: number;
  /** Since the frame before: groups that began, people who joined one, groups that became one. */
  readonly births: number;
  readonly joins: number;
  readonly merges: number;
  /** Parts of two or more that split off, and groups that dissolved, by withdrawals. */
  readonly splits: number;
  readonly ends: number;
  readonly events: readonly GroupEvent[];
};

export type GroupFilm = {
  readonly frames: readonly FilmFrame[];
  /**
   * Id of each person's group at the last frame; −1 for people not entered by then. An id below n is
   * that of the person with whom the group began, one from n on that of a group that split off.
   */
  readonly groupIds: Int32Array;
};

function check({ enteredAt, n, spans, frames }: FilmInput): void {
  if (!Number.isSafeInteger(n) || n < 0) throw new RangeError("n must be a whole number >= 0");
  if (enteredAt !== null && enteredAt.length !== n) {
    throw new RangeError("enteredAt must hold one instant per person");
  }
  const { a, b, from, until } = spans;
  if (b.length !== a.length || from.length !== a.length || until.length !== a.length) {
    throw new RangeError("span columns differ in length");
  }
  for (let k = 0; k < a.length; k++) {
    const [u, v] = [a[k]!, b[k]!];
    if (u < 0 || u >= n || v < 0 || v >= n || u === v) {
      throw new RangeError(`span ${k} does not join two of the people`);
    }
    if (!(from[k]! < until[k]!)) throw new RangeError(`span ${k} ends before it begins`);
  }
  for (let k = 0; k < frames.length; k++) {
    if (!(k === 0 ? !Number.isNaN(frames[k]!) : frames[k]! > frames[k - 1]!)) {
      throw new RangeError("frames must ascend");
    }
  }
}

/** Indices by ascending time, tie by index. */
function byTime(times: Float64Array): Int32Array {
  return Int32Array.from(times, (_, k) => k).sort((x, y) => times[x]! - times[y]! || x - y);
}

/**
 * Growth of connected groups over time, as a film of frames. Which film depends on the spans:
 * `spansAsItHappened` (first exposure) or `spansAsWeKnewIt` (entry into the record).
 *
 * Pairs are taken in order of their beginning, tie by number. A person enters no later than their
 * first pair. Pairs that end between two frames are taken out first and the groups rebuilt once; a
 * pair that begins and ends between two frames is never seen. Frames at every instant of change
 * therefore give the whole story.
 *
 * @throws RangeError when columns differ in length, a span joins nobody, ends before it begins, or
 *   frames do not ascend
 *
 * Edge cases: no people → all 0; no frame → no film. Two spans of the same pair at one time would
 * count twice as pairs: merge them first. Cost: O(n + m log m), and O(n + m) more for every frame
 * with a withdrawal. Source: methods C.11; Tarjan 1975 (union–find).
 */
export function groupFilm(input: FilmInput): GroupFilm {
  check(input);
  const { n, spans, frames } = input;
  const entered = new Float64Array(n).fill(Number.NEGATIVE_INFINITY);
  if (input.enteredAt) entered.set(input.enteredAt);
  const { from, until } = spans;
  for (let k = 0; k < from.length; k++) {
    for (const u of [spans.a[k]!, spans.b[k]!])
      if (!(entered[u]! <= from[k]!)) entered[u] = from[k]!;
  }
  const people = byTime(entered);
  const starts = byTime(from);
  const place = new Int32Array(n).fill(-1);
  const groups = new LivingGroups(n);

  // Pairs that stand, as places of entry, with the instant each one ends.
  const a = new Int32Array(from.length);
  const b = new Int32Array(from.length);
  const end = new Float64Array(from.length);
  let pairs = 0;
  let nextEnd = Number.POSITIVE_INFINITY;
  let person = 0;
  let span = 0;
  const film: FilmFrame[] = [];
  for (const at of frames) {
    const events: GroupEvent[] = [];
    if (nextEnd <= at) {
      let kept = 0;
      nextEnd = Number.POSITIVE_INFINITY;
      for (let k = 0; k < pairs; k++) {
        if (end[k]! <= at) continue;
        a[kept] = a[k]!;
        b[kept] = b[k]!;
        end[kept] = end[k]!;
        nextEnd = Math.min(nextEnd, end[kept]!);
        kept++;
      }
      pairs = kept;
      for (const event of groups.rebuild(a, b, pairs)) events.push(event);
    }
    let joins = 0;
    for (; person < n && entered[people[person]!]! <= at; person++) {
      place[people[person]!] = groups.enter(people[person]!);
    }
    for (; span < starts.length && from[starts[span]!]! <= at; span++) {
      const k = starts[span]!;
      if (until[k]! <= at) continue;
      a[pairs] = place[spans.a[k]!]!;
      b[pairs] = place[spans.b[k]!]!;
      end[pairs] = until[k]!;
      nextEnd = Math.min(nextEnd, until[k]!);
      const outcome = groups.join(a[pairs]!, b[pairs]!);
      pairs++;
      if (outcome === "join") joins++;
      else if (outcome !== "within") events.push(outcome);
    }
    film.push(frameOf(at, groups, pairs, joins, events));
  }
  const groupIds = place.map((held) => (held < 0 ? -1 : groups.idOf(held)));
  return { frames: film, groupIds };
}

function frameOf(
  at: number,
  groups: LivingGroups,
  pairs: number,
  joins: number,
  events: readonly GroupEvent[],
): FilmFrame {
  const count = { birth: 0, merge: 0, split: 0, end: 0 };
  for (const { kind } of events) count[kind]++;
  return {
    at,
    people: groups.people,
    pairs,
    groups: groups.groups,
    largest: groups.largest,
    cycleRank: pairs - groups.people + groups.groups,
    births: count.birth,
    joins,
    merges: count.merge,
    splits: count.split,
    ends: count.end,
    events,
  };
}
