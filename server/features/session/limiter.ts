import { RateLimiterMemory } from "rate-limiter-flexible";
import { HttpProblem } from "../../http/problem.ts";

/**
 * Failed sign-ins: 30 an hour per address and account, 300 per address; successes are not counted,
 * for a whole office may sit behind one address. Kept in the memory of the one server process.
 */
export function createSignInLimiter() {
  const perAccount = new RateLimiterMemory({ points: 30, duration: 3600 });
  const perAddress = new RateLimiterMemory({ points: 300, duration: 3600 });
  const key = (address: string, email: string) => `${address}|${email.toLowerCase()}`;
  return {
    async check(address: string, email: string): Promise<void> {
      const [account, all] = await Promise.all([
        perAccount.get(key(address, email)),
        perAddress.get(address),
      ]);
      if ((account?.remainingPoints ?? 1) <= 0 || (all?.remainingPoints ?? 1) <= 0) {
        const wait = Math.max(account?.msBeforeNext ?? 0, all?.msBeforeNext ?? 0);
        throw new HttpProblem("too_many_attempts", { retryAfter: Math.ceil(wait / 1000) });
      }
    },
    async failed(address: string, email: string): Promise<void> {
      await Promise.allSettled([
        perAccount.consume(key(address, email)),
        perAddress.consume(address),
      ]);
    },
  };
}
