import { BathCheck } from "@server/models/bath-check";
import { Certificate } from "@server/models/certificate";
import { Installation } from "@server/models/installation";
import { Instrument } from "@server/models/instrument";
import { columnsOf, completeFields } from "@server/queries/evidence/installation-fields";
import type { TestApp } from "./test-app";

let count = 0;

/** An instrument of the organisation with a serial nobody else has. */
export async function instrument(
  app: TestApp,
  organisationId: string,
  kind: Instrument["kind"],
  wishes: { serial?: string; probeClass?: "A" | "B" } = {},
): Promise<Instrument> {
  count += 1;
  return Instrument.create({
    organisationId,
    kind,
    serial: wishes.serial ?? `S-${count}`,
    probeClass: wishes.probeClass ?? null,
    createdAt: app.clock.date(),
  });
}

const recorded = (app: TestApp) => ({ recordedAt: app.clock.date(), recordedByName: "Somebody" });

/** A probe pair with a check in one bath: the first reads 0.11 K more. */
export async function checkedPair(app: TestApp, organisationId: string) {
  const first = await instrument(app, organisationId, "probe");
  const second = await instrument(app, organisationId, "probe");
  const check = await BathCheck.create({
    organisationId,
    firstProbeId: first.id,
    secondProbeId: second.id,
    checkedOn: "2026-02-20",
    bathUncertaintyK: 0.01,
    readings: Array.from({ length: 10 }, (_, at) => ({
      firstC: 4.11 + (at % 2) / 100,
      secondC: 4 + (at % 2) / 100,
    })),
    ...recorded(app),
  });
  return { first, second, check };
}

/** A flow meter with a certificate, an installation that names it, and a checked pair. */
export async function evidenceOfPoint(app: TestApp, organisationId: string, pointId: string) {
  const meter = await instrument(app, organisationId, "flowMeter");
  const certificate = await Certificate.create({
    organisationId,
    instrumentId: meter.id,
    number: "C-1",
    issuedOn: "2025-09-01",
    dueOn: "2026-09-01",
    expanded: 1,
    k: 2,
    ...recorded(app),
  });
  const pair = await checkedPair(app, organisationId);
  const fields = completeFields({ startsAt: "2026-02-21T08:00:00.000Z", flowMeterId: meter.id });
  const row = await Installation.create({
    ...columnsOf(fields),
    organisationId,
    pointId,
    version: 1,
    ...recorded(app),
  });
  return { meter, certificate, installation: row, ...pair };
}
