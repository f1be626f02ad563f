import { createMeterComparison } from "@shared/contracts/meter-comparisons";
import { saveMeterComparison } from "@server/commands/save-meter-comparison";
import { scoped } from "@server/database/scoped";
import type { MeterComparison } from "@server/models/meter-comparison";
import type { Person } from "./factories";
import type { TestApp } from "./test-app";

/** A permanent class 2 meter against a typed portable over 72 hours, with an outage of 80 hours. */
export const meterComparisonBody = {
  title: "Heat meter of the main against the portable",
  from: "2026-02-02",
  to: "2026-02-05",
  first: { kind: "typed", name: "Portable", energyKwh: 2511.6, expandedPercent: 5.6 },
  second: {
    kind: "register",
    serial: "HM-2041",
    energy: { opening: 184_632, closing: 187_059 },
    claim: { kind: "class", meterClass: 2, flowRatio: 0.42, meanDeltaTK: 18.4, deltaTMinK: 3 },
  },
  standIn: {
    outageHours: 80,
    coveredHours: 61.25,
    coveredKwh: 2093.7,
    degreeHours: { covered: 820.5, missing: 251 },
  },
} as const;

/** The comparison above, saved by somebody. */
export function savedComparison(
  app: TestApp,
  { account, membership, organisationId }: Person,
  siteId: string,
): Promise<MeterComparison> {
  const acting = {
    database: app.database,
    clock: app.clock,
    scope: scoped(organisationId),
    actor: {
      accountId: account.id,
      accountName: account.name,
      organisationId,
      membershipId: membership.id,
      role: membership.role,
      via: "session",
      sessionId: null,
    },
  } as const;
  return saveMeterComparison(acting, siteId, createMeterComparison.body.parse(meterComparisonBody));
}
