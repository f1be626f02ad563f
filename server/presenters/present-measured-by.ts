import type { MeasuredBy } from "@shared/contracts/energy";
import type { Interval } from "@shared/domain/time/interval";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { instantText } from "@server/database/conversions";
import type { StandingInstallation } from "@server/queries/evidence/point-evidence";
import { certificateState } from "./present-instrument";

/**
 * Who measured a range: serials, and how the certificate stood on the last day of it that the
 * installation speaks for, as the ± judges it.
 */
export function presentMeasuredBy(
  { id, startMs, endMs, evidence }: StandingInstallation,
  range: Interval,
  zone: string,
): MeasuredBy {
  const lastDay = localDateOf(Math.min(range.endMs, endMs ?? range.endMs) - 1, zone);
  const { flowMeter, probes, bathCheck } = evidence;
  const certificate = flowMeter?.certificate ?? null;
  return {
    installationId: id,
    from: instantText(new Date(startMs)),
    to: endMs === null ? null : instantText(new Date(endMs)),
    flowMeter: flowMeter && {
      serial: flowMeter.serial,
      certificate: certificate && {
        dueOn: certificate.dueOn,
        state: certificateState(certificate.dueOn, lastDay),
      },
    },
    meterClass: evidence.meterPlate?.accuracyClass ?? null,
    probes: probes && {
      supplySerial: probes.supply.serial,
      returnSerial: probes.return.serial,
      checkedOn: bathCheck?.checkedOn ?? null,
    },
  };
}
