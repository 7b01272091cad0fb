import { readdirSync, readFileSync } from "node:fs";

// USER_HZ, which is 100 on every Linux in use.
const TICKS_PER_SECOND = 100;

function read(pid: string): { parent: number; seconds: number } | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // The name in brackets may hold spaces; what follows is by position.
    const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    return {
      parent: Number(fields[1]),
      seconds: (Number(fields[11]) + Number(fields[12])) / TICKS_PER_SECOND,
    };
  } catch {
    return null;
  }
}

/** Processor time of a process and its children that are alive, s; from Linux's /proc. */
export function processorTime(pid: number): number {
  let sum = read(String(pid))?.seconds ?? 0;
  for (const name of readdirSync("/proc")) {
    const one = /^\d+$/.test(name) ? read(name) : null;
    if (one?.parent === pid) sum += one.seconds;
  }
  return Math.round(sum * 10) / 10;
}
