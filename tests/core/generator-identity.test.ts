import { isValidPhoneNumber } from "libphonenumber-js";
import { describe, expect, it } from "vitest";
import { generateOutbreak } from "../../drizzle/seed/generator/generate-outbreak.ts";
import { inventedPhone, isInventedPhone, PHONE_POOL } from "../../drizzle/seed/generator/phones.ts";
import { partialDay } from "../../shared/contracts/common.ts";

const outbreaks = [9, 16, 18].map((seed) =>
  generateOutbreak({
    seed,
    lastDay: "2026-05-20",
    monitoringDays: 14,
    infectiousBefore: 2,
    infectiousAfter: 10,
    incubationMin: 2,
    incubationMax: 10,
    tracers: ["tracer-a"],
    followUpChecks: false,
  }),
);
const everybody = outbreaks.flatMap((outbreak) => outbreak.people);

describe("identity is invented", () => {
  it("has names that are nearly all different, with marks of several kinds", () => {
    for (const { people } of outbreaks) {
      const different = new Set(people.map((person) => person.name)).size;
      expect(different).toBeGreaterThan(people.length * 0.97);
    }
    const names = everybody.map((person) => person.name);
    for (const mark of [/'/, /-/, /[áéíýřčšž]/, /[åøæ]/, /ñ|ç/]) {
      expect(
        names.some((name) => mark.test(name)),
        String(mark),
      ).toBe(true);
    }
    expect(names.every((name) => name === name.normalize("NFC") && name.includes(" "))).toBe(true);
  });

  it("has phones that are well formed, of the invented blocks, and shared only by duplicates", () => {
    for (const outbreak of outbreaks) {
      const phones = new Map<string, number>();
      for (const { id, phone, duplicateOf } of outbreak.people) {
        if (phone === null || phone === "unknown" || phone === "refused") continue;
        expect(isValidPhoneNumber(phone)).toBe(true);
        expect(isInventedPhone(phone)).toBe(true);
        if (duplicateOf === null) {
          expect(phones.has(phone)).toBe(false);
          phones.set(phone, id);
        } else expect(phones.get(phone)).toBe(duplicateOf);
      }
      expect(phones.size).toBeGreaterThan(outbreak.people.length * 0.6);
    }
  });

  it("has phones that end in all kinds of digits", () => {
    for (const { people } of outbreaks) {
      const phones = people.filter((one) => one.phone?.startsWith("+") && one.duplicateOf === null);
      const ends = new Map<string, number>();
      for (const { phone } of phones) {
        const end = phone?.slice(-2) ?? "";
        ends.set(end, (ends.get(end) ?? 0) + 1);
      }
      // A hundred ends there are; none of them tells more than a handful of people apart.
      expect(ends.size).toBeGreaterThanOrEqual(95);
      expect(Math.max(...ends.values())).toBeLessThan(phones.length * 0.03);
    }
  });

  it("never runs through the same number twice before the pool is used up", () => {
    const all = new Set(Array.from({ length: PHONE_POOL }, (_, index) => inventedPhone(index)));
    expect(all.size).toBe(PHONE_POOL);
    expect(all.has(null)).toBe(false);
    expect(inventedPhone(PHONE_POOL)).toBeNull();
    expect(isValidPhoneNumber(inventedPhone(PHONE_POOL - 1) ?? "")).toBe(true);
  });

  it("has mail only at a reserved name, each once", () => {
    for (const { people } of outbreaks) {
      const mails = people.flatMap((person) => person.email ?? []);
      expect(mails.length).toBeGreaterThan(50);
      expect(mails.every((mail) => /^[a-z.]+\.\d+@example\.org$/.test(mail))).toBe(true);
      expect(new Set(mails).size).toBe(mails.length);
    }
  });

  it("spells a duplicate another way and points at the first entry", () => {
    for (const { people, story } of outbreaks) {
      const doubles = people.filter((person) => person.duplicateOf !== null);
      expect(doubles.map((person) => person.id)).toEqual(story.duplicates);
      expect(doubles.length).toBeGreaterThan(0);
      for (const person of doubles) {
        const first = people[person.duplicateOf ?? -1];
        expect(first?.duplicateOf).toBeNull();
        expect(first?.phone).toBe(person.phone);
        expect(first?.name).not.toBe(person.name);
        expect((first?.recordedAt ?? "9999") <= person.recordedAt).toBe(true);
      }
    }
  });

  it("keeps unknown, refused, not asked and partial apart", () => {
    const births = everybody.map((person) => person.birthDate);
    for (const value of ["unknown", "refused", null]) expect(births).toContain(value);
    expect(births.some((value) => /^\d{4}-\d{2}$/.test(value ?? ""))).toBe(true);
    // What a form and an import take; else a file taken out could not be brought in again.
    const refused = births.filter((value) => !partialDay.safeParse(value).success);
    expect(refused).toEqual([]);
    const onsets = everybody.map((person) => person.onsetDate);
    for (const value of ["unknown", "refused"]) expect(onsets).toContain(value);
    expect(onsets.some((value) => /^\d{4}-\d{2}$/.test(value ?? ""))).toBe(true);
  });
});

describe("places", () => {
  it("carry each name once and set households apart by number", () => {
    for (const { places } of outbreaks) {
      expect(new Set(places.map((place) => place.name)).size).toBe(places.length);
      const homes = places.filter((place) => place.setting === "household");
      expect(homes.every((place) => /^Household \d+$/.test(place.name))).toBe(true);
      for (const name of ["Sallow Bay School", "Lantern House", "Saltern Market", "Cutter Ferry"]) {
        expect(places.some((place) => place.name === name)).toBe(true);
      }
    }
  });
});
