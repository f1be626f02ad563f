import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import { RowQuality, type ReadingColumns } from "../readings/reading-columns";

/**
 * Thermal power of each row, before anything is summed.
 *
 * P = q·ρ(θ_m)/3600·[h(θ_s) − h(θ_r)] in kW, with q in m³/h, ρ at the side where the flow meter
 * sits, and h at the loop's pressure. The fluid gives off heat where P > 0 (heating) and takes it up
 * where P < 0 (cooling). Example: 28.8 m³/h on the return, 6.90 → 12.80 °C → −197.798 kW.
 *
 * Where a row holds the power of a permanent meter, that is its power; cut-offs do not apply to it.
 * In a loop of one service a power of the other sign counts in neither register: it is "against the
 * register" and counted as such. Two counters of one meter may move in the same step: then the row
 * runs in both registers, and nothing is netted.
 */
export type MeterSide = "supply" | "return";
export type LoopService = "heating" | "cooling" | "changeover";

/** Below either, a sample counts in no register; null means the cut-off is not set on the loop. */
export interface CutOffs {
  readonly flowM3PerHour: number | null;
  readonly deltaTK: number | null;
}

export const NO_CUT_OFFS: CutOffs = { flowM3PerHour: null, deltaTK: null };

export interface PowerOptions {
  readonly fluid: FluidAtPressure;
  readonly meterSide: MeterSide;
  readonly service: LoopService;
  readonly cutOffs: CutOffs;
}

/** Where the power of a sample goes. */
export const Register = {
  /** The row cannot be used: excluded, without a reading, or outside what the fluid can be. */
  unusable: 0,
  /** Usable, and no heat moves. */
  idle: 1,
  heating: 2,
  cooling: 3,
  /** A cut-off keeps it out of both registers. */
  suppressed: 4,
  /** A meter's power of the sign that the loop's service cannot have. */
  against: 5,
  /** A meter's heating and cooling counters both moved. */
  both: 6,
} as const;

export interface SamplePower {
  /** Signed, heating positive, before cut-offs; NaN where the row is unusable. */
  readonly powerKw: Float64Array;
  /** One {@link Register} code a row. */
  readonly register: Uint8Array;
  /** 1 where the energy is a meter's and no register's water; null where no row has such a power. */
  readonly meterOnly: Uint8Array | null;
}

// Taken out of its module once: it is compared with in every row.
const MEASURED = RowQuality.measured;

/** 0.50 K from two readings in hundredths is not below a cut-off of 0.5 K. */
const DECIMAL_NOISE = 1e-9;

/** Power in kW of one state; temperatures must lie within the fluid's lowest and highest. */
export function thermalPowerKw(
  flowM3PerHour: number,
  supplyC: number,
  returnC: number,
  fluid: FluidAtPressure,
  meterSide: MeterSide,
): number {
  const density = fluid.density(meterSide === "supply" ? supplyC : returnC);
  return (flowM3PerHour * density * (fluid.enthalpy(supplyC) - fluid.enthalpy(returnC))) / 3600;
}

/**
 * A property of a fluid with its last result for each hundredth of a degree. Loggers write few
 * decimals, so the same temperatures come again and again; only the very same one is reused, which
 * leaves every result as it is.
 */
class Remembered {
  private readonly temperatureC: Float64Array;
  private readonly result: Float64Array;

  constructor(
    private readonly property: (temperatureC: number) => number,
    private readonly lowestC: number,
    highestC: number,
  ) {
    const places = Math.ceil((highestC - lowestC) * 100) + 2;
    this.temperatureC = new Float64Array(places).fill(NaN);
    this.result = new Float64Array(places);
  }

  at(temperatureC: number): number {
    const place = ((temperatureC - this.lowestC) * 100 + 0.5) | 0;
    if (this.temperatureC[place] !== temperatureC) {
      this.temperatureC[place] = temperatureC;
      this.result[place] = this.property(temperatureC);
    }
    return this.result[place]!;
  }
}

/** Power and register of every row; see the method above. */
export function samplePower(columns: ReadingColumns, options: PowerOptions): SamplePower {
  const count = columns.quality.length;
  const powerKw = new Float64Array(count).fill(NaN);
  const register = new Uint8Array(count);
  formPower(columns, options, powerKw, register);
  const isMetered = !!columns.powerKw || !!columns.heatingKw || !!columns.coolingKw;
  const meterOnly = isMetered ? takeMetered(columns, options.service, powerKw, register) : null;
  return { powerKw, register, meterOnly };
}

/** Puts the meter's power over the water's where there is one; see {@link SamplePower.meterOnly}. */
function takeMetered(
  { powerKw: metered, heatingKw, coolingKw, quality }: ReadingColumns,
  service: LoopService,
  powerKw: Float64Array,
  register: Uint8Array,
): Uint8Array {
  const meterOnly = new Uint8Array(quality.length);
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== MEASURED) continue;
    const heating = heatingKw?.[i] ?? NaN;
    const cooling = coolingKw?.[i] ?? NaN;
    const counted = heating === heating || cooling === cooling;
    const power = counted ? (heating || 0) - (cooling || 0) : (metered?.[i] ?? NaN);
    if (power !== power) continue;
    meterOnly[i] = register[i] === Register.unusable ? 1 : 0;
    powerKw[i] = power;
    if (counted && heating > 0 && cooling > 0) {
      register[i] = Register.both;
      meterOnly[i] = 1;
    } else if (power > 0)
      register[i] = !counted && service === "cooling" ? Register.against : Register.heating;
    else if (power < 0)
      register[i] = !counted && service === "heating" ? Register.against : Register.cooling;
    else register[i] = Register.idle;
  }
  return meterOnly;
}

/** Power from flow and temperatures, into the arrays given. */
function formPower(
  columns: ReadingColumns,
  options: PowerOptions,
  powerKw: Float64Array,
  register: Uint8Array,
): void {
  const { flowM3PerHour, supplyC, returnC, quality } = columns;
  const count = quality.length;
  if (!flowM3PerHour || !supplyC || !returnC) return;
  const { fluid, meterSide, service, cutOffs } = options;
  const { lowestC, highestC } = fluid;
  const meterC = meterSide === "supply" ? supplyC : returnC;
  const density = new Remembered(fluid.density, lowestC, highestC);
  const enthalpy = new Remembered(fluid.enthalpy, lowestC, highestC);
  const flowCut = (cutOffs.flowM3PerHour ?? -Infinity) - DECIMAL_NOISE;
  const deltaTCut = (cutOffs.deltaTK ?? 0) - DECIMAL_NOISE;
  const home =
    service === "heating"
      ? Register.heating
      : service === "cooling"
        ? Register.cooling
        : Register.idle;
  for (let i = 0; i < count; i++) {
    if (quality[i] !== MEASURED) continue;
    const flow = flowM3PerHour[i]!;
    const supply = supplyC[i]!;
    const back = returnC[i]!;
    // NaN fails every comparison.
    const liquid = supply >= lowestC && supply <= highestC && back >= lowestC && back <= highestC;
    if (!liquid || flow !== flow) continue;
    const heat = enthalpy.at(supply) - enthalpy.at(back);
    const power = (flow * density.at(meterC[i]!) * heat) / 3600;
    powerKw[i] = power;
    if (flow < flowCut || Math.abs(supply - back) < deltaTCut) register[i] = Register.suppressed;
    else if (power > 0) register[i] = Register.heating;
    else if (power < 0) register[i] = Register.cooling;
    // Flow without a temperature difference is still flow of the loop's own service.
    else register[i] = flow !== 0 ? home : Register.idle;
  }
}

/** How many usable samples each cut-off holds back; one below both counts as below the flow's. */
export interface CutOffCounts {
  readonly belowFlow: number;
  readonly belowDeltaTOnly: number;
}

export function countCutOffs(columns: ReadingColumns, options: PowerOptions): CutOffCounts {
  const { register } = samplePower(columns, options);
  const flowOnly = samplePower(columns, {
    ...options,
    cutOffs: { ...options.cutOffs, deltaTK: null },
  }).register;
  let belowFlow = 0;
  let belowDeltaTOnly = 0;
  for (let i = 0; i < register.length; i++) {
    if (flowOnly[i] === Register.suppressed) belowFlow++;
    else if (register[i] === Register.suppressed) belowDeltaTOnly++;
  }
  return { belowFlow, belowDeltaTOnly };
}
