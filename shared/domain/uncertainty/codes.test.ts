import type { budgetTerm as contractTerm } from "@shared/contracts/evidence";
import { WORKED_EVIDENCE, WORKED_INPUT } from "@test/reference/uncertainty-worked-interval";
import type { z } from "zod";
import { budgetFromEvidence } from "./budget-from-evidence";
import { ORIGIN_CODES, VERDICT_CODES } from "./codes";
import { conditionVerdicts } from "./conditions";

const NOTHING = { ...WORKED_INPUT, evidence: null, pipe: null };
const namesOf = (codes: Readonly<Record<string, readonly string[]>>, code: string) =>
  [...(codes[code] ?? ["no such code"])].sort();

test("every term's origin carries the values its sentence is promised, no more and no less", () => {
  const lapsed = { ...WORKED_INPUT, onDate: "2028-01-01", pairDifferenceCorrected: false };
  const edits = [{ kind: "drift", value: 1, reason: "old sensors" }] as const;
  const edited = { ...WORKED_INPUT, evidence: { ...WORKED_EVIDENCE, edits } };
  const seen = new Set<string>();
  for (const input of [WORKED_INPUT, NOTHING, lapsed, edited]) {
    for (const { origin } of budgetFromEvidence(input).terms) {
      expect(Object.keys(origin.values).sort()).toEqual(namesOf(ORIGIN_CODES, origin.code));
      seen.add(origin.code);
    }
  }
  expect(seen.size).toBeGreaterThan(25);
});

test("so does every verdict", () => {
  for (const evidence of [WORKED_EVIDENCE, null]) {
    const verdicts = conditionVerdicts({
      evidence,
      budget: budgetFromEvidence({ ...WORKED_INPUT, evidence }),
      fluid: { kind: "water" },
      state: { velocityMPerS: 0.2, reynolds: 9000, deltaTK: 0.3 },
      enteredBoreMm: 102.26,
      enteredBoreCorrected: false,
      onDate: "2026-06-20",
      intervalS: 300,
      pairDifferenceCorrected: true,
      completeness: 0.97,
    });
    for (const { code, values } of verdicts) {
      expect(Object.keys(values).sort()).toEqual(namesOf(VERDICT_CODES, code));
    }
  }
});

test("a term fits what the API hands out", () => {
  const [term] = budgetFromEvidence(WORKED_INPUT).terms;
  const handedOut: z.infer<typeof contractTerm> = {
    ...term!,
    origin: { ...term!.origin, values: { ...term!.origin.values } },
  };
  expect(handedOut.kind).toBe("certificate");
});
