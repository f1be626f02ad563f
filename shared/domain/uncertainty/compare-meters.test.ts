import { compareMeters, type MeterFigures } from "./compare-meters";
import { meterClassUncertainty } from "./permanent-meter";

const known = (value: number, expanded: number | null) => ({ value, expanded });
const energyOnly = (value: number, expanded: number | null): MeterFigures => ({
  energyKwh: known(value, expanded),
  volumeM3: null,
  deltaTK: null,
});

test("a class 2 meter against a portable, worked by hand", () => {
  const perm = meterClassUncertainty({
    meterClass: 2,
    flowRatio: 0.42,
    deltaTK: 18.4,
    deltaTMinK: 3,
  });
  expect(perm?.energyPercent).toBeCloseTo(4.272153, 6);
  // 2·2.047619/√3 and 2·0.9891304/√3.
  expect(perm?.volumePercent).toBeCloseTo(2.364387, 5);
  expect(perm?.deltaTPercent).toBeCloseTo(1.142149, 5);
  const second = energyOnly(2427, (2427 * (perm?.energyPercent ?? NaN)) / 100);
  const agreeing = compareMeters(energyOnly(2511.6, 2511.6 * 0.056), second);
  expect(agreeing.energy.en).toBeCloseTo(0.484157, 6);
  expect(agreeing).toMatchObject({ verdict: "agree", because: [], errorsCancel: false });
  const far = compareMeters(energyOnly(2781, 2781 * 0.056), second);
  expect(far.energy.en).toBeCloseTo(1.892093, 6);
  expect(far.verdict).toBe("disagree");
});

test("good energy from bad parts is flagged, and parts that agree are not", () => {
  const first: MeterFigures = {
    energyKwh: known(100, 3),
    volumeM3: known(10, 0.2),
    deltaTK: known(8.6, 0.2),
  };
  const off: MeterFigures = {
    energyKwh: known(99, 3),
    volumeM3: known(9, 0.2),
    deltaTK: known(9.45, 0.2),
  };
  const found = compareMeters(first, off);
  expect(found.verdict).toBe("agree");
  expect([found.volume?.code, found.deltaT?.code]).toEqual(["disagree", "disagree"]);
  expect(found.errorsCancel).toBe(true);
  expect(compareMeters(first, { ...off, volumeM3: null, deltaTK: null }).errorsCancel).toBe(false);
  const near = { ...off, volumeM3: known(9.9, 0.2), deltaTK: known(8.6, 0.2) };
  expect(compareMeters(first, near).errorsCancel).toBe(false);
});

test("without a ± or with something shared nothing is concluded, and it is said why", () => {
  const sure = energyOnly(100, 3);
  expect(compareMeters(energyOnly(100, null), sure)).toMatchObject({
    verdict: "inconclusive",
    because: ["firstWithoutUncertainty"],
  });
  expect(compareMeters(sure, energyOnly(100, null)).because).toEqual(["secondWithoutUncertainty"]);
  expect(compareMeters(energyOnly(1, 0), energyOnly(1, 0)).because).toEqual(["noUncertaintyAtAll"]);
  const shared = compareMeters(sure, energyOnly(200, 3), ["sharedInstruments"]);
  expect(shared).toMatchObject({ verdict: "inconclusive", because: ["sharedInstruments"] });
  expect(shared.energy.code).toBe("disagree");
});
