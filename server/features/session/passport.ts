import passportPackage from "passport";
import { Strategy } from "passport-local";
import type { Services } from "../../services.ts";
import { verifyPassword } from "./password.ts";

/** What a successful sign-in gives: enough to begin a session. */
export interface Verified {
  id: string;
  epoch: number;
}

/** A passport of this application's own (no shared state between apps) with the local strategy. */
export function createPassport(services: Pick<Services, "pools">) {
  const passport = new passportPackage.Passport();
  passport.use(
    new Strategy({ usernameField: "email", passwordField: "password" }, (email, password, done) => {
      const check = async (): Promise<Verified | false> => {
        const found = await services.pools.auth.query<{
          id: string;
          epoch: number;
          password_hash: string;
        }>(
          "select id, epoch, password_hash from auth.account where lower(email) = lower($1) and disabled_at is null",
          [email],
        );
        const account = found.rows[0] ?? null;
        const right = await verifyPassword(account?.password_hash ?? null, password);
        return right && account ? { id: account.id, epoch: account.epoch } : false;
      };
      check().then(
        (user) => done(null, user),
        (error: unknown) => done(error),
      );
    }),
  );
  return passport;
}
