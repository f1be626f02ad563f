import { execFile } from "node:child_process";
import path from "node:path";
import { promisify } from "node:util";

const run = promisify(execFile);
const script = path.join(__dirname, "pandas_peer.py");
const coefficients = path.join("shared", "data", "if97_region1_coefficients.json");

export type PandasMode = "read" | "tosql" | "load";

export interface PandasPeer {
  /** Seconds by Python's own clock, without starting the interpreter and loading pandas. */
  run(mode: PandasMode): Promise<{ seconds: number; kwh: number; rows: number }>;
}

/** A Python with pandas, SQLAlchemy and a MariaDB driver; null where this machine has none. */
export async function findPandas(
  csv: string,
  database: { port: number; name: string },
  workFolder: string,
): Promise<PandasPeer | null> {
  for (const python of ["python3", "/usr/bin/python3"]) {
    try {
      await run(python, ["-c", "import numpy, pandas, sqlalchemy, pymysql"]);
    } catch {
      // Another Python may have them.
      continue;
    }
    const url = `mysql+pymysql://root@127.0.0.1:${database.port}/${database.name}`;
    return {
      async run(mode) {
        const args = [script, mode, csv, url, coefficients, workFolder];
        const { stdout } = await run(python, args);
        return JSON.parse(stdout) as { seconds: number; kwh: number; rows: number };
      },
    };
  }
  return null;
}
