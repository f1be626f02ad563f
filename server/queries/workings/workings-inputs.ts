import type { Workings, WorkingsFigure } from "@shared/contracts/workings";
import { deltaTMeans, type EnergyTotals } from "@shared/domain/energy/totals";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { RegisterName } from "@server/queries/energy/loads";
import type { FigurePart } from "./figure-uncertainty";
import type { FileBehind } from "./files-behind";
import type { WaterMeans } from "./water-means";

type Input = Workings["inputs"][number];

interface Given {
  readonly figure: WorkingsFigure;
  readonly register: RegisterName;
  readonly totals: EnergyTotals;
  readonly means: WaterMeans;
  readonly parts: readonly FigurePart[];
  readonly files: readonly FileBehind[];
}

const worked = { instrument: null, file: null, rows: null, code: "computed" } as const;

/** What a figure was worked out from, in the order of its formula. */
export function workingsInputs(energyPoint: EnergyPoint, given: Given): Input[] {
  const { figure, means } = given;
  if (figure === "completeness" || given.totals.coveredS === 0) return [];
  if (means.flowM3PerHour === null) return [meterPower(given)];
  const flow = flowInput(energyPoint, given);
  if (figure === "volume") return [flow, ...boreInput(given)];
  const temperatures = [temperature("supply", given), temperature("return", given)];
  const deltaTs = deltaTInputs(given);
  if (figure === "deltaT") return [flow, ...temperatures, ...deltaTs];
  return [
    flow,
    ...temperatures,
    ...deltaTs,
    ...waterInputs(energyPoint, given),
    ...boreInput(given),
  ];
}

/** Rows come from the one file or the one instrument only where there is one. */
function readBy(given: Given, serialOf: (part: FigurePart) => string | null): Input["source"] {
  const { files, parts, totals } = given;
  const serials = new Set(parts.map(serialOf));
  const [serial] = serials;
  const [file] = files;
  return {
    instrument: serials.size === 1 && serial ? serial : null,
    file: files.length === 1 && file ? { id: file.id, name: file.name } : null,
    rows: totals.measuredRows,
    code: "read",
  };
}

const evidenceOf = ({ part }: FigurePart) => part.installation?.evidence ?? null;

function flowInput({ point }: EnergyPoint, given: Given): Input {
  const [least, greatest] = given.means.flowM3PerHour ?? [0, 0];
  return {
    symbol: "flow",
    code: point.meterSide === "supply" ? "flowOnSupply" : "flowOnReturn",
    ...(least === greatest
      ? { value: least, range: null }
      : { value: null, range: [least, greatest] }),
    unit: "m³/h",
    source: readBy(given, (part) => evidenceOf(part)?.flowMeter?.serial ?? null),
  };
}

function temperature(side: "supply" | "return", given: Given): Input {
  return {
    symbol: side,
    code: `${side}MeanByFlow`,
    value: side === "supply" ? given.means.supplyC : given.means.returnC,
    range: null,
    unit: "°C",
    source: readBy(given, (part) => evidenceOf(part)?.probes?.[side].serial ?? null),
  };
}

/** The three means are never shown without one another: they answer different questions. */
function deltaTInputs({ totals, register }: Given): Input[] {
  const means = deltaTMeans(totals[register], totals.meterOnlyS);
  return (
    [
      ["deltaTByFlow", means.flowWeightedK],
      ["deltaTByEnergy", means.energyWeightedK],
      ["deltaTOverTime", means.timeMeanK],
    ] as const
  ).flatMap(([code, value]): Input[] =>
    value === null
      ? []
      : [{ symbol: "deltaT", code, value, range: null, unit: "K", source: worked }],
  );
}

function meterPower(given: Given): Input {
  return {
    symbol: "power",
    code: given.files.some(({ meters }) => meters === "counter")
      ? "counterOfMeter"
      : "powerOfMeter",
    value: null,
    range: given.means.powerKw && [...given.means.powerKw],
    unit: "kW",
    source: readBy(given, (part) => evidenceOf(part)?.flowMeter?.serial ?? null),
  };
}

function waterInputs({ settings, point }: EnergyPoint, { means, register }: Given): Input[] {
  const { supplyC, returnC } = means;
  if (!settings.fluid.ok || supplyC === null || returnC === null) return [];
  const { fluid } = settings.fluid;
  const onSupply = point.meterSide === "supply";
  const heating = register === "heating";
  const gained =
    fluid.enthalpy(heating ? supplyC : returnC) - fluid.enthalpy(heating ? returnC : supplyC);
  return [
    {
      symbol: "density",
      code: onSupply ? "densityAtSupply" : "densityAtReturn",
      value: fluid.density(onSupply ? supplyC : returnC),
      range: null,
      unit: "kg/m³",
      source: worked,
    },
    {
      symbol: "enthalpy",
      code: heating ? "enthalpySupplyLessReturn" : "enthalpyReturnLessSupply",
      value: gained,
      range: null,
      unit: "kJ/kg",
      source: worked,
    },
    {
      symbol: "pressure",
      code: settings.pressure.assumed ? "pressureAssumed" : "pressureOfLoop",
      value: settings.pressure.pressureMPa,
      range: null,
      unit: "MPa",
      source: { ...worked, code: settings.pressure.assumed ? "assumed" : "record" },
    },
  ];
}

/** The bore turns speeds into flow in the ±; several installations may each have their own. */
function boreInput({ parts }: Given): Input[] {
  const bores = new Set(parts.map(({ budget }) => budget.boreMm));
  const [bore] = bores;
  if (bores.size !== 1 || bore === null || bore === undefined) return [];
  const measured = parts.every((part) => evidenceOf(part)?.pipe != null);
  return [
    {
      symbol: "bore",
      code: measured ? "boreOfInstallation" : "boreOfPoint",
      value: bore,
      range: null,
      unit: "mm",
      source: { ...worked, code: "record" },
    },
  ];
}
