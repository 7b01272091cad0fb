import pg from "pg";

/** Channel that every announced change is notified on; the payload is the investigation's id. */
const CHANNEL = "strandline";
const FIRST_PAUSE_MS = 100;
const LONGEST_PAUSE_MS = 10_000;

export type Listener = {
  /** True while the connection stands and listens. */
  connected(): boolean;
  stop(): Promise<void>;
};

/**
 * Listens on a connection of its own and makes it anew when it is lost, with growing pauses.
 *
 * @param url connection string of the system login
 * @param on.change called with an investigation's id
 * @param on.connect called at each (re)connection: whatever came meanwhile was not heard
 * @param on.lost called with why a connection failed
 */
export function listen(
  url: string,
  on: {
    change: (investigationId: string) => void;
    connect: () => void;
    lost: (error: Error) => void;
  },
): Listener {
  let stopped = false;
  let client: pg.Client | null = null;
  let connected = false;
  let pause = FIRST_PAUSE_MS;
  let timer: NodeJS.Timeout | undefined;

  function again(from: pg.Client, error: Error): void {
    if (client !== from) return;
    client = null;
    connected = false;
    from.end().catch(() => {});
    if (stopped) return;
    on.lost(error);
    timer = setTimeout(connect, pause);
    pause = Math.min(2 * pause, LONGEST_PAUSE_MS);
  }

  function connect(): void {
    const next = new pg.Client({
      connectionString: url,
      connectionTimeoutMillis: 3000,
      keepAlive: true,
    });
    client = next;
    next.on("error", (error) => again(next, error));
    next.on("end", () => again(next, new Error("the connection was ended")));
    next.on("notification", ({ payload }) => {
      if (payload) on.change(payload);
    });
    next
      .connect()
      .then(() => next.query(`listen ${CHANNEL}`))
      .then(() => {
        if (client !== next) return;
        connected = true;
        pause = FIRST_PAUSE_MS;
        on.connect();
      })
      .catch((error: Error) => again(next, error));
  }

  connect();
  return {
    connected: () => connected,
    async stop() {
      stopped = true;
      clearTimeout(timer);
      const last = client;
      client = null;
      connected = false;
      await last?.end().catch(() => {});
    },
  };
}
