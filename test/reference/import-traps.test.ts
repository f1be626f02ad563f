import { importBytes, type ImportedText, type SaidOfFile } from "@test/generators/import-text";
import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { clockOff } from "@shared/domain/readings/checks/clock-notes";
import { hampelSpikes } from "@shared/domain/readings/checks/hampel-spikes";
import { noFlowNoise } from "@shared/domain/readings/checks/no-flow-noise";
import { reversedFlow } from "@shared/domain/readings/checks/reversed-flow";
import { stepChanges } from "@shared/domain/readings/checks/step-change";
import { stuckChannels } from "@shared/domain/readings/checks/stuck-channel";
import { swappedSides } from "@shared/domain/readings/checks/swapped-sides";
import { unitPlausibility } from "@shared/domain/readings/checks/unit-plausibility";
import { counterMeans, NO_COUNTER_FACTS } from "@shared/domain/readings/counter-steps";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";

/*
 * The ways in which a logger's file misleads, each as a file named for its defect, and what an import
 * says, asks or keeps of it. Nothing is averaged, filled, clipped, flipped or moved unsaid: a file
 * whose trap is not met gives the same rows with no step beside them.
 */
const BORE_MM = 102.26;
const UTC: SaidOfFile = { clock: { kind: "utc" } };
const PARIS: SaidOfFile = { clock: { kind: "site" }, zone: "Europe/Paris" };

const read = (name: string, said: SaidOfFile = UTC): ImportedText =>
  importBytes(readLogFixture(name), said);

const segmentOf = (name: string): ReadingSegment => {
  const { segment } = read(name);
  if (segment === null) throw new Error(`${name} asks something`);
  return segment;
};

const stepsOf = (found: ImportedText): Record<string, number> =>
  Object.fromEntries(found.resolved.steps.map(({ code, count }) => [code, count]));

const column = (index: number, change: Partial<FileRecipe["columns"][number]>) => ({
  ...UTC,
  recipe: (recipe: FileRecipe): FileRecipe => ({
    ...recipe,
    columns: recipe.columns.map((own) => (own.index === index ? { ...own, ...change } : own)),
  }),
});

const rounded = (values: ArrayLike<number> | null | undefined, digits = 6) =>
  Array.from(values ?? [], (value) => Number(value.toFixed(digits)));

interface Trap {
  readonly trap: string;
  readonly file: string;
  readonly check: (file: string) => void;
}

const traps: readonly Trap[] = [
  {
    trap: "1 separator, quotes and encoding are recognised from the bytes",
    file: "ok/am-pm-split-quoted.csv",
    check(file) {
      const { dialect } = read(file).recognition.recipe;
      expect(dialect).toMatchObject({ separator: ",", quote: '"', encoding: "utf-8" });
      expect(read("ok/windows-1252.csv").recognition.recipe.dialect.encoding).toBe("windows-1252");
    },
  },
  {
    trap: "1 a short row is listed and never dropped unsaid",
    file: "not-ok/damaged-rows.csv",
    check: (file) => expect(stepsOf(read(file))).toHaveProperty("shortRows"),
  },
  {
    trap: "1 two readings that a separator could have cut in two are told from it",
    file: "not-ok/readings-look-like-offsets.txt",
    check(file) {
      const { recipe } = read(file).recognition;
      expect(recipe.dialect.separator).toBe(" ");
      expect(recipe.columns.map(({ meaning }) => meaning)).toEqual([
        "date",
        "timeOfDay",
        "outdoor",
        "electricPower",
      ]);
      expect(rounded(read(file).segment!.columns.outdoorC)).toEqual([-5.6, -4.1, -4.7, -3.8]);
    },
  },
  {
    trap: "2 two decimal marks in one column are asked about",
    file: "not-ok/mark-mixed-in-one-column.csv",
    check: (file) => expect(read(file).asked).toContain("decimalMark"),
  },
  {
    trap: "3 a row of units and names above it are no readings",
    file: "ok/several-header-rows.csv",
    check(file) {
      const { recognition, resolved } = read(file);
      expect(recognition.recipe.dialect).toMatchObject({ headerLine: 3, unitsLine: 4 });
      expect(resolved.counts.read).toBe(recognition.dataRowCount);
    },
  },
  {
    trap: "3 a serial number above the header is no day",
    file: "not-ok/serial-number-looks-like-a-day.csv",
    check(file) {
      const { recognition } = read(file);
      expect(recognition.recipe.dialect.firstDataLine).toBe(3);
      expect(recognition.dataRowCount).toBe(4);
    },
  },
  {
    trap: "4 an order of day and month that nothing proves is asked",
    file: "not-ok/both-orders-fit.csv",
    check(file) {
      const order = (recipe: FileRecipe): FileRecipe => ({
        ...recipe,
        time: { ...recipe.time, format: { kind: "calendar", order: "dayMonthYear" } },
      });
      expect(read(file, { ...UTC, recipe: order }).asked).toContain("dateOrder");
    },
  },
  {
    trap: "4 a year of two digits is asked for, and said to be of this century",
    file: "not-ok/two-digit-year.csv",
    check(file) {
      const order = (recipe: FileRecipe): FileRecipe => ({
        ...recipe,
        time: { ...recipe.time, format: { kind: "calendar", order: "yearMonthDay" } },
      });
      const { asked, recognition } = read(file, { ...UTC, recipe: order });
      expect(asked).toContain("dateOrder");
      expect(recognition.proofs).toContainEqual(
        expect.objectContaining({ about: "century", certainty: "likely", cell: "11/10/12 08:00" }),
      );
    },
  },
  {
    trap: "5 minutes past midnight with AM are not noon, and 24:00 is the next day's start",
    file: "ok/am-pm-split-quoted.csv",
    check(file) {
      const first = new Date(read(file).segment!.columns.instantMs[0]!);
      expect(first.toISOString()).toBe("2025-07-15T00:05:00.000Z");
      const midnight = new Date(read("ok/midnight-as-24.csv").segment!.columns.instantMs[1]!);
      expect(midnight.toISOString()).toBe("2025-07-16T00:00:00.000Z");
    },
  },
  {
    trap: "6 both passes of the repeated hour are kept, by the order of their rows",
    file: "not-ok/autumn-hour-repeated.csv",
    check(file) {
      const found = read(file, PARIS);
      expect(stepsOf(found)).toHaveProperty("repeatedHour");
      expect(found.resolved.counts.leftOut).toBe(0);
      expect(found.asked).toContain("loggerClock");
    },
  },
  {
    trap: "6 a logger that stays on winter time has no hour missing",
    file: "not-ok/winter-time-all-year.csv",
    check(file) {
      const asSite = read(file, PARIS);
      expect(stepsOf(asSite)).toEqual({ missingHour: 2 });
      const winter = read(file, { clock: { kind: "siteStandard" }, zone: "Europe/Paris" });
      expect(stepsOf(winter)).toEqual({});
      const { instantMs } = winter.segment!.columns;
      const steps = [...instantMs].slice(1).map((ms, i) => ms - instantMs[i]!);
      expect(new Set(steps)).toEqual(new Set([1_800_000]));
      expect(new Date(instantMs[0]!).toISOString()).toBe("2026-03-28T23:00:00.000Z");
    },
  },
  {
    trap: "7 a local time that never was is left out and listed, not moved",
    file: "not-ok/spring-hour-missing.csv",
    check(file) {
      const found = read(file, PARIS);
      expect(stepsOf(found)).toHaveProperty("missingHour");
      expect(found.resolved.counts.leftOut).toBeGreaterThan(0);
    },
  },
  {
    trap: "8 identical repeats are dropped with a count",
    file: "not-ok/duplicates-identical.csv",
    check(file) {
      expect(stepsOf(read(file))).toEqual({ identicalRepeats: 2 });
      expect(read(file).resolved.counts).toMatchObject({ read: 14, kept: 12 });
    },
  },
  {
    trap: "8 conflicting repeats are asked about, and the last does not win by itself",
    file: "not-ok/duplicates-conflicting.csv",
    check(file) {
      const { segment, resolved } = read(file);
      expect(segment).toBeNull();
      expect(resolved.questions.map(({ code }) => code)).toEqual(["conflictingRepeats"]);
    },
  },
  {
    trap: "9 an older stretch behind a younger one is sorted and shown as a block",
    file: "not-ok/older-rows-behind.csv",
    check(file) {
      const found = read(file);
      const step = found.resolved.steps.find(({ code }) => code === "outOfOrder");
      expect(step).toMatchObject({ count: 12, countByKind: { block: 12 } });
      const { instantMs } = found.segment!.columns;
      expect([...instantMs]).toEqual([...instantMs].sort((a, b) => a - b));
    },
  },
  {
    trap: "10 a clock that was slow is found from the notes, and nothing is moved by it",
    file: "not-ok/clock-five-minutes-slow.csv",
    check(file) {
      const segment = segmentOf(file);
      const loggerMs = segment.columns.instantMs[0]!;
      const found = clockOff(segment, [{ loggerMs, referenceMs: loggerMs + 300_000 }]);
      expect(found).toMatchObject({ code: "clockOff" });
      expect(found!.choices.map(({ change }) => change)).toEqual(
        expect.arrayContaining(["clock", "keep"]),
      );
      expect(clockOff(segment, [])).toBeNull();
    },
  },
  {
    trap: "11 words and numbers for no reading are counted and never zero",
    file: "not-ok/sentinels.csv",
    check(file) {
      const found = read(file);
      const step = found.resolved.steps.find(({ code }) => code === "sentinels");
      expect(Object.keys(step?.countByKind ?? {}).length).toBeGreaterThan(1);
      const flow = found.resolved.original.find(({ meaning }) => meaning === "flow")!.values;
      expect([flow[1], flow[2]]).toEqual([NaN, NaN]);
    },
  },
  {
    trap: "12 a counter that starts again is a rollover only where its capacity says so",
    file: "not-ok/counter-rolls-over.csv",
    check(file) {
      const { columns } = segmentOf(file);
      const steps = (capacity: number | null) =>
        counterMeans(columns, "instantaneous", 3_600_000, {
          ...NO_COUNTER_FACTS,
          volume: { capacity, mostPerHour: 50 },
          gapFactor: 3,
        });
      expect(rounded(steps(10_000).columns.flowM3PerHour)).toEqual([NaN, 1.4, 1.3, 1.2]);
      expect(steps(null).events.map(({ kind }) => kind)).toEqual(["reset"]);
      expect(rounded(steps(null).columns.flowM3PerHour)[2]).toBeNaN();
    },
  },
  {
    trap: "13 pulses wait for their worth, which is never assumed",
    file: "not-ok/pulses-without-worth.csv",
    check(file) {
      const open = read(file);
      expect(open.asked).toContain("pulseValue");
      expect(open.segment).toBeNull();
      const found = read(file, column(1, { unit: "L", pulseValue: 25 }));
      expect(stepsOf(found)).toEqual({ pulsesToFlow: 5, pulseOpening: 1 });
      expect(rounded(found.segment!.columns.flowM3PerHour)).toEqual([NaN, 1.2, 0.7, 0, 0.9, 1.1]);
    },
  },
  {
    trap: "14 means of a step that no header names are asked about",
    file: "not-ok/means-of-unknown-step.csv",
    check: (file) => expect(read(file).asked).toEqual(["seriesKind"]),
  },
  {
    trap: "14 a rising volume is a counter and no rate",
    file: "not-ok/counter-rolls-over.csv",
    check(file) {
      expect(read(file).recognition.recipe.columns[1]).toMatchObject({ meaning: "volumeCounter" });
      expect(segmentOf(file).columns.flowM3PerHour).toBeNull();
    },
  },
  {
    trap: "15 temperatures are drawn to the flow's instants between two readings, never beyond them",
    file: "not-ok/temperatures-every-five-minutes.csv",
    check(file) {
      const [flow, temperatures] = [segmentOf("ok/flow-every-minute.csv"), segmentOf(file)];
      const [segment] = resolveSegments([
        { ...flow, precedence: 1 },
        { ...temperatures, precedence: 2 },
      ]);
      expect(rounded(segment!.columns.supplyC).slice(0, 6)).toEqual([
        20, 20.2, 20.4, 20.6, 20.8, 21,
      ]);
      const cut = {
        ...temperatures.columns,
        instantMs: temperatures.columns.instantMs.slice(0, 2),
      };
      const short = {
        ...cut,
        supplyC: cut.supplyC!.slice(0, 2),
        returnC: cut.returnC!.slice(0, 2),
        quality: cut.quality.slice(0, 2),
      };
      const [ended] = resolveSegments([
        { ...flow, precedence: 1 },
        { ...temperatures, columns: short, precedence: 2 },
      ]);
      expect(ended!.columns.supplyC![6]).toBeNaN();
    },
  },
  {
    trap: "16 swapped sides stop the import; the choices swap the whole file",
    file: "not-ok/supply-return-swapped.csv",
    check(file) {
      const found = swappedSides(segmentOf(file), { service: "cooling", boreMm: BORE_MM });
      expect(found).toMatchObject({ code: "swappedSides", weight: "stop" });
      expect(found!.choices.map(({ change }) => change)).toContain("swapSides");
      expect(swappedSides(segmentOf(file), { service: "heating", boreMm: BORE_MM })).toBeNull();
    },
  },
  {
    trap: "17 steady negative flow is one sign for the visit, never the size of each row",
    file: "not-ok/flow-negative.csv",
    check(file) {
      const segment = segmentOf(file);
      const [found] = reversedFlow(segment, { boreMm: BORE_MM });
      expect(found).toMatchObject({ code: "reversedFlow", weight: "stop" });
      expect([...segment.columns.flowM3PerHour!].every((flow) => flow < 0)).toBe(true);
    },
  },
  {
    trap: "18 gallons of another country are no US gallons",
    file: "not-ok/imperial-gallons.csv",
    check: (file) => expect(read(file).asked).toContain("flowUnit"),
  },
  {
    trap: "18 temperatures that fit two units are asked about",
    file: "not-ok/temperature-fits-two-units.csv",
    check: (file) => expect(read(file).asked).toContain("temperatureUnit"),
  },
  {
    trap: "18 water speed becomes flow with the point's bore, and waits for one",
    file: "ok/water-speed-feet.csv",
    check(file) {
      const open = read(file);
      expect(open.resolved.questions).toEqual([{ code: "pointBore", columnIndex: 1 }]);
      const bores = [{ fromMs: 0, toMs: null, insideDiameterMm: BORE_MM }];
      const found = read(file, { ...UTC, facts: { bores } });
      // 3.2808399 ft/s is 1 m/s, and 1 m/s in NPS 4 schedule 40 is 29.5668 m³/h.
      expect(found.segment!.columns.flowM3PerHour![0]).toBeCloseTo(29.5668, 3);
      expect(stepsOf(found)).toEqual({ velocityTimesBore: 4 });
      const [unit] = unitPlausibility(found.segment!, {
        boreMm: BORE_MM,
        designFlowM3PerHour: null,
        service: "cooling",
        flowUnit: null,
      });
      expect(unit).toBeUndefined();
    },
  },
  {
    trap: "19 a channel that stands still while the load moves is found",
    file: "not-ok/return-stuck.csv",
    check(file) {
      const [found] = stuckChannels(segmentOf(file), { designDeltaTK: null });
      expect(found).toMatchObject({ channel: "returnC", figures: { readings: 40, value: 12.31 } });
    },
  },
  {
    trap: "20 one impossible flow is found, its neighbours are not",
    file: "not-ok/one-spike.csv",
    check(file) {
      const segment = segmentOf(file);
      const [found] = hampelSpikes(segment, { boreMm: BORE_MM });
      expect(found).toMatchObject({ channel: "flowM3PerHour", rows: [{ from: 31, to: 32 }] });
      expect(segment.columns.flowM3PerHour![31]).toBe(412);
    },
  },
  {
    trap: "21 a hole stays a hole and is shown",
    file: "not-ok/hole-of-two-hours.csv",
    check(file) {
      const { gaps, counts } = read(file).resolved;
      expect(gaps).toMatchObject([{ missingRows: 8 }]);
      expect(counts).toMatchObject({ kept: 40, expected: 48, missing: 8 });
    },
  },
  {
    trap: "22 noise at standstill is shown with a cut-off, and not deleted",
    file: "not-ok/noise-at-standstill.csv",
    check(file) {
      const segment = segmentOf(file);
      const limits = { boreMm: BORE_MM, flowCutOffM3PerHour: null };
      expect(noFlowNoise(segment, limits)).toMatchObject({ code: "noFlowNoise" });
      expect(segment.columns.instantMs).toHaveLength(96);
    },
  },
  {
    trap: "23 a probe strapped on anew splits the log where it jumps",
    file: "not-ok/probe-strapped-again.csv",
    check(file) {
      const segment = segmentOf(file);
      const found = stepChanges(segment, { boreMm: BORE_MM }).find(
        ({ channel }) => channel === "returnC",
      );
      const split = found?.choices.find(({ change }) => change === "split");
      expect(split).toMatchObject({ atMs: segment.columns.instantMs[136] });
    },
  },
  {
    trap: "24 a second download that overlaps counts each row once",
    file: "not-ok/second-download-overlaps.csv",
    check(file) {
      const sources = [segmentOf("ok/first-download.csv"), segmentOf(file)].map(
        (segment, precedence) => ({ ...segment, precedence }),
      );
      const [segment, ...others] = resolveSegments(sources);
      expect(others).toEqual([]);
      expect(segment!.columns.instantMs).toHaveLength(24);
    },
  },
  {
    trap: "words for a bad reading are for somebody to name",
    file: "not-ok/status-words.csv",
    check(file) {
      const open = read(file);
      expect(open.asked).toEqual(["statusWords"]);
      const found = read(file, column(4, { badWords: ["Fehler"] }));
      expect(stepsOf(found)).toEqual({ badStatus: 2 });
      expect(found.resolved.counts).toMatchObject({ measured: 6, excluded: 2 });
      expect(stepsOf(read(file, column(4, { badWords: [] })))).toEqual({});
    },
  },
  {
    trap: "two columns of one name are asked about",
    file: "not-ok/two-columns-one-name.csv",
    check: (file) => expect(read(file).asked).toEqual(["alikeColumns"]),
  },
  {
    trap: "columns of two points are told apart, and whose is asked",
    file: "not-ok/two-points.csv",
    check(file) {
      const { asked, recognition } = read(file);
      expect(asked).toEqual(["whichSet"]);
      expect(recognition.pointSets?.map(({ name }) => name)).toEqual(["ch 1", "ch 2"]);
      expect(recognition.recipe.columns.slice(1).every(({ meaning }) => meaning === "skip")).toBe(
        true,
      );
    },
  },
  {
    trap: "companion series are read beside the readings",
    file: "ok/companions.csv",
    check(file) {
      const { asked, segment } = read(file);
      expect(asked).toEqual([]);
      expect(rounded(segment!.columns.outdoorC)).toEqual([14.5, 15.5, 16.5, 17.5]);
      expect(rounded(segment!.columns.pressureKpa)).toEqual([240, 240, 240, 240]);
    },
  },
];

it.each(traps.map((each) => [each.trap, each] as const))("trap %s", (_, { file, check }) => {
  check(file);
});
