import { loggerSerial } from "./logger-serial";

const of = (...entries: [string, string][]) =>
  loggerSerial(entries.map(([label, value], i) => ({ line: i + 1, label, value })));

it.each([
  ["Serial number", "LG-0712"],
  ["Serial No.", "20714455"],
  ["Seriennummer", "A.17/3"],
  ["Logger S/N", "4711"],
])("reads %s", (label, value) => {
  expect(of(["Site", "North Hall"], [label, value])).toBe(value);
});

it("takes a probe's serial for no logger's", () => {
  expect(of(["Sensor serial number", "P-1"], ["Serial number", "LG-2"])).toBe("LG-2");
});

it.each([
  ["Session", "4711"],
  ["Serial number", "not recorded by the operator"],
  ["Serial number", ""],
])("takes %s: %s for none", (label, value) => {
  expect(of([label, value])).toBeNull();
});
