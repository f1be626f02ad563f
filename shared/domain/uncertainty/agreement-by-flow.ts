import { type Agreement, agreement, type Compared } from "./agreement";

/** What two meters counted while the flow lay within one band, flows in m³/h. */
export interface FlowBand {
  readonly fromM3PerHour: number;
  /** Exclusive; null: no upper end. */
  readonly toM3PerHour: number | null;
  readonly first: Compared;
  readonly second: Compared;
}

export interface BandAgreement {
  readonly fromM3PerHour: number;
  readonly toM3PerHour: number | null;
  readonly agreement: Agreement;
}

export interface AgreementByFlow {
  readonly total: Agreement;
  readonly bands: readonly BandAgreement[];
  /** The total agrees while a band does not: errors of high and low flow hide in it. */
  readonly compensating: boolean;
}

/**
 * Agreement band by band beside that of the total. A meter that reads high at low flow and low at
 * high flow may come out right over a day, and wrong over the next.
 * Example: +30 of 100 ± 15 and −30 of 400 ± 20 kWh: the total agrees, both bands do not.
 */
export function agreementByFlow(
  total: { readonly first: Compared; readonly second: Compared },
  bands: readonly FlowBand[],
): AgreementByFlow {
  const whole = agreement(total.first, total.second);
  const judged = bands.map((band) => ({
    fromM3PerHour: band.fromM3PerHour,
    toM3PerHour: band.toM3PerHour,
    agreement: agreement(band.first, band.second),
  }));
  return {
    total: whole,
    bands: judged,
    compensating:
      whole.code === "agree" && judged.some((band) => band.agreement.code === "disagree"),
  };
}

export interface MeterLine {
  /** first = intercept + slope · second. */
  readonly slope: number;
  readonly intercept: number;
}

/**
 * Least-squares line of one meter's readings over the other's: a slope off 1 is a matter of scale
 * (bore, class), an intercept off 0 one of zero. Null with fewer than two different readings of the
 * second. Example: 1.1, 2.1, 3.1 over 1, 2, 3 → slope 1, intercept 0.1.
 */
export function meterLine(
  readings: readonly { readonly first: number; readonly second: number }[],
): MeterLine | null {
  const count = readings.length;
  if (count < 2) return null;
  const meanFirst = readings.reduce((sum, each) => sum + each.first, 0) / count;
  const meanSecond = readings.reduce((sum, each) => sum + each.second, 0) / count;
  let squares = 0;
  let products = 0;
  for (const { first, second } of readings) {
    squares += (second - meanSecond) ** 2;
    products += (second - meanSecond) * (first - meanFirst);
  }
  if (!(squares > 0)) return null;
  const slope = products / squares;
  return { slope, intercept: meanFirst - slope * meanSecond };
}
