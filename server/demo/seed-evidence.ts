import { createInstallation } from "@shared/contracts/evidence";
import { MINUTE_MS } from "@shared/domain/time/interval";
import { createLocalClock } from "@shared/domain/time/local-clock";
import type { Acting } from "@server/commands/acting";
import { recordBathCheck } from "@server/commands/record-bath-check";
import { recordInstallation } from "@server/commands/record-installation";
import { addCertificate, createInstrument } from "@server/commands/save-instrument";
import { BathCheck } from "@server/models/bath-check";
import { Certificate } from "@server/models/certificate";
import { Installation } from "@server/models/installation";
import { Instrument } from "@server/models/instrument";
import {
  demoBathChecks,
  demoInstallations,
  demoInstruments,
  type DemoInstallation,
} from "./demo-evidence";

/**
 * Makes what is missing of the demo's kit, its bath checks and how its points are measured. What a
 * killed server had made before is found by serial, pair or point and kept.
 */
export async function ensureDemoEvidence(
  acting: Acting,
  { zone, endDate }: { readonly zone: string; readonly endDate: string },
  pointIds: ReadonlyMap<string, string>,
): Promise<void> {
  const idOf = await ensureInstruments(acting, endDate);
  for (const { pair, checkedOn, readings } of demoBathChecks(endDate)) {
    const [firstProbeId, secondProbeId] = [idOf(pair[0]), idOf(pair[1])];
    const where = { firstProbeId, secondProbeId, checkedOn };
    if ((await acting.scope.find(BathCheck, { where })) === null)
      await recordBathCheck(acting, { ...where, readings: [...readings], bathUncertaintyK: 0.01 });
  }
  for (const demo of demoInstallations(endDate)) {
    const pointId = pointIds.get(demo.tag);
    if (pointId === undefined) throw new Error(`the demo has no point on ${demo.tag}`);
    if ((await acting.scope.count(Installation, { where: { pointId } })) > 0) continue;
    await recordInstallation(acting, pointId, fieldsOf(demo, zone, idOf));
  }
}

async function ensureInstruments(
  acting: Acting,
  endDate: string,
): Promise<(serial: string) => string> {
  const ids = new Map<string, string>();
  for (const { instrument, certificate } of demoInstruments(endDate)) {
    const { kind, serial } = instrument;
    const row =
      (await acting.scope.find(Instrument, { where: { kind, serial } })) ??
      (await createInstrument(acting, instrument));
    ids.set(serial, row.id);
    const known = await acting.scope.count(Certificate, { where: { instrumentId: row.id } });
    if (certificate !== null && known === 0)
      await addCertificate(acting, row.id, { ...certificate, k: certificate.k ?? 2 });
  }
  return (serial) => {
    const id = ids.get(serial);
    if (id === undefined) throw new Error(`the demo's kit has no ${serial}`);
    return id;
  };
}

function fieldsOf(
  { startDate, startTime, meter, logger, probes, mounting, fields }: DemoInstallation,
  zone: string,
  idOf: (serial: string) => string,
) {
  const [hours = 0, minutes = 0] = startTime.split(":").map(Number);
  const localMs = Date.parse(`${startDate}T00:00:00Z`) + (hours * 60 + minutes) * MINUTE_MS;
  const startMs = createLocalClock(zone).toUtc(localMs);
  const onPipe = (serial: string) => ({
    probeId: idOf(serial),
    mounting,
    depthMm: mounting === "pocket" ? 60 : null,
    insulated: true,
  });
  return createInstallation.body.parse({
    ...fields,
    startsAt: new Date(startMs).toISOString(),
    flowMeterId: idOf(meter),
    loggerId: logger === null ? null : idOf(logger),
    probes: probes && { supply: onPipe(probes[0]), return: onPipe(probes[1]) },
  });
}
