import type { Transaction } from "sequelize";
import type { InstallationFields, InstrumentKind } from "@shared/contracts/evidence";
import { boreMm, outsideDiameterFromCircumferenceMm } from "@shared/domain/pipes/bore";
import type { Scope } from "@server/database/scoped";
import { Invalid } from "@server/http/errors";
import { BathCheck } from "@server/models/bath-check";
import { Instrument } from "@server/models/instrument";

/**
 * What the contract's shape cannot say: that things named exist, are what they are used as, and do
 * not contradict each other.
 * @throws Invalid pointing at the field.
 */
export async function requireUsableFields(
  scope: Scope,
  fields: InstallationFields,
  transaction?: Transaction,
): Promise<void> {
  const { startsAt, endsAt, edits } = fields;
  if (endsAt !== null && Date.parse(endsAt) <= Date.parse(startsAt))
    throw Invalid.field("endsAt", "ends-before-start", "Must be after the start.");
  requireBore(fields.pipe);
  const twice = edits.findIndex(({ kind }, at) => edits.some((o, i) => i < at && o.kind === kind));
  if (twice >= 0)
    throw Invalid.field(`edits/${twice}/kind`, "edited-twice", "This term is set above already.");
  await requireInstruments(scope, fields, transaction);
  await requireBathCheck(scope, fields, transaction);
}

function requireBore(pipe: InstallationFields["pipe"]): void {
  if (pipe === null) return;
  const { circumferenceMm, outsideDiameterMm, wallReadingsMm, liningMm } = pipe;
  const outside =
    circumferenceMm === null
      ? outsideDiameterMm
      : outsideDiameterFromCircumferenceMm(circumferenceMm);
  if (outside === null)
    throw Invalid.field(
      "pipe/circumferenceMm",
      "outside-needed",
      "Give the circumference or the outside diameter.",
    );
  const wall = wallReadingsMm.reduce((sum, mm) => sum + mm, 0) / wallReadingsMm.length;
  if (boreMm(outside, wall, liningMm) === null)
    throw Invalid.field(
      "pipe/wallReadingsMm",
      "no-bore-left",
      "Walls and lining together leave nothing of the bore.",
    );
}

async function requireInstruments(
  scope: Scope,
  { flowMeterId, loggerId, probes }: InstallationFields,
  transaction?: Transaction,
): Promise<void> {
  const wanted: [field: string, id: string | null, kinds: readonly InstrumentKind[]][] = [
    ["flowMeterId", flowMeterId, ["flowMeter", "permanentMeter"]],
    ["loggerId", loggerId, ["logger", "permanentMeter"]],
    ["probes/supply/probeId", probes?.supply.probeId ?? null, ["probe"]],
    ["probes/return/probeId", probes?.return.probeId ?? null, ["probe"]],
  ];
  const ids = wanted.flatMap(([, id]) => id ?? []);
  const rows =
    ids.length === 0 ? [] : await scope.list(Instrument, { where: { id: ids }, transaction });
  for (const [field, id, kinds] of wanted) {
    if (id === null) continue;
    const row = rows.find((instrument) => instrument.id === id);
    if (row === undefined || !kinds.includes(row.kind))
      throw Invalid.field(field, "no-such-instrument", "The kit has no such instrument.");
  }
  if (probes && probes.supply.probeId === probes.return.probeId)
    throw Invalid.field("probes/return/probeId", "same-probe", "A pair is two different probes.");
}

async function requireBathCheck(
  scope: Scope,
  { bathCheckId, probes }: InstallationFields,
  transaction?: Transaction,
): Promise<void> {
  if (bathCheckId === null) return;
  const check = await scope.find(BathCheck, { where: { id: bathCheckId }, transaction });
  const pair = probes && [probes.supply.probeId, probes.return.probeId];
  const fits = check && pair?.includes(check.firstProbeId) && pair.includes(check.secondProbeId);
  if (!fits)
    throw Invalid.field("bathCheckId", "other-pair", "This check is not of the two probes.");
}
