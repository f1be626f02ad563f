import type { ImportDetail, QuestionView } from "@shared/contracts/imports";

/** The five steps, in order. */
export const WIZARD_STEPS = ["file", "columns", "time", "checks", "result"] as const;
export type WizardStep = (typeof WIZARD_STEPS)[number];

const TIME_QUESTIONS: readonly QuestionView["code"][] = ["loggerClock"];

/** Questions of one step; the date order is asked beside the column it concerns. */
export function questionsOf(step: WizardStep, detail: ImportDetail): QuestionView[] {
  return detail.files
    .flatMap((file) => file.questions)
    .filter((question) =>
      step === "time"
        ? TIME_QUESTIONS.includes(question.code)
        : step === "columns" && !TIME_QUESTIONS.includes(question.code),
    );
}

const hasReadableFiles = (detail: ImportDetail): boolean =>
  detail.files.length > 0 &&
  detail.files.every((file) => file.recognition !== null && file.unreadable === null);

/** The furthest step that what is known so far allows; earlier ones are always open. */
export function furthestStep(detail: ImportDetail): WizardStep {
  if (detail.state === "importing" || detail.state === "imported") return "result";
  if (!hasReadableFiles(detail)) return "file";
  if (questionsOf("columns", detail).length > 0) return "columns";
  if (questionsOf("time", detail).length > 0) return "time";
  return "checks";
}

/** The step to show: the one the URL names where it is open, otherwise where work goes on. */
export function currentStep(detail: ImportDetail, asked: string | undefined): WizardStep {
  const furthest = furthestStep(detail);
  if (furthest === "result") return "result";
  const wanted = WIZARD_STEPS.find((step) => step === asked);
  if (wanted && WIZARD_STEPS.indexOf(wanted) <= WIZARD_STEPS.indexOf(furthest)) return wanted;
  if (!wanted && (detail.state === "open" || detail.state === "reading")) return "file";
  return furthest;
}

/** A job is under way or waits; also one that takes the readings of an imported log out again. */
export const isWorking = ({ state, progress }: Pick<ImportDetail, "state" | "progress">): boolean =>
  state === "reading" || state === "checking" || state === "importing" || progress !== null;
