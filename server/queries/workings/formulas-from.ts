import type { Workings } from "@shared/contracts/workings";

type Source = Workings["formulasFrom"][number];

const water: Source = { name: "IAPWS R7-97", edition: "(2012)", forWhat: "waterProperties" };
const glycol: Source = {
  name: "ASHRAE Handbook, Fundamentals",
  edition: " (2001)",
  forWhat: "glycolProperties",
};
const coefficient: Source = { name: "EN 1434-1", edition: ":2022", forWhat: "heatCoefficient" };
const limits: Source = { ...coefficient, forWhat: "meterLimits" };
const guide: Source = { name: "JCGM 100", edition: ":2008", forWhat: "uncertainty" };
const probes: Source = { name: "IEC 60751", edition: ":2022", forWhat: "probeClass" };

/** The published methods that went into these workings and no other: where formulas are from. */
export function formulasFrom(
  figure: Workings["figure"],
  fluidKind: Workings["basis"]["fluid"]["kind"],
  byHand: Workings["byHand"],
  budget: Workings["budget"],
): Source[] {
  const heat = figure === "energy" || figure === "power" || figure === "nightBase";
  const usesWater = byHand?.factors.some(({ code }) => code === "heatCoefficient") === true;
  const terms = budget?.terms.map(({ term }) => term) ?? [];
  return [
    ...(heat && usesWater ? [fluidKind === "water" ? water : glycol, coefficient] : []),
    ...(terms.some(({ kind }) => kind === "meterLimits") ? [limits] : []),
    ...(budget ? [guide] : []),
    ...(terms.some(({ origin }) => classCodes.includes(origin.code)) ? [probes] : []),
  ];
}

const classCodes = ["pairFromClass", "pairClassAssumed"];
