import { DAY_MS } from "../../time/interval";
import type { RowRange } from "../corrections/correction-span";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { placeOf } from "./row-spans";

/**
 * Rows whose date lies far from the rest, as a logger writes them after its clock was lost (1970,
 * 2000) or set wrong (2099).
 *
 * Rows fall into groups wherever nothing was written for over 30 days. The largest group is the
 * rest. A group is far if it is before 1990, when no such logger wrote anything, or after `latestMs`;
 * or if it is small (at most 3 rows, or 1 % of them) and further from the rest than 30 days and than
 * the rest is long. Where all rows are before 1990 or after `latestMs`, all are far.
 *
 * Example: a week of March 2025 with two rows of 1 January 1970 → those two, 55.2 years away.
 */
export interface FarDateLimits {
  /** No reading can be later, such as the time of the import; null where that is unknown. */
  readonly latestMs: number | null;
}

const APART_MS = 30 * DAY_MS;
const FEW_ROWS = 3;
const FEW_SHARE = 0.01;
const EARLIEST_MS = Date.UTC(1990, 0, 1);

export type FarDatesFinding = Finding<
  "farDates",
  {
    readonly firstMs: number;
    readonly lastMs: number;
    /** Days to the rest, of the furthest row; null where no rest is left. */
    readonly furthestDays: number | null;
    readonly restFromMs: number | null;
    readonly restToMs: number | null;
  }
>;

export function farDates(segment: ReadingSegment, limits: FarDateLimits): FarDatesFinding | null {
  const { instantMs } = segment.columns;
  const count = instantMs.length;
  if (count === 0) return null;
  const latestMs = limits.latestMs ?? Infinity;
  const groups = groupsOf(instantMs, latestMs);
  const isImpossible = ({ from }: RowRange) =>
    instantMs[from]! < EARLIEST_MS || instantMs[from]! > latestMs;
  const possible = groups.filter((group) => !isImpossible(group));
  const rest = possible.reduce<RowRange | null>(
    (largest, group) => (largest === null || size(group) > size(largest) ? group : largest),
    null,
  );
  const first = (group: RowRange) => instantMs[group.from]!;
  const last = (group: RowRange) => instantMs[group.to - 1]!;
  const away = (group: RowRange) =>
    rest === null ? 0 : Math.max(first(rest) - last(group), first(group) - last(rest));
  const few = Math.max(FEW_ROWS, FEW_SHARE * count);
  const isFar = (group: RowRange) =>
    rest === null ||
    isImpossible(group) ||
    (group !== rest &&
      size(group) <= few &&
      size(group) < size(rest) &&
      away(group) > Math.max(APART_MS, last(rest) - first(rest)));
  const far = groups.filter(isFar);
  if (far.length === 0) return null;
  const place = placeOf(segment, far);
  const furthestMs = rest && Math.max(first(rest) - first(far[0]!), last(far.at(-1)!) - last(rest));
  return {
    code: "farDates",
    weight: "stop",
    channel: null,
    ...place,
    figures: {
      firstMs: first(far[0]!),
      lastMs: last(far.at(-1)!),
      furthestDays: furthestMs === null ? null : furthestMs / DAY_MS,
      restFromMs: rest && first(rest),
      restToMs: rest && last(rest),
    },
    choices: [{ change: "exclude", spans: place.spans }, KEEP],
  };
}

const size = ({ from, to }: RowRange) => to - from;

/** Rows between which nothing is missing for 30 days; cut at 1990 and at the latest instant too. */
function groupsOf(instantMs: Float64Array, latestMs: number): RowRange[] {
  const groups: RowRange[] = [];
  let from = 0;
  for (let row = 1; row <= instantMs.length; row++) {
    if (row < instantMs.length) {
      const before = instantMs[row - 1]!;
      const here = instantMs[row]!;
      const isNewGroup =
        here - before > APART_MS ||
        (before < EARLIEST_MS && here >= EARLIEST_MS) ||
        (before <= latestMs && here > latestMs);
      if (!isNewGroup) continue;
    }
    groups.push({ from, to: row });
    from = row;
  }
  return groups;
}
