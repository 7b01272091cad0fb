import { randomBytes } from "node:crypto";

const PREFIX_BYTES = 6;

/**
 * Random ids (UUID version 4) for rows that are stored together. They share their first six bytes,
 * which are random as well, so that an index on them grows in one place instead of in thousands,
 * best when the rows are stored in the order of their ids; 74 random bits of their own are left.
 * They tell which rows came together, as the time of recording does, and nothing of the order among
 * them as long as ids are not handed out sorted.
 */
export function nearIds(count: number): string[] {
  const prefix = randomBytes(PREFIX_BYTES).toString("hex");
  const random = randomBytes(count * (16 - PREFIX_BYTES)).toString("hex");
  return Array.from({ length: count }, (_, k) => {
    const own = random.slice(20 * k, 20 * k + 20);
    const variant = "89ab"[Number.parseInt(own[3] as string, 16) & 3];
    return `${prefix.slice(0, 8)}-${prefix.slice(8)}-4${own.slice(0, 3)}-${variant}${own.slice(4, 7)}-${own.slice(7, 19)}`;
  });
}
