import type { Workings } from "../contracts/workings";
import type { Format } from "../formats/format";
import { formatNumber, NO_BREAK_SPACE, uncertaintyPlaces } from "../formats/numbers";
import { quantityOf } from "./shown-quantity";
import { significant, type Words } from "./words";

type Budget = NonNullable<Workings["budget"]>;
type Term = Budget["terms"][number]["term"];

export interface BudgetText {
  readonly title: string;
  readonly rows: readonly {
    readonly key: string;
    readonly label: string;
    readonly detail: string;
    readonly percent: string;
    /** Length of the bar against the largest, 0 to 1. */
    readonly share: number;
    /** "Does not shrink with time", for those who hear the row. */
    readonly nature: string;
  }[];
  readonly together: { readonly label: string; readonly value: string };
  readonly times: { readonly label: string; readonly value: string };
  readonly notes: readonly string[];
}

/** Where the ± comes from, largest first; null where none is given. */
export function budgetText(model: Workings, t: Words, format: Format): BudgetText | null {
  const { budget } = model;
  if (budget === null) return null;
  const largest = budget.terms[0]?.percent ?? 0;
  const percent = (value: number) =>
    value > 0 && value < 0.005
      ? t("budget.percentUnder", { value: format.number(0.01, 2) })
      : t("budget.percent", { value: format.number(value, 2) });
  return {
    title: t("budget.title"),
    rows: budget.terms.map(({ term, percent: size }) => ({
      key: `${term.kind} ${term.actsOn}`,
      label: t(`budget.term.${term.kind}`),
      detail: termDetail(term, t, format),
      percent: percent(size),
      share: largest > 0 ? size / largest : 0,
      nature: t(`budget.${term.nature}`),
    })),
    together: { label: t("budget.together"), value: percent(budget.combinedPercent) },
    times: {
      label: t("budget.times", { k: budget.k }),
      value: t("budget.timesResult", {
        expanded: expandedText(model, budget.expanded, format),
        percent: significant(budget.expandedPercent, format, 2),
      }),
    },
    notes: notesOf(budget, t, format),
  };
}

function expandedText(model: Workings, stored: number, format: Format): string {
  const quantity = quantityOf(model);
  const unit = quantity ? format.unit(quantity) : null;
  const shown = unit ? stored * unit.factor : stored;
  const text = formatNumber(shown, uncertaintyPlaces(shown) ?? 2, format.language);
  return `${text}${NO_BREAK_SPACE}${unit?.unit ?? model.unit}`;
}

function notesOf(budget: Budget, t: Words, format: Format): string[] {
  const { flowWeightedDeltaTK, deltaTWeightedVelocityMPerS, boreMm } = budget;
  const notes = [
    t("budget.percentMore", { systematic: format.number(budget.systematicPercent, 2) }),
  ];
  // Where nothing shrinks, the number of rows says nothing.
  if (budget.samples > 1 && budget.randomPercent > 0)
    notes.push(
      t("budget.samples", {
        samples: format.number(budget.samples, 0),
        effective: format.number(budget.effectiveSamples, 0),
        rho: format.number(budget.autocorrelation, 2),
      }),
    );
  if (flowWeightedDeltaTK !== null)
    notes.push(
      t("budget.putTo.deltaT", {
        deltaT: format.withUnit(flowWeightedDeltaTK, "temperatureDifference", 2),
      }),
    );
  if (deltaTWeightedVelocityMPerS !== null && boreMm !== null)
    notes.push(
      t("budget.putTo.velocity", {
        velocity: format.withUnit(deltaTWeightedVelocityMPerS, "velocity", 2),
        bore: format.withUnit(boreMm, "pipeSize", 1),
      }),
    );
  return notes;
}

function termDetail(term: Term, t: Words, format: Format): string {
  const given = t(`budget.given.${term.distribution}`, {
    given: significant(term.given, format, 2),
    unit: term.unit,
    k: term.k ?? "",
  });
  return t("budget.detail", { given, origin: originText(term.origin, t, format) });
}

/** Values of an origin as people read them: codes of fittings as words, numbers in few figures. */
function originText({ code, values }: Term["origin"], t: Words, format: Format): string {
  const written = Object.entries(values).map(([name, value]) => {
    if (typeof value === "number") return [name, shortNumber(value, format)];
    if (name === "fitting") return [name, t(`budget.fitting.${value}`)];
    if (/^\d{4}-\d\d-\d\d$/.test(value)) return [name, format.day(value, "dayMonthYear")];
    return [name, value];
  });
  return t(`budget.origin.${code}`, Object.fromEntries(written));
}

function shortNumber(value: number, format: Format): string {
  return Number.isInteger(value) ? format.number(value, 0) : significant(value, format, 2);
}
