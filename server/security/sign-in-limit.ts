import { createHash } from "node:crypto";
import { Op } from "sequelize";
import type { Clock } from "@server/clock";
import type { Database } from "@server/database/connect";
import { RateLimited } from "@server/http/errors";
import { SignInFailure } from "@server/models/sign-in-failure";

/** So many wrong passwords for one address of e-mail within the window, whoever tries. */
export const failuresAllowed = 10;
const windowMs = 15 * 60_000;

function keyOf(email: string): string {
  return createHash("sha256").update(email.trim().toLowerCase()).digest("hex");
}

/**
 * Takes one of the attempts an address of e-mail has within the window, known address or not. It is
 * taken before the password is looked at, so that guesses sent all at once do not slip through, and
 * given back by `clearSignInFailures` when the password was right. It lives in the database, so that
 * several servers count together and a restart forgets nothing.
 * @throws RateLimited (429) with the seconds left.
 */
export async function takeSignInAttempt(
  email: string,
  { database, clock }: { database: Database; clock: Clock },
): Promise<void> {
  const now = clock.date();
  const windowOpened = new Date(now.getTime() - windowMs);
  const key = keyOf(email);
  await database.query(
    `INSERT INTO sign_in_failure (email_hash, failures, window_started_at)
     VALUES (:key, 1, :now)
     ON DUPLICATE KEY UPDATE
       failures = IF(window_started_at <= :windowOpened, 1, failures + 1),
       window_started_at = IF(window_started_at <= :windowOpened, :now, window_started_at)`,
    { replacements: { key, now, windowOpened } },
  );
  const row = await SignInFailure.findByPk(key);
  if (row !== null && row.failures > failuresAllowed)
    throw new RateLimited((row.windowStartedAt.getTime() + windowMs - clock.now()) / 1000);
  // Old counters go along the way: guesses at random addresses must not fill the table.
  await SignInFailure.destroy({
    where: { windowStartedAt: { [Op.lte]: windowOpened } },
    limit: 20,
  });
}

export async function clearSignInFailures(email: string): Promise<void> {
  await SignInFailure.destroy({ where: { emailHash: keyOf(email) } });
}
