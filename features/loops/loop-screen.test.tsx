import { fireEvent, screen, waitFor, within } from "@testing-library/react";

import type { PointSummary, SeriesAnswer } from "@shared/contracts/energy";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import { SAMPLE_WORKINGS } from "@shared/workings/sample-workings";
import { packNumbers } from "@shared/domain/readings/packed-numbers";
import {
  loopOf,
  openWith,
  pointOf,
  sent,
  serverAnswers,
  serverIsSilent,
  serverRefuses,
  show,
  siteOf,
  visited,
} from "@features/places/test-kit";

import { LoopScreen } from "./loop-screen";

// The drawing part is behind one door, which a test of the page keeps shut.
jest.mock("@features/charts/plot-door", () => ({
  usePlotDoor: () => ({ Plot: null, failed: false, retry: () => undefined }),
}));
// jsdom has no layout; a chart waits for its width.
jest.mock("@features/ui/theme/use-measured-width", () => ({
  useMeasuredWidth: () => [806, () => undefined],
}));

const week = "from=2026-05-11&to=2026-05-18";
const from = "2026-05-10T23:00:00.000Z";
const to = "2026-05-17T23:00:00.000Z";

const register = (energyKwh: number, deltaT: number | null) => ({
  energyKwh,
  volumeM3: energyKwh / 5.68,
  runningS: energyKwh > 0 ? 590_000 : 0,
  flowWeightedDeltaTK: deltaT,
  energyWeightedDeltaTK: deltaT && deltaT + 0.2,
  timeMeanDeltaTK: deltaT && deltaT - 0.6,
});

/** A ± as the server gives it beside a figure. */
const plusMinus = (expanded: number): PlusMinus => ({
  expanded,
  percent: 3.3,
  basis: "evidence",
});

function summaryOf(more: Partial<PointSummary> = {}): PointSummary {
  return {
    zone: "Europe/London",
    from,
    to,
    basis: {
      engineVersion: 1,
      pressure: { absoluteMPa: 1.6, assumed: true },
      meterSide: "return",
      fluid: { kind: "water" },
      liquidC: { lowest: 0, highest: 150 },
      blockedBy: null,
      meansOnly: false,
      rowsAgainstRegister: 0,
      recalculating: false,
    },
    plusMinus: {
      heating: { energy: null, deltaT: null },
      cooling: { energy: plusMinus(498.7), deltaT: plusMinus(0.13) },
      volume: plusMinus(51),
      lacks: null,
    },
    totals: {
      heating: register(0, null),
      cooling: register(14_940, 4.87),
      volumeM3: 2630,
      suppressedKwh: 0,
      suppressedS: 0,
      coveredS: 596_220,
      expectedS: 604_800,
      coverage: 0.9858,
      rows: { measured: 9937, excluded: 37, noReading: 0, expected: 10_080 },
      apportioned: false,
      filled: null,
    },
    days: Array.from({ length: 7 }, (_, i) => ({
      date: `2026-05-${11 + i}`,
      heatingKwh: 0,
      coolingKwh: 2000 + i,
      volumeM3: 370,
      coveredS: 86_400,
      lengthS: 86_400,
      plusMinus: { heating: null, cooling: plusMinus(86) },
    })),
    busiest: {
      from: "2026-05-14T14:30:00.000Z",
      to: "2026-05-14T15:00:00.000Z",
      supplyC: 6.59,
      returnC: 12.65,
      flowM3PerHour: 35.1,
      deltaTK: 6.06,
      powerKw: 247.8,
      plusMinus: plusMinus(7.7),
      register: "cooling",
    },
    busiestDay: { date: "2026-05-14", energyKwh: 2763, plusMinus: plusMinus(86) },
    nightBase: {
      fromHour: 0,
      toHour: 5,
      powerKw: 23,
      register: "cooling",
      coverage: 1,
      plusMinus: plusMinus(1.3),
    },
    leftOut: [
      {
        kind: "excluded",
        from: "2026-05-14T21:03:00.000Z",
        to: "2026-05-14T21:41:00.000Z",
        rows: 37,
        reason: "weakSignal",
      },
    ],
    leftOutCount: 1,
    can: { correct: true },
    evidence: { installations: [], can: { record: true } },
    firstReadingAt: "2025-05-01T00:00:00.000Z",
    lastReadingAt: "2026-05-17T22:59:00.000Z",
    ...more,
  };
}

const steady = (value: number) => packNumbers(new Float64Array(336).fill(value), 1);

const series: SeriesAnswer = {
  zone: "Europe/London",
  fromMs: Date.parse(from),
  toMs: Date.parse(to),
  nominalStepS: 60,
  rows: 9974,
  averagedOverS: 1800,
  t0Ms: Date.parse(from),
  tMs: null,
  supplyC: steady(6.5),
  returnC: steady(12),
  flowM3PerHour: steady(20),
  powerKw: steady(-127.6),
  envelope: null,
  quality: [{ fromMs: Date.parse(from), toMs: Date.parse(to), kind: "measured" }],
  yExtent: { temperatureC: [6, 12], flowM3PerHour: [20, 20] },
};

const summaryCall = `GET /points/9/summary?${week}`;
const seriesCall = `GET /points/9/series?from=${encodeURIComponent(from)}&to=${encodeURIComponent(to)}&pixels=704`;

function marks(today: string, until: string) {
  return `GET /points/9/days?from=${today}&to=${until}`;
}

beforeEach(() => {
  jest.spyOn(Date, "now").mockReturnValue(Date.parse("2026-05-19T09:00:00Z"));
  openWith({ loopId: "7" });
  serverAnswers("GET /loops/7", loopOf({ tag: "CHW-1B", name: "Ropewalk House chilled water" }));
  serverAnswers("GET /loops/7/points", { items: [pointOf()] });
  serverAnswers("GET /sites/1", siteOf());
  serverAnswers(marks("2026-05-18", "2026-05-25"), {
    zone: "Europe/London",
    days: [],
    firstReadingAt: "2025-05-01T00:00:00.000Z",
    lastReadingAt: "2026-05-17T22:59:00.000Z",
  });
  serverAnswers(summaryCall, summaryOf());
  serverAnswers(seriesCall, series);
  serverAnswers("GET /imports?pointId=9&state=imported&limit=50", { items: [], nextCursor: null });
});
afterEach(() => jest.restoreAllMocks());

it("opens on the last week with readings and says how much of it they cover", async () => {
  show(<LoopScreen />);
  expect(
    await screen.findByRole("button", {
      name: /^Cooling energy, week 20: 14,940 plus or minus 500 kilowatt hours, show workings/,
    }),
  ).toBeVisible();
  expect(screen.getByText("Readings cover 165.6 of 168 h")).toBeVisible();
  expect(screen.getByText("Thu 14 May, 15:30")).toBeVisible();
  expect(screen.getByRole("button", { name: /^Night base, 00:00 to 05:00: 23.0/ })).toBeVisible();
  expect(screen.getByText(/Weak signal/)).toBeVisible();
  expect(
    screen.getByRole("button", { name: /^ΔT, .*: 4.87 plus or minus 0.13 kelvin, show workings/ }),
  ).toBeVisible();
});

it("opens a figure's workings, says so in the address, and closes them on Escape", async () => {
  const range = "from=2026-05-11&to=2026-05-18";
  serverAnswers(`GET /points/9/workings?figure=energy&${range}`, SAMPLE_WORKINGS);
  show(<LoopScreen />);
  const figure = await screen.findByRole("button", { name: /^Cooling energy/ });
  fireEvent.click(figure);
  const panel = await screen.findByRole("complementary", { name: "Workings" });
  expect(await within(panel).findByText("Where the ± comes from")).toBeVisible();
  expect(within(panel).getByText(/2,630.m³ × 1.166.kWh.*= 14,930.kWh/)).toBeVisible();
  expect(within(panel).getByText("9,937 measured, 37 excluded, 106 missing")).toBeVisible();
  expect(within(panel).getByRole("link", { name: "Open the evidence" })).toHaveAttribute(
    "href",
    "/sites/1/loops/3/points/7/evidence",
  );
  fireEvent.keyDown(panel, { key: "Escape" });
  expect(screen.queryByRole("complementary", { name: "Workings" })).toBeNull();
});

it("names the kit that measured, with its certificate in words, and what the ± stands on", async () => {
  const kit = {
    installationId: "5",
    from: "2026-02-01T09:00:00.000Z",
    to: null,
    flowMeter: { serial: "F-1", certificate: { dueOn: "2026-05-31", state: "dueSoon" } },
    meterClass: null,
    probes: { supplySerial: "T-1", returnSerial: "T-2", checkedOn: "2026-02-01" },
  } as const;
  const lapsed = {
    ...kit,
    flowMeter: { serial: "F-1", certificate: { dueOn: "2026-03-31", state: "lapsed" } },
    probes: { ...kit.probes, checkedOn: null },
  } as const;
  const can = { record: true };
  serverAnswers(summaryCall, summaryOf({ evidence: { installations: [kit], can } }));
  const { unmount } = show(<LoopScreen />);
  const list = await screen.findByRole("list", { name: "How it was measured" });
  expect(within(list).getByText("F-1")).toBeVisible();
  expect(within(list).getByText("Certificate to 31 May 2026")).toBeVisible();
  expect(within(list).getByText("T-1, T-2")).toBeVisible();
  expect(within(list).getByText("Same bath 1 Feb 2026")).toBeVisible();
  expect(screen.getByText("The ± stands on this evidence.")).toBeVisible();
  expect(screen.getByRole("link", { name: "Open the evidence" })).toHaveAttribute(
    "href",
    "/sites/1/loops/7/points/9/evidence",
  );
  unmount();
  serverAnswers(summaryCall, summaryOf({ evidence: { installations: [lapsed], can } }));
  show(<LoopScreen />);
  expect(await screen.findByText("Certificate ran out 31 Mar 2026")).toBeVisible();
  expect(screen.getByText("Never in the same bath")).toBeVisible();
});

it("says that usual values stand without evidence, with a way to record some for who may", async () => {
  serverAnswers(summaryCall, summaryOf());
  const { unmount } = show(<LoopScreen />);
  expect(await screen.findByText("No evidence yet, so usual values stand.")).toBeVisible();
  expect(screen.getByRole("link", { name: "Record an installation" })).toHaveAttribute(
    "href",
    "/sites/1/loops/7/points/9/evidence/new",
  );
  unmount();
  serverAnswers(
    summaryCall,
    summaryOf({ evidence: { installations: [], can: { record: false } } }),
  );
  const { unmount: close } = show(<LoopScreen />);
  expect(await screen.findByText("No evidence yet, so usual values stand.")).toBeVisible();
  expect(screen.queryByRole("link", { name: "Record an installation" })).toBeNull();
  close();
  serverAnswers(summaryCall, summaryOf({ evidence: null }));
  show(<LoopScreen />);
  expect(await screen.findByText("Rows left out")).toBeVisible();
  expect(screen.queryByText("How it was measured")).toBeNull();
});

it("leads from what was left out to the form that excludes or fills it, for who may", async () => {
  const [weak] = summaryOf().leftOut;
  const gap = {
    kind: "missing",
    from: "2026-05-16T01:20:00.000Z",
    to: "2026-05-16T02:11:00.000Z",
    rows: 51,
    reason: "noRows",
  } as const;
  const filled = { ...gap, kind: "filled", from: "2026-05-13T10:15:00.000Z" } as const;
  const leftOut = [filled, ...(weak ? [weak] : []), gap];
  serverAnswers(summaryCall, summaryOf({ leftOut, leftOutCount: 3 }));
  const { unmount } = show(<LoopScreen />);
  const screenOf = "/sites/1/loops/7/points/9/corrections";
  const days = "since=2026-05-11&until=2026-05-17";
  expect(
    await screen.findByRole("link", { name: "Exclude, from Thu 14 May, 22:03" }),
  ).toHaveAttribute(
    "href",
    `${screenOf}?propose=exclude&from=2026-05-14T21%3A03%3A00.000Z&to=2026-05-14T21%3A41%3A00.000Z`,
  );
  const fill = new URLSearchParams({ fill: `${gap.from}_${gap.to}` }).toString();
  expect(
    screen.getByRole("link", { name: "Fill this gap, from Sat 16 May, 02:20" }),
  ).toHaveAttribute("href", `${screenOf}?tab=fills&${days}&${fill}`);
  expect(
    screen.getByRole("link", { name: "See the fill, from Wed 13 May, 11:15" }),
  ).toHaveAttribute("href", `${screenOf}?tab=fills&${days}`);
  unmount();
  serverAnswers(summaryCall, summaryOf({ leftOut, can: { correct: false } }));
  show(<LoopScreen />);
  expect(await screen.findByRole("link", { name: /^See the fill/ })).toBeVisible();
  expect(screen.queryByRole("link", { name: /^Exclude|^Fill this gap/ })).toBeNull();
});

it("never nets a changeover loop's registers", async () => {
  serverAnswers("GET /loops/7", loopOf({ service: "changeover" }));
  const totals = {
    ...summaryOf().totals,
    heating: register(1646.25, 5),
    cooling: register(1569.19, 5),
  };
  const registers = {
    heating: { energy: plusMinus(55), deltaT: null },
    cooling: { energy: plusMinus(52), deltaT: null },
  };
  serverAnswers(
    summaryCall,
    summaryOf({ totals, plusMinus: { ...registers, volume: null, lacks: null } }),
  );
  show(<LoopScreen />);
  expect(
    await screen.findByRole("button", { name: /^Heating energy.*1,646 plus or minus 55/ }),
  ).toBeVisible();
  expect(
    screen.getByRole("button", { name: /^Cooling energy.*1,569 plus or minus 52/ }),
  ).toBeVisible();
  expect(screen.queryByText(/77/)).toBeNull();
});

it("says how long each register of a changeover loop ran, and how long neither did", async () => {
  serverAnswers("GET /loops/7", loopOf({ service: "changeover" }));
  const totals = {
    ...summaryOf().totals,
    coveredS: 86_400,
    heating: { ...register(1646.25, 5), runningS: 36_000 },
    cooling: { ...register(1569.19, 5), runningS: 34_200 },
  };
  serverAnswers(summaryCall, summaryOf({ totals }));
  show(<LoopScreen />);
  expect(
    await screen.findByText(/^Heating ran 10.h, cooling 9.h 30.min, neither 4.h 30.min\.$/),
  ).toBeVisible();
});

it("says that a permanent meter's class is not recorded, and leads to where it can be", async () => {
  const none = { energy: null, deltaT: null };
  const plusMinus = { heating: none, cooling: none, volume: null, lacks: "meterClass" } as const;
  serverAnswers(summaryCall, summaryOf({ plusMinus }));
  show(<LoopScreen />);
  expect(await screen.findByText(/^± unknown: the meter’s class is not recorded/)).toBeVisible();
  expect(screen.getByRole("link", { name: "Record it in the evidence" })).toHaveAttribute(
    "href",
    expect.stringMatching(/\/points\/\d+\/evidence/),
  );
});

it("shows energy a cut-off held back, with its time", async () => {
  const totals = { ...summaryOf().totals, suppressedKwh: 8.369, suppressedS: 15_300 };
  serverAnswers(summaryCall, summaryOf({ totals }));
  show(<LoopScreen />);
  expect(await screen.findByText(/^8.37 kWh over 4 h 15 min held back/)).toBeVisible();
});

it("stands what is filled beside the energy, never in it, and leads to the fills", async () => {
  const filled = {
    heatingKwh: 0,
    coolingKwh: 123.4,
    heatingExpandedKwh: 0,
    coolingExpandedKwh: 40,
    volumeM3: null,
    filledS: 3300,
    approvedOnly: false,
  };
  const { totals } = summaryOf();
  serverAnswers(summaryCall, summaryOf({ totals: { ...totals, filled } }));
  const { unmount } = show(<LoopScreen />);
  expect(
    await screen.findByRole("link", {
      name: /^Filled beside it: 123\s±\s40\skWh over 55\smin, proposed$/,
    }),
  ).toHaveAttribute(
    "href",
    "/sites/1/loops/7/points/9/corrections?tab=fills&since=2026-05-11&until=2026-05-17",
  );
  expect(screen.getByRole("button", { name: /^Cooling energy.*: 14,940 / })).toBeVisible();
  // The strip shows it too, so its key names it.
  expect(screen.getByText("Estimated")).toBeVisible();
  unmount();
  const approved = { ...filled, approvedOnly: true };
  serverAnswers(summaryCall, summaryOf({ totals: { ...totals, filled: approved } }));
  show(<LoopScreen />);
  expect(await screen.findByRole("link", { name: /55\smin, approved$/ })).toBeVisible();
});

it("shows a meter's energy with a dash and its reason where no water was measured", async () => {
  const { basis, totals } = summaryOf();
  const dry = { volumeM3: null, flowWeightedDeltaTK: null, energyWeightedDeltaTK: null };
  serverAnswers(
    summaryCall,
    summaryOf({
      basis: { ...basis, rowsAgainstRegister: 3 },
      totals: { ...totals, volumeM3: null, cooling: { ...totals.cooling, ...dry } },
    }),
  );
  show(<LoopScreen />);
  expect(await screen.findByRole("heading", { name: "Power of the meter" })).toBeVisible();
  expect(screen.getAllByText("Not part of a meter’s power")).toHaveLength(2);
  expect(screen.getByText(/^3 rows of the meter’s power have the other sign/)).toBeVisible();
  expect(screen.queryByText("Supply, return and flow")).toBeNull();
});

it("says in one quiet line that a logger kept only means", async () => {
  serverAnswers(summaryCall, summaryOf());
  const { unmount } = show(<LoopScreen />);
  await screen.findByText("Supply, return and flow");
  expect(screen.queryByText(/^The logger stored only means/)).toBeNull();
  unmount();
  serverAnswers(summaryCall, summaryOf({ basis: { ...summaryOf().basis, meansOnly: true } }));
  show(<LoopScreen />);
  expect(await screen.findByText(/^The logger stored only means/)).toBeVisible();
});

it("says what fills a glycol loop, where it freezes and what a weak mixture costs", async () => {
  const fluid = {
    kind: "ethyleneGlycol",
    percent: 5,
    basis: "volume",
    testedOn: "2026-03-02",
    testMethod: "refractometer",
  } as const;
  serverAnswers("GET /loops/7", loopOf({ fluid }));
  show(<LoopScreen />);
  expect(await screen.findByText("Ethylene glycol, 5 % by volume")).toBeVisible();
  expect(screen.getByText(/^Freezes at −1\.\d\s°C$/)).toBeVisible();
  expect(screen.getByText("Tested 2 Mar 2026, refractometer")).toBeVisible();
  expect(screen.getByText(/^Under 10 % by volume/)).toBeVisible();
});

it("says between which temperatures the fluid is liquid when no reading is", async () => {
  const { basis, totals } = summaryOf();
  serverAnswers(
    summaryCall,
    summaryOf({
      basis: { ...basis, blockedBy: "outsideFluid" },
      totals: { ...totals, cooling: register(0, null) },
    }),
  );
  show(<LoopScreen />);
  expect(
    await screen.findByText(/^Water is liquid and known from 0\.0\s°C to 150\.0\s°C/),
  ).toBeVisible();
});

it("gives the reason instead of an energy, and keeps the chart", async () => {
  const { basis, totals } = summaryOf();
  serverAnswers(
    summaryCall,
    summaryOf({
      basis: { ...basis, blockedBy: "concentration" },
      totals: { ...totals, cooling: register(0, null) },
      busiest: null,
      busiestDay: null,
      nightBase: null,
    }),
  );
  show(<LoopScreen />);
  expect(
    (await screen.findAllByText("The glycol percentage is outside the tables")).length,
  ).toBeGreaterThan(0);
  expect(screen.queryByText(/^0 kWh/)).toBeNull();
  expect(screen.getByRole("img", { name: /no energy/ })).toBeVisible();
});

it("moves the chart's cursor by keys and says what stands there", async () => {
  show(<LoopScreen />);
  const chart = await screen.findByRole("group", { name: /^Supply, return and flow, CHW-1B/ });
  expect(
    screen.getByRole("img", { name: /cooling 14,940\skWh. Busiest at Thu 14 May, 15:30/ }),
  ).toBeInTheDocument();
  await screen.findByText(/shown as 30 min means/);
  fireEvent.keyDown(chart, { key: "Home" });
  expect(await screen.findByText(/^Mon 11 May, 00:00: supply 6.50 °C/)).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "ArrowRight" });
  expect(await screen.findByText(/^Mon 11 May, 00:30:/)).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "PageDown" });
  expect(await screen.findByText(/^Tue 12 May, 00:30:/)).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "+" });
  fireEvent.click(await screen.findByRole("button", { name: "Exclude this span" }));
  const form = visited.push.mock.calls.at(-1)?.[0];
  const span = new URLSearchParams(form?.split("?")[1]);
  expect(span.get("propose")).toBe("exclude");
  const hours = (Date.parse(span.get("to") ?? "") - Date.parse(span.get("from") ?? "")) / 3.6e6;
  // One zoom by the key leaves 0.6 of the week's 168 h, to the minute.
  expect(hours).toBeCloseTo(100.8, 1);
  fireEvent.click(await screen.findByRole("button", { name: "Show all" }));
  await waitFor(() => expect(screen.queryByRole("button", { name: "Show all" })).toBeNull());
});

it("takes the range before from the arrow and fetches its figures", async () => {
  const before = "from=2026-05-04&to=2026-05-11";
  serverAnswers(`GET /points/9/summary?${before}`, summaryOf());
  show(<LoopScreen />);
  await screen.findByText("Week 20");
  fireEvent.click(screen.getByRole("button", { name: "Earlier" }));
  expect(await screen.findByText("Week 19")).toBeVisible();
  await waitFor(() =>
    expect(sent.map(({ call }) => call)).toContain(`GET /points/9/summary?${before}`),
  );
});

it("shows the table's days with their sum", async () => {
  openWith({ loopId: "7", week: "2026-05-11", show: "table" });
  const day = (value: number) => Array.from({ length: 7 }, () => value);
  serverAnswers(`GET /points/9/energy?${week}&step=day`, {
    zone: "Europe/London",
    from,
    to,
    basis: summaryOf().basis,
    totals: summaryOf().totals,
    plusMinus: null,
    columns: {
      startMs: Array.from({ length: 7 }, (_, i) => Date.parse(from) + i * 86_400_000),
      lengthS: day(86_400),
      coveredS: [86_400, 83_100, ...day(86_400).slice(2)],
      heatingKwh: day(0),
      coolingKwh: day(2134.3),
      volumeM3: day(375),
      meanSupplyC: day(6.4),
      meanReturnC: day(11.3),
      flowWeightedDeltaTK: day(4.9),
      suppressedKwh: day(0),
      minPowerKw: day(-240),
      maxPowerKw: day(0),
    },
  });
  show(<LoopScreen />);
  const table = await screen.findByRole("table");
  const rows = within(table).getAllByRole("row");
  expect(rows).toHaveLength(9);
  expect(rows[2]).toHaveTextContent(/^Tue 12 May.*2,134.*55 min$/);
  // Each day and their sum carry their ±.
  expect(rows[2]).toHaveTextContent(/2,134\s*± \d+/);
  expect(rows[8]).toHaveTextContent(/^Total.*14,940\s*± 500/);
});

it("says what to do where a loop has no point, and where a point has no readings", async () => {
  serverAnswers("GET /loops/7/points", { items: [] });
  const { unmount } = show(<LoopScreen />);
  expect(await screen.findByRole("heading", { name: "No metering point yet" })).toBeVisible();
  unmount();

  serverAnswers("GET /loops/7/points", { items: [pointOf()] });
  serverAnswers(marks("2026-05-18", "2026-05-25"), {
    zone: "Europe/London",
    days: [],
    firstReadingAt: null,
    lastReadingAt: null,
  });
  serverAnswers(
    "GET /points/9/summary?from=2026-05-18&to=2026-05-25",
    summaryOf({ firstReadingAt: null, lastReadingAt: null }),
  );
  show(<LoopScreen />);
  expect(await screen.findByRole("heading", { name: "No readings yet" })).toBeVisible();
  for (const link of screen.getAllByRole("link", { name: "Import a log" }))
    expect(link).toHaveAttribute("href", "/logs/new?point=9");
});

it("tells a loop that is gone from a server that is silent", async () => {
  serverRefuses("GET /loops/7", 404, "not-found");
  const { unmount } = show(<LoopScreen />);
  expect(await screen.findByRole("link", { name: /Sites/ })).toBeVisible();
  unmount();
  serverIsSilent("GET /loops/7");
  show(<LoopScreen />);
  expect(await screen.findByText(/[Oo]ffline/)).toBeVisible();
});
