import { RowQuality, type ReadingColumns, type ReadingSegment } from "../reading-columns";
import { rowsInSpan, type CorrectionSpan } from "./correction-span";

/** Which rows of a span are left out: those whose value lies beyond a bound. */
export interface ExclusionRule {
  readonly channel: "flow" | "supply" | "return" | "power" | "deltaT" | "signal";
  readonly is: "below" | "above";
  /** m³/h, °C, kW, K or percent. */
  readonly value: number;
}

/**
 * Leaves rows of a span out: all of them, or those that meet a rule. Their values stay readable; only
 * what they are worth changes. A row without a reading stays one without a reading. ΔT and power are
 * compared by size, whichever way the heat goes; power is what a meter wrote. A row that lacks the
 * rule's channel does not meet it.
 *
 * Example: signal below 40 % from 9 to 10 o'clock leaves a row of 35 % out and keeps one of 40 %.
 */
export function exclude(
  segment: ReadingSegment,
  span: CorrectionSpan,
  rule: ExclusionRule | null,
): ReadingSegment {
  const { from, to } = rowsInSpan(segment, span);
  if (from >= to) return segment;
  const { columns } = segment;
  const valueOf = rule === null ? null : reader(columns, rule.channel);
  const quality = columns.quality.slice();
  for (let row = from; row < to; row++) {
    if (quality[row] !== RowQuality.measured) continue;
    if (rule !== null && valueOf !== null) {
      const value = valueOf(row);
      // NaN fails both comparisons.
      if (!(rule.is === "below" ? value < rule.value : value > rule.value)) continue;
    }
    quality[row] = RowQuality.excluded;
  }
  return { ...segment, columns: { ...columns, quality } };
}

function reader(
  columns: ReadingColumns,
  channel: ExclusionRule["channel"],
): (row: number) => number {
  const { flowM3PerHour, supplyC, returnC, signalPercent, powerKw, heatingKw, coolingKw } = columns;
  const at = (values: Float64Array | null | undefined) => (row: number) => values?.[row] ?? NaN;
  switch (channel) {
    case "flow":
      return at(flowM3PerHour);
    case "supply":
      return at(supplyC);
    case "return":
      return at(returnC);
    case "signal":
      return at(signalPercent);
    case "deltaT":
      return (row) => Math.abs(at(supplyC)(row) - at(returnC)(row));
    case "power":
      return (row) =>
        powerKw ? Math.abs(at(powerKw)(row)) : Math.max(at(heatingKw)(row), at(coolingKw)(row));
  }
}
