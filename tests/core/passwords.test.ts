import { describe, expect, it } from "vitest";
import { isGuessable } from "../../shared/passwords.ts";

describe("passwords that are guessed first", () => {
  it.each([
    "passwordpassword",
    "Password-2026!!",
    "p@ssw0rdp@ssw0rd",
    "123456789012345",
    "aaaaaaaaaaaaaaaa",
    "abcabcabcabcabc1",
    "qwertyuiopasdfgh",
    "iloveyouiloveyou",
    "strandline-officer-2026",
    "welcome welcome 1999",
  ])("refuses %s", (password) => {
    expect(isGuessable(password)).toBe(true);
  });

  it.each([
    "three tides and a lantern",
    "long enough for a test",
    "3f9182c2d7710e58",
    "8#kQ2!9zP$4vL@7w",
    "μια μακριά φράση εδώ",
    "correct horse battery staple",
  ])("takes %s", (password) => {
    expect(isGuessable(password)).toBe(false);
  });

  it("knows what the account itself gives away", () => {
    const words = ["Ada Field", "ada.field@trace.example"];
    expect(isGuessable("ada field ada field 12", words)).toBe(true);
    expect(isGuessable("ada field ada field 12")).toBe(false);
    expect(isGuessable("ada walks the tide line", words)).toBe(false);
  });

  it("ends quickly on the longest input", () => {
    const started = performance.now();
    isGuessable(`${"ab".repeat(127)}x!`, ["x".repeat(120)]);
    isGuessable(`${"a1".repeat(64)}${"b2".repeat(64)}`);
    expect(performance.now() - started).toBeLessThan(200);
  });
});
