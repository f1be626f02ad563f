import { useQuery } from "@tanstack/react-query";

import type { ImportDetail } from "@shared/contracts/imports";
import type { RangePlusMinus } from "@shared/contracts/plus-minus";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";

import { energyOfQuery } from "./imports-queries";

/**
 * The quarter-hours a stored file's rows lie in: what energy, ± and workings can be asked for. Null
 * before anything is stored.
 */
export function resultRange(detail: ImportDetail): { from: string; to: string } | null {
  const { firstInstant, lastInstant, importedAt } = detail;
  if (importedAt === null || firstInstant === null || lastInstant === null) return null;
  const firstMs = Date.parse(firstInstant) - meanStepMs(detail, "meanToLabel");
  const lastMs = Date.parse(lastInstant) + meanStepMs(detail, "meanFromLabel");
  const startMs = Math.floor(firstMs / INTERVAL_MS) * INTERVAL_MS;
  const endMs = Math.max(Math.ceil(lastMs / INTERVAL_MS) * INTERVAL_MS, startMs + INTERVAL_MS);
  return { from: new Date(startMs).toISOString(), to: new Date(endMs).toISOString() };
}

/** How far a mean of this kind reaches past its time; 0 where no file holds such means. */
function meanStepMs(detail: ImportDetail, kind: "meanFromLabel" | "meanToLabel"): number {
  const stepsS = detail.files
    .filter(({ recipe }) => recipe?.seriesKind === kind)
    .map(({ id }) => detail.checks?.files.find(({ fileId }) => fileId === id)?.nominalStepS ?? 0);
  return Math.max(0, ...stepsS) * 1000;
}

/** The ± of what the file brought, by the evidence of its point; null until it is known. */
export function useResultPlusMinus(detail: ImportDetail): RangePlusMinus | null {
  const range = resultRange(detail);
  const answer = useQuery({
    ...energyOfQuery(detail.point.id, range ?? { from: "", to: "" }),
    enabled: range !== null,
  });
  return answer.data?.plusMinus ?? null;
}
