import { expect, test } from "vitest";
import { MARKED_KEYS, MarkerScan, markedPerson } from "./support/markers.ts";

const person = markedPerson("bimo", 7);
const scan = new MarkerScan();
scan.add("one", person);

test.each(MARKED_KEYS)("%s is found as it stands and in every disguise", (key) => {
  const value = person[key];
  const disguises = [
    value,
    value.toUpperCase(),
    value.normalize("NFD"),
    encodeURIComponent(value),
    JSON.stringify({ value }).replace(/é/g, "\\u00e9"),
    [...value].reverse().join(""),
    Buffer.from(value).toString("hex"),
    ...["", "x", "xy"].map((lead) => Buffer.from(`${lead}${value}, more`).toString("base64")),
    ...["", "x", "xy"].map((lead) => Buffer.from(`${lead}${value}`).toString("base64url")),
  ];
  for (const text of disguises) {
    expect(scan.hits(`before ${text} after`), text).toContainEqual(
      expect.objectContaining({ person: "one", key }),
    );
  }
});

test("a telephone number is found by its digits, a name by either part", () => {
  expect(scan.hits("447700900407")).toMatchObject([{ key: "phone" }, { key: "phone" }]);
  expect(scan.hits("07700900407").map((hit) => hit.key)).toContain("phone");
  expect(scan.hits("okxubimo").map((hit) => hit.key)).toEqual(["name"]);
});

test("masked and coarse forms and other people's values are not hits", () => {
  for (const text of ["Z. O.", "07", "z…@….example", "1917", "Zqnélode", "+44 7700 900408"]) {
    expect(scan.hits(text), text).toEqual([]);
  }
});
