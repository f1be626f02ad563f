import { daysFrom } from "./calendar-days";
import { certificateLapsed } from "./certificate-terms";
import type { ConditionsInput } from "./conditions";
import { FLUID_TEST_DAYS } from "./fluid-terms";
import { worstClockOffsetS } from "./random-terms";
import { blocks, type ConditionVerdict, fine, widens } from "./verdict";

const DUE_SOON_DAYS = 30;
const BILL_PERCENT = 99;
const BILL_WITH_FILL_PERCENT = 95;

/** Certificate, clocks, the fluid's test and how much of the time is covered. */
export function recordConditions(input: ConditionsInput): ConditionVerdict[] {
  return [
    certificateVerdict(input),
    ...clockVerdict(input),
    ...fluidVerdict(input),
    ...completenessVerdict(input.completeness),
  ];
}

/** A lapsed or missing certificate widens its term and bars billing. */
function certificateVerdict({ evidence, onDate }: ConditionsInput): ConditionVerdict {
  const certificate = evidence?.flowMeter?.certificate ?? null;
  if (certificate === null) return blocks("certificate", "certificateMissing", {}, "billing");
  const { number, issuedOn, dueOn } = certificate;
  if (dueOn === null) return fine("certificate", "certificateOpenEnded", { number, issuedOn });
  if (certificateLapsed(certificate, onDate)) {
    return blocks("certificate", "certificateLapsed", { number, dueOn }, "billing");
  }
  const days = daysFrom(onDate, dueOn);
  return days <= DUE_SOON_DAYS
    ? fine("certificate", "certificateDueSoon", { number, dueOn, days })
    : fine("certificate", "certificateInDate", { number, dueOn });
}

/** A logger's clock may be off by less than half an interval. */
function clockVerdict({ evidence, intervalS }: ConditionsInput): ConditionVerdict[] {
  const offsetS = worstClockOffsetS(evidence?.clocks ?? []);
  if (offsetS === null) return [widens("clock", "clockUnchecked", {}, "alignment")];
  if (intervalS === null || !(intervalS > 0)) return [];
  const values = { offsetS, limitS: intervalS / 2 };
  return offsetS < intervalS / 2
    ? [fine("clock", "clockFine", values)]
    : [widens("clock", "clockOff", values, "alignment")];
}

/** Mixtures only: tested within twelve months; one nobody tested is indicative, not for billing. */
function fluidVerdict({ evidence, fluid, onDate }: ConditionsInput): ConditionVerdict[] {
  if (fluid.kind === "water") return [];
  const testedOn = evidence?.fluidTestedOn ?? null;
  if (testedOn === null) return [blocks("fluid", "fluidNotTested", {}, "billing")];
  const days = daysFrom(testedOn, onDate);
  return days > FLUID_TEST_DAYS
    ? [widens("fluid", "fluidTestOld", { testedOn, days, most: FLUID_TEST_DAYS }, "fluid")]
    : [fine("fluid", "fluidTested", { testedOn, days })];
}

/** From 99 % a figure may be billed, from 95 % with its filled share shown, below not as it is. */
function completenessVerdict(completeness: number | null): ConditionVerdict[] {
  if (completeness === null) return [];
  const percent = 100 * completeness;
  if (percent >= BILL_PERCENT) {
    return [fine("completeness", "completenessFine", { percent })];
  }
  return percent >= BILL_WITH_FILL_PERCENT
    ? [
        widens(
          "completeness",
          "completenessFilled",
          { percent, leastPercent: BILL_PERCENT },
          "filled",
        ),
      ]
    : [
        blocks(
          "completeness",
          "completenessLow",
          { percent, leastPercent: BILL_WITH_FILL_PERCENT },
          "billing",
        ),
      ];
}
