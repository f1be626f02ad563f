import { z } from "zod";
import { id, instant } from "./contract";

/* What the checks of an import's readings found, and what could be done about each finding. */

export const findingWeight = z
  .enum(["stop", "look", "note"])
  .describe(
    "stop: somebody has to choose before the import; look, note: kept unless chosen otherwise",
  );

export const findingChannel = z.enum([
  "flowM3PerHour",
  "supplyC",
  "returnC",
  "signalPercent",
  "powerKw",
]);

export const findingChoice = z.object({
  /** What `repairChoices.findings` names. */
  key: z.string(),
  change: z.enum(["exclude", "swapSides", "flipFlow", "unit", "clock", "split", "cutOff", "keep"]),
  swapped: z.enum(["probes", "channels"]).optional(),
  unit: z
    .object({
      channel: z.enum(["flow", "temperatures"]),
      unit: z.string(),
      /** Of flow: what the water's speed would be in this bore, median and 95th percentile. */
      medianMPerS: z.number().nullable(),
      highMPerS: z.number().nullable(),
      /** Of temperatures: 5th and 95th percentile. */
      lowC: z.number().nullable(),
      highC: z.number().nullable(),
    })
    .optional(),
  clock: z.object({ offsetS: z.number(), driftSPerDay: z.number() }).optional(),
  split: z.object({ at: instant }).optional(),
  cutOff: z
    .object({
      flowM3PerHour: z.number(),
      suppressedKwh: z.number().nullable().describe("what it would no longer count"),
    })
    .optional(),
  energyChangeKwh: z
    .object({ heating: z.number(), cooling: z.number() })
    .nullable()
    .describe("energy with this choice less energy with the readings kept; null: not worked out"),
});

export const findingSpan = z.object({ from: instant, to: instant });

export const importFinding = z.object({
  key: z.string().describe("stays the same when the import is checked again"),
  fileId: id.nullable().describe("null where it is about several files"),
  code: z.enum([
    "farDates",
    "flowUnit",
    "temperatureUnit",
    "spikes",
    "clockOff",
    "clockHint",
    "swappedSides",
    "reversedFlow",
    "backflow",
    "flowTurns",
    "stepChange",
    "stuckChannel",
    "noFlowNoise",
  ]),
  weight: findingWeight,
  channel: findingChannel.nullable(),
  rowCount: z.number().int(),
  spans: z.array(findingSpan).max(50).describe("the first of them"),
  spanCount: z.number().int(),
  figures: z.record(z.string(), z.union([z.number(), z.string(), z.null()])),
  choices: z.array(findingChoice),
  chosen: z.string().nullable().describe("null: still to be chosen"),
  keptSpans: z.array(instant).describe("spans of an exclusion that stay in, by their start"),
  /** The readings round it, at most 120 of each channel; null in holes. */
  picture: z
    .object({
      from: instant,
      to: instant,
      mark: findingSpan,
      channels: z.array(
        z.object({ channel: findingChannel, values: z.array(z.number().nullable()).max(120) }),
      ),
    })
    .nullable(),
});
export type ImportFinding = z.infer<typeof importFinding>;
export type ImportFindingChoice = z.infer<typeof findingChoice>;

/** A check that could not be made, and what it lacks: silence is never soundness. */
export const notChecked = z.object({
  check: z.enum([
    "spikes",
    "flowUnit",
    "noFlowNoise",
    "swappedSides",
    "negativeFlow",
    "stuckChannel",
    "stepChange",
    "clockOff",
  ]),
  lacks: z.enum(["boreMm", "flow", "temperatures", "clockNotes", "oneService", "companion"]),
  fileId: id.nullable(),
});
export type NotCheckedView = z.infer<typeof notChecked>;

/** What was chosen for findings: the key of a finding to the key of one of its choices. */
export const findingChoices = z.record(z.string().max(120), z.string().max(60));
/** Spans of a chosen exclusion that stay in, by finding; named by their first instant. */
export const keptSpans = z.record(z.string().max(120), z.array(instant).max(50).readonly());
