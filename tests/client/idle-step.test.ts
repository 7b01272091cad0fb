import { describe, expect, it } from "vitest";
import { idleStep } from "../../src/features/session/idle-step.ts";

const now = Date.parse("2026-05-27T12:00:00Z");
const minute = 60_000;
const session = { idleMinutes: 15, endsAt: "2026-05-27T20:00:00Z" };
const idle = (minutes: number, unheardInput = false) => ({
  idleMs: minutes * minute,
  unheardInput,
});

describe("what to do about an idle session", () => {
  it("is nothing while there is time", () => {
    expect(idleStep(idle(5), session, now)).toEqual({
      ask: "nothing",
      warnSeconds: null,
      endsSoon: false,
    });
  });

  it("is a warning in the last two minutes, with the seconds left", () => {
    expect(idleStep(idle(12.9), session, now).warnSeconds).toBeNull();
    expect(idleStep(idle(13), session, now).warnSeconds).toBe(120);
    expect(idleStep(idle(14.5), session, now).warnSeconds).toBe(30);
  });

  it("is to tell the server when somebody types and nothing was sent for a while", () => {
    expect(idleStep(idle(3, true), session, now).ask).toBe("nothing");
    expect(idleStep(idle(4, true), session, now)).toMatchObject({ ask: "stay", warnSeconds: null });
    expect(idleStep(idle(14, true), session, now).ask).toBe("stay");
  });

  it("is to ask whether it is over once the time has run out, typed or not", () => {
    expect(idleStep(idle(15), session, now).ask).toBe("check");
    expect(idleStep(idle(16, true), session, now).ask).toBe("check");
  });

  it("is to say so before the end that nothing moves, and to check at it", () => {
    const soon = { ...session, endsAt: "2026-05-27T12:09:00Z" };
    expect(idleStep(idle(0), soon, now)).toMatchObject({ ask: "nothing", endsSoon: true });
    const over = { ...session, endsAt: "2026-05-27T12:00:00Z" };
    expect(idleStep(idle(0, true), over, now).ask).toBe("check");
  });
});
