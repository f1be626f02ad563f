/**
 * Which heat a permanent meter's positive power is. In a loop of one service it is that service's.
 * In a changeover loop somebody says it, or the water's temperatures do, row by row.
 */
export type PositivePower = "heating" | "cooling" | "byTemperature";

/**
 * A meter's power with heating positive, kW; the given column itself where it already is. By
 * temperature, a positive power is heating where supply is warmer than return, else cooling; where those are unknown or equal
 * while heat moves, where a negative power meets temperatures that say heating, and where nobody has
 * said what positive means, it is unknown (NaN).
 *
 * Example: 40 kW of a cooling meter → −40 kW; by temperature at 12 → 18 °C → −40 kW.
 */
export function orientPower(
  powerKw: Float64Array,
  positive: PositivePower | null,
  temperatures: {
    readonly supplyC: Float64Array | null;
    readonly returnC: Float64Array | null;
  },
): Float64Array {
  if (positive === "heating") return powerKw;
  if (positive === "cooling") return powerKw.map((kw) => 0 - kw);
  if (positive === null) return new Float64Array(powerKw.length).fill(NaN);
  const { supplyC, returnC } = temperatures;
  return powerKw.map((kw, row) => {
    const deltaTK = (supplyC?.[row] ?? NaN) - (returnC?.[row] ?? NaN);
    if (kw === 0) return 0;
    if (deltaTK < 0) return kw > 0 ? 0 - kw : kw;
    return deltaTK > 0 && kw > 0 ? kw : NaN;
  });
}
