import type { Site } from "@shared/contracts/places";
import type { Bench } from "./bench";
import { median } from "./measure";
import { importFile, newPoint } from "./ours-import";
import { time, times, type Line } from "./report";
import { p99OfSmallCall } from "./responsiveness";

const importsAtATime = 4;

/** G10: how long a small call takes while year files are imported one after the other. */
export async function benchResponsiveness(
  { server, bytes, rounds }: Bench,
  site: Site,
): Promise<Line[]> {
  let count = 0;
  const importSome = async () => {
    for (let i = 0; i < importsAtATime; i++) {
      const pointId = await newPoint(server, site, `BUSY-${++count}`);
      await importFile(server, pointId, "year.csv", bytes);
    }
  };
  const idle: number[] = [];
  const busy: number[] = [];
  const ratios: number[] = [];
  await p99OfSmallCall(server, { seconds: 2 });
  for (let round = 0; round < rounds; round++) {
    const quiet = await p99OfSmallCall(server, { seconds: 8 });
    const loaded = await p99OfSmallCall(server, { busy: importSome() });
    idle.push(quiet.p99S);
    busy.push(loaded.p99S);
    ratios.push(loaded.p99S / quiet.p99S);
    console.error(
      `  small call p99: idle ${time(quiet.p99S)} of ${quiet.calls}, importing ${time(loaded.p99S)} of ${loaded.calls}`,
    );
  }
  const ratio = median(ratios);
  return [
    {
      goal: "G10",
      promise: "p99 of a small call while importing ≤ 1.5× idle",
      ours: time(median(busy)),
      peer: `${time(median(idle))} idle`,
      ratio: times(ratio),
      met: ratio <= 1.5,
    },
  ];
}
