import type { Certificate, Instrument } from "@shared/contracts/evidence";

const DAY_MS = 86_400_000;
const dayOf = (isoDay: string) => Date.parse(`${isoDay}T00:00:00Z`) / DAY_MS;

/** The stretch of days that one scale shows, and where on it a day lies. */
export interface LifeScale {
  readonly firstDay: number;
  readonly lastDay: number;
  readonly today: string;
}

/** The certificate that speaks for an instrument today: the newest issued by then. */
export function certificateToday(
  { certificates }: Pick<Instrument, "certificates">,
  today: string,
): Certificate | null {
  return (
    certificates.find(({ withdrawnAt, issuedOn }) => withdrawnAt === null && issuedOn <= today) ??
    null
  );
}

/** One scale for all lives: from the oldest issue to the last due day, today within. */
export function lifeScaleOf(instruments: readonly Instrument[], today: string): LifeScale {
  const days = [dayOf(today) - 30, dayOf(today) + 30];
  for (const instrument of instruments) {
    const certificate = certificateToday(instrument, today);
    if (certificate === null) continue;
    days.push(dayOf(certificate.issuedOn));
    if (certificate.dueOn !== null) days.push(dayOf(certificate.dueOn));
  }
  return { firstDay: Math.min(...days), lastDay: Math.max(...days), today };
}

/** Where a day lies on the scale, 0 to 1. */
export function placeOf({ firstDay, lastDay }: LifeScale, isoDay: string): number {
  return (dayOf(isoDay) - firstDay) / (lastDay - firstDay);
}

/** Whole days from today; negative once it has passed. */
export function daysUntil(isoDay: string, today: string): number {
  return dayOf(isoDay) - dayOf(today);
}

/** Worst first: run out, running out, no certificate, then by the day it is due. */
export function bySoonest(today: string) {
  const rank = { lapsed: 0, dueSoon: 1, none: 2, inDate: 3, openEnded: 4 } as const;
  return (a: Instrument, b: Instrument): number => {
    const kinds = rank[a.calibration] - rank[b.calibration];
    if (kinds !== 0) return kinds;
    const [first, second] = [a, b].map((one) => certificateToday(one, today)?.dueOn ?? "9999");
    return (first ?? "").localeCompare(second ?? "") || a.serial.localeCompare(b.serial);
  };
}
