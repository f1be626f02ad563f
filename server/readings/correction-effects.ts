import { QueryTypes, type Transaction } from "sequelize";
import type { CorrectionChange, CorrectionEffect } from "@shared/contracts/corrections";
import { changedRows } from "@shared/domain/readings/corrections/changed-rows";
import { sharedSpan } from "@shared/domain/readings/corrections/correction-span";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import { localDaysBetween, type LocalDay } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import { enqueueJob } from "@server/jobs/job-queue";
import { calculateEnergy } from "./calculate-energy";
import { loadEnergySettings, powerOptionsOf, type EnergySettings } from "./energy-settings";
import { indexFrom, loadSegments, sliceColumns, stepsOfPoint } from "./load-segments";
import { loadPointCorrections, spanOfChange, type PointCorrections } from "./point-corrections";
import { fileSpans } from "./reading-span";
import { ChannelBit } from "./stored-rows";

/** Days worked out at a time, so that memory stays flat. */
const daysAtOnce = 92;

export interface CorrectionToWeigh {
  readonly id: string;
  readonly change: CorrectionChange;
  /** Points whose readings it touches. */
  readonly pointIds: readonly string[];
}

/**
 * What a correction would do to the energy of the points it touches, beside the corrections applied
 * by now: heating and cooling of the local days it reaches into, before and after. Reads only;
 * `onStretch` is called between stretches of days and may throw to stop.
 */
export async function correctionEffect(
  database: Database,
  correction: CorrectionToWeigh,
  onStretch: () => void,
): Promise<CorrectionEffect> {
  const parts = [];
  for (const pointId of correction.pointIds)
    parts.push(await effectOnPoint(database, correction, pointId, onStretch));
  const found = parts.flatMap((part) => part ?? []);
  const sum = (of: (part: PointEffect) => number) =>
    found.reduce((total, part) => total + of(part), 0);
  const { startMs, endMs } = rangeOf(found, correction.change);
  return {
    from: instantText(new Date(startMs)),
    to: instantText(new Date(endMs)),
    before: {
      heatingKwh: sum(({ before }) => before.heatingKwh),
      coolingKwh: sum(({ before }) => before.coolingKwh),
    },
    after: {
      heatingKwh: sum(({ after }) => after.heatingKwh),
      coolingKwh: sum(({ after }) => after.coolingKwh),
    },
    volume: {
      beforeM3: sum(({ before }) => before.volumeM3),
      afterM3: sum(({ after }) => after.volumeM3),
    },
    rowsChanged: sum(({ rowsChanged }) => rowsChanged),
  };
}

interface EffectSums {
  heatingKwh: number;
  coolingKwh: number;
  volumeM3: number;
}

interface PointEffect {
  readonly range: Interval;
  readonly before: EffectSums;
  readonly after: EffectSums;
  readonly rowsChanged: number;
}

/** Where no reading lies in the stretch, the stretch itself; an open one ends where it starts. */
function rangeOf(found: readonly PointEffect[], change: CorrectionChange): Interval {
  if (found.length > 0)
    return {
      startMs: Math.min(...found.map(({ range }) => range.startMs)),
      endMs: Math.max(...found.map(({ range }) => range.endMs)),
    };
  const span = spanOfChange(change);
  if (span === null) return { startMs: 0, endMs: 0 };
  const { startMs, endMs } = span;
  return { startMs, endMs: Number.isFinite(endMs) ? endMs : startMs };
}

async function effectOnPoint(
  database: Database,
  { id, change }: CorrectionToWeigh,
  pointId: string,
  onStretch: () => void,
): Promise<PointEffect | null> {
  const settings = await loadEnergySettings(database, pointId);
  const without = await loadPointCorrections(database, pointId);
  const withIt = await loadPointCorrections(database, pointId, undefined, id);
  const range = await affectedRange(database, pointId, change, without, withIt);
  if (range === null) return null;
  const { reach } = await stepsOfPoint(database, pointId);
  const days = localDaysBetween(
    { startMs: range.startMs - reach, endMs: range.endMs + reach },
    settings.zone,
  );
  const before = { heatingKwh: 0, coolingKwh: 0, volumeM3: 0 };
  const after = { heatingKwh: 0, coolingKwh: 0, volumeM3: 0 };
  let rowsChanged = await rowsOfFile(database, change);
  for (let from = 0; from < days.length; from += daysAtOnce) {
    onStretch();
    const stretch = days.slice(from, from + daysAtOnce);
    const [fromMs, toMs] = edgesOf(stretch);
    const was = await loadSegments(database, pointId, fromMs, toMs, undefined, without);
    const becomes = await loadSegments(database, pointId, fromMs, toMs, undefined, withIt);
    add(before, was, settings, stretch);
    add(after, becomes, settings, stretch);
    // A split changes no row, and the lists before and after it do not match.
    if (!isOfFile(change) && change.kind !== "split")
      rowsChanged += changedRows(
        inside(was, fromMs, toMs),
        inside(becomes, fromMs, toMs),
        powerOptionsOf(settings)?.fluid ?? null,
      );
  }
  return { range, before, after, rowsChanged };
}

function edgesOf(days: readonly LocalDay[]): [number, number] {
  return [days[0]?.startMs ?? 0, days[days.length - 1]?.endMs ?? 0];
}

/** The rows beyond a stretch's ends come again in its neighbours. */
function inside(segments: readonly ReadingSegment[], fromMs: number, toMs: number) {
  return segments.map((segment) => {
    const { instantMs } = segment.columns;
    const [from, to] = [indexFrom(instantMs, fromMs), indexFrom(instantMs, toMs)];
    return { ...segment, columns: sliceColumns(segment.columns, from, to) };
  });
}

function add(
  sums: EffectSums,
  segments: readonly ReadingSegment[],
  settings: EnergySettings,
  days: readonly LocalDay[],
): void {
  for (const { totals } of calculateEnergy(segments, settings, days)?.days ?? []) {
    sums.heatingKwh += totals.heating.energyKwh;
    sums.coolingKwh += totals.cooling.energyKwh;
    sums.volumeM3 += totals.volumeM3;
  }
}

const isOfFile = (change: CorrectionChange) => change.kind === "clock" || change.kind === "unit";

/** When the readings are that it changes, before and after; null where there are none. */
async function affectedRange(
  database: Database,
  pointId: string,
  change: CorrectionChange,
  without: PointCorrections,
  withIt: PointCorrections,
): Promise<Interval | null> {
  const spans = [
    ...(await fileSpans(database, pointId, without.files)),
    ...(await fileSpans(database, pointId, withIt.files)),
  ].filter(({ logFileId }) => !("logFileId" in change) || logFileId === change.logFileId);
  if (spans.length === 0) return null;
  const held = {
    startMs: Math.min(...spans.map(({ firstMs }) => firstMs)),
    endMs: Math.max(...spans.map(({ lastMs }) => lastMs)) + 1,
  };
  const span = spanOfChange(change);
  return span === null ? held : sharedSpan(held, span);
}

/** Rows of the file a clock or unit is put right for; 0 for what corrects a stretch. */
async function rowsOfFile(database: Database, change: CorrectionChange): Promise<number> {
  if (change.kind !== "clock" && change.kind !== "unit") return 0;
  const bit = change.kind === "unit" ? ChannelBit[change.channel] : 0;
  const [row] = await database.query<{ count: string | null }>(
    `SELECT SUM(row_count) AS count FROM reading_block
      WHERE log_file_id = :logFileId AND (:bit = 0 OR (channel_set & :bit) <> 0)`,
    { replacements: { logFileId: change.logFileId, bit }, type: QueryTypes.SELECT },
  );
  return Number(row?.count ?? 0);
}

/**
 * Proposed corrections of a point are weighed again once its readings or its energy changed, so that
 * the effect somebody reads before applying is the effect it will have.
 */
export async function workOutEffectsAnew(
  database: Database,
  transaction: Transaction,
  { pointId, organisationId }: Pick<EnergySettings, "pointId" | "organisationId">,
): Promise<void> {
  const proposals = await database.query<{ id: string; at: string }>(
    `SELECT id, proposed_at_point_id AS at FROM correction
      WHERE organisation_id = :organisationId AND state = 'proposed'
        AND (point_id = :pointId OR probe_id IN (
          SELECT supply_probe_id FROM installation WHERE point_id = :pointId AND supply_probe_id IS NOT NULL
          UNION ALL
          SELECT return_probe_id FROM installation WHERE point_id = :pointId AND return_probe_id IS NOT NULL))`,
    { replacements: { organisationId, pointId }, type: QueryTypes.SELECT, transaction },
  );
  for (const { id, at } of proposals) {
    await database.query(
      "UPDATE correction SET state = 'working' WHERE id = :id AND state = 'proposed'",
      { replacements: { id }, transaction },
    );
    await enqueueJob(database, transaction, {
      organisationId,
      pointId: String(at),
      correctionId: String(id),
      kind: "correction",
    });
  }
}
