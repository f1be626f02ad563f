import { energyOfVolumeKwh, heatCoefficient } from "@shared/domain/energy/heat-coefficient";
import { thermalPowerKw, type MeterSide } from "@shared/domain/energy/power";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { flowAtVelocityM3PerHour, velocityMPerS } from "@shared/domain/pipes/bore";
import { pipeSize } from "@shared/domain/pipes/pipe-tables";
import { KW_PER, toKw } from "@shared/domain/units/energy-and-power";
import { toM3PerHour } from "@shared/domain/units/flow";
import { differenceToKelvin, toCelsius } from "@shared/domain/units/temperature";
import { readCsv, relativeError } from "./read-csv";

const at16 = waterAtPressure(1.6);
const mjPerM3K = (supplyC: number, returnC: number, side: MeterSide, fluid = at16) =>
  heatCoefficient(fluid, side, supplyC, returnC)!.mjPerM3K;

// Every number computed with IF97 by another program; no published table of k could be read.
test("heat coefficients equal those computed by another program, on either side", () => {
  const rows = readCsv("test/reference/data/heat_coefficient_computed.csv");
  expect(rows).toHaveLength(15);
  for (const row of rows) {
    const supplyC = Number(row["t_supply_C"]);
    const returnC = Number(row["t_return_C"]);
    for (const [pressure, name] of [
      [0.6, "0.6MPa"],
      [1.6, "1.6MPa"],
    ] as const) {
      for (const side of ["supply", "return"] as const) {
        const expected = Number(row[`k_${side}_MJ_m3K_${name}`]);
        const own = heatCoefficient(waterAtPressure(pressure), side, supplyC, returnC)!;
        expect(relativeError(own.mjPerM3K, expected)).toBeLessThan(3e-9);
        const inKwh = Number(row[`k_${side}_kWh_m3K_${name}`]);
        expect(relativeError(own.kwhPerM3K, inKwh)).toBeLessThan(5e-9);
      }
    }
  }
});

// Computed with IF97 at 1.6 MPa.
test("heat coefficients of usual hot and chilled loops", () => {
  for (const [supplyC, returnC, side, expected] of [
    [70, 40, "return", 4.148534],
    [70, 40, "supply", 4.088194],
    [6, 12, "supply", 4.194288],
    [6, 12, "return", 4.19233],
    [80, 60, "return", 4.117625],
    [45, 35, "return", 4.152832],
  ] as const) {
    expect(mjPerM3K(supplyC, returnC, side)).toBeCloseTo(expected, 6);
  }
});

test("the hot loop's coefficient in kWh", () => {
  expect(heatCoefficient(at16, "return", 70, 40)!.kwhPerM3K).toBeCloseTo(1.152371, 6);
});

test("a heat coefficient at equal temperatures is the limit, and outside the fluid there is none", () => {
  const limit = heatCoefficient(at16, "return", 12, 12)!.mjPerM3K;
  expect(relativeError(limit, mjPerM3K(12.001, 11.999, "return"))).toBeLessThan(1e-6);
  expect(heatCoefficient(at16, "return", -1, 12)).toBeNull();
  expect(heatCoefficient(at16, "supply", 12, 151)).toBeNull();
});

test("density at the wrong side reads 1.454 % low at 70/40 °C and 0.047 % off at 6/12 °C", () => {
  const wrong = (supplyC: number, returnC: number, taken: MeterSide) => {
    const right = taken === "supply" ? "return" : "supply";
    const own = mjPerM3K(supplyC, returnC, taken);
    return 100 * (own / mjPerM3K(supplyC, returnC, right) - 1);
  };
  expect(wrong(70, 40, "supply")).toBeCloseTo(-1.454, 3);
  expect(wrong(6, 12, "return")).toBeCloseTo(-0.047, 3);
});

// A worked interval, computed with IF97: return-side meter, 8.000 L/s, 6.90 → 12.80 °C, 300 s.
test("the worked interval gives its density, enthalpies, power, energy and speed", () => {
  expect(at16.density(12.8)).toBeCloseTo(1000.11, 2);
  expect(at16.enthalpy(6.9)).toBeCloseTo(30.5834, 4);
  expect(at16.enthalpy(12.8)).toBeCloseTo(55.3055, 4);
  const power = -thermalPowerKw(toM3PerHour(8, "L/s"), 6.9, 12.8, at16, "return");
  expect(power).toBeCloseTo(197.798, 3);
  expect((power * 300) / 3600).toBeCloseTo(16.4832, 4);
  expect(mjPerM3K(6.9, 12.8, "return")).toBeCloseTo(4.19064, 5);
  const coefficient = heatCoefficient(at16, "return", 6.9, 12.8)!;
  expect(energyOfVolumeKwh(coefficient, 2.4, 6.9, 12.8)).toBeCloseTo(-16.4832, 4);
  expect(velocityMPerS(28.8, 102.965)).toBeCloseTo(0.960771, 5);
  // Constant density 1000 and 4.186 kJ/(kg·K) are 0.110792 % off: good for a sanity check only.
  expect(100 * ((8 * 4.186 * 5.9) / power - 1)).toBeCloseTo(-0.110792, 5);
});

// Trade equation Btu/h = 500·gpm·Δ°F (ASHRAE AC-02-6-1, 2002, eq. 1). The same factor by IF97 at
// 1.6 MPa with the meter on the return is 501.288, and the flow of a ton 2.39383 gpm (computed).
test("the trade's factor of 500 is 501.288 by IF97 at 44 to 54 °F", () => {
  const supplyC = toCelsius(44, "degF");
  const returnC = toCelsius(54, "degF");
  const power = -thermalPowerKw(toM3PerHour(1, "US gpm"), supplyC, returnC, at16, "return");
  expect(power / toKw(1, "Btu/h") / 10).toBeCloseTo(501.288, 3);
  expect(toKw(1, "ton") / power).toBeCloseTo(2.39383, 5);
  expect(differenceToKelvin(10, "degF")).toBeCloseTo(returnC - supplyC, 12);
});

// ASME B36.10M as carried by an open-source piping library.
test("steel pipe has the standard's outside diameter, wall and bore", () => {
  for (const [table, dn, outside, wall, bore] of [
    ["asme-b36.10m-40", 100, 114.3, 6.02, 102.26],
    ["asme-b36.10m-40", 200, 219.1, 8.18, 202.74],
    ["asme-b36.10m-std", 300, 323.8, 9.53, 304.74],
  ] as const) {
    expect(pipeSize(table, dn)).toMatchObject({
      outsideDiameterMm: outside,
      wallMm: wall,
      boreMm: bore,
    });
  }
});

// Computed from the bore.
test("one metre a second in NPS 4 schedule 40 is 29.5668 m³/h", () => {
  expect(flowAtVelocityM3PerHour(1, pipeSize("asme-b36.10m-40", 100)!.boreMm)).toBeCloseTo(
    29.5668,
    4,
  );
});

// NIST SP 811, appendix B.8.
test("gallon, Btu and ton are the published ones", () => {
  expect(toM3PerHour(1, "US gpm")).toBeCloseTo(0.227125, 6);
  expect(KW_PER["Btu/h"] * 3_600_000).toBeCloseTo(1055.056, 3);
  expect(KW_PER.ton).toBeCloseTo(3.51685, 5);
});
