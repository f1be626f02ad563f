import type { ImportChecks } from "@shared/contracts/import-checks";
import type { ImportFinding } from "@shared/contracts/import-findings";
import type { ImportDetail } from "@shared/contracts/imports";
import { findingsOf, type Finding } from "./findings";

type Weight = Finding["weight"];

/** One thing on the Checks step: what the readings show, or what was mended in the rows. */
export type CheckItem =
  | {
      readonly kind: "reading";
      readonly key: string;
      readonly weight: Weight;
      readonly finding: ImportFinding;
    }
  | {
      readonly kind: "rows";
      readonly key: string;
      readonly weight: Weight;
      readonly finding: Finding;
    };

const ORDER: Readonly<Record<Weight, number>> = { stop: 0, look: 1, note: 2 };

/**
 * Everything found, by weight; within one weight what the readings show comes first, in the server's
 * order of the energy at stake. One that stops keeps its place when it is settled, so that nothing
 * moves under somebody's hand, and is shown as settled.
 */
export function itemsOf(checks: ImportChecks, repair: ImportDetail["repair"]): CheckItem[] {
  const readings = (checks.findings ?? []).map((finding): CheckItem & { order: number } => ({
    kind: "reading",
    key: finding.key,
    weight: isSettled(finding, repair) ? "look" : finding.weight,
    order: ORDER[finding.weight],
    finding,
  }));
  const rows = findingsOf(checks, repair).map((finding): CheckItem & { order: number } => ({
    kind: "rows",
    key: finding.key,
    weight: finding.weight,
    order: ORDER[finding.weight],
    finding,
  }));
  return [...readings, ...rows].sort((a, b) => a.order - b.order);
}

/** One that stops and has a choice, be it one whose check is still running. */
export function isSettled(finding: ImportFinding, repair: ImportDetail["repair"]): boolean {
  if (finding.weight !== "stop") return false;
  const asked = repair.findings?.[finding.key];
  return finding.chosen !== null || finding.choices.some(({ key }) => key === asked);
}

/** How many things still stop the import. */
export function stopsOf(checks: ImportChecks, repair: ImportDetail["repair"]): number {
  return itemsOf(checks, repair).filter(({ weight }) => weight === "stop").length;
}
