import { z } from "zod";
import { id, instant } from "./contract";
import { energyBlock } from "./energy";
import { importFinding, notChecked } from "./import-findings";

const rowExample = z.object({
  line: z.number().int(),
  column: z.string().nullable(),
  cell: z.string().nullable(),
  instantMs: z.number().nullable(),
});
export const repairStep = z.object({
  code: z.enum([
    "unreadableCells",
    "shortRows",
    "unreadableTimes",
    "sentinels",
    "identicalRepeats",
    "conflictingRepeats",
    "outOfOrder",
    "repeatedHour",
    "missingHour",
    "weakSignal",
    "overlapEqual",
    "overlapDifferent",
    "unitConversion",
    "counterRollover",
    "counterReset",
    "counterJump",
    "counterExchange",
    "velocityTimesBore",
    "pulsesToFlow",
    "pulseOpening",
    "badStatus",
    "footer",
  ]),
  count: z.number().int(),
  examples: z.array(rowExample),
  countByKind: z.record(z.string(), z.number()),
});
export type RepairStepView = z.infer<typeof repairStep>;

/** What the checking job found over all files, with the choices so far. */
export const importChecks = z.object({
  /** Hash of what the findings rest on besides the files and choices; older checks lack it. */
  findingsBasis: z.string().optional(),
  /**
   * Choices that must be made because the defect occurs: names of repairChoices that are null, and
   * "findings" where one that stops has no choice.
   */
  undecided: z.array(z.enum(["conflictingRepeats", "weakSignal", "overlap", "findings"])),
  files: z.array(
    z.object({
      fileId: id,
      steps: z.array(repairStep),
      rowsRead: z.number().int(),
      rowsKept: z.number().int(),
      firstInstant: instant.nullable(),
      lastInstant: instant.nullable(),
      nominalStepS: z.number().nullable(),
      expectedRows: z.number().int().nullable(),
      gaps: z.array(
        z.object({
          from: instant,
          to: instant,
          missingRows: z.number().int(),
          flowBeforeM3PerHour: z.number().nullable(),
          flowAfterM3PerHour: z.number().nullable(),
        }),
      ),
      gapCount: z.number().int(),
      /** How the first row moved from the logger's clock to UTC. */
      firstRow: z.object({ line: z.number(), cell: z.string(), instant }).nullable(),
      clockChangeInside: z.boolean(),
    }),
  ),
  rows: z.object({
    measured: z.number().int(),
    excluded: z.number().int(),
    noReading: z.number().int(),
    missing: z.number().int(),
    expected: z.number().int(),
  }),
  /** Rows whose flow instant found no temperature within two steps. */
  rowsWithoutTemperature: z.number().int(),
  /** Measured rows at temperatures at which the fluid is not liquid: stored, but without energy. */
  rowsOutsideFluid: z.number().int().optional(),
  liquidC: z
    .object({ lowest: z.number(), highest: z.number() })
    .nullable()
    .optional()
    .describe("the loop's fluid is liquid and known between these, °C"),
  outsideFluidExamples: z
    .array(
      z.object({
        instant,
        channel: z.enum(["supply", "return"]),
        valueC: z.number().nullable(),
        reason: z.string(),
      }),
    )
    .optional(),
  energy: z
    .object({
      heatingKwh: z.number(),
      coolingKwh: z.number(),
      suppressedKwh: z.number(),
      volumeM3: z
        .number()
        .nullable()
        .describe("null where a permanent meter gives the energy and no water was measured"),
      coveredS: z.number(),
    })
    .nullable()
    .describe("null where the loop's energy cannot be worked out, see energyBlockedBy"),
  energyBlockedBy: energyBlock.nullable(),
  /** Rows of a meter's power of the other sign than the loop's service: they give no energy. */
  rowsAgainstRegister: z.number().int().optional(),
  /** A small picture of the whole file: 240 columns of flow and ΔT, null in holes. */
  picture: z
    .object({
      from: instant,
      to: instant,
      flowM3PerHour: z.array(z.number().nullable()),
      supplyC: z.array(z.number().nullable()),
      returnC: z.array(z.number().nullable()),
      quality: z.array(
        z.object({ from: instant, to: instant, kind: z.enum(["measured", "excluded", "missing"]) }),
      ),
    })
    .nullable(),
  /** What the readings themselves show, in the order in which to settle it. */
  findings: z.array(importFinding).optional(),
  /** Findings beyond those listed. */
  moreFindings: z.number().int().optional(),
  notChecked: z.array(notChecked).optional(),
  /** Names of the checks that found nothing. */
  clean: z.array(z.string()),
  daily: z.array(
    z.object({
      date: z.iso.date(),
      heatingKwh: z.number().nullable(),
      coolingKwh: z.number().nullable(),
      coveredS: z.number(),
      lengthS: z.number(),
    }),
  ),
});
export type ImportChecks = z.infer<typeof importChecks>;
