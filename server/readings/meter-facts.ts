import type { LoopService } from "@shared/contracts/places";
import { isCounter, toStoredScale } from "@shared/domain/log-files/column-units";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { counterCapacity, type CounterLimits } from "@shared/domain/readings/counter-steps";
import { GAP_FACTOR, type GapRule } from "@shared/domain/readings/covered-steps";
import type { PositivePower } from "@shared/domain/readings/orient-power";
import type { MeterFacts } from "@shared/domain/readings/resolve-segments";

/** What a point and its loop say about what a permanent meter there can count. */
export interface MeterPlace {
  readonly service: LoopService;
  readonly designFlowM3PerHour: number | null;
  readonly designDeltaTK: number | null;
  readonly insideDiameterMm: number | null;
  readonly gapRule: GapRule;
}

/** Columns of a query over `metering_point p` and `loop l` that make a {@link MeterPlace}. */
export const meterPlaceColumns = `l.service AS service,
  l.design_flow_m3_per_hour AS designFlowM3PerHour, l.design_delta_t_k AS designDeltaTK,
  (SELECT b.inside_diameter_mm FROM bore_version b
    WHERE b.point_id = p.id AND b.valid_to IS NULL LIMIT 1) AS insideDiameterMm,
  p.gap_rule AS gapRule`;

/** Services as the energy's functions name them. */
export const SERVICE_OF_ENERGY = {
  hot: "heating",
  chilled: "cooling",
  changeover: "changeover",
} as const satisfies Record<LoopService, string>;

/** A loop moves at most twice what it was designed for; a pipe at most 5 m/s. */
const MOST_OF_DESIGN = 2;
const MOST_M_PER_S = 5;
/** The greatest ΔT a loop is designed for, where its own is unknown. */
const GREATEST_DELTA_T_K = 40;
/** Greater than that of liquid water from 0 to 150 °C and of its glycol mixtures. */
const KWH_PER_M3_K = 1.17;

/** Water that can pass in an hour at most, m³/h; null where neither design flow nor bore is known. */
export function mostFlowM3PerHour(place: MeterPlace): number | null {
  if (place.designFlowM3PerHour !== null) return MOST_OF_DESIGN * place.designFlowM3PerHour;
  if (place.insideDiameterMm === null) return null;
  const areaM2 = (Math.PI / 4) * (place.insideDiameterMm / 1000) ** 2;
  return MOST_M_PER_S * areaM2 * 3600;
}

/** Heat that can pass in an hour at most, kW; null where the flow's most is unknown. */
export function mostPowerKw(place: MeterPlace): number | null {
  const flow = mostFlowM3PerHour(place);
  const deltaTK =
    place.designDeltaTK === null ? GREATEST_DELTA_T_K : MOST_OF_DESIGN * place.designDeltaTK;
  return flow === null ? null : flow * deltaTK * KWH_PER_M3_K;
}

/** What the recipe and the place tell of the meter behind a file; null for a file of no meter. */
export function meterFacts(recipe: FileRecipe, place: MeterPlace): MeterFacts | null {
  const { meter, columns } = recipe;
  const isMetered = columns.some(({ meaning }) => meaning === "power" || isCounter(meaning));
  if (!isMetered) return null;
  const limits = (meaning: string, mostPerHour: number | null): CounterLimits => {
    const column = columns.find((each) => each.meaning === meaning);
    const typed = column?.capacity ?? null;
    const capacity = typed === null ? null : counterCapacity(typed);
    const unit = column?.unit ?? null;
    return {
      capacity: capacity === null || unit === null ? null : toStoredScale(capacity, unit),
      mostPerHour,
    };
  };
  return {
    positivePower: positivePowerOf(place.service, meter?.positivePower ?? null),
    exchangesMs: (meter?.exchangedAt ?? []).map((instant) => Date.parse(instant)),
    gapFactor: GAP_FACTOR[place.gapRule],
    volume: limits("volumeCounter", mostFlowM3PerHour(place)),
    heating: limits("heatingCounter", mostPowerKw(place)),
    cooling: limits("coolingCounter", mostPowerKw(place)),
  };
}

/** A loop of one service names the register itself, whatever the recipe says. */
function positivePowerOf(service: LoopService, said: PositivePower | null): PositivePower | null {
  const own = SERVICE_OF_ENERGY[service];
  return own === "changeover" ? said : own;
}
