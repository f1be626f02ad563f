import type { CombinedUncertainty } from "./budget";
import { budgetTerm, standard } from "./budget-term";
import { combineTerms } from "./combine-terms";
import type { BudgetTermKind } from "./point-evidence";
import { volumePerEnergyPercent } from "./volume-per-energy";

const combined = (percents: Partial<Record<BudgetTermKind, number>>): CombinedUncertainty =>
  combineTerms(
    Object.entries(percents).map(([kind, percent]) => ({
      term: budgetTerm(kind as BudgetTermKind, standard(percent, "%"), {
        from: "default",
        code: kind,
        values: {},
      }),
      percent,
      shrinks: false,
    })),
    1000,
    1,
    1,
  );

it("loses what scales volume and energy alike, and keeps ΔT, heat and what a zero leaves", () => {
  const energy = combined({ certificate: 0.5, zero: 0.6, probePair: 0.4, density: 0.03 });
  const volume = combined({ certificate: 0.5, zero: 0.7 });
  // 2·√(0.1² + 0.4² + 0.03²)
  expect(volumePerEnergyPercent(energy, volume)).toBeCloseTo(0.826801, 6);
});

it("keeps the noise of the flow whole", () => {
  const energy = combined({ flowNoise: 0.3, probePair: 0.4 });
  // 2·√(0.3² + 0.4²)
  expect(volumePerEnergyPercent(energy, combined({ flowNoise: 0.3 }))).toBeCloseTo(1, 9);
});
