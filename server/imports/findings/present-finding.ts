import type { ImportFinding, ImportFindingChoice } from "@shared/contracts/import-findings";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import type { FindingChoice } from "@shared/domain/readings/checks/finding";
import {
  flowUnitCandidates,
  LOOP_WINDOW_C,
  temperatureUnitCandidates,
} from "@shared/domain/readings/checks/unit-plausibility";
import { fromM3PerHour } from "@shared/domain/units/flow";
import { fromCelsius } from "@shared/domain/units/temperature";
import { DAY_MS } from "@shared/domain/time/interval";
import type { CheckedFile } from "../file-checks";
import type { ImportCheckContext } from "./check-context";
import { choiceKey, chosenOf, isoOf } from "./choices";
import { unitsOf, type FoundFinding } from "./find-findings";
import { findingPicture } from "./finding-picture";
import type { ChoicePrice } from "./price-choices";

const MOST_SPANS_SHOWN = 50;

export interface PresentingFinding {
  readonly files: readonly CheckedFile[];
  readonly choices: RepairChoices;
  readonly context: ImportCheckContext;
  readonly prices: ReadonlyMap<string, ChoicePrice>;
}

/** A finding as the API shows it. */
export function presentFinding(found: FoundFinding, more: PresentingFinding): ImportFinding {
  const { finding } = found;
  const excluded = finding.choices.find(({ change }) => change === "exclude");
  const spans = excluded?.change === "exclude" ? excluded.spans : finding.spans;
  const starts = new Set(spans.slice(0, MOST_SPANS_SHOWN).map(({ startMs }) => isoOf(startMs)));
  return {
    key: found.key,
    fileId: found.fileId,
    code: finding.code,
    weight: finding.weight,
    channel: channelOf(finding.channel),
    rowCount: finding.rowCount,
    spans: spans
      .slice(0, MOST_SPANS_SHOWN)
      .map(({ startMs, endMs }) => ({ from: isoOf(startMs), to: isoOf(endMs) })),
    spanCount: spans.length,
    figures: { ...finding.figures },
    choices: finding.choices.map((choice) => presentChoice(found, choice, more)),
    chosen: chosenOf(found, more.choices),
    keptSpans: (more.choices.keptSpans?.[found.key] ?? []).filter((start) => starts.has(start)),
    picture: findingPicture(found),
  };
}

const CHANNELS = ["flowM3PerHour", "supplyC", "returnC", "signalPercent", "powerKw"] as const;
const channelOf = (name: string | null) => CHANNELS.find((channel) => channel === name) ?? null;

function presentChoice(
  found: FoundFinding,
  choice: FindingChoice,
  more: PresentingFinding,
): ImportFindingChoice {
  const key = choiceKey(choice);
  const price = more.prices.get(key);
  const base = { key, change: choice.change, energyChangeKwh: price?.change ?? null };
  switch (choice.change) {
    case "swapSides":
      return { ...base, swapped: choice.swapped };
    case "clock":
      return {
        ...base,
        clock: {
          offsetS: choice.error.offsetMs / 1000,
          driftSPerDay: (choice.error.driftPerMs * DAY_MS) / 1000,
        },
      };
    case "split":
      return { ...base, split: { at: isoOf(choice.atMs) } };
    case "cutOff":
      return {
        ...base,
        cutOff: {
          flowM3PerHour: choice.flowM3PerHour,
          suppressedKwh: price?.suppressedKwh ?? null,
        },
      };
    case "unit":
      return { ...base, unit: { ...unitFacts(found, choice, more) } };
    case "exclude":
    case "flipFlow":
    case "keep":
      return base;
  }
}

/** What the readings would mean in a unit: the water's speed, or the loop's temperatures. */
function unitFacts(
  { fileId, segment }: FoundFinding,
  { channel, unit }: Extract<FindingChoice, { change: "unit" }>,
  { files, context }: PresentingFinding,
): NonNullable<ImportFindingChoice["unit"]> {
  const unknown = { medianMPerS: null, highMPerS: null, lowC: null, highC: null };
  const recipe = files.find((file) => file.fileId === fileId)?.recipe;
  const { flowUnit, temperatureUnit } = recipe ? unitsOf(recipe) : NO_UNITS;
  const { place } = context;
  const { flowM3PerHour, supplyC, returnC } = segment.columns;
  if (channel === "flow") {
    if (place.boreMm === null || flowUnit === null || !flowM3PerHour)
      return { channel, unit, ...unknown };
    const written = flowM3PerHour.map((value) => fromM3PerHour(value, flowUnit));
    const candidates = flowUnitCandidates(written, place.boreMm, place.designFlowM3PerHour);
    const facts = candidates.find((candidate) => candidate.unit === unit);
    return {
      channel,
      unit,
      ...unknown,
      medianMPerS: facts?.medianMPerS ?? null,
      highMPerS: facts?.highMPerS ?? null,
    };
  }
  const values = [supplyC, returnC].flatMap((each) => (each ? Array.from(sampled(each)) : []));
  const written = Float64Array.from(values, (value) =>
    temperatureUnit === null ? NaN : fromCelsius(value, temperatureUnit),
  );
  const candidates = temperatureUnitCandidates(written, LOOP_WINDOW_C[place.service]);
  const facts = candidates.find((candidate) => candidate.unit === unit);
  return {
    channel,
    unit,
    ...unknown,
    lowC: facts?.lowC ?? null,
    highC: facts?.highC ?? null,
  };
}

const NO_UNITS = { flowUnit: null, temperatureUnit: null } as const;
const MOST_SAMPLES = 4001;

function sampled(values: Float64Array): Float64Array {
  const step = Math.max(1, Math.ceil(values.length / MOST_SAMPLES));
  return values.filter((_, row) => row % step === 0);
}
