import { createMeterComparison } from "@shared/contracts/meter-comparisons";
import {
  comparisonFrom,
  emptyComparison,
  readComparison,
  valuesOf,
  type ComparisonValues,
} from "./comparison-values";

const filled: ComparisonValues = {
  ...emptyComparison,
  title: " Main ",
  from: { day: "2026-03-28", time: "00:00" },
  to: { day: "2026-03-31", time: "0:00" },
  first: { ...emptyComparison.first, kind: "typed", name: "Portable", energyKwh: 2511.6 },
  second: {
    ...emptyComparison.second,
    name: "HM-2041",
    energy: { ...emptyComparison.second.energy, opening: 184_632, closing: 187_059 },
    meterClass: "2",
    flowRatio: 0.42,
    meanDeltaTK: 18.4,
  },
};
const zone = "Europe/Paris";

function bodyOf(values: ComparisonValues) {
  const read = readComparison(values, zone, "Untitled");
  if (!read.ok) throw new Error(`missing ${read.missing.join()}`);
  return read.body;
}

test("an empty form says what it still needs, and nothing is made up", () => {
  expect(readComparison(emptyComparison, zone, "Untitled")).toEqual({
    ok: false,
    missing: ["period", "first", "second"],
  });
  const open = readComparison({ ...filled, hasStandIn: true }, zone, "Untitled");
  expect(open).toEqual({ ok: false, missing: ["standIn"] });
});

test("midnights go as days of the site, other times as instants", () => {
  expect(bodyOf(filled)).toMatchObject({ title: "Main", from: "2026-03-28", to: "2026-03-31" });
  const at = bodyOf({ ...filled, to: { day: "2026-03-31", time: "10:15" } });
  // Paris moves its clocks on 29 March: +01:00 before, +02:00 after.
  expect([at.from, at.to]).toEqual(["2026-03-27T23:00:00.000Z", "2026-03-31T08:15:00.000Z"]);
  expect(bodyOf({ ...filled, title: " " }).title).toBe("Untitled");
});

test("what is not known stays null, and consent without a name is none", () => {
  const standIn = {
    ...emptyComparison.standIn,
    outageHours: 80,
    coveredHours: 61.25,
    coveredKwh: 2093.7,
    byDegreeHours: false,
    coveredKh: 820.5,
    hasConsent: true,
    consentBy: " ",
  };
  const body = bodyOf({ ...filled, hasStandIn: true, standIn });
  expect(body.standIn).toMatchObject({ degreeHours: null, coveredPercent: null, consentBy: null });
  expect(body.first).toMatchObject({ expandedPercent: null, volumeM3: null });
});

test("a saved comparison comes back into the form as it was asked", () => {
  const sent = bodyOf({ ...filled, notes: "Seal 12" });
  const input = createMeterComparison.body.parse(sent);
  const period = { from: "2026-03-27T23:00:00.000Z", to: "2026-03-30T22:00:00.000Z" };
  expect(bodyOf(valuesOf(input, period, zone))).toEqual(sent);
});

it("starts with the point and the days it was opened from, and asks for what they leave open", () => {
  const values = comparisonFrom({
    point: "9",
    register: "cooling",
    from: "2026-05-11",
    until: "2026-05-18",
  });
  expect(values.first).toMatchObject({ kind: "point", pointId: "9", register: "cooling" });
  expect([values.from.day, values.to.day]).toEqual(["2026-05-11", "2026-05-18"]);
  const odd = comparisonFrom({ point: "9", register: "both", from: "soon" });
  expect([odd.first.register, odd.from.day]).toEqual([null, null]);
  expect(comparisonFrom({})).toEqual(emptyComparison);
});
