import type { ImportChecks } from "@shared/contracts/import-checks";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import { rankFindings } from "@shared/domain/readings/checks/rank-findings";
import type { EnergySettings } from "@server/readings/energy-settings";
import type { CheckedFile } from "../file-checks";
import type { ImportCheckContext } from "./check-context";
import { chosenOf } from "./choices";
import type { ChoiceEnergy } from "./choice-energy";
import type { FoundFinding, FoundFindings } from "./find-findings";
import { presentFinding } from "./present-finding";
import { priceChoices, type ChoicePrice } from "./price-choices";

/** More would not be read; those left over are the lightest. */
const MOST_SHOWN = 60;

/** What the Checks step shows of findings: in the order to settle them, with what choices are worth. */
export function shownFindings(
  { findings: unranked, notChecked }: FoundFindings,
  energy: ChoiceEnergy | null,
  more: {
    readonly files: readonly CheckedFile[];
    readonly choices: RepairChoices;
    readonly context: ImportCheckContext;
    readonly settings: EnergySettings;
  },
): Pick<ImportChecks, "findings" | "moreFindings" | "notChecked"> {
  const heaviest = byWeight(unranked);
  const prices =
    energy === null
      ? new Map<string, ReadonlyMap<string, ChoicePrice>>()
      : priceChoices(heaviest, more.choices, energy, more);
  const ranked = ranking(heaviest, (found) => stakeOf(prices.get(found.key)));
  return {
    findings: ranked
      .slice(0, MOST_SHOWN)
      .map((found) =>
        presentFinding(found, { ...more, prices: prices.get(found.key) ?? new Map() }),
      ),
    moreFindings: Math.max(0, ranked.length - MOST_SHOWN),
    notChecked: [...notChecked],
  };
}

/** Whether one that stops has no choice yet. */
export function isUndecided({ findings }: FoundFindings, choices: RepairChoices): boolean {
  return findings.some((found) => chosenOf(found, choices) === null);
}

/** Before energy is known: by weight, then by the rows it is about. */
const byWeight = (findings: readonly FoundFinding[]) =>
  ranking(findings, ({ finding }) => finding.rowCount);

function ranking(
  findings: readonly FoundFinding[],
  stake: (found: FoundFinding) => number | null,
): FoundFinding[] {
  const owner = new Map(findings.map((found) => [found.finding, found]));
  const stakes = new Map(findings.map((found) => [found.finding, stake(found)]));
  return rankFindings(
    findings.map(({ finding }) => finding),
    (finding) => stakes.get(finding) ?? null,
  ).flatMap((finding) => owner.get(finding) ?? []);
}

/** The most that any choice would change. */
function stakeOf(prices: ReadonlyMap<string, ChoicePrice> | undefined): number | null {
  const sizes = [...(prices?.values() ?? [])].flatMap(({ change }) =>
    change ? [Math.abs(change.heating) + Math.abs(change.cooling)] : [],
  );
  return sizes.length === 0 ? null : Math.max(...sizes);
}
