import type { ImportChecks, RepairStepView } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";

type Repair = ImportDetail["repair"];
/** Names of the choices a person has about defects. */
export type ChoiceName = Exclude<keyof Repair, "weakSignalBelowPercent" | "findings" | "keptSpans">;

/** One thing on the Checks step. A stopping one has no choice made for it. */
export interface Finding {
  readonly key: string;
  readonly weight: "stop" | "look" | "note";
  readonly fileId: string;
  readonly what:
    | { readonly kind: "step"; readonly step: RepairStepView; readonly choice: ChoiceName | null }
    | { readonly kind: "gap"; readonly gap: ImportChecks["files"][number]["gaps"][number] }
    | { readonly kind: "moreGaps"; readonly count: number };
}

const CHOICE_OF: Partial<Record<RepairStepView["code"], ChoiceName>> = {
  identicalRepeats: "identicalRepeats",
  conflictingRepeats: "conflictingRepeats",
  outOfOrder: "outOfOrder",
  sentinels: "sentinels",
  missingHour: "missingHour",
  weakSignal: "weakSignal",
  overlapDifferent: "overlap",
};

/** Steps that lose something a person may want back; the rest are for the record. */
const WORTH_A_LOOK: readonly RepairStepView["code"][] = [
  "unreadableCells",
  "shortRows",
  "unreadableTimes",
  "weakSignal",
  "missingHour",
  "conflictingRepeats",
  "overlapDifferent",
];

/** Rows of the repeated hour that nothing in the file places in the first or second pass. */
export const isUnclear = (step: RepairStepView): boolean =>
  step.code === "repeatedHour" && (step.countByKind.unclear ?? 0) > 0;

const GAPS_SHOWN = 4;
const ORDER = { stop: 0, look: 1, note: 2 } as const;

/** Everything found, the stopping things first, then what needs a look, then what is for the record. */
export function findingsOf(checks: ImportChecks, repair: Repair): Finding[] {
  const findings = checks.files.flatMap((file): Finding[] => {
    const steps = file.steps
      .filter((step) => step.count > 0)
      .map((step): Finding => {
        const choice = CHOICE_OF[step.code] ?? null;
        const undecided = choice !== null && repair[choice] === null;
        return {
          key: `${file.fileId} ${step.code}`,
          weight: undecided
            ? "stop"
            : WORTH_A_LOOK.includes(step.code) || isUnclear(step)
              ? "look"
              : "note",
          fileId: file.fileId,
          what: { kind: "step", step, choice },
        };
      });
    const gaps = file.gaps.slice(0, GAPS_SHOWN).map((gap): Finding => ({
      key: `${file.fileId} gap ${gap.from}`,
      weight: "look",
      fileId: file.fileId,
      what: { kind: "gap", gap },
    }));
    const more = file.gapCount - gaps.length;
    return more > 0
      ? [
          ...steps,
          ...gaps,
          {
            key: `${file.fileId} gaps`,
            weight: "look",
            fileId: file.fileId,
            what: { kind: "moreGaps", count: more },
          },
        ]
      : [...steps, ...gaps];
  });
  return findings.sort((a, b) => ORDER[a.weight] - ORDER[b.weight]);
}
