import { z } from "zod";
import { contract, id, instant } from "./contract";

/* Companion series of a point: kept beside its readings, never part of its energy. */
export const companionChannel = z.enum(["outdoor", "electricPower", "pressure"]);
export type CompanionName = z.infer<typeof companionChannel>;

const edge = z.union([z.iso.date(), instant]);
const packed = z
  .object({ decimals: z.number().int(), differences: z.string() })
  .describe("packed as the numbers of getSeries are");

export const listCompanions = contract({
  operationId: "listCompanions",
  summary: "Companion series of a metering point, with the time they cover",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/companions",
  params: z.object({ pointId: id }),
  answer: z.object({
    zone: z.string(),
    items: z.array(
      z.object({
        channel: companionChannel,
        firstAt: instant,
        lastAt: instant,
        rows: z.number().int().describe("of all files, those counted twice that two hold"),
        files: z.number().int(),
      }),
    ),
  }),
});
export type CompanionsAnswer = z.infer<(typeof listCompanions)["answer"]>;

export const getCompanionSeries = contract({
  operationId: "getCompanionSeries",
  summary: "One companion series in °C, kW or kPa, as a chart of the given width can draw it",
  tag: "Energy",
  method: "get",
  path: "/points/:pointId/companions/:channel/series",
  params: z.object({ pointId: id, channel: companionChannel }),
  query: z.object({
    from: edge,
    to: edge.describe("exclusive"),
    pixels: z.coerce.number().int().min(50).max(4000),
  }),
  answer: z.object({
    zone: z.string(),
    fromMs: z.number(),
    toMs: z.number(),
    rows: z.number().int().describe("readings behind the picture"),
    averagedOverS: z.number().nullable().describe("null where each point is a reading"),
    t0Ms: z.number(),
    tMs: packed.describe("offsets from t0Ms"),
    values: packed,
    least: z.number().nullable(),
    greatest: z.number().nullable(),
  }),
});
export type CompanionSeriesAnswer = z.infer<(typeof getCompanionSeries)["answer"]>;
