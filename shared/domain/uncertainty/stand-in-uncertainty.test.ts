import { standIn } from "./stand-in";
import { standInUncertainty } from "./stand-in-uncertainty";

const outage = {
  hours: 80,
  coveredHours: 61.25,
  coveredKwh: 2093.7,
  degreeHours: { covered: 820.5, missing: 251 },
};
const found = standIn(outage);
if (found === null) throw new Error("the outage gave no stand-in");

test("the portable's error is in the estimate too and adds as it is", () => {
  const { partsKwh, totalKwh } = standInUncertainty(found, {
    coveredPercent: 5.6,
    estimatePercent: 20,
  });
  // 2093.7·0.056; 640.4859·√(0.056² + 0.2²); √((2734.1859·0.056)² + (640.4859·0.2)²).
  expect(partsKwh[0]).toBeCloseTo(117.2472, 3);
  expect(partsKwh[1]).toBeCloseTo(133.0235, 2);
  expect(totalKwh).toBeCloseTo(199.6319, 2);
});

test("what nobody stated stays unknown, for its part and for the sum", () => {
  expect(standInUncertainty(found, { coveredPercent: 5.6, estimatePercent: null })).toEqual({
    partsKwh: [expect.closeTo(117.2472, 3), null],
    totalKwh: null,
  });
  expect(standInUncertainty(found, { coveredPercent: null, estimatePercent: 20 })).toEqual({
    partsKwh: [null, null],
    totalKwh: null,
  });
});

test("an outage that was covered whole needs no word on an estimate", () => {
  const whole = standIn({ ...outage, coveredHours: 80 });
  if (whole === null) throw new Error("the outage gave no stand-in");
  const { totalKwh } = standInUncertainty(whole, { coveredPercent: 5, estimatePercent: null });
  expect(totalKwh).toBeCloseTo(104.685, 6);
});
