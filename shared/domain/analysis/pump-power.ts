/**
 * Electric power of a pump that moves a flow against its system's head.
 *
 * P_el = ρ·g·q·H ÷ (1000·η) in kW with q in m³/s, and H = H0 + (Hd − H0)·(q ÷ qd)²: a part that does
 * not depend on flow (lift, or a head that a control holds) and friction, which grows with its
 * square. η is overall: pump, motor and drive. It is taken as constant, which it is not far from the
 * design flow. Source: the hydraulic power of ISO 9906 and the parabolic system curve of any pump
 * handbook. Example: H0 8 m, Hd 26 m at 130 m³/h, η 0.58, 1000 kg/m³: 15.8747 kW.
 */
export interface PumpCurve {
  /** Head at no flow, m; 0 for a system of friction alone. */
  readonly staticHeadM: number;
  readonly designHeadM: number;
  readonly designFlowM3PerHour: number;
  /** Overall, above 0 and at most 1. */
  readonly efficiency: number;
}

export const STANDARD_GRAVITY_M_PER_S2 = 9.80665;

/** Head the pump has to give at a flow, m. */
export function systemHeadM(curve: PumpCurve, flowM3PerHour: number): number {
  const share = flowM3PerHour / curve.designFlowM3PerHour;
  return curve.staticHeadM + (curve.designHeadM - curve.staticHeadM) * share * share;
}

/** kW; 0 at no flow. `densityKgPerM3` of the water in the pump. */
export function pumpPowerKw(
  curve: PumpCurve,
  flowM3PerHour: number,
  densityKgPerM3: number,
): number {
  const headM = systemHeadM(curve, flowM3PerHour);
  const hydraulicW = (densityKgPerM3 * STANDARD_GRAVITY_M_PER_S2 * flowM3PerHour * headM) / 3600;
  return hydraulicW / 1000 / curve.efficiency;
}

/**
 * Power by the cube of flow, P = P_d·(q ÷ q_d)³, kW; null where the system has static or controlled
 * head, because there the law promises savings that do not come (q ÷ 2 would be P ÷ 8).
 * Source: the affinity laws. Example: 8 kW at 100 m³/h is 1 kW at 50 m³/h.
 */
export function cubeLawPowerKw(
  designPowerKw: number,
  curve: Pick<PumpCurve, "staticHeadM" | "designFlowM3PerHour">,
  flowM3PerHour: number,
): number | null {
  if (curve.staticHeadM !== 0) return null;
  return designPowerKw * (flowM3PerHour / curve.designFlowM3PerHour) ** 3;
}
