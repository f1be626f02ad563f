import type { CorrectionChange } from "@shared/contracts/corrections";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import type { FindingChoice } from "@shared/domain/readings/checks/finding";
import { trueInstantMs, type ClockError } from "@shared/domain/readings/corrections/clock";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import type { FoundFinding } from "./find-findings";

type FindingChoices = Pick<RepairChoices, "findings" | "keptSpans">;

/** What names a choice of a finding. */
export function choiceKey(choice: FindingChoice): string {
  switch (choice.change) {
    case "swapSides":
      return `swapSides:${choice.swapped}`;
    case "unit":
      return `unit:${choice.unit}`;
    default:
      return choice.change;
  }
}

/**
 * The choice that counts for a finding; null where a stopping one has none. A unit is never chosen
 * here: it changes the file's recipe, after which the finding is gone.
 */
export function chosenOf(found: FoundFinding, choices: FindingChoices): string | null {
  const asked = choices.findings?.[found.key];
  const isOffered = found.finding.choices.some(
    (choice) => choiceKey(choice) === asked && choice.change !== "unit",
  );
  if (asked !== undefined && isOffered) return asked;
  return found.finding.weight === "stop" ? null : "keep";
}

/** A finding with the change that was chosen for it. */
export interface ChosenChange {
  readonly found: FoundFinding;
  readonly change: CorrectionChange;
}

/** What the choices come to, in the findings' order; those that keep the readings change nothing. */
export function chosenChanges(
  findings: readonly FoundFinding[],
  choices: FindingChoices,
): ChosenChange[] {
  return findings.flatMap((found) => {
    const key = chosenOf(found, choices);
    const change = key === null ? null : changeOf(found, key, findings, choices);
    return change ? [{ found, change }] : [];
  });
}

/** What the choices would come to with another one for a single finding. */
export function changesIf(
  findings: readonly FoundFinding[],
  choices: FindingChoices,
  found: FoundFinding,
  key: string,
): CorrectionChange[] {
  const asked = { ...choices, findings: { ...choices.findings, [found.key]: key } };
  return chosenChanges(findings, asked).map(({ change }) => change);
}

/** Every clock that could be put right, chosen or not. */
export function offeredClocks(findings: readonly FoundFinding[]): CorrectionChange[] {
  return findings.flatMap(({ fileId, finding }) =>
    finding.choices.flatMap((choice) =>
      choice.change === "clock" && fileId !== null ? [clockChange(fileId, choice.error)] : [],
    ),
  );
}

/** What one choice of a finding would change, beside the clock that is chosen; null for nothing. */
export function changeOf(
  found: FoundFinding,
  key: string,
  findings: readonly FoundFinding[],
  choices: FindingChoices,
): CorrectionChange | null {
  const choice = found.finding.choices.find((each) => choiceKey(each) === key);
  if (!choice) return null;
  const clock = chosenClock(found, findings, choices);
  switch (choice.change) {
    case "exclude": {
      const kept = new Set(choices.keptSpans?.[found.key] ?? []);
      const spans = choice.spans
        .filter(({ startMs }) => !kept.has(isoOf(startMs)))
        .map((span) => inTrueTime(span, clock));
      const [first] = spans;
      const last = spans.at(-1);
      if (!first || !last) return null;
      return {
        kind: "exclude",
        from: first.from,
        to: last.to,
        rule: null,
        ...(spans.length > 1 ? { parts: spans } : {}),
      };
    }
    case "swapSides":
      return { kind: "swapSides", ...inTrueTime(choice.span, clock), swapped: choice.swapped };
    case "flipFlow":
      return { kind: "flipFlow", ...inTrueTime(choice.span, clock) };
    case "clock":
      return found.fileId === null ? null : clockChange(found.fileId, choice.error);
    case "split":
      return { kind: "split", at: isoOf(inTime(choice.atMs, clock)) };
    case "unit":
    case "cutOff":
    case "keep":
      return null;
  }
}

/** The clock that is chosen for the file a finding is about; its spans are in the logger's time. */
function chosenClock(
  { fileId }: FoundFinding,
  findings: readonly FoundFinding[],
  choices: FindingChoices,
): ClockError | null {
  const owner = findings.find(
    (other) =>
      other.finding.code === "clockOff" &&
      (fileId === null || other.fileId === fileId) &&
      chosenOf(other, choices) === "clock",
  );
  const choice = owner?.finding.choices.find(({ change }) => change === "clock");
  return choice?.change === "clock" ? choice.error : null;
}

const inTime = (ms: number, clock: ClockError | null) =>
  clock === null ? ms : trueInstantMs(ms, clock);

function inTrueTime({ startMs, endMs }: Interval, clock: ClockError | null) {
  return { from: isoOf(inTime(startMs, clock)), to: isoOf(inTime(endMs, clock)) };
}

function clockChange(logFileId: string, error: ClockError): CorrectionChange {
  return {
    kind: "clock",
    logFileId,
    offsetS: error.offsetMs / 1000,
    driftSPerDay: (error.driftPerMs * DAY_MS) / 1000,
    referenceAt: isoOf(error.referenceMs),
  };
}

export const isoOf = (ms: number): string => new Date(Math.round(ms)).toISOString();
