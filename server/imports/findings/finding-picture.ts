import type { ImportFinding } from "@shared/contracts/import-findings";
import { firstFrom } from "@shared/domain/readings/corrections/correction-span";
import { RowQuality, type ReadingChannel } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import { isoOf } from "./choices";
import type { FoundFinding } from "./find-findings";

type Picture = NonNullable<ImportFinding["picture"]>;
type Pictured = Picture["channels"][number]["channel"];

const MOST_POINTS = 120;
/** Readings shown beside what was found, at least; a single one would otherwise fill the picture. */
const LEAST_BESIDE = 20;
/** Two stretches are shown together while what lies between them is at most this often as long. */
const TOGETHER = 6;

/** A small picture of the readings round a finding; null where nothing of them can be drawn. */
export function findingPicture({ finding, segment }: FoundFinding): Picture | null {
  const mark = markOf(finding.spans);
  const { instantMs } = segment.columns;
  if (mark === null || instantMs.length < 2) return null;
  const besideMs = Math.max(mark.endMs - mark.startMs, LEAST_BESIDE * segment.nominalStepMs);
  const from = Math.max(0, firstFrom(instantMs, mark.startMs - besideMs));
  const to = Math.min(instantMs.length, firstFrom(instantMs, mark.endMs + besideMs));
  if (to - from < 2) return null;
  const window = { startMs: instantMs[from] as number, endMs: instantMs[to - 1] as number };
  const channels = channelsOf(finding).flatMap((channel) => {
    const values = segment.columns[channel];
    return values ? [{ channel, values: drawn(segment, values, from, to) }] : [];
  });
  if (channels.length === 0) return null;
  return {
    from: isoOf(window.startMs),
    to: isoOf(window.endMs),
    mark: {
      from: isoOf(Math.max(mark.startMs, window.startMs)),
      to: isoOf(Math.min(mark.endMs, window.endMs)),
    },
    channels,
  };
}

/** All of the spans where they lie close, else the longest of them. */
function markOf(spans: readonly Interval[]): Interval | null {
  const [first] = spans;
  const last = spans.at(-1);
  if (!first || !last) return null;
  const hull = { startMs: first.startMs, endMs: last.endMs };
  const held = spans.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0);
  if (hull.endMs - hull.startMs <= TOGETHER * held) return hull;
  return spans.reduce((longest, span) =>
    span.endMs - span.startMs > longest.endMs - longest.startMs ? span : longest,
  );
}

function channelsOf({ code, channel, figures }: FoundFinding["finding"]): readonly Pictured[] {
  switch (code) {
    case "swappedSides":
    case "temperatureUnit":
      return ["supplyC", "returnC"];
    case "clockHint":
      return ["flowM3PerHour", "supplyC"];
    case "stuckChannel": {
      const companion = figures.companion;
      return [asPictured(channel), asPictured(companion)].flatMap((name) => name ?? []);
    }
    case "farDates":
    case "clockOff":
      return [];
    default:
      return [asPictured(channel)].flatMap((name) => name ?? []);
  }
}

const PICTURED = [
  "flowM3PerHour",
  "supplyC",
  "returnC",
  "signalPercent",
  "powerKw",
] as const satisfies readonly ReadingChannel[];
const asPictured = (name: string | null) => PICTURED.find((each) => each === name) ?? null;

/**
 * At most 120 points, equally far apart in time. Where more readings share a point, least and
 * greatest take turns, so that a single spike stays visible.
 */
function drawn(
  { columns: { instantMs, quality } }: FoundFinding["segment"],
  values: Float64Array,
  from: number,
  to: number,
): (number | null)[] {
  const startMs = instantMs[from] as number;
  const lengthMs = Math.max(1, (instantMs[to - 1] as number) - startMs);
  const count = Math.min(MOST_POINTS, Math.max(2, to - from));
  const low = new Float64Array(count).fill(Infinity);
  const high = new Float64Array(count).fill(-Infinity);
  for (let row = from; row < to; row++) {
    const value = values[row] as number;
    if (Number.isNaN(value) || quality[row] === RowQuality.excluded) continue;
    const at = Math.round((((instantMs[row] as number) - startMs) / lengthMs) * (count - 1));
    low[at] = Math.min(low[at] as number, value);
    high[at] = Math.max(high[at] as number, value);
  }
  return Array.from(low, (least, at) => {
    const greatest = high[at] as number;
    if (least > greatest) return null;
    return round(at % 2 === 0 ? least : greatest);
  });
}

const round = (value: number) => Math.round(value * 1000) / 1000;
