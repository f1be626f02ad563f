import { Op } from "sequelize";
import type { BatchFile } from "@shared/contracts/import-batches";
import type { ImportChecks } from "@shared/contracts/import-checks";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import type { Context } from "@server/http/context";
import { isCancellable, isReopenable } from "@server/imports/import-states";
import type { ImportBatch } from "@server/models/import-batch";
import { ImportBatchFile } from "@server/models/import-batch-file";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { MeteringPoint } from "@server/models/metering-point";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { loadRangePlusMinus } from "@server/queries/workings/range-plus-minus";
import { Loop } from "@server/models/loop";
import { installedSerials } from "./installed-serials";

type Reporting = Pick<Context, "scope" | "database">;
type Problem = BatchFile["problems"][number];

/** One file of a batch as its report says; what the asker may do is added by the presenter. */
export interface ReportedFile extends Omit<BatchFile, "can"> {
  /** Nothing is open: it is imported when somebody says so. */
  readonly isReady: boolean;
  /** Its point can change, and it can leave the batch. */
  readonly isOpen: boolean;
}

/** Every file of a batch, in the order they came. */
export async function batchReport(
  reporting: Reporting,
  batch: ImportBatch,
): Promise<ReportedFile[]> {
  const { scope } = reporting;
  const files = await scope.list(ImportBatchFile, {
    where: { batchId: batch.id },
    order: [["id", "ASC"]],
  });
  const importIds = files.flatMap(({ importId }) => importId ?? []);
  const [imports, logs] = await Promise.all([
    scope.list(LogImport, { where: { id: importIds } }),
    scope.list(LogFile, { where: { importId: importIds }, order: [["id", "ASC"]] }),
  ]);
  const points = await pointsOf(reporting, imports);
  const twins = await storedTwins(reporting, logs);
  const isSettled = !imports.some(({ state }) => isMoving(state));
  const reported: ReportedFile[] = [];
  for (const file of files) {
    const row = imports.find(({ id }) => id === file.importId) ?? null;
    const own = logs.filter(({ importId }) => importId === row?.id);
    const problems: Problem[] = [
      ...pointProblems(file),
      ...(await doubts(reporting, file, row)),
      ...(row === null ? [] : importProblems(row, own, twins)),
    ];
    const stops = problems.some(({ code }) => code === "pointDoubtful" || code === "sameFile");
    const { checks } = row ?? {};
    reported.push({
      id: file.id,
      name: file.name,
      bytes: file.byteLength,
      loggerSerial: file.loggerSerial,
      importId: file.importId,
      state: row?.state ?? "askingPoint",
      point: (row && points.get(row.pointId)) ?? null,
      pointBy: file.pointBy,
      rows: checks ? rowsOf(checks) : null,
      ...spanOf(checks ?? null),
      ...(await energyOf(reporting, row, own, isSettled)),
      problems,
      isReady: row?.state === "ready" && !stops,
      isOpen: row === null || isCancellable(row.state) || isReopenable(row.state),
    });
  }
  return reported;
}

function isMoving(state: LogImport["state"]): boolean {
  return state === "reading" || state === "checking" || state === "importing";
}

async function pointsOf({ scope }: Reporting, imports: readonly LogImport[]) {
  const ids = [...new Set(imports.map(({ pointId }) => pointId))];
  const points = await scope.list(MeteringPoint, { where: { id: ids } });
  const loops = await scope.list(Loop, { where: { id: points.map(({ loopId }) => loopId) } });
  return new Map(
    points.map(({ id, code, name, loopId }) => {
      const loopTag = loops.find((loop) => loop.id === loopId)?.tag ?? "";
      return [id, { id, code, name, loopTag }];
    }),
  );
}

/** Bytes that are stored already for the same point, as `point hash`. */
async function storedTwins({ scope }: Reporting, logs: readonly LogFile[]): Promise<Set<string>> {
  const stored = await scope.list(LogFile, {
    attributes: ["id", "pointId", "sha256", "importId"],
    where: { sha256: logs.map(({ sha256 }) => sha256), precedence: { [Op.ne]: null } },
  });
  return new Set(
    logs.flatMap(({ pointId, sha256, importId }) =>
      stored.some(
        (other) =>
          other.importId !== importId && other.pointId === pointId && other.sha256 === sha256,
      )
        ? [`${pointId} ${sha256}`]
        : [],
    ),
  );
}

const problem = (
  code: Problem["code"],
  count: number | null = null,
  detail: string | null = null,
) => ({
  code,
  count,
  detail,
});

function pointProblems({ importId, pointAmbiguous }: ImportBatchFile): Problem[] {
  if (importId !== null) return [];
  return [problem(pointAmbiguous ? "pointAmbiguous" : "pointUnknown")];
}

/**
 * A logger moves on: rows from before it came to the point, or from after it left, are hardly of
 * that point, until somebody says so.
 */
async function doubts(
  { scope }: Reporting,
  file: ImportBatchFile,
  row: LogImport | null,
): Promise<Problem[]> {
  const { firstInstant, lastInstant } = spanOf(row?.checks ?? null);
  const { loggerSerial } = file;
  if (file.pointBy !== "serial" || row === null || row.state === "imported") return [];
  if (loggerSerial === null || firstInstant === null || lastInstant === null) return [];
  const places = await installedSerials(scope, loggerSerial);
  const fits = places.some(
    ({ pointId, startsMs, endsMs }) =>
      pointId === row.pointId &&
      startsMs <= Date.parse(firstInstant) &&
      Date.parse(lastInstant) <= (endsMs ?? Infinity),
  );
  return fits ? [] : [problem("pointDoubtful", null, loggerSerial)];
}

function importProblems(
  row: LogImport,
  files: readonly LogFile[],
  twins: ReadonlySet<string>,
): Problem[] {
  const problems: Problem[] = [];
  const unreadable = files.find((file) => file.unreadable !== null);
  if (unreadable?.unreadable)
    problems.push(problem("unreadable", null, unreadable.unreadable.code));
  const differing = files
    .flatMap(({ appliedRecipe }) => appliedRecipe?.differences ?? [])
    .filter(({ asks }) => asks);
  const questions = files.reduce((sum, file) => sum + (file.questions ?? []).length, 0);
  if (questions > 0 && differing.length > 0)
    problems.push(problem("recipeDiffers", differing.length));
  if (questions > 0) problems.push(problem("questionsOpen", questions));
  const { checks, failure } = row;
  if (checks && checks.undecided.length > 0)
    problems.push(problem("choicesOpen", checks.undecided.length));
  if (files.some(({ pointId, sha256 }) => twins.has(`${pointId} ${sha256}`)))
    problems.push(problem("sameFile"));
  if (failure) problems.push(problem("failed", null, `${failure.detail} ${failure.remedy}`));
  if (checks?.energyBlockedBy)
    problems.push(problem("energyBlocked", null, checks.energyBlockedBy));
  return problems;
}

function rowsOf({ files, rows }: ImportChecks): NonNullable<BatchFile["rows"]> {
  const read = files.reduce((sum, file) => sum + file.rowsRead, 0);
  const kept = files.reduce((sum, file) => sum + file.rowsKept, 0);
  const { measured: used, excluded, noReading } = rows;
  return { read, used, leftOut: read - kept, excluded, noReading };
}

function spanOf(checks: ImportChecks | null): Pick<BatchFile, "firstInstant" | "lastInstant"> {
  const known = (values: (string | null)[]) => values.filter((value) => value !== null).sort();
  const firsts = known((checks?.files ?? []).map(({ firstInstant }) => firstInstant));
  const lasts = known((checks?.files ?? []).map(({ lastInstant }) => lastInstant));
  return { firstInstant: firsts[0] ?? null, lastInstant: lasts.at(-1) ?? null };
}

/** A register that did not run is left out; the ± is worked out once nothing in the batch moves. */
async function energyOf(
  reporting: Reporting,
  row: LogImport | null,
  files: readonly LogFile[],
  isSettled: boolean,
): Promise<Pick<BatchFile, "heating" | "cooling">> {
  const energy = row?.checks?.energy;
  if (row === null || !energy) return { heating: null, cooling: null };
  const plusMinus = isSettled ? await plusMinusOf(reporting, row, files) : null;
  const figure = (kwh: number, register: "heating" | "cooling") =>
    kwh === 0 ? null : { kwh, expandedKwh: plusMinus?.[register].energy?.expanded ?? null };
  return {
    heating: figure(energy.heatingKwh, "heating"),
    cooling: figure(energy.coolingKwh, "cooling"),
  };
}

/** By the evidence of the point, over the quarter-hours the stored rows lie in. */
async function plusMinusOf(reporting: Reporting, row: LogImport, files: readonly LogFile[]) {
  const { importedAt, firstInstant, lastInstant, state } = row;
  if (state !== "imported" || !importedAt || !firstInstant || !lastInstant) return null;
  const reach = (kind: LogFile["seriesKind"]) =>
    Math.max(
      0,
      ...files
        .filter(({ seriesKind }) => seriesKind === kind)
        .map(({ nominalStepMs }) => nominalStepMs ?? 0),
    );
  const firstMs = firstInstant.getTime() - reach("meanToLabel");
  const lastMs = lastInstant.getTime() + reach("meanFromLabel");
  const startMs = Math.floor(firstMs / INTERVAL_MS) * INTERVAL_MS;
  const endMs = Math.max(Math.ceil(lastMs / INTERVAL_MS) * INTERVAL_MS, startMs + INTERVAL_MS);
  const energyPoint = await loadEnergyPoint(reporting, row.pointId);
  return loadRangePlusMinus(reporting, energyPoint, { startMs, endMs, dates: null });
}
