import { standIn } from "./stand-in";

test("hours nobody measured are estimated by degree-hours and stay a part of their own", () => {
  const found = standIn({
    hours: 10,
    coveredHours: 6,
    coveredKwh: 60,
    degreeHours: { covered: 30, missing: 10 },
  });
  expect(found).toEqual({
    parts: [
      { code: "substitutedPortable", energyKwh: 60, hours: 6 },
      { code: "estimatedDegreeHours", energyKwh: 20, hours: 4 },
    ],
    totalKwh: 80,
    estimatedPercent: 25,
  });
});

test("without degree-hours time scales, and nothing missing is nothing estimated", () => {
  const outage = { hours: 10, coveredHours: 8, coveredKwh: 80, degreeHours: null };
  expect(standIn(outage)?.parts[1]).toEqual({
    code: "estimatedTime",
    energyKwh: 20,
    hours: 2,
  });
  const whole = standIn({ ...outage, coveredHours: 10 });
  expect(whole?.parts).toHaveLength(1);
  expect(whole?.estimatedPercent).toBe(0);
});

test("nothing to scale from gives no figure", () => {
  const outage = { hours: 10, coveredHours: 8, coveredKwh: 80 };
  expect(standIn({ ...outage, degreeHours: { covered: 0, missing: 5 } })).toBeNull();
  expect(standIn({ hours: 10, coveredHours: 0, coveredKwh: 0, degreeHours: null })).toBeNull();
  expect(standIn({ ...outage, coveredHours: 11, degreeHours: null })).toBeNull();
});
