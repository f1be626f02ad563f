import type { z } from "zod";
import {
  installationFields,
  type createInstallation,
  type InstallationFields,
} from "@shared/contracts/evidence";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { Installation } from "@server/models/installation";

type GivenFields = Omit<z.output<(typeof createInstallation)["body"]>, "supersedes" | "reason">;

/** What an installation says where nobody said anything: nothing is known, which is not zero. */
const unknown: Omit<InstallationFields, "startsAt"> = {
  endsAt: null,
  flowMeterId: null,
  loggerId: null,
  flowDriftPercent: null,
  flowStepLPerS: null,
  pipe: null,
  meterPlate: null,
  enteredBoreMm: null,
  straightRun: null,
  zero: null,
  shownFlowLPerS: null,
  soundSpeed: null,
  remountPercent: null,
  probes: null,
  mountingK: null,
  temperatureStepK: null,
  bathCheckId: null,
  clocks: [],
  noise: null,
  fluidTestedOn: null,
  edits: [],
  notes: null,
};

/** The fields as given, with everything left out as unknown. */
export function completeFields(given: GivenFields): InstallationFields {
  return installationFields.parse({ ...unknown, ...given });
}

/** The fields of a stored version, as the contract has them. */
export function fieldsOf(row: Installation): InstallationFields {
  const { probes, ...details } = row.details;
  const { supplyProbeId, returnProbeId } = row;
  return {
    ...details,
    startsAt: instantText(row.startsAt),
    endsAt: instantTextOrNull(row.endsAt),
    flowMeterId: row.flowMeterId,
    loggerId: row.loggerId,
    bathCheckId: row.bathCheckId,
    probes:
      probes && supplyProbeId !== null && returnProbeId !== null
        ? {
            supply: { ...probes.supply, probeId: supplyProbeId },
            return: { ...probes.return, probeId: returnProbeId },
          }
        : null,
  };
}

/** The columns that store the fields. */
export function columnsOf(fields: InstallationFields) {
  const { startsAt, endsAt, flowMeterId, loggerId, bathCheckId, probes, ...rest } = fields;
  return {
    startsAt: new Date(startsAt),
    endsAt: endsAt === null ? null : new Date(endsAt),
    flowMeterId,
    loggerId,
    bathCheckId,
    supplyProbeId: probes?.supply.probeId ?? null,
    returnProbeId: probes?.return.probeId ?? null,
    document: { ...rest, probes: probes && withoutIds(probes) },
  };
}

function withoutIds({ supply, return: back }: NonNullable<InstallationFields["probes"]>) {
  const onPipe = ({ mounting, depthMm, insulated }: typeof supply) => ({
    mounting,
    depthMm,
    insulated,
  });
  return { supply: onPipe(supply), return: onPipe(back) };
}
