import { soundSpeedMPerS, waterSoundSpeedMPerS } from "@shared/domain/fluids/sound-speed";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import {
  boreMm,
  flowAreaM2,
  outsideDiameterFromCircumferenceMm,
  velocityMPerS,
} from "@shared/domain/pipes/bore";
import { boreUncertaintyMm, FLOW_SENSITIVITY_TO_BORE } from "@shared/domain/pipes/bore-uncertainty";
import { reynoldsNumber } from "@shared/domain/pipes/reynolds-number";
import { straightRunAfter, straightRunBefore } from "@shared/domain/pipes/straight-run";
import { toM3PerHour } from "@shared/domain/units/flow";
import { readJson } from "./read-csv";

// Marczak, J. Acoust. Soc. Am. 102 (1997) 2776; values computed from the published coefficients.
test("the sound speed of pure water has its published values and its maximum near 74.17 °C", () => {
  for (const [temperatureC, expected] of [
    [0, 1402.385],
    [20, 1482.38],
    [50, 1542.565],
    [74, 1555.14],
  ] as const) {
    expect(waterSoundSpeedMPerS(temperatureC)).toBeCloseTo(expected, 3);
  }
  let fastestC = 0;
  for (let t = 70; t <= 80; t += 0.01) {
    if (waterSoundSpeedMPerS(t)! > waterSoundSpeedMPerS(fastestC)!) fastestC = t;
  }
  expect(fastestC).toBeCloseTo(74.17, 1);
});

// Bilaniuk and Wong, J. Acoust. Soc. Am. 93 (1993) 1609, erratum 99 (1996) 3257, 148 points.
test("a second formula agrees within 0.0015 % at 20 °C and gives its computed values", () => {
  expect(waterSoundSpeedMPerS(20, "bilaniukWong1993")).toBeCloseTo(1482.358, 3);
  const { computed_check_values: rows } = readJson("shared/data/sound_speed_water.json") as {
    computed_check_values: Record<
      "t_C" | "marczak1997" | "bilaniuk_wong_148pt" | "iapws95_0p101325MPa",
      number
    >[];
  };
  expect(rows).toHaveLength(15);
  for (const row of rows) {
    const marczak = waterSoundSpeedMPerS(row.t_C)!;
    const second = waterSoundSpeedMPerS(row.t_C, "bilaniukWong1993")!;
    expect(marczak).toBeCloseTo(row.marczak1997, 3);
    expect(second).toBeCloseTo(row.bilaniuk_wong_148pt, 3);
    expect(Math.abs(second / marczak - 1)).toBeLessThan(1.7e-5);
    // IAPWS R6-95, an equation of state that knows nothing of either formula: within 0.062 m/s.
    expect(Math.abs(marczak - row.iapws95_0p101325MPa)).toBeLessThan(0.062);
  }
});

// Kaye & Laby tables, and Del Grosso and Mader 1972, as quoted by others; printed to 0.1 and 0.001.
test("published sound speeds are met within what their print and age allow", () => {
  const { published_points: points } = readJson("shared/data/sound_speed_water.json") as {
    published_points: { t_C: number; c: number }[];
  };
  expect(points).toHaveLength(6);
  for (const { t_C, c } of points) {
    expect(Math.abs(waterSoundSpeedMPerS(t_C)! - c)).toBeLessThan(0.1);
  }
});

test("outside a formula's range, and for glycol, the sound speed is not known", () => {
  expect(waterSoundSpeedMPerS(-0.1)).toBeNull();
  expect(waterSoundSpeedMPerS(95.1)).toBeNull();
  expect(waterSoundSpeedMPerS(97, "bilaniukWong1993")).toBeGreaterThan(1500);
  expect(waterSoundSpeedMPerS(NaN)).toBeNull();
  const glycol = { kind: "propyleneGlycol", percent: 30, basis: "mass" } as const;
  expect(soundSpeedMPerS(glycol, 20)).toBeNull();
  expect(soundSpeedMPerS({ kind: "water" }, 20)).toBe(waterSoundSpeedMPerS(20));
});

interface Installation {
  circumference_mm: number;
  ut_wall_mm: number[];
  flow_L_s: number;
  fluid_temp_C: number;
  pressure_MPa: number;
  upstream_m: number;
  downstream_m: number;
  displayed_sound_speed_m_s: number[];
  nominal_od_mm: number;
  nominal_wall_mm: number;
  zero_reading_m_s: number;
  u_od_mm: number;
  u_ut_gauge_mm: number;
}

// S01: one clamp-on installation; every figure computed by another program from the input alone.
describe("a taped and gauged pipe with a clamp-on meter", () => {
  const input = readJson("test/fixtures/scenarios/S01/input.json") as Installation;
  const expected = readJson("test/fixtures/scenarios/S01/expected.json") as Record<string, number>;
  const outsideMm = outsideDiameterFromCircumferenceMm(input.circumference_mm);
  const wallMm = input.ut_wall_mm.reduce((sum, wall) => sum + wall, 0) / input.ut_wall_mm.length;
  const bore = boreMm(outsideMm, wallMm)!;
  const speed = velocityMPerS(toM3PerHour(input.flow_L_s, "L/s"), bore);

  test("the bore, its uncertainty and the speed are those of the measurements", () => {
    expect(outsideMm).toBeCloseTo(expected["OD_mm"]!, 4);
    expect(bore).toBeCloseTo(expected["ID_mm"]!, 4);
    expect(flowAreaM2(bore)).toBeCloseTo(expected["area_m2"]!, 8);
    expect(speed).toBeCloseTo(expected["velocity_at_8Ls_m_s"]!, 7);
    const u = boreUncertaintyMm(input.u_od_mm, input.u_ut_gauge_mm, input.ut_wall_mm)!;
    expect(u).toBeCloseTo(expected["u_ID_mm"]!, 6);
    const relative = (100 * u) / bore;
    expect(relative).toBeCloseTo(expected["u_ID_rel_pct"]!, 6);
    expect(FLOW_SENSITIVITY_TO_BORE * relative).toBeCloseTo(
      expected["u_flow_from_ID_pct_sensitivity2"]!,
      6,
    );
  });

  test("a nominal bore in the transmitter reads low by the square of the bores", () => {
    const nominal = boreMm(input.nominal_od_mm, input.nominal_wall_mm)!;
    const ratio = flowAreaM2(bore) / flowAreaM2(nominal);
    expect(ratio).toBeCloseTo(
      expected["flow_ratio_true_over_indicated_if_nominal_bore_was_entered"]!,
      6,
    );
    expect(input.flow_L_s * ratio).toBeCloseTo(expected["corrected_flow_L_s"]!, 4);
    const zero = input.zero_reading_m_s * flowAreaM2(bore) * 1000;
    expect(zero).toBeCloseTo(expected["zero_offset_L_s"]!, 8);
  });

  test("viscosity, Reynolds number and sound speed are those of the water in it", () => {
    const water = waterAtPressure(input.pressure_MPa);
    const viscosityPaS = water.viscosityPaS(input.fluid_temp_C);
    expect(viscosityPaS).toBeCloseTo(expected["dyn_viscosity_Pa_s"]!, 9);
    const reynolds = reynoldsNumber({
      velocityMPerS: speed,
      boreMm: bore,
      densityKgPerM3: water.density(input.fluid_temp_C),
      viscosityPaS,
    });
    expect(reynolds).toBeCloseTo(expected["reynolds"]!, 2);
    const sound = waterSoundSpeedMPerS(input.fluid_temp_C)!;
    expect(sound).toBeCloseTo(expected["sound_speed_expected_m_s"]!, 3);
    const [near = NaN, far = NaN] = input.displayed_sound_speed_m_s;
    expect(100 * (near / sound - 1)).toBeCloseTo(expected["dev_1449_pct"]!, 5);
    expect(100 * (far / sound - 1)).toBeCloseTo(expected["dev_1389_pct"]!, 5);
  });

  test("the straight before it is short of 10 D and warns, the one after is enough", () => {
    const before = straightRunBefore(input.upstream_m, bore, "bend")!;
    expect(before.bores).toBeCloseTo(expected["upstream_D"]!, 6);
    expect(before).toMatchObject({ advisedBores: 10, verdict: "short" });
    const after = straightRunAfter(input.downstream_m, bore)!;
    expect(after.bores).toBeCloseTo(expected["downstream_D"]!, 6);
    expect(after).toMatchObject({ advisedBores: 5, verdict: "ok" });
  });
});
