import { makeFormat } from "@features/i18n";
import { shownRange, shownValue, storedValue } from "./shown-range";

const si = makeFormat("en", "si", "UTC");
const inchPound = makeFormat("en", "inchPound", "UTC");

test("limits stay inside the stored range in other units", () => {
  expect(shownRange(si, "pipeSize", 15, 1300)).toEqual({ min: 15, max: 1300 });
  expect(shownRange(inchPound, "pipeSize", 15, 1300)).toEqual({ min: 0.591, max: 51.1 });
  expect(shownRange(si, "pressure", 0, 2.5)).toEqual({ min: 0, max: 25 });
});

test("a value that was not touched is stored as it was, to the last bit", () => {
  const before = 114.3;
  const shown = shownValue(inchPound, "pipeSize", before);
  expect(shown).toBe(4.5);
  expect(storedValue(inchPound, "pipeSize", shown, before)).toBe(before);
  // One US gallon per minute is 0.227125 m³/h (231 in³; NIST SP 811).
  expect(storedValue(inchPound, "flow", 100, null)).toBeCloseTo(22.7125, 3);
  expect(storedValue(si, "pressure", null, 0.3)).toBeNull();
});
