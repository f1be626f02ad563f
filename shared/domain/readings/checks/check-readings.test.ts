import * as fc from "fast-check";
import {
  cleanSeries,
  withoutRows,
  withValues,
  type CleanPlan,
} from "@test/generators/clean-series";
import { DAY_MS, MINUTE_MS } from "../../time/interval";
import { exclude } from "../corrections/exclude";
import { rowsInSpan } from "../corrections/correction-span";
import { RowQuality, type ReadingSegment } from "../reading-columns";
import { checkFile, checkSeries, type FileContext, type SeriesContext } from "./check-readings";

const plans: fc.Arbitrary<CleanPlan> = fc.record({
  seed: fc.nat(1_000_000),
  rows: fc.integer({ min: 300, max: 2500 }),
  stepMs: fc.constantFrom(1, 5, 15).map((minutes) => minutes * MINUTE_MS),
  service: fc.constantFrom("cooling" as const, "heating" as const),
  boreMm: fc.constantFrom(52.5, 102.26, 202.74),
  kind: fc.constantFrom("instantaneous", "meanFromLabel", "meanToLabel"),
  runsAllNight: fc.boolean(),
});

const contextOf = (plan: CleanPlan): FileContext & SeriesContext => ({
  service: plan.service,
  boreMm: plan.boreMm,
  designFlowM3PerHour: null,
  designDeltaTK: null,
  flowCutOffM3PerHour: null,
  zeroUncertaintyMPerS: null,
  flowUnit: "m3/h",
  temperatureUnit: "degC",
  latestMs: Date.UTC(2026, 0, 1),
  clockNotes: [],
  hasTwoClocks: true,
});

// One seed, so that a run repeats.
fc.configureGlobal({ seed: 20_261_201 });

const checked = (segment: ReadingSegment, context: FileContext & SeriesContext) => {
  const [file, series] = [checkFile(segment, context), checkSeries(segment, context)];
  return {
    findings: [...file.findings, ...series.findings],
    notChecked: [...file.notChecked, ...series.notChecked],
  };
};

const codesOf = (segment: ReadingSegment, plan: CleanPlan) =>
  checked(segment, contextOf(plan)).findings.map(({ code }) => code);

/** Weekday mornings after the start, where pump and temperatures have settled. */
const settled = (plan: CleanPlan) => {
  const series = cleanSeries(plan);
  const day = Math.floor(DAY_MS / plan.stepMs);
  const row = Math.floor((9 / 24) * day);
  return { series, row, day, holds: series.columns.instantMs.length > row + 60 };
};

it("finds nothing in series without a defect", () => {
  fc.assert(
    fc.property(plans, (plan) => {
      expect(codesOf(cleanSeries(plan), plan)).toEqual([]);
    }),
    { numRuns: 60 },
  );
});

it("finds planted spikes at exactly their rows, and excluding them leaves nothing to find", () => {
  fc.assert(
    fc.property(
      plans,
      fc.constantFrom("flowM3PerHour" as const, "supplyC" as const, "returnC" as const),
      fc.uniqueArray(fc.nat(2), { minLength: 1, maxLength: 3 }),
      (plan, channel, places) => {
        const { series, row, holds } = settled(plan);
        fc.pre(holds);
        const rows = places.map((place) => row + 15 * place).sort((a, b) => a - b);
        const spiked = withValues(series, channel, (value, r) =>
          rows.includes(r) ? (channel === "flowM3PerHour" ? value * 12 : value + 47) : value,
        );
        const { findings } = checked(spiked, contextOf(plan));
        expect(findings.map(({ code }) => code)).toEqual(["spikes"]);
        expect(findings[0]!.channel).toBe(channel);
        expect(findings[0]!.rows).toEqual(rows.map((r) => ({ from: r, to: r + 1 })));
        const [choice] = findings[0]!.choices;
        const spans = choice!.change === "exclude" ? choice!.spans : [];
        const repaired = spans.reduce((segment, span) => exclude(segment, span, null), spiked);
        expect(
          [...repaired.columns.quality.keys()].filter(
            (r) => repaired.columns.quality[r] === RowQuality.excluded,
          ),
        ).toEqual(rows);
        expect(codesOf(repaired, plan)).toEqual([]);
      },
    ),
    { numRuns: 25 },
  );
});

it("finds a planted stuck probe at exactly its rows", () => {
  fc.assert(
    fc.property(plans, fc.integer({ min: 32, max: 200 }), (plan, length) => {
      const series = cleanSeries({ ...plan, rows: plan.rows + 1500, stepMs: 15 * MINUTE_MS });
      const from = 96 + 40;
      const held = series.columns.returnC![from]!;
      const stuck = withValues(series, "returnC", (value, row) =>
        row >= from && row < from + length ? held : value === held ? value + 0.01 : value,
      );
      const finding = checked(stuck, contextOf(plan)).findings.find(
        ({ code }) => code === "stuckChannel",
      );
      expect(finding).toMatchObject({ channel: "returnC", rows: [{ from, to: from + length }] });
    }),
    { numRuns: 25 },
  );
});

it("finds swapped sides, turned flow and the wrong unit, each alone and as a whole", () => {
  fc.assert(
    fc.property(plans, fc.constantFrom("swap", "turn", "unit"), (plan, defect) => {
      fc.pre(plan.rows * plan.stepMs > DAY_MS / 2);
      const series = cleanSeries(plan);
      const { supplyC, returnC } = series.columns;
      const broken =
        defect === "swap"
          ? { ...series, columns: { ...series.columns, supplyC: returnC, returnC: supplyC } }
          : withValues(series, "flowM3PerHour", (value) =>
              defect === "turn" ? 0 - value : value * 60,
            );
      const { findings } = checked(broken, contextOf(plan));
      const codes = findings.filter(({ weight }) => weight === "stop").map(({ code }) => code);
      expect(codes).toEqual([
        { swap: "swappedSides", turn: "reversedFlow", unit: "flowUnit" }[defect],
      ]);
      expect(findings[0]!.rows).toEqual([{ from: 0, to: plan.rows }]);
    }),
    { numRuns: 25 },
  );
});

it("finds a probe strapped on again at exactly its row", () => {
  fc.assert(
    fc.property(
      plans,
      fc.double({ min: 0.8, max: 4, noNaN: true }),
      fc.constantFrom(-1, 1),
      (plan, size, sign) => {
        const series = cleanSeries({ ...plan, rows: 96 * 5, stepMs: 15 * MINUTE_MS });
        const at = 96 * 2 + 45;
        const moved = withValues(series, "returnC", (value, row) =>
          row >= at ? value + sign * size : value,
        );
        const steps = checked(moved, contextOf(plan)).findings.flatMap((finding) =>
          finding.code === "stepChange" ? [finding] : [],
        );
        expect(steps).toMatchObject([{ channel: "returnC", rows: [{ from: at, to: at + 1 }] }]);
        expect(steps[0]!.figures.step / (sign * size)).toBeCloseTo(1, 0);
      },
    ),
    { numRuns: 25 },
  );
});

it("does not mind the signal, the year, or rows that are already left out", () => {
  fc.assert(
    fc.property(plans, fc.integer({ min: -3000, max: 250 }), fc.nat(299), (plan, days, row) => {
      const series = cleanSeries(plan);
      const quality = series.columns.quality.slice();
      quality[row] = RowQuality.excluded;
      const flowM3PerHour = series.columns.flowM3PerHour!.slice();
      flowM3PerHour[row] = 9999;
      const columns = {
        ...series.columns,
        instantMs: series.columns.instantMs.map((ms) => ms + days * DAY_MS),
        signalPercent: new Float64Array(plan.rows).fill(days),
        flowM3PerHour,
        quality,
      };
      expect(codesOf({ ...series, columns }, plan)).toEqual([]);
    }),
    { numRuns: 25 },
  );
});

it("gives spans that hold exactly the rows of a finding, however rows are labelled", () => {
  fc.assert(
    fc.property(
      plans,
      fc.uniqueArray(fc.nat(250), { minLength: 1, maxLength: 40 }),
      (plan, picked) => {
        const series = withoutRows(cleanSeries({ ...plan, runsAllNight: true }), (row) =>
          picked.includes(row),
        );
        const noisy = withValues(series, "flowM3PerHour", (value, row) =>
          row % 7 < 3 ? 0.001 : value,
        );
        const finding = checked(noisy, contextOf(plan)).findings.find(
          ({ code }) => code === "noFlowNoise",
        );
        expect(finding!.rows.length).toBeGreaterThan(20);
        expect(finding!.spans.map((span) => rowsInSpan(noisy, span))).toEqual(finding!.rows);
      },
    ),
    { numRuns: 25 },
  );
});

it("says what it could not check", () => {
  const plan = { ...contextOf({ boreMm: 100, service: "cooling" } as CleanPlan), boreMm: null };
  const series = cleanSeries();
  expect(checked(series, plan).notChecked).toEqual([
    { check: "spikes", lacks: "boreMm" },
    { check: "flowUnit", lacks: "boreMm" },
    { check: "clockOff", lacks: "clockNotes" },
    { check: "noFlowNoise", lacks: "boreMm" },
  ]);
  const columns = { ...series.columns, flowM3PerHour: null, returnC: null };
  const bare = checked({ ...series, columns }, { ...plan, service: "changeover" });
  expect(bare.findings).toEqual([]);
  expect(bare.notChecked.map(({ check, lacks }) => `${check} ${lacks}`)).toEqual([
    "clockOff clockNotes",
    "negativeFlow flow",
    "swappedSides flow",
    "swappedSides temperatures",
    "swappedSides oneService",
    "stuckChannel companion",
    "stepChange companion",
  ]);
});

it("takes an empty series for one without defects", () => {
  const context = contextOf({ boreMm: 100, service: "heating" } as CleanPlan);
  expect(checked(cleanSeries({ rows: 0 }), context).findings).toEqual([]);
  expect(checked(cleanSeries({ rows: 1 }), context).findings).toEqual([]);
});
