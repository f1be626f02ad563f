import type { Bench } from "./bench";
import { YEAR } from "./log-year";
import { interleaved, seconds } from "./measure";
import { parseAlone, recipeOf } from "./ours-parse";
import { papaparseChunks, papaparseStream } from "./peers/plain-node";
import { time, times, type Line } from "./report";

async function expectRows(rows: Promise<number>, header: 0 | 1): Promise<void> {
  const found = (await rows) - header;
  // papaparse counts an empty last line, pandas and we do not.
  if (found !== YEAR.rowCount && found !== YEAR.rowCount + 1)
    throw new Error(`a parser read ${found} rows of ${YEAR.rowCount}`);
}

/** G3: ours reads numbers and instants; the peers only cut text, pandas reads numbers. */
export async function benchParsing({ csv, pandas, rounds }: Bench): Promise<Line[]> {
  const recipe = await recipeOf(csv);
  await parseAlone(csv, recipe); // warm, as a worker is after its first file
  const took = await interleaved(rounds, {
    ours: () => seconds(() => expectRows(parseAlone(csv, recipe), 0)),
    papaparse: () => seconds(() => expectRows(papaparseStream(csv), 1)),
    chunks: () => seconds(() => expectRows(papaparseChunks(csv), 1)),
    pandas: pandas && (async () => (await pandas.run("read")).seconds),
  });
  const line = (peer: keyof typeof took, name: string, least: number): Line => {
    const peerS = took[peer];
    return {
      goal: "G3",
      promise: `parsing ≥ ${least}× ${name}`,
      ours: time(took.ours),
      peer: time(peerS),
      ratio: times(peerS / took.ours),
      met: peerS / took.ours >= least,
    };
  };
  return [
    line("papaparse", "a papaparse stream", 5),
    { ...line("chunks", "papaparse by chunks", 5), promise: "(papaparse by chunks)", met: null },
    ...(pandas ? [line("pandas", "pandas read_csv", 4)] : []),
  ];
}
