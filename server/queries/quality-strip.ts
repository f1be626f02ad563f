import { QueryTypes } from "sequelize";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import type { Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { wholeNumber } from "@server/database/conversions";

export interface QualitySegment extends Interval {
  readonly kind: "measured" | "excluded" | "missing";
}

interface Row {
  pointId: string;
  startS: string | number;
  excluded: string | number | null;
  partly: string | number;
}

const INTERVAL_S = INTERVAL_MS / 1000;
/** Covered seconds are stored as floats; half a second short is still whole. */
const SLACK_S = 0.5;

/**
 * What became of each quarter hour of a range, as stretches, by point id: measured where readings
 * cover it whole, excluded where rows of it were left out, missing where nothing covers part of it.
 * One query for all points, reading only what tells quality: `covered_s` is null for a whole
 * interval, `excluded_rows` for none. A year is 35,000 rows a point, so ask for weeks.
 */
export async function qualityStrips(
  database: Database,
  pointIds: readonly string[],
  range: Interval,
): Promise<Map<string, QualitySegment[]>> {
  if (pointIds.length === 0 || range.endMs <= range.startMs) return new Map();
  const rows = await database.query<Row>(
    `SELECT point_id AS pointId, start_s AS startS, excluded_rows AS excluded,
       COALESCE(covered_s, ${INTERVAL_S}) < ${INTERVAL_S - SLACK_S} AS partly
     FROM interval_energy
     WHERE point_id IN (:pointIds) AND start_s >= :from AND start_s < :to
     ORDER BY point_id, start_s`,
    {
      replacements: { pointIds, from: range.startMs / 1000, to: range.endMs / 1000 },
      type: QueryTypes.SELECT,
    },
  );
  const strips = new Map<string, QualitySegment[]>();
  const builders = new Map(pointIds.map((id) => [id, new StripBuilder(range)]));
  for (const { pointId, startS, excluded, partly } of rows) {
    const kind =
      wholeNumber(partly) === 0 ? "measured" : Number(excluded ?? 0) > 0 ? "excluded" : "missing";
    builders.get(String(pointId))?.add(wholeNumber(startS) * 1000, kind);
  }
  for (const [id, builder] of builders) strips.set(id, builder.finish());
  return strips;
}

/** Joins quarter hours of one kind; what lies between them is missing. */
class StripBuilder {
  private readonly segments: QualitySegment[] = [];
  private atMs: number;

  constructor(private readonly range: Interval) {
    this.atMs = range.startMs;
  }

  add(startMs: number, kind: QualitySegment["kind"]): void {
    if (startMs > this.atMs) this.push("missing", startMs);
    this.push(kind, Math.min(startMs + INTERVAL_MS, this.range.endMs));
  }

  finish(): QualitySegment[] {
    if (this.atMs < this.range.endMs) this.push("missing", this.range.endMs);
    return this.segments;
  }

  private push(kind: QualitySegment["kind"], endMs: number): void {
    const last = this.segments.at(-1);
    if (last?.kind === kind) this.segments[this.segments.length - 1] = { ...last, endMs };
    else this.segments.push({ kind, startMs: this.atMs, endMs });
    this.atMs = endMs;
  }
}
