import { availableParallelism } from "node:os";
import path from "node:path";
import { Piscina } from "piscina";
import { newSecret } from "./secrets";

/** bcrypt reads no further than this, so anything longer can never have been set as a password. */
const longestBytes = 72;

/** Hashes and compares passwords off the event loop. */
export interface Passwords {
  /** A bcrypt hash, 60 characters. At most 72 bytes of UTF-8, which the contract checks. */
  hash(password: string): Promise<string>;
  /**
   * Whether the password fits the hash. With null, where no such account exists, it takes as long
   * and answers false, so that time tells nobody which addresses are known.
   */
  matches(password: string, hash: string | null): Promise<boolean>;
  close(): Promise<void>;
}

/** `cost` is bcrypt's: the time doubles with every step; 12 takes about 0.3 s of one core. */
export function createPasswords(cost: number): Passwords {
  const pool = new Piscina<object, string | boolean>({
    filename: path.join(__dirname, "password-worker.mjs"),
    // One core stays free for the event loop and the database.
    maxThreads: Math.max(1, availableParallelism() - 1),
    minThreads: 0,
    idleTimeout: 30_000,
  });
  const hash = async (password: string): Promise<string> =>
    String(await pool.run({ kind: "hash", password, cost }));
  let nobodysHash: Promise<string> | undefined;
  return {
    hash,
    async matches(password, given) {
      nobodysHash ??= hash(newSecret());
      const isLong = Buffer.byteLength(password) > longestBytes;
      const against = given ?? (await nobodysHash);
      const fits = await pool.run({ kind: "compare", password, hash: against });
      return fits === true && given !== null && !isLong;
    },
    close: () => pool.destroy(),
  };
}
