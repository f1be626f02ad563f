import type { FileRecipe, RepairChoices } from "@shared/domain/log-files/recipe";
import { FLOW_UNITS, TEMPERATURE_UNITS } from "@shared/domain/log-files/column-units";
import { Conflict, Invalid } from "@server/http/errors";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { recipeInUnit } from "./other-unit";

export interface SettledChoices {
  readonly repair: RepairChoices;
  /** Files whose recipe a chosen unit changes. */
  readonly recipes: ReadonlyMap<LogFile, FileRecipe>;
}

/**
 * Choices with new ones put to them, finding by finding. A unit that is chosen goes into the file's
 * recipe, so that the numbers are converted once and from what was written.
 * @throws Invalid (422) where the last check found no such thing or offers no such choice; Conflict
 * (409) where a unit is chosen while no check says for which file.
 */
export function settleFindings(
  row: LogImport,
  files: readonly LogFile[],
  { findings: asked = {}, keptSpans, ...others }: Partial<RepairChoices>,
): SettledChoices {
  const found = row.checks?.findings;
  const recipes = new Map<LogFile, FileRecipe>();
  const settled: Record<string, string> = { ...row.repair.findings };
  for (const [key, choiceKey] of Object.entries(asked)) {
    const finding = found?.find((each) => each.key === key);
    const choice = finding?.choices.find((each) => each.key === choiceKey);
    if (found && !finding && !(row.checks?.moreFindings ?? 0))
      throw Invalid.field(`findings/${key}`, "finding-unknown", "The checks found no such thing.");
    if (finding && !choice)
      throw Invalid.field(
        `findings/${key}`,
        "choice-unknown",
        "This finding offers no such choice.",
      );
    if (!choiceKey.startsWith("unit:")) {
      settled[key] = choiceKey;
      continue;
    }
    const file = files.find(({ id }) => id === finding?.fileId);
    const recipe = file && (recipes.get(file) ?? file.recipe);
    if (!choice?.unit || !file || !recipe)
      throw new Conflict(
        "finding-not-checked",
        "Which file this unit is for is only known while its check stands.",
        "Wait until the import is checked, then choose the unit again.",
      );
    const { unit } = choice.unit;
    const flow = FLOW_UNITS.find((each) => each === unit);
    const temperature = TEMPERATURE_UNITS.find((each) => each === unit);
    if (choice.unit.channel === "flow" && flow)
      recipes.set(file, recipeInUnit(recipe, { change: "unit", channel: "flow", unit: flow }));
    else if (temperature)
      recipes.set(
        file,
        recipeInUnit(recipe, { change: "unit", channel: "temperatures", unit: temperature }),
      );
    delete settled[key];
  }
  const repair = { ...row.repair, ...others };
  return {
    repair: {
      ...repair,
      ...(Object.keys(settled).length > 0 || repair.findings ? { findings: settled } : {}),
      ...(keptSpans ? { keptSpans: { ...row.repair.keptSpans, ...keptSpans } } : {}),
    },
    recipes,
  };
}
