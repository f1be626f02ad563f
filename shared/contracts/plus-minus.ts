import { z } from "zod";

/** An expanded uncertainty as screens print it beside a figure. */
export const plusMinus = z.object({
  expanded: z.number().describe("in the figure's unit, k = 2, about 95 %"),
  percent: z.number().nullable().describe("of the figure; null where the figure is 0"),
  /** Whether any evidence of the point went into it, or defaults only. */
  basis: z.enum(["evidence", "partlyDefaults", "defaults"]),
});
export type PlusMinus = z.infer<typeof plusMinus>;

const known = plusMinus.nullable().describe("null where the workings say why there is none");
const register = z.object({ energy: known, deltaT: known });

/** The ± of what a range adds up to, each register by itself. */
export const rangePlusMinus = z.object({
  heating: register,
  cooling: register,
  volume: known,
  /** What nobody recorded, so that an energy has no ±: named beside the figure, never left blank. */
  lacks: z.enum(["meterClass"]).nullable(),
});
export type RangePlusMinus = z.infer<typeof rangePlusMinus>;

/** The ± of a day's energy, or of any other stretch's. */
export const energyPlusMinus = z.object({ heating: known, cooling: known });
export type EnergyPlusMinus = z.infer<typeof energyPlusMinus>;
