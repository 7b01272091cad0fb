import { type BenchClient, spread } from "./http-client.ts";

const PAGES = 20;

interface Page {
  total: number;
}

/**
 * Times the due list over HTTP, one request at a time: for each signed-in client twenty pages, from
 * the first one on where there are so many, else the pages there are over again.
 *
 * @param base address of the investigation, `/api/investigations/<id>`
 * @param clients callers by the name under which their times are given
 * @returns per caller how many are due, and median, 95th percentile and most of the times in ms
 */
export async function benchFollowUp(
  base: string,
  clients: Readonly<Record<string, BenchClient>>,
): Promise<Record<string, { due: number; ms: ReturnType<typeof spread> }>> {
  const out: Record<string, { due: number; ms: ReturnType<typeof spread> }> = {};
  for (const [name, client] of Object.entries(clients)) {
    const ask = (page: number) =>
      client.call<Page>("GET", `${base}/follow-up?show=due&page=${page}&pageSize=50`);
    // The first answer of a caller fills caches that later ones have as well.
    const { total } = (await ask(1)).body;
    const pages = Math.max(1, Math.ceil(total / 50));
    const times: number[] = [];
    for (let turn = 0; turn < PAGES; turn += 1) times.push((await ask(1 + (turn % pages))).ms);
    out[name] = { due: total, ms: spread(times) };
  }
  return out;
}
