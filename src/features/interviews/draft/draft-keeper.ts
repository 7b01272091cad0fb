import type { Draft } from "../../../../shared/contracts/interviews.ts";
import { ApiError } from "../../../lib/api-error.ts";
import type { DraftBody } from "../form/draft-body.ts";

/** Where the typed text stands. `savedAt` is the server's time of the last save, if any. */
export type DraftState =
  | { kind: "saved"; savedAt: string | null }
  | { kind: "waiting"; savedAt: string | null }
  | { kind: "saving"; savedAt: string | null }
  | { kind: "failed"; savedAt: string | null; reason: "offline" | "refused"; error: ApiError }
  | { kind: "conflict"; savedAt: string | null; theirs: Draft; mineAt: number };

export interface DraftKeeperOptions {
  version: number;
  savedAt: string | null;
  save: (version: number, body: DraftBody) => Promise<Pick<Draft, "version" | "updatedAt">>;
  /** Reads what is stored now; asked when another window saved first. */
  load: () => Promise<Draft>;
}

const settleMs = 800;
const longestPauseMs = 30_000;
const mostTried = 5;

/**
 * Keeps a form saved on the server: 800 ms after the last change or at once when told so, one
 * request at a time, tried again ever more slowly while there is no connection. What is not saved
 * stays in memory and nowhere else: it names people, and this device may be shared.
 */
export class DraftKeeper {
  readonly #options: DraftKeeperOptions;
  readonly #listeners = new Set<() => void>();
  #state: DraftState;
  #version: number;
  #unsaved: DraftBody | null = null;
  #changedAt = 0;
  #timer: ReturnType<typeof setTimeout> | undefined;
  #busy: Promise<void> | null = null;
  #hurry = false;
  #failures = 0;
  #held = false;
  /** Bodies whose answer was lost: one of them may be what the server holds. */
  #tried: string[] = [];

  constructor(options: DraftKeeperOptions) {
    this.#options = options;
    this.#version = options.version;
    this.#state = { kind: "saved", savedAt: options.savedAt };
  }

  /** For useSyncExternalStore. */
  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };
  readonly state = (): DraftState => this.#state;

  /** Takes over what the form holds now. */
  change(body: DraftBody): void {
    this.#unsaved = body;
    this.#changedAt = Date.now();
    if (this.#state.kind === "saved") this.#set({ kind: "waiting", savedAt: this.#savedAt });
    if (this.#state.kind !== "failed") this.#schedule(settleMs);
  }

  /** Saves what is waiting without further delay. */
  flush(): void {
    // While there is no connection the tries keep their own, ever slower time.
    if (this.#state.kind !== "failed") this.#go();
  }

  #go(): void {
    if (!this.#unsaved || this.#held || this.#state.kind === "conflict") return;
    if (this.#busy === null) this.#busy = this.#run();
    else this.#hurry = true;
  }

  /** Tries again at once, when the connection is said to be back. */
  readonly reconnect = (): void => {
    this.#failures = 0;
    this.#go();
  };

  /** Ends the disagreement with another window: saves this one's text over the other's. */
  keepMine(body: DraftBody): void {
    if (this.#state.kind !== "conflict") return;
    this.#version = this.#state.theirs.version;
    this.#unsaved = body;
    this.#set({ kind: "waiting", savedAt: this.#state.theirs.updatedAt });
    this.flush();
  }

  /** Ends the disagreement by taking over what the other window saved. */
  takeTheirs(): void {
    if (this.#state.kind !== "conflict") return;
    this.#version = this.#state.theirs.version;
    this.#unsaved = null;
    this.#set({ kind: "saved", savedAt: this.#state.theirs.updatedAt });
  }

  /** Holds saving back, after a request under way has ended: while the interview itself is sent. */
  async hold(): Promise<void> {
    this.#held = true;
    clearTimeout(this.#timer);
    await this.#busy;
  }

  /** Goes on saving after `hold`. */
  release(): void {
    this.#held = false;
    if (this.#unsaved) this.#schedule(settleMs);
  }

  /** The interview is on record: what is still waiting is of no more use. */
  finish(): void {
    this.#held = true;
    this.#unsaved = null;
    clearTimeout(this.#timer);
    this.#set({ kind: "saved", savedAt: this.#savedAt });
  }

  /** Saves one last body past the hold, once and without retry. */
  async saveLast(body: DraftBody): Promise<void> {
    await this.#busy;
    await this.#options.save(this.#version, body);
  }

  get #savedAt(): string | null {
    return this.#state.savedAt;
  }

  #set(state: DraftState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener();
  }

  #schedule(ms: number): void {
    if (this.#held || this.#state.kind === "conflict") return;
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => this.#go(), ms);
  }

  async #run(): Promise<void> {
    const body = this.#unsaved;
    if (!body) return;
    clearTimeout(this.#timer);
    this.#unsaved = null;
    this.#hurry = false;
    this.#set({ kind: "saving", savedAt: this.#savedAt });
    try {
      const { version, updatedAt } = await this.#options.save(this.#version, body);
      this.#version = version;
      this.#failures = 0;
      this.#tried = [];
      this.#set({ kind: this.#unsaved ? "waiting" : "saved", savedAt: updatedAt });
    } catch (error) {
      this.#tried = [...this.#tried, JSON.stringify(body)].slice(-mostTried);
      this.#unsaved ??= body;
      await this.#failed(error);
    } finally {
      this.#busy = null;
    }
    if (this.#unsaved && this.#state.kind === "waiting") {
      if (this.#hurry) this.flush();
      else this.#schedule(settleMs);
    }
  }

  async #failed(error: unknown): Promise<void> {
    const known = error instanceof ApiError ? error : new ApiError(0, "unreadable");
    if (known.code === "stale_version") {
      try {
        const theirs = await this.#options.load();
        if (this.#tried.includes(JSON.stringify(theirs.body))) {
          // It is our own: it arrived, and only the answer was lost on the way back.
          this.#version = theirs.version;
          this.#tried = [];
          this.#set({ kind: "waiting", savedAt: theirs.updatedAt });
          return;
        }
        this.#set({ kind: "conflict", savedAt: this.#savedAt, theirs, mineAt: this.#changedAt });
        return;
      } catch {
        // The other version cannot be read now: the next try meets the same answer and asks again.
      }
    }
    const away = known.status === 0 || known.status >= 500 || known.status === 429;
    const pause = Math.min(longestPauseMs, 1_000 * 2 ** this.#failures);
    this.#failures += 1;
    this.#set({
      kind: "failed",
      savedAt: this.#savedAt,
      reason: away ? "offline" : "refused",
      error: known,
    });
    this.#schedule(pause);
  }
}
