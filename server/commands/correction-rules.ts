import { QueryTypes } from "sequelize";
import type { CorrectionChange } from "@shared/contracts/corrections";
import { fluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import { isUnitOf } from "@shared/domain/readings/corrections/unit";
import { Conflict, Invalid } from "@server/http/errors";
import { BathCheck } from "@server/models/bath-check";
import { Instrument } from "@server/models/instrument";
import { LogFile } from "@server/models/log-file";
import { touchedPoints } from "@server/queries/corrections/touched-points";
import { gaugePressureOf } from "@server/readings/point-corrections";
import { ChannelBit } from "@server/readings/stored-rows";
import type { Acting } from "./acting";

const wrong = (field: string, code: string, message: string) =>
  Invalid.field(`change/${field}`, code, message);

/**
 * @throws Invalid (422) where a change names what the point does not have or changes nothing; Conflict
 * (409) where the point holds no readings.
 */
export async function requireSound(
  acting: Acting,
  pointId: string,
  change: CorrectionChange,
): Promise<void> {
  await requireReadings(acting, pointId);
  requireSpan(change);
  switch (change.kind) {
    case "clock":
      await requireFile(acting, pointId, change.logFileId);
      if (change.offsetS === 0 && change.driftSPerDay === 0)
        throw wrong("offsetS", "no-change", "This clock would stay as it is.");
      return;
    case "unit":
      return requireUnit(acting, pointId, change);
    case "probeOffset":
      return requireProbe(acting, pointId, change);
    case "scaleByBore":
      if (change.enteredBoreMm === change.trueBoreMm)
        throw wrong("trueBoreMm", "no-change", "Both bores are the same.");
      return;
    case "fluid": {
      const gaugeMPa = await gaugePressureOf(acting.database, pointId);
      const fluid = fluidForEnergy(change.fluid, gaugeMPa);
      if (!fluid.ok) throw wrong("fluid", "fluid-unknown", fluid.problem.message);
      return;
    }
    case "exclude":
    case "swapSides":
    case "flipFlow":
    case "split":
  }
}

async function requireReadings({ database }: Acting, pointId: string): Promise<void> {
  const [found] = await database.query<{ held: number }>(
    "SELECT EXISTS (SELECT 1 FROM reading_block WHERE point_id = :pointId) AS held",
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  if (Number(found?.held) !== 1)
    throw new Conflict(
      "no-readings",
      "This metering point holds no readings that could be corrected.",
      "Import its log first.",
    );
}

function requireSpan(change: CorrectionChange): void {
  if (!("from" in change) || change.to === null) return;
  if (Date.parse(change.to) <= Date.parse(change.from))
    throw wrong("to", "empty-range", "The end must be later than the start; it is not part of it.");
}

async function requireFile({ scope }: Acting, pointId: string, id: string): Promise<LogFile> {
  const file = await scope.find(LogFile, { where: { id, pointId } });
  if (file === null || file.precedence === null)
    throw wrong("logFileId", "not-of-this-point", "Choose a file whose readings this point holds.");
  return file;
}

async function requireUnit(
  acting: Acting,
  pointId: string,
  { channel, unit, logFileId }: Extract<CorrectionChange, { kind: "unit" }>,
): Promise<void> {
  await requireFile(acting, pointId, logFileId);
  if (!isUnitOf(channel, unit))
    throw wrong("unit", "unit-unknown", "This is not a unit of that reading.");
  const [held] = await acting.database.query<{ channels: number | null }>(
    "SELECT BIT_OR(channel_set) AS channels FROM reading_block WHERE log_file_id = :logFileId",
    { replacements: { logFileId }, type: QueryTypes.SELECT },
  );
  if ((Number(held?.channels ?? 0) & ChannelBit[channel]) === 0)
    throw wrong("channel", "not-in-file", "The file holds no such readings.");
}

async function requireProbe(
  { scope, database }: Acting,
  pointId: string,
  change: Extract<CorrectionChange, { kind: "probeOffset" }>,
): Promise<void> {
  if (change.addK === 0) throw wrong("addK", "no-change", "An offset of 0 K changes nothing.");
  const probe = await scope.find(Instrument, { where: { id: change.probeId, kind: "probe" } });
  if (probe === null) throw wrong("probeId", "no-such-probe", "Choose a probe of the register.");
  if (change.bathCheckId !== null) {
    const check = await scope.find(BathCheck, { where: { id: change.bathCheckId } });
    if (check === null || ![check.firstProbeId, check.secondProbeId].includes(probe.id))
      throw wrong("bathCheckId", "not-of-this-probe", "Choose a bath check of this probe.");
  }
  const { organisationId } = scope;
  const touched = await touchedPoints(database, { organisationId, pointId: null, change });
  if (!touched.includes(pointId))
    throw wrong(
      "probeId",
      "probe-not-here",
      "No installation of this point names the probe within the span.",
    );
}
