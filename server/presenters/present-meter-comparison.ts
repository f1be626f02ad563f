import type {
  MeterComparison as MeterComparisonAnswer,
  MeterComparisonLine,
} from "@shared/contracts/meter-comparisons";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { MeterComparison } from "@server/models/meter-comparison";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import type { ComparisonSurroundings } from "@server/queries/comparisons/comparison-surroundings";

interface NamedSite {
  readonly name: string;
  readonly zone: string;
}

function about(row: MeterComparison, site: NamedSite) {
  return {
    id: row.id,
    siteId: row.siteId,
    siteName: site.name,
    zone: site.zone,
    title: row.title,
    from: instantText(row.fromAt),
    to: instantText(row.toAt),
    recordedAt: instantText(row.recordedAt),
    recordedBy: row.recordedByName,
    state: row.state,
  };
}

export function presentMeterComparisonLine(
  row: MeterComparison,
  site: NamedSite,
): MeterComparisonLine {
  const { first, second, verdict, errorsCancel, energy, standIn } = row.result;
  return {
    ...about(row, site),
    first: { name: first.name, energyKwh: first.energyKwh },
    second: { name: second.name, energyKwh: second.energyKwh },
    verdict,
    errorsCancel,
    en: energy.en,
    hasStandIn: standIn !== null,
  };
}

export function presentMeterComparison(
  row: MeterComparison,
  site: NamedSite,
  { readingsChanged, supersededById }: ComparisonSurroundings,
  actor: Actor,
): MeterComparisonAnswer {
  return {
    ...about(row, site),
    input: row.input,
    result: row.result,
    notes: row.input.notes,
    readingsChanged,
    supersedesId: row.supersedesId,
    supersededById,
    withdrawnAt: instantTextOrNull(row.withdrawnAt),
    withdrawnBy: row.withdrawnByName,
    withdrawnReason: row.withdrawnReason,
    can: { edit: can(actor).editComparisons && row.state === "stands" },
  };
}
