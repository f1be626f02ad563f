import type { InstallationFields } from "@shared/contracts/evidence";
import type { BathCheckEvidence, PointEvidence } from "@shared/domain/uncertainty/point-evidence";
import type { BathCheck } from "@server/models/bath-check";
import type { Certificate } from "@server/models/certificate";
import { bathCheckEvidence } from "./bath-check-evidence";
import { certificateOn, type EvidenceRecords } from "./evidence-records";
import { newestCheckOfPair, standingCheck } from "./pair-checks";

/**
 * The check that speaks for an installation: the one chosen, or whatever corrected it since; else the
 * newest standing check of its two probes on or before the day it starts. Null with none.
 */
export function bathCheckOf(
  { bathCheckId, probes }: InstallationFields,
  { bathChecks }: Pick<EvidenceRecords, "bathChecks">,
  startDay: string,
): BathCheck | null {
  if (probes === null) return null;
  const chosen = bathChecks.find(({ id }) => id === bathCheckId);
  if (chosen !== undefined) return standingCheck(chosen, bathChecks);
  const pair = [probes.supply.probeId, probes.return.probeId] as const;
  return newestCheckOfPair(pair, startDay, bathChecks);
}

/**
 * An installation as the domain reads it: ids become what the kit's records say of them on the day
 * it starts.
 * @param loopTestedOn when the loop's glycol was tested; counts where the installation says nothing.
 */
export function evidenceOf(
  fields: InstallationFields,
  records: EvidenceRecords,
  startDay: string,
  loopTestedOn: string | null,
): PointEvidence {
  const { instruments, certificates, bathChecks } = records;
  const meter = fields.flowMeterId === null ? undefined : instruments.get(fields.flowMeterId);
  const check = bathCheckOf(fields, records, startDay);
  const { probes } = fields;
  const probeOf = ({ probeId, ...onPipe }: NonNullable<typeof probes>["supply"]) => {
    const row = instruments.get(probeId);
    return { ...onPipe, serial: row?.serial ?? "", probeClass: row?.probeClass ?? null };
  };
  return {
    meterPlate: fields.meterPlate,
    flowMeter: meter
      ? {
          serial: meter.serial,
          certificate: certificateEvidence(
            certificateOn(certificates.get(meter.id) ?? [], startDay),
          ),
          driftPercent: fields.flowDriftPercent,
          stepLPerS: fields.flowStepLPerS,
        }
      : null,
    pipe: fields.pipe,
    straightRun: fields.straightRun,
    zero: fields.zero,
    soundSpeed: fields.soundSpeed,
    remountPercent: fields.remountPercent,
    probes: probes && {
      supply: probeOf(probes.supply),
      return: probeOf(probes.return),
      mountingK: fields.mountingK,
      stepK: fields.temperatureStepK,
    },
    bathCheck: check && checkEvidence(check, bathChecks, records),
    clocks: fields.clocks,
    noise: fields.noise,
    fluidTestedOn: fields.fluidTestedOn ?? loopTestedOn,
    edits: fields.edits,
  };
}

function certificateEvidence(certificate: Certificate | null) {
  if (certificate === null) return null;
  const { number, issuedOn, dueOn, expanded, k } = certificate;
  return { number, issuedOn, dueOn, expanded, k };
}

function checkEvidence(
  check: BathCheck,
  checks: readonly BathCheck[],
  { instruments }: EvidenceRecords,
): BathCheckEvidence {
  return bathCheckEvidence(check, checks, (probeId) => instruments.get(probeId)?.serial ?? "");
}
