import { IAPWS97_EoS } from "@neutrium/thermo.eos.iapws97";
import { saturationPressureMPa, saturationTemperatureC } from "@shared/domain/fluids/saturation";
import { waterRegion1 } from "@shared/domain/fluids/water";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { waterViscosityPaS } from "@shared/domain/fluids/water-viscosity";
import { readCsv, readJson, relativeError } from "./read-csv";

interface Published {
  IF97_Table5: { points: Record<"T_K" | "p_MPa" | "v" | "h" | "u" | "s" | "cp" | "w", number>[] };
  IF97_Table35_saturation: { points: { T_K: number; p_MPa: number }[] };
}
const published = readJson("test/reference/data/iapws_verification_values.json") as Published;

// IAPWS R7-97(2012), table 5, nine digits as printed.
test("Region 1 gives the published verification values to their last digit", () => {
  for (const point of published.IF97_Table5.points) {
    const water = waterRegion1(point.T_K - 273.15, point.p_MPa);
    for (const [own, printed] of [
      [1 / water.densityKgPerM3, point.v],
      [water.enthalpyKjPerKg, point.h],
      [water.internalEnergyKjPerKg, point.u],
      [water.entropyKjPerKgK, point.s],
      [water.heatCapacityKjPerKgK, point.cp],
      [water.soundSpeedMPerS, point.w],
    ] as const) {
      expect(relativeError(own, printed)).toBeLessThan(5e-9);
    }
  }
});

// IAPWS R7-97(2012), table 35.
test("the boiling line gives the published verification values, both ways", () => {
  for (const { T_K, p_MPa } of published.IF97_Table35_saturation.points) {
    expect(relativeError(saturationPressureMPa(T_K - 273.15), p_MPa)).toBeLessThan(5e-9);
    expect(saturationTemperatureC(p_MPa) + 273.15).toBeCloseTo(T_K, 5);
  }
});

// IAPWS R12-08, table 4: all eleven points, μ₂ = 1, to the last digit printed.
test("viscosity gives the published verification values", () => {
  const { verification_Table4: points } = readJson(
    "shared/data/viscosity_r12_08_coefficients.json",
  ) as { verification_Table4: { T_K: number; rho_kg_m3: number; mu_uPas: number }[] };
  expect(points).toHaveLength(11);
  for (const { T_K, rho_kg_m3, mu_uPas } of points) {
    expect(Math.abs(waterViscosityPaS(T_K - 273.15, rho_kg_m3) * 1e6 - mu_uPas)).toBeLessThan(6e-7);
  }
});

describe("from 1 to 130 °C and 0.3 to 1.6 MPa", () => {
  const rows = readCsv("test/reference/data/water_check_values.csv").map((row) =>
    Object.fromEntries(Object.entries(row).map(([name, cell]) => [name, Number(cell)])),
  );

  // Computed with Debian's python3-iapws 1.5.3, IF97, nine digits.
  test("another program's IF97 gives the same density, enthalpy, heat capacity and sound speed", () => {
    expect(rows).toHaveLength(64);
    for (const row of rows) {
      const full = waterRegion1(row.t_C!, row.p_MPa!);
      const folded = waterAtPressure(row.p_MPa!);
      expect(relativeError(full.densityKgPerM3, row.if97_rho_kg_m3!)).toBeLessThan(1e-8);
      expect(relativeError(full.enthalpyKjPerKg, row.if97_h_kJ_kg!)).toBeLessThan(1e-8);
      expect(relativeError(full.heatCapacityKjPerKgK, row.if97_cp_kJ_kgK!)).toBeLessThan(1e-8);
      expect(relativeError(full.soundSpeedMPerS, row.if97_w_m_s!)).toBeLessThan(1e-8);
      expect(relativeError(folded.density(row.t_C!), row.if97_rho_kg_m3!)).toBeLessThan(1e-8);
      expect(relativeError(folded.enthalpy(row.t_C!), row.if97_h_kJ_kg!)).toBeLessThan(1e-8);
    }
  });

  // IAPWS R6-95, an independent equation of state, by the same program. The two equations differ by
  // up to 1.48e-5 in density and 0.072 kJ/kg in enthalpy in this range (computed from that table).
  test("the scientific equation of state agrees within the stated deviation", () => {
    for (const row of rows) {
      const water = waterAtPressure(row.p_MPa!);
      expect(relativeError(water.density(row.t_C!), row.iapws95_rho_kg_m3!)).toBeLessThan(1.48e-5);
      expect(Math.abs(water.enthalpy(row.t_C!) - row.iapws95_h_kJ_kg!)).toBeLessThan(0.072);
      // Heat capacity 0.079 %, sound speed 2.86 m/s (computed from that table).
      expect(relativeError(water.heatCapacity(row.t_C!), row.iapws95_cp_kJ_kgK!)).toBeLessThan(
        7.9e-4,
      );
      const { soundSpeedMPerS } = waterRegion1(row.t_C!, row.p_MPa!);
      expect(Math.abs(soundSpeedMPerS - row.iapws95_w_m_s!)).toBeLessThan(2.86);
    }
  });

  // IAPWS R12-08 at IF97's density, by the same program; printed to nine digits.
  test("another program gives the same viscosity", () => {
    for (const row of rows) {
      const own = waterAtPressure(row.p_MPa!).viscosityPaS(row.t_C!);
      expect(relativeError(own * 1000, row.r12_mu_mPas_at_if97_rho!)).toBeLessThan(1e-8);
    }
  });

  // The density of the independent equation instead of IF97's moves the viscosity by 2e-5 at most.
  test("viscosity at the scientific equation's density agrees within the stated deviation", () => {
    for (const row of rows) {
      const own = waterViscosityPaS(row.t_C!, row.iapws95_rho_kg_m3!);
      expect(relativeError(own * 1000, row.r12_mu_mPas_at_if97_rho!)).toBeLessThan(5e-5);
    }
  });
});

// @neutrium/thermo.eos.iapws97 2.0.2, an independent implementation from the npm registry.
test("an independent implementation gives the same density and enthalpy over a grid", () => {
  const other = new IAPWS97_EoS();
  for (const pressureMPa of [0.25, 0.6, 1.6, 2.5]) {
    const water = waterAtPressure(pressureMPa);
    for (
      let temperatureC = 0.5;
      temperatureC <= Math.min(150, water.highestC - 1);
      temperatureC += 7
    ) {
      const state = other.solve({ p: pressureMPa * 1e6, t: temperatureC + 273.15 });
      expect(relativeError(water.density(temperatureC), Number(state.rho))).toBeLessThan(1e-9);
      expect(relativeError(water.enthalpy(temperatureC), Number(state.h))).toBeLessThan(1e-9);
    }
  }
});

test("water at 20 °C and one atmosphere weighs 998.206 kg/m³", () => {
  expect(waterAtPressure(0.101325).density(20)).toBeCloseTo(998.206, 3);
});
