import { displayUnits, fromDisplay, toDisplay } from "./display-units";
import { fromKw, KW_PER, toKwh } from "./energy-and-power";
import { columnToM3PerHour, toM3PerHour } from "./flow";
import { columnToStoredUnit, toStoredScale } from "../log-files/column-units";
import { fromMm, toMPa } from "./size-and-pressure";
import { columnToCelsius, differenceToKelvin, toCelsius } from "./temperature";

// NIST SP 811, appendix B.8: gallon 231 in³, Btu(IT) 1055.056 J, ton of refrigeration 288 000 Btu/day.
test("a US gallon a minute is 0.227125 m³/h and a hundred are 6.30902 L/s", () => {
  expect(toM3PerHour(1, "US gpm")).toBeCloseTo(0.227124707, 9);
  expect(toM3PerHour(100, "US gpm") / 3.6).toBeCloseTo(6.30902, 5);
  expect(toM3PerHour(8, "L/s")).toBe(28.8);
  expect(toM3PerHour(500, "L/min")).toBe(30);
});

test("a ton of refrigeration is 3.51685 kW and 12 MBH", () => {
  expect(KW_PER.ton).toBeCloseTo(3.51685, 5);
  expect(fromKw(KW_PER.ton, "MBH")).toBeCloseTo(12, 12);
  expect(toKwh(3.6, "MJ")).toBeCloseTo(1, 12);
  expect(toKwh(1, "kBtu")).toBeCloseTo(0.293071, 6);
});

test("degrees Fahrenheit lose their offset only where they are temperatures", () => {
  expect([32, 44, 212].map((f) => toCelsius(f, "degF"))).toEqual([0, 12 / 1.8, 100]);
  expect(differenceToKelvin(9, "degF")).toBe(5);
  expect(toCelsius(273.15, "K")).toBe(0);
});

test("columns convert as single values do and keep their holes", () => {
  expect([...columnToM3PerHour(new Float64Array([10, NaN]), "US gpm")]).toEqual([
    toM3PerHour(10, "US gpm"),
    NaN,
  ]);
  expect([...columnToCelsius(new Float64Array([50, NaN]), "degF")]).toEqual([10, NaN]);
});

test("a size in inches and a pressure in psi come back as millimetres and megapascals", () => {
  expect(fromMm(114.3, "in")).toBeCloseTo(4.5, 12);
  expect(toMPa(14.6959488, "psi")).toBeCloseTo(0.101325, 8);
});

test("what an account types in its own units is stored as it was before", () => {
  for (const system of ["si", "inchPound"] as const) {
    for (const unit of Object.values(displayUnits(system))) {
      expect(fromDisplay(toDisplay(12.34, unit), unit)).toBeCloseTo(12.34, 9);
    }
  }
  expect(toDisplay(6.666667, displayUnits("inchPound").temperature)).toBeCloseTo(44, 5);
  expect(toDisplay(100, displayUnits("inchPound").flow)).toBeCloseTo(440.2868, 4);
});

// NIST SP 811, appendix B.8: Btu(IT) 1055.056 J, gallon 231 in³, cubic foot 0.02831685 m³.
test("a meter's power and counters come to kW, m³ and kWh by the published factors", () => {
  expect(toStoredScale(1, "MBH")).toBeCloseTo(0.2930711, 7);
  expect(toStoredScale(1, "ton")).toBeCloseTo(3.516853, 6);
  expect([toStoredScale(2, "MW"), toStoredScale(2000, "W")]).toEqual([2000, 2]);
  expect(toStoredScale(1, "ft3")).toBeCloseTo(0.02831685, 8);
  expect(toStoredScale(1, "US gal")).toBeCloseTo(0.003785412, 9);
  expect(toStoredScale(3.6, "GJ")).toBeCloseTo(1000, 9);
  expect(toStoredScale(1, "MMBtu")).toBeCloseTo(293.0711, 4);
  expect(toStoredScale(1, "kBtu")).toBeCloseTo(0.2930711, 7);
  const litres = Float64Array.of(1000, NaN);
  expect([...columnToStoredUnit(litres, "L")]).toEqual([1, NaN]);
  expect([...litres]).toEqual([1000, NaN]);
});
