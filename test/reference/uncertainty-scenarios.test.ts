import { soundSpeedMPerS } from "@shared/domain/fluids/sound-speed";
import { agreement } from "@shared/domain/uncertainty/agreement";
import { boreFromEvidence } from "@shared/domain/uncertainty/bore-from-evidence";
import { budgetFromEvidence } from "@shared/domain/uncertainty/budget-from-evidence";
import { conditionVerdicts } from "@shared/domain/uncertainty/conditions";
import { soundSpeedVerdict } from "@shared/domain/uncertainty/conditions-of-flow";
import {
  expandedFromLimitsPercent,
  type MeterClass,
  meterLimits,
} from "@shared/domain/uncertainty/meter-limits";
import type { PointEvidence } from "@shared/domain/uncertainty/point-evidence";
import { standIn } from "@shared/domain/uncertainty/stand-in";
import { readJson, relativeError } from "./read-csv";

/** Every expected figure was computed by another program from the input alone. */
const expectClose = (own: number | null | undefined, expected: number | undefined) =>
  expect(relativeError(own ?? NaN, expected ?? NaN)).toBeLessThan(1e-6);

// S01: one clamp-on installation, looked at before it is used.
describe("a clamp-on meter 0.92 m behind an elbow", () => {
  const input = readJson("test/fixtures/scenarios/S01/input.json") as {
    circumference_mm: number;
    ut_wall_mm: number[];
    lining_mm: number;
    nominal_od_mm: number;
    nominal_wall_mm: number;
    fluid_temp_C: number;
    upstream_m: number;
    downstream_m: number;
    displayed_sound_speed_m_s: [number, number];
    zero_reading_m_s: number;
    u_od_mm: number;
    u_ut_gauge_mm: number;
  };
  const expected = readJson("test/fixtures/scenarios/S01/expected.json") as Record<string, number>;
  const evidence: PointEvidence = {
    meterPlate: null,
    flowMeter: null,
    pipe: {
      circumferenceMm: input.circumference_mm,
      outsideDiameterMm: null,
      wallReadingsMm: input.ut_wall_mm,
      liningMm: input.lining_mm,
      outsideDiameterUncertaintyMm: input.u_od_mm,
      gaugeUncertaintyMm: input.u_ut_gauge_mm,
    },
    straightRun: {
      upstreamM: input.upstream_m,
      downstreamM: input.downstream_m,
      nearestFitting: "bend",
    },
    zero: {
      flowStopped: true,
      readingMPerS: input.zero_reading_m_s,
      remainingMPerS: null,
      action: "none",
    },
    soundSpeed: {
      displayedMPerS: input.displayed_sound_speed_m_s[0],
      fluidC: input.fluid_temp_C,
    },
    remountPercent: null,
    probes: null,
    bathCheck: null,
    clocks: [],
    noise: null,
    fluidTestedOn: null,
    edits: [],
  };
  const budget = budgetFromEvidence({
    evidence,
    pipe: null,
    fluid: null,
    fluidHeatPercent: 0,
    meterSide: "return",
    onDate: "2026-06-20",
    state: null,
  });
  const verdicts = conditionVerdicts({
    evidence,
    budget,
    fluid: { kind: "water" },
    state: {
      velocityMPerS: expected["velocity_at_8Ls_m_s"]!,
      reynolds: expected["reynolds"]!,
      deltaTK: null,
    },
    enteredBoreMm: input.nominal_od_mm - 2 * input.nominal_wall_mm,
    enteredBoreCorrected: false,
    onDate: "2026-06-20",
    intervalS: null,
    pairDifferenceCorrected: true,
    completeness: null,
  });
  const of = (check: string) => verdicts.filter((verdict) => verdict.check === check);

  test("the bore and its uncertainty come from tape and gauge", () => {
    const bore = boreFromEvidence(evidence.pipe, null);
    expectClose(bore?.boreMm, expected["ID_mm"]);
    expectClose(bore?.outsideDiameterMm, expected["OD_mm"]);
    expectClose(bore?.wallMeanMm, expected["wall_mean_mm"]);
    expectClose(bore?.wallDeviationMm, expected["wall_sd_mm"]);
    expectClose(bore?.uncertaintyMm, expected["u_ID_mm"]);
  });

  test("8.935 D before it warns and widens the profile, 5.924 D after it is enough", () => {
    expect(of("straightRun")).toHaveLength(1);
    const [run] = of("straightRun");
    expect(run).toMatchObject({
      weight: "look",
      code: "straightRunUpstreamShort",
      adds: { kind: "term", term: "profile" },
    });
    expectClose(run?.values["upstreamBores"] as number, expected["upstream_D"]);
    const profile = budget.terms.find((term) => term.kind === "profile");
    expectClose(profile?.origin.values["downstreamBores"] as number, expected["downstream_D"]);
  });

  test("1449 m/s is −0.2056 % off and plausible, 1389 m/s is −4.3379 % off and bars the use", () => {
    const sound = soundSpeedMPerS({ kind: "water" }, input.fluid_temp_C);
    const shown = (displayedMPerS: number) =>
      soundSpeedVerdict({ displayedMPerS, fluidC: input.fluid_temp_C }, sound)[0];
    const [near, far] = input.displayed_sound_speed_m_s;
    expect(shown(near)).toMatchObject({ weight: "fine", code: "soundSpeedPlausible" });
    expect(shown(far)).toMatchObject({
      weight: "stop",
      code: "soundSpeedImplausible",
      adds: { kind: "block", blocks: "use" },
    });
    expectClose(shown(near)?.values["deviationPercent"] as number, expected["dev_1449_pct"]);
    expectClose(shown(far)?.values["deviationPercent"] as number, expected["dev_1389_pct"]);
    expectClose(
      shown(near)?.values["expectedMPerS"] as number,
      expected["sound_speed_expected_m_s"],
    );
  });

  test("the nominal bore in the meter reads 1.3837 % low, and the zero left is 0.012 m/s wide", () => {
    const [bore] = of("bore");
    expect(bore?.code).toBe("boreEnteredDiffers");
    const ratio = expected["flow_ratio_true_over_indicated_if_nominal_bore_was_entered"]!;
    expectClose(1 + (bore?.values["flowPercent"] as number) / 100, ratio);
    expect(of("zero")[0]?.code).toBe("zeroReadingLeft");
    const zero = budget.terms.find((term) => term.kind === "zero");
    expect(zero).toMatchObject({ given: 0.012, unit: "m/s" });
  });
});

// S04: a permanent meter against a portable one, then an outage the portable stands in for.
describe("a permanent meter of class 2 against a portable one", () => {
  const input = readJson("test/fixtures/scenarios/S04/input.json") as {
    perm_register_kWh: [number, number];
    portable_kWh: number;
    portable_U_pct_k2: number;
    perm_class: MeterClass;
    q_over_qp: number;
    mean_dT_K: number;
    dTmin_K: number;
    case2_portable_kWh: number;
    outage_h: number;
    portable_cover_h: number;
    portable_cover_kWh: number;
    hdh_cover_Kh: number;
    hdh_missing_Kh: number;
  };
  const expected = readJson("test/fixtures/scenarios/S04/expected.json") as Record<string, number>;
  const limits = meterLimits({
    meterClass: input.perm_class,
    flowRatio: input.q_over_qp,
    deltaTK: input.mean_dT_K,
    deltaTMinK: input.dTmin_K,
  })!;
  const permanentKwh = input.perm_register_kWh[1] - input.perm_register_kWh[0];
  const permanent = {
    value: permanentKwh,
    expanded: (expandedFromLimitsPercent(limits) / 100) * permanentKwh,
  };
  const portable = (value: number) => ({
    value,
    expanded: (input.portable_U_pct_k2 / 100) * value,
  });

  test("its limits as a rectangle give ± 4.272153 %", () => {
    expectClose(limits.flowPercent, expected["mpe_flow_pct"]);
    expectClose(limits.pairPercent, expected["mpe_pair_pct"]);
    expectClose(limits.calculatorPercent, expected["mpe_calc_pct"]);
    expectClose(limits.totalPercent, expected["mpe_total_pct"]);
    expectClose(expandedFromLimitsPercent(limits), expected["U_perm_pct_k2"]);
    expectClose(permanent.expanded, expected["U_perm_kWh"]);
  });

  test("2511.6 kWh agrees, 2781.0 kWh does not", () => {
    const found = agreement(portable(input.portable_kWh), permanent);
    expectClose(portable(input.portable_kWh).expanded, expected["U_port_kWh"]);
    expectClose(found.difference, expected["difference_kWh"]);
    expectClose(found.differencePercent, expected["difference_pct_of_perm"]);
    expectClose(found.en, expected["En"]);
    expect(found.code).toBe("agree");
    const second = agreement(portable(input.case2_portable_kWh), permanent);
    expectClose(second.en, expected["En_case2"]);
    expect(second.code).toBe("disagree");
  });

  test("the portable stands in for 61.25 h, degree-hours for the rest, and both keep their label", () => {
    const found = standIn({
      hours: input.outage_h,
      coveredHours: input.portable_cover_h,
      coveredKwh: input.portable_cover_kWh,
      degreeHours: { covered: input.hdh_cover_Kh, missing: input.hdh_missing_Kh },
    });
    expect(found?.parts.map((part) => part.code)).toEqual([
      "substitutedPortable",
      "estimatedDegreeHours",
    ]);
    expectClose(found?.parts[0]?.energyKwh, expected["standin_measured_kWh"]);
    expectClose(found?.parts[1]?.energyKwh, expected["standin_estimated_kWh"]);
    expectClose(found?.parts[1]?.hours, expected["standin_estimated_h"]);
    expectClose(found?.totalKwh, expected["standin_total_kWh"]);
    expectClose(found?.estimatedPercent, expected["share_estimated_pct"]);
  });
});
