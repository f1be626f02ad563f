import type { ReadingColumns } from "@shared/domain/readings/reading-columns";
import { readCsv } from "./read-csv";

/** Readings of a scenario's file, whose columns are already in stored units and UTC. */
export function readingsOf(path: string, timeColumn: string): ReadingColumns {
  const rows = readCsv(path);
  const column = (name: string) => Float64Array.from(rows, (row) => Number(row[name]));
  return {
    instantMs: Float64Array.from(rows, (row) => Date.parse(row[timeColumn] ?? "")),
    flowM3PerHour: column("flow_m3h"),
    supplyC: column("supply_C"),
    returnC: column("return_C"),
    signalPercent: null,
    quality: new Uint8Array(rows.length),
  };
}
