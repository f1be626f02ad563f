import type { RepairStep, RowExample } from "@shared/domain/log-files/repair-step";
import type {
  CompanionChannel,
  ReadingChannel,
  ReadingColumns,
} from "@shared/domain/readings/reading-columns";
import { indexFrom } from "@server/readings/load-segments";

/** Rows of a file at instants that another file of the point holds as well. */
export interface Overlap {
  readonly equal: RepairStep;
  readonly different: RepairStep;
}

const channels = [
  "flowM3PerHour",
  "supplyC",
  "returnC",
  "powerKw",
  "volumeCounterM3",
  "heatingCounterKwh",
  "coolingCounterKwh",
  "outdoorC",
  "electricKw",
  "pressureKpa",
] as const satisfies readonly (ReadingChannel | CompanionChannel)[];
const mostExamples = 20;
/** The same reading exported in another unit differs by rounding only; a real one by far more. */
const closeEnough = 1e-9;

function isSame(a: number, b: number): boolean {
  return a === b || (a !== a && b !== b) || Math.abs(a - b) <= closeEnough * Math.abs(a);
}

/**
 * Compares a file's rows with those of files that are stored, or come before it in the same import,
 * at equal instants and in the channels both hold. A flow file and a temperature file share nothing
 * and so do not overlap. Each row counts once: as different if it differs from any.
 */
export function findOverlap(
  columns: ReadingColumns,
  line: Uint32Array,
  others: readonly ReadingColumns[],
): Overlap {
  const { instantMs } = columns;
  const verdict = new Uint8Array(instantMs.length);
  for (const other of others) {
    const shared = channels.filter((name) => !!columns[name] && !!other[name]);
    if (shared.length === 0) continue;
    compare(columns, other, shared, verdict);
  }
  return { equal: stepOf("overlapEqual", 1), different: stepOf("overlapDifferent", 2) };

  function stepOf(code: "overlapEqual" | "overlapDifferent", wanted: number): RepairStep {
    let count = 0;
    const examples: RowExample[] = [];
    for (let i = 0; i < verdict.length; i++) {
      if (verdict[i] !== wanted) continue;
      count++;
      if (examples.length < mostExamples) {
        examples.push({
          line: line[i] ?? 0,
          column: null,
          cell: null,
          instantMs: instantMs[i] as number,
        });
      }
    }
    return { code, count, examples, countByKind: {} };
  }
}

/** Marks rows that `other` holds too: 1 with the same readings, 2 with others. */
function compare(
  columns: ReadingColumns,
  other: ReadingColumns,
  shared: readonly (typeof channels)[number][],
  verdict: Uint8Array,
): void {
  const { instantMs } = columns;
  let j = indexFrom(other.instantMs, instantMs[0] ?? Infinity);
  for (let i = 0; i < instantMs.length && j < other.instantMs.length;) {
    const a = instantMs[i] as number;
    const b = other.instantMs[j] as number;
    if (a < b) i++;
    else if (b < a) j++;
    else {
      const row = j;
      const at = i;
      const equal = shared.every((name) =>
        isSame(columns[name]?.[at] as number, other[name]?.[row] as number),
      );
      if (!equal) verdict[i] = 2;
      else if (verdict[i] === 0) verdict[i] = 1;
      i++;
      j++;
    }
  }
}
