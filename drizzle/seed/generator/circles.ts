import { itemAt } from "./item-at.ts";
import type { Rng } from "./rng.ts";
import type { Town } from "./town.ts";

/** The four circles a person may belong to: slots of `Town.member`. */
export const SLOT = { household: 0, day: 1, friends: 2, relatives: 3 } as const;
export const SLOTS = 4;

/** Group of a person in a slot, or -1. */
export function groupOf(town: Town, person: number, slot: number): number {
  return itemAt(town.member, person * SLOTS + slot);
}

/** A random other member of the person's group in a slot; -1 when there is nobody. */
export function someoneIn(town: Town, rng: Rng, person: number, slot: number): number {
  const group = groupOf(town, person, slot);
  if (group < 0) return -1;
  const start = itemAt(town.groupStart, group);
  const size = itemAt(town.groupStart, group + 1) - start;
  if (size < 2) return -1;
  const other = itemAt(town.groupPeople, start + rng.below(size));
  return other === person ? -1 : other;
}

/** Everybody in the person's group in a slot, themselves left out. */
export function othersIn(town: Town, person: number, slot: number): number[] {
  const group = groupOf(town, person, slot);
  if (group < 0) return [];
  const people = town.groupPeople.subarray(
    itemAt(town.groupStart, group),
    itemAt(town.groupStart, group + 1),
  );
  return Array.from(people).filter((other) => other !== person);
}

/** The slot two people share first, or -1. */
export function sharedSlot(town: Town, a: number, b: number): number {
  for (let slot = 0; slot < SLOTS; slot += 1) {
    const group = groupOf(town, a, slot);
    if (group >= 0 && group === groupOf(town, b, slot)) return slot;
  }
  return -1;
}
