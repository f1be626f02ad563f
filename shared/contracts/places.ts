import { z } from "zod";
import { contract, id, instant, nothing, oneLine, page, pageQuery } from "./contract";
import { rangePlusMinus } from "./plus-minus";
import { unitSystem } from "./people";

const name = oneLine(120);
const notes = z.string().trim().max(2000);
/** Archived things are left out unless asked for; "false" in a query must not read as true. */
const archived = z.object({
  archived: z
    .enum(["true", "false"])
    .transform((text) => text === "true")
    .optional(),
});

export const ianaZone = z
  .string()
  .max(64)
  .refine((zone) => {
    try {
      new Intl.DateTimeFormat("en", { timeZone: zone });
      return /^[A-Za-z_]+(\/[A-Za-z0-9_+-]+)*$/.test(zone);
    } catch {
      return false;
    }
  }, "not a time zone of the IANA database, such as Europe/London");
export const currency = z
  .string()
  .regex(/^[A-Z]{3}$/, "three capital letters of ISO 4217, such as GBP");

const ability = z.object({ edit: z.boolean(), archive: z.boolean(), remove: z.boolean() });

// Sites ---------------------------------------------------------------------------------------
/** On the quarter-hour, because energy is stored by it. */
const clock = (pattern: RegExp) => z.string().regex(pattern, "a quarter-hour, such as 07:00");
export const occupiedHours = z
  .object({
    weekdays: z
      .array(z.number().int().min(1).max(7))
      .min(1)
      .max(7)
      .refine((days) => new Set(days).size === days.length, "each weekday once")
      .describe("1 Monday to 7 Sunday"),
    start: clock(/^([01]\d|2[0-3]):(00|15|30|45)$/),
    end: clock(/^(([01]\d|2[0-3]):(00|15|30|45)|24:00)$/).describe(
      "later than start; 24:00 at most",
    ),
  })
  .refine(({ start, end }) => start < end, {
    path: ["end"],
    message: "must be later than the start",
  });
const siteFields = z.object({
  name,
  zone: ianaZone,
  currency,
  unitSystem,
  address: z.string().trim().max(300).nullable(),
  occupiedHours: occupiedHours
    .nullable()
    .describe("when people are in, by the site's clock; null: Monday to Friday 07:00 to 19:00"),
});
export const site = siteFields.extend({
  id,
  occupiedHours: z.object({
    ...occupiedHours.shape,
    assumed: z.boolean().describe("nobody has set them"),
  }),
  isDemo: z.boolean().describe("invented data, shown as such"),
  archivedAt: instant.nullable(),
  buildingCount: z.number().int(),
  loopCount: z.number().int(),
  can: ability.extend({ addLoop: z.boolean(), import: z.boolean() }),
});
export type Site = z.infer<typeof site>;
const siteId = z.object({ siteId: id });

export const listSites = contract({
  operationId: "listSites",
  summary: "Sites of the organisation",
  tag: "Places",
  method: "get",
  path: "/sites",
  query: pageQuery.extend(archived.shape),
  answer: page(site).extend({ can: z.object({ create: z.boolean() }) }),
});
export const createSite = contract({
  operationId: "createSite",
  summary: "Add a site",
  tag: "Places",
  method: "post",
  path: "/sites",
  body: siteFields.partial({ address: true, unitSystem: true, occupiedHours: true }),
  answer: site,
});
export const getSite = contract({
  operationId: "getSite",
  summary: "One site",
  tag: "Places",
  method: "get",
  path: "/sites/:siteId",
  params: siteId,
  answer: site,
});
export const updateSite = contract({
  operationId: "updateSite",
  summary: "Change a site; another zone rebuilds its days",
  tag: "Places",
  method: "patch",
  path: "/sites/:siteId",
  params: siteId,
  body: siteFields.partial().extend({ archived: z.boolean().optional() }),
  answer: site,
});
export const removeSite = contract({
  operationId: "removeSite",
  summary: "Remove a site that holds no readings",
  tag: "Places",
  method: "delete",
  path: "/sites/:siteId",
  params: siteId,
  answer: nothing,
});

// Buildings -----------------------------------------------------------------------------------
const buildingFields = z.object({ name, note: z.string().trim().max(200).nullable() });
export const building = buildingFields.extend({
  id,
  siteId: id,
  archivedAt: instant.nullable(),
  can: ability,
});
export type Building = z.infer<typeof building>;
const buildingId = z.object({ buildingId: id });

export const listBuildings = contract({
  operationId: "listBuildings",
  summary: "Buildings of a site",
  tag: "Places",
  method: "get",
  path: "/sites/:siteId/buildings",
  params: siteId,
  query: archived,
  answer: z.object({ items: z.array(building) }),
});
export const createBuilding = contract({
  operationId: "createBuilding",
  summary: "Add a building",
  tag: "Places",
  method: "post",
  path: "/sites/:siteId/buildings",
  params: siteId,
  body: buildingFields.partial({ note: true }),
  answer: building,
});
export const updateBuilding = contract({
  operationId: "updateBuilding",
  summary: "Change a building",
  tag: "Places",
  method: "patch",
  path: "/buildings/:buildingId",
  params: buildingId,
  body: buildingFields.partial().extend({ archived: z.boolean().optional() }),
  answer: building,
});
export const removeBuilding = contract({
  operationId: "removeBuilding",
  summary: "Remove a building that holds no readings",
  tag: "Places",
  method: "delete",
  path: "/buildings/:buildingId",
  params: buildingId,
  answer: nothing,
});

// Loops ---------------------------------------------------------------------------------------
export const loopService = z.enum(["chilled", "hot", "changeover"]);
export type LoopService = z.infer<typeof loopService>;
export const glycolTestMethod = z.enum(["refractometer", "hydrometer", "laboratory", "unknown"]);
export type GlycolTestMethod = z.infer<typeof glycolTestMethod>;
export const fluid = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("water") }),
  z.object({
    kind: z.enum(["ethyleneGlycol", "propyleneGlycol"]),
    percent: z.number().gt(0).max(100).describe("above 60 % by volume there is no energy"),
    basis: z.enum(["mass", "volume"]),
    testedOn: z.iso
      .date()
      .nullable()
      .default(null)
      .describe("day of the test the percentage comes from, YYYY-MM-DD"),
    testMethod: glycolTestMethod.nullable().default(null),
  }),
]);
export type Fluid = z.infer<typeof fluid>;
/** A fluid that gives no energy: outside the glycol tables, or at a pressure water is not known at. */
export const fluidBlock = z.enum(["concentration", "pressure"]);
export type FluidBlock = z.infer<typeof fluidBlock>;
const loopFields = z.object({
  tag: oneLine(24).describe("as painted on the pipe, such as CHW-1B"),
  name,
  buildingId: id.nullable(),
  parentLoopId: id.nullable().describe("the loop that feeds this one"),
  service: loopService,
  fluid,
  gaugePressureMPa: z
    .number()
    .min(0)
    .max(2.5)
    .nullable()
    .describe("null: 1.6 MPa absolute is assumed"),
  designFlowM3PerHour: z.number().gt(0).max(10_000).nullable(),
  designDeltaTK: z.number().min(1).max(40).nullable(),
  flowCutOffM3PerHour: z.number().min(0).max(1_000).nullable().describe("null: no cut-off"),
  deltaTCutOffK: z.number().min(0).max(10).nullable().describe("null: no cut-off"),
  notes: notes.nullable(),
});
export const loop = loopFields.extend({
  id,
  siteId: id,
  archivedAt: instant.nullable(),
  pressure: z.object({ absoluteMPa: z.number(), assumed: z.boolean() }),
  energyBlockedBy: fluidBlock.nullable().describe("why readings give no energy"),
  hasReadings: z.boolean(),
  can: ability.extend({ addPoint: z.boolean() }),
});
export type Loop = z.infer<typeof loop>;
const loopId = z.object({ loopId: id });
const optionalLoopFields = loopFields.partial({
  buildingId: true,
  parentLoopId: true,
  fluid: true,
  gaugePressureMPa: true,
  designFlowM3PerHour: true,
  designDeltaTK: true,
  flowCutOffM3PerHour: true,
  deltaTCutOffK: true,
  notes: true,
});

export const listLoops = contract({
  operationId: "listLoops",
  summary: "Loops of a site",
  tag: "Places",
  method: "get",
  path: "/sites/:siteId/loops",
  params: siteId,
  query: archived,
  answer: z.object({ items: z.array(loop) }),
});
export const createLoop = contract({
  operationId: "createLoop",
  summary: "Add a loop",
  tag: "Places",
  method: "post",
  path: "/sites/:siteId/loops",
  params: siteId,
  body: optionalLoopFields,
  answer: loop,
});
export const getLoop = contract({
  operationId: "getLoop",
  summary: "One loop",
  tag: "Places",
  method: "get",
  path: "/loops/:loopId",
  params: loopId,
  answer: loop,
});
export const updateLoop = contract({
  operationId: "updateLoop",
  summary: "Change a loop; fluid, pressure, service or cut-offs recalculate its energy",
  tag: "Places",
  method: "patch",
  path: "/loops/:loopId",
  params: loopId,
  body: loopFields.partial().extend({ archived: z.boolean().optional() }),
  answer: loop,
});
export const removeLoop = contract({
  operationId: "removeLoop",
  summary: "Remove a loop that holds no readings",
  tag: "Places",
  method: "delete",
  path: "/loops/:loopId",
  params: loopId,
  answer: nothing,
});

// Metering points -----------------------------------------------------------------------------
export const pointRole = z.enum(["main", "riser", "branch", "coil", "zone"]);
export const meterSide = z.enum(["supply", "return"]);
export const pipe = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("table"), tableId: z.string().max(60), dn: z.number() }),
  z.object({
    kind: z.literal("measured"),
    outsideDiameterMm: z.number().min(15).max(1300),
    wallMm: z.number().min(0.5).max(40),
    liningMm: z.number().min(0).max(25),
    material: z.string().trim().max(60).nullable(),
  }),
]);
export type Pipe = z.infer<typeof pipe>;
export const gapRule = z
  .enum(["survey", "billing"])
  .describe("a step over 3 (survey) or 1.5 (billing) usual steps is a hole in the energy");
const pointFields = z.object({
  code: oneLine(40).describe("printed on the pipe"),
  name,
  role: pointRole,
  parentPointId: id.nullable(),
  meterSide: meterSide.describe("where the flow meter sits; there is no default"),
  gapRule,
  pipe: pipe.nullable(),
  notes: notes.nullable(),
});
export const bore = z.object({
  outsideDiameterMm: z.number(),
  wallMm: z.number(),
  liningMm: z.number(),
  insideDiameterMm: z.number(),
  label: z.string().describe("such as DN 100, carbon steel"),
});
export const point = pointFields.extend({
  id,
  loopId: id,
  archivedAt: instant.nullable(),
  bore: bore.nullable(),
  hasReadings: z.boolean(),
  can: ability.extend({ import: z.boolean() }),
});
export type Point = z.infer<typeof point>;
const pointId = z.object({ pointId: id });
const optionalPointFields = pointFields.partial({
  parentPointId: true,
  gapRule: true,
  pipe: true,
  notes: true,
});

export const listPoints = contract({
  operationId: "listPoints",
  summary: "Metering points of a loop",
  tag: "Places",
  method: "get",
  path: "/loops/:loopId/points",
  params: loopId,
  query: archived,
  answer: z.object({ items: z.array(point) }),
});
export const createPoint = contract({
  operationId: "createPoint",
  summary: "Add a metering point",
  tag: "Places",
  method: "post",
  path: "/loops/:loopId/points",
  params: loopId,
  body: optionalPointFields,
  answer: point,
});
export const getPoint = contract({
  operationId: "getPoint",
  summary: "One metering point",
  tag: "Places",
  method: "get",
  path: "/points/:pointId",
  params: pointId,
  answer: point,
});
export const updatePoint = contract({
  operationId: "updatePoint",
  summary: "Change a metering point; another meter side recalculates its energy",
  tag: "Places",
  method: "patch",
  path: "/points/:pointId",
  params: pointId,
  body: pointFields.partial().extend({ archived: z.boolean().optional() }),
  answer: point,
});
export const removePoint = contract({
  operationId: "removePoint",
  summary: "Remove a metering point without readings",
  tag: "Places",
  method: "delete",
  path: "/points/:pointId",
  params: pointId,
  answer: nothing,
});

export const boreVersion = z.object({
  validFrom: instant,
  validTo: instant.nullable().describe("null: until now"),
  pipe,
  bore,
});
export type BoreVersionAnswer = z.infer<typeof boreVersion>;
export const listBoreVersions = contract({
  operationId: "listBoreVersions",
  summary: "The pipe of a metering point over time, newest first",
  tag: "Places",
  method: "get",
  path: "/points/:pointId/bores",
  params: pointId,
  answer: z.object({ items: z.array(boreVersion) }),
});

export const listPipeTables = contract({
  operationId: "listPipeTables",
  summary: "Standard pipe tables: outside diameter, wall and bore by nominal size",
  tag: "Places",
  method: "get",
  path: "/pipe-tables",
  answer: z.object({
    items: z.array(
      z.object({
        id: z.string(),
        standard: z.string(),
        series: z.string(),
        material: z.string(),
        rows: z.array(
          z.object({
            dn: z.number(),
            outsideDiameterMm: z.number(),
            wallMm: z.number(),
            liningMm: z.number(),
            insideDiameterMm: z.number(),
          }),
        ),
      }),
    ),
  }),
});

// The site page -------------------------------------------------------------------------------
export const siteOverviewLoop = z.object({
  loop: loop.pick({
    id: true,
    tag: true,
    name: true,
    service: true,
    buildingId: true,
    parentLoopId: true,
    energyBlockedBy: true,
  }),
  mainPointId: id.nullable().describe("the point whose energy stands for the loop"),
  nominalSizeDn: z.number().nullable(),
  energyKwh: z
    .number()
    .nullable()
    .describe("of the register of the loop's service; null for changeover, which has two"),
  heatingKwh: z.number().nullable(),
  coolingKwh: z.number().nullable(),
  plusMinus: rangePlusMinus.nullable().describe("of the energies and of ΔT; null without a point"),
  flowWeightedDeltaTK: z.number().nullable(),
  coverage: z.number().nullable().describe("covered share of the period so far, 0 to 1"),
  filledShare: z
    .number()
    .nullable()
    .describe("share of the period so far that a fill stands for, beside what is covered"),
  quality: z.array(
    z.object({
      from: instant,
      to: instant,
      kind: z.enum(["measured", "filled", "excluded", "missing"]),
    }),
  ),
});
export const getSiteOverview = contract({
  operationId: "getSiteOverview",
  summary: "Buildings and loops of a site with their energy over a range of local days",
  tag: "Places",
  method: "get",
  path: "/sites/:siteId/overview",
  params: siteId,
  query: z.object({ from: z.iso.date(), to: z.iso.date().describe("exclusive") }),
  answer: z.object({
    site,
    buildings: z.array(building),
    loops: z.array(siteOverviewLoop),
    firstReadingAt: instant.nullable(),
    lastReadingAt: instant.nullable(),
  }),
});
