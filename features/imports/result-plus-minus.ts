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
  const startMs = Math.floor(Date.parse(firstInstant) / INTERVAL_MS) * INTERVAL_MS;
  const endMs = (Math.floor(Date.parse(lastInstant) / INTERVAL_MS) + 1) * INTERVAL_MS;
  return { from: new Date(startMs).toISOString(), to: new Date(endMs).toISOString() };
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
