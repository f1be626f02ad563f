import type { LoopService } from "../energy/power";
import { createFileScan } from "./file-scan";
import { finishRecognition } from "./finish-recognition";
import { HEAD_BYTES, isUnreadable, recogniseHead } from "./recognise-head";
import type { Recognition } from "./recognition";

function recognise(
  header: string,
  rowOf: (i: number) => string,
  service: LoopService | null,
): Recognition {
  const rows = Array.from({ length: 24 }, (_, i) => {
    const hour = String(i).padStart(2, "0");
    return `2026-05-18 ${hour}:00;${rowOf(i)}`;
  });
  const bytes = new TextEncoder().encode([`Time (UTC);${header}`, ...rows, ""].join("\n"));
  const head = recogniseHead(bytes.subarray(0, HEAD_BYTES), true);
  if (isUnreadable(head)) throw new Error(head.code);
  const scan = createFileScan(head);
  scan.push(bytes);
  const found = finishRecognition(head, scan.end(), service);
  if ("code" in found) throw new Error(found.code);
  return found;
}
const meanings = ({ recipe }: Recognition) => recipe.columns.slice(1).map(({ meaning }) => meaning);
const codes = ({ questions }: Recognition) => questions.map(({ code }) => code);

test("a power without flow or temperature is a meter's; beside a flow it is left for somebody to choose", () => {
  const alone = recognise("mean_kW", (i) => `${100 + i}.5`, "heating");
  expect(alone.recipe.columns[1]).toMatchObject({ meaning: "power", unit: "kW" });
  const beside = recognise(
    "Flow [m³/h];Supply [°C];Return [°C];Heat power [kW]",
    (i) => `${20 + i}.5;45.1;40.2;${100 + i}.5`,
    "heating",
  );
  expect(meanings(beside)).toEqual(["flow", "supply", "return", "skip"]);
});

test("a header that says mean is asked for its step, one that says which is not", () => {
  expect(codes(recognise("mean_kW", (i) => `${i}.5`, "heating"))).toEqual(["seriesKind"]);
  expect(codes(recognise("Mean power, interval start [kW]", (i) => `${i}.5`, "heating"))).toEqual(
    [],
  );
  expect(codes(recognise("Heat power [kW]", (i) => `${i}.5`, "heating"))).toEqual([]);
});

test("the power of a pump or a compressor is no heat", () => {
  const found = recognise("Pump power [kW];Compressor [kW]", (i) => `${i}.5;${i}.7`, "heating");
  expect(meanings(found)).toEqual(["skip", "skip"]);
});

test("an energy that only rises is a counter of the loop's service; one that does not is none", () => {
  const counter = (i: number) => `${1000 + 3 * i}.2`;
  expect(meanings(recognise("Energy [MWh]", counter, "heating"))).toEqual(["heatingCounter"]);
  expect(meanings(recognise("Energy [MWh]", counter, "cooling"))).toEqual(["coolingCounter"]);
  const open = recognise("Energy [MWh]", counter, "changeover");
  expect(meanings(open)).toEqual(["skip"]);
  expect(codes(open)).toContain("columnMeaning");
  const interval = recognise("Energy [kWh]", (i) => `${10 + (i % 2) * 5}.2`, "heating");
  expect(meanings(interval)).toEqual(["skip"]);
});

test("heating and cooling counters are told by their names", () => {
  const found = recognise(
    "Heating energy [kWh];Cooling energy [kWh]",
    (i) => `${10 + i}.2;${20 + i}.2`,
    "changeover",
  );
  expect(meanings(found)).toEqual(["heatingCounter", "coolingCounter"]);
  expect(codes(found)).toEqual([]);
});

test("MBtu may be a thousand or a million Btu, so its unit is asked", () => {
  const found = recognise("Heat energy [MBtu]", (i) => `${10 + i}.2`, "heating");
  expect(found.recipe.columns[1]).toMatchObject({ meaning: "heatingCounter", unit: null });
  expect(found.questions).toMatchObject([{ code: "columnUnit", minValue: 10.2, maxValue: 33.2 }]);
});

test("a power in a changeover loop goes by the temperatures of its file, or is asked", () => {
  const alone = recognise("Heat power [kW]", (i) => `${i - 5}.5`, "changeover");
  expect(alone.questions).toMatchObject([{ code: "positivePower", maxValue: 18.5 }]);
  const told = recognise(
    "Heat power [kW];Supply [°C];Return [°C]",
    (i) => `${i}.5;45.1;40.2`,
    "changeover",
  );
  expect(told.recipe.meter).toEqual({ positivePower: "byTemperature", exchangedAt: [] });
  expect(codes(told)).toEqual([]);
});
