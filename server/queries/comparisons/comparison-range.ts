import type { MeterComparisonInput } from "@shared/contracts/meter-comparisons";
import { DAY_MS } from "@shared/domain/time/interval";
import { Invalid } from "@server/http/errors";
import {
  readRange,
  requireQuarterHours,
  type EnergyRange,
} from "@server/queries/energy/energy-range";

/** Quarter-hours of a year are read for each point; more is a question for two comparisons. */
const MOST_DAYS = 366;

/**
 * The period of a comparison. Metering points are summed from quarter-hours, so with one of them the
 * period must not cut any.
 * @throws Invalid (422) at the body's own fields.
 */
export function comparisonRange(asked: MeterComparisonInput, zone: string): EnergyRange {
  return atBody(() => {
    const range = readRange(asked, zone);
    const hasPoint = asked.first.kind === "point" || asked.second.kind === "point";
    if (hasPoint && range.endMs - range.startMs > MOST_DAYS * DAY_MS)
      throw Invalid.field(
        "to",
        "range-too-long",
        "A metering point is compared over a year at most.",
      );
    if (hasPoint && range.dates === null) requireQuarterHours(range);
    return range;
  });
}

/** Ranges are read from a query elsewhere; here their ends stand in the body. */
export function atBody<Answer>(read: () => Answer): Answer {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof Invalid)) throw error;
    throw new Invalid(
      (error.errors ?? []).map((one) => ({
        ...one,
        pointer: one.pointer.replace(/^\/query\//, "/body/"),
      })),
      error.message,
      error.code,
    );
  }
}
