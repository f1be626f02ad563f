import type { PointSummary } from "@shared/contracts/energy";
import type { AskedFigure } from "@features/workings/workings-queries";
import type { WorkingsKey } from "@features/workings/workings-key";

import type { LoopView } from "./loop-context";

/**
 * The figure a key means on this page: of its point and its range where the key names none, and the
 * busiest half hour for a power without a range. Null until the page knows which half hour that is.
 */
export function askedFigure(
  key: WorkingsKey,
  { point, range }: Pick<LoopView, "point" | "range">,
  summary: PointSummary | null,
): AskedFigure | null {
  const asked = { pointId: key.pointId ?? point.id, figure: key.figure, register: key.register };
  if (key.from !== undefined && key.to !== undefined)
    return { ...asked, from: key.from, to: key.to };
  if (key.figure !== "power") return { ...asked, from: range.from, to: range.until };
  const busiest = summary?.busiest;
  return busiest
    ? { ...asked, register: busiest.register, from: busiest.from, to: busiest.to }
    : null;
}
