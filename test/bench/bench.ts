import type { Database } from "@server/database/connect";
import type { BenchServer } from "./bench-server";
import type { PandasPeer } from "./peers/pandas";

/** What every part of the bench works with. */
export interface Bench {
  readonly server: BenchServer;
  /** The server's own database, for the peers' tables and for looking at sizes. */
  readonly database: Database;
  /** The year file. */
  readonly csv: string;
  readonly bytes: Buffer;
  /** Null where this machine has no pandas. */
  readonly pandas: PandasPeer | null;
  readonly rounds: number;
  readonly folder: string;
}
