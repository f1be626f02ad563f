import type { ImportFindingChoice } from "@shared/contracts/import-findings";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import type { FindingChoice } from "@shared/domain/readings/checks/finding";
import { changeOf, changesIf, choiceKey } from "./choices";
import type { ChoiceEnergy, Registers } from "./choice-energy";
import type { FoundFinding } from "./find-findings";
import { withUnit } from "./other-unit";
import type { CheckedFile } from "../file-checks";
import type { EnergySettings } from "@server/readings/energy-settings";

/** What a choice is worth against keeping the readings, all other choices as they are. */
export interface ChoicePrice {
  readonly change: ImportFindingChoice["energyChangeKwh"];
  /** Of a cut-off: what it would no longer count. */
  readonly suppressedKwh: number | null;
}

/** Findings whose choices are priced: the heaviest. */
const MOST_FINDINGS = 12;
/** How often all rows may be integrated for choices that change all of them. */
const MOST_WHOLES = 2;

/** Prices of the heaviest findings' choices, by finding and choice; what is missing was too much work. */
export function priceChoices(
  findings: readonly FoundFinding[],
  choices: RepairChoices,
  energy: ChoiceEnergy,
  {
    files,
    settings,
  }: { readonly files: readonly CheckedFile[]; readonly settings: EnergySettings },
): Map<string, Map<string, ChoicePrice>> {
  const rows = files.reduce((sum, { columns }) => sum + (columns?.instantMs.length ?? 0), 0);
  const prices = new Map<string, Map<string, ChoicePrice>>();
  for (const found of findings.slice(0, MOST_FINDINGS)) {
    const kept = changesIf(findings, choices, found, "keep");
    const ofFinding = new Map<string, ChoicePrice>();
    prices.set(found.key, ofFinding);
    for (const choice of found.finding.choices) {
      const isTooMuch = energy.rowsIntegrated > MOST_WHOLES * rows + LITTLE_ROWS;
      if (isTooMuch && choice.change !== "keep") continue;
      const price = priceOf(choice);
      if (price) ofFinding.set(choiceKey(choice), price);
    }

    function priceOf(choice: FindingChoice): ChoicePrice | null {
      if (choice.change === "keep")
        return { change: { heating: 0, cooling: 0 }, suppressedKwh: null };
      if (choice.change === "cutOff") return cutOffPrice(choice.flowM3PerHour);
      if (choice.change === "unit") {
        const other = withUnit(files, found.fileId, choice);
        const before = energy.whole(kept);
        const after = other && energy.wholeOf(other, kept);
        return before && after && { change: difference(before, after), suppressedKwh: null };
      }
      const change = changeOf(found, choiceKey(choice), findings, choices);
      if (change === null) return { change: { heating: 0, cooling: 0 }, suppressedKwh: null };
      const made = changesIf(findings, choices, found, choiceKey(choice));
      const weight = energy.weigh(kept, made, [change]);
      return weight && { change: difference(weight.before, weight.after), suppressedKwh: null };
    }

    function cutOffPrice(flowM3PerHour: number): ChoicePrice | null {
      const before = energy.whole(kept);
      const cutOffs = { ...settings.cutOffs, flowM3PerHour };
      const after = energy.wholeOf(files, kept, { ...settings, cutOffs });
      return before && after
        ? {
            change: difference(before, after),
            suppressedKwh: after.suppressedKwh - before.suppressedKwh,
          }
        : null;
    }
  }
  return prices;
}

/** Room for what is local, however few rows there are. */
const LITTLE_ROWS = 200_000;

function difference(before: Registers, after: Registers) {
  return {
    heating: after.heatingKwh - before.heatingKwh,
    cooling: after.coolingKwh - before.coolingKwh,
  };
}
