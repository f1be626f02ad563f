import { fireEvent, screen, waitFor, within } from "@testing-library/react";

import type { PointShape } from "@shared/contracts/shape";
import { makeFormat } from "@shared/formats/format";
import {
  loopOf,
  openWith,
  pointOf,
  serverAnswers,
  serverIsSilent,
  serverRefuses,
  show,
  siteOf,
} from "@features/places/test-kit";

import type { OpenWorkings } from "@features/workings/use-workings";
import type { WorkingsKey } from "@features/workings/workings-key";

import { LoadView } from "./load-view";
import { daysOf } from "./shown-range";

// jsdom has no layout; a chart waits for its width.
jest.mock("@features/ui/theme/use-measured-width", () => ({
  useMeasuredWidth: () => [806, () => undefined],
}));

const plusMinus = (expanded: number) => ({ expanded, percent: 3.3, basis: "evidence" }) as const;

const peak = {
  from: "2025-06-09T13:00:00.000Z",
  to: "2025-06-09T14:00:00.000Z",
  powerKw: 490.9348,
  plusMinus: plusMinus(15.2),
  loadFactor: 0.434973,
  fullLoadHours: 73.07546,
};

function shapeOf(more: Partial<PointShape> = {}): PointShape {
  return {
    zone: "Europe/London",
    from: "2025-06-08T23:00:00.000Z",
    to: "2025-06-15T23:00:00.000Z",
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
    register: "cooling",
    stepMinutes: 60,
    windowMinutes: 60,
    coveredS: 604_800,
    expectedS: 604_800,
    energyKwh: 35_875.29,
    volumeM3: 8198.31,
    meanKw: 213.5434,
    meanPlusMinus: plusMinus(7.1),
    peaks: { fixed: peak, rolling: peak },
    design: null,
    curve: [
      { hours: 0, powerKw: 490.9348 },
      { hours: 84, powerKw: 180 },
      { hours: 168, powerKw: 60 },
    ],
    deltaT: {
      flowWeightedK: 3.756808,
      energyWeightedK: 3.813261,
      timeMeanK: 3.499583,
      fromEnergyK: 3.7566,
      plusMinus: {
        flowWeighted: plusMinus(0.12),
        energyWeighted: plusMinus(0.12),
        timeMean: plusMinus(0.12),
      },
    },
    specificFlow: {
      m3PerKwh: 0.2285,
      litresPerSecondPerKw: 0.06347847,
      gpmPerTon: 3.538497,
      plusMinus: plusMinus(0.0075),
    },
    occupiedHours: { weekdays: [1, 2, 3, 4, 5], start: "07:00", end: "19:00", assumed: true },
    baseLoad: {
      powerKw: 71.87869,
      plusMinus: plusMinus(2.9),
      percentile: 5,
      hours: "all",
      steps: 168,
    },
    offHours: { energyShare: 0.2923193, energyKwh: 10_487, dayOffRatio: 0.41 },
    pumpWithoutDeltaT: {
      limitK: 1,
      seconds: 7200,
      runs: [{ from: "2025-06-10T01:00:00.000Z", to: "2025-06-10T03:00:00.000Z" }],
      runCount: 1,
    },
    lowDeltaT: null,
    excess: null,
    pumping: null,
    ...more,
  };
}

const call = (asked = "windowMinutes=60&hours=all") =>
  `GET /points/9/shape?from=2025-06-09&to=2025-06-16&${asked}`;

const asked: WorkingsKey[] = [];
const workings: OpenWorkings = {
  open: null,
  isOpen: () => false,
  show: (key) => void asked.push(key),
  close: () => undefined,
  figure: (key) => ({ onOpenWorkings: () => void asked.push(key), workingsOpen: false }),
};

function view(loop = loopOf({ tag: "CHW-1B" }), params = {}, blocked: React.ReactNode = null) {
  return (
    <LoadView
      site={siteOf()}
      loop={loop}
      point={pointOf()}
      points={[pointOf()]}
      range={daysOf("2025-06-09", "2025-06-15")}
      rangeName="week 24"
      today="2026-06-15"
      format={makeFormat("en", "si", "Europe/London")}
      params={params}
      blocked={blocked}
      workings={workings}
    />
  );
}

beforeEach(() => {
  asked.length = 0;
  openWith({ loopId: "7", view: "load" });
});

it("names each peak by its definition and its instant, with the load factor it stands beside", async () => {
  serverAnswers(call(), shapeOf());
  show(view());
  expect(
    await screen.findByRole("button", {
      name: /^Blocks on the clock: 491 plus or minus 15 kilowatts, show workings/,
    }),
  ).toBeVisible();
  expect(
    screen.getByRole("button", { name: /^Any 60 min: 491 plus or minus 15 kilowatts/ }),
  ).toBeVisible();
  expect(screen.getAllByText("Mon 9 Jun, 14:00 to 15:00")).toHaveLength(2);
  expect(screen.getAllByText("Load factor 0.435")).toHaveLength(2);
  expect(screen.queryByText(/^Design/)).toBeNull();
});

it("opens a peak's workings over its own window, and the mean's over the range", async () => {
  serverAnswers(call(), shapeOf());
  show(view());
  fireEvent.click(await screen.findByRole("button", { name: /^Any 60 min/ }));
  fireEvent.click(screen.getByRole("button", { name: /^Mean: 213\.5 plus or minus 7\.1/ }));
  expect(asked).toEqual([
    { figure: "power", from: peak.from, to: peak.to },
    { figure: "power", from: "2025-06-09", to: "2025-06-16" },
  ]);
});

it("names the register of a peak where a loop has two", async () => {
  serverAnswers(call(), shapeOf({ register: "heating" }));
  show(view(loopOf({ service: "changeover" })));
  fireEvent.click(await screen.findByRole("button", { name: /^Any 60 min/ }));
  expect(asked).toEqual([{ figure: "power", register: "heating", from: peak.from, to: peak.to }]);
});

it("prints no ± where the server has none", async () => {
  const bare = { ...peak, plusMinus: null };
  serverAnswers(call(), shapeOf({ peaks: { fixed: bare, rolling: bare } }));
  show(view());
  expect(
    await screen.findByRole("button", { name: /^Any 60 min: 490\.9 kilowatts, show workings/ }),
  ).toBeVisible();
});

it("says which mean gives the energy back", async () => {
  serverAnswers(call(), shapeOf());
  show(view());
  const means = await screen.findByRole("list", { name: "ΔT, three means" });
  expect(within(means).getAllByRole("listitem")).toHaveLength(3);
  expect(
    within(means).getByRole("button", {
      name: /^Weighted by flow: 3\.76 plus or minus 0\.12 kelvin, show workings/,
    }),
  ).toBeVisible();
  expect(
    within(means).getByText(/^Over time: 3\.50 plus or minus 0\.12 kelvin$/),
  ).toBeInTheDocument();
  expect(screen.getByText(/^Energy over volume gives 3\.76\sK, which is the mean/)).toBeVisible();
});

it("names the hours of the base load and says they are assumed", async () => {
  serverAnswers(call(), shapeOf());
  show(view());
  expect(await screen.findByText("5 % of all covered time was below this")).toBeVisible();
  expect(screen.getByText(/Mon to Fri, 07:00 to 19:00.*Assumed: nobody has set/)).toBeVisible();
  expect(screen.getByRole("link", { name: "Set the hours" })).toHaveAttribute(
    "href",
    "/sites/1/edit",
  );
  expect(screen.getByText("Tue 10 Jun, 02:00 to 04:00")).toBeVisible();
});

it("asks for what it lacks instead of showing a zero", async () => {
  serverAnswers(call(), shapeOf());
  const { unmount } = show(view());
  expect(await screen.findByText(/^Give the loop a design ΔT/)).toBeVisible();
  unmount();
  const excess = {
    designDeltaTK: 6,
    minimumFlowM3PerHour: null,
    volumeM3: 8198.31,
    idealVolumeM3: 5795.446,
    excessShare: 0.4146124,
    leftOutS: 0,
  };
  serverAnswers(call(), shapeOf({ excess }));
  show(view(loopOf({ designDeltaTK: 6 })));
  expect(await screen.findByText("Excess flow: 41.5 percent")).toBeInTheDocument();
  expect(screen.getByText(/^No least flow is given/)).toBeVisible();
  expect(screen.getByRole("link", { name: "Add the pump" })).toHaveAttribute(
    "href",
    "/sites/1/loops/7/pump",
  );
});

it("gives the cost with what it stands on, and offers no form to who may not edit", async () => {
  const excess = {
    designDeltaTK: 6,
    minimumFlowM3PerHour: 20,
    volumeM3: 8198.31,
    idealVolumeM3: 5795.446,
    excessShare: 0.4146124,
    leftOutS: 0,
  };
  const pumping = {
    energyKwh: 548.1324,
    idealEnergyKwh: 292.4693,
    excessKwh: 255.6632,
    kwhPerMwh: 15.27883,
    cubeLawHolds: false,
    pricePerKwh: "0.187",
    currency: "GBP",
    excessCost: 47.80901,
  };
  serverAnswers(call(), shapeOf({ excess, pumping }));
  const can = { ...loopOf().can, edit: false };
  show(view(loopOf({ designDeltaTK: 6, can })));
  expect(await screen.findByText("Its cost: 47.81 GBP")).toBeInTheDocument();
  expect(screen.getByText(/^At 0\.187\sGBP a kWh$/)).toBeVisible();
  expect(screen.getByText(/^Advice, not a bill/)).toBeVisible();
  expect(screen.getByText(/cube law is not used/)).toBeVisible();
  expect(screen.queryByRole("link", { name: "Change the pump" })).toBeNull();
});

it("walks along the curve by keys, and shows the same points as a table", async () => {
  serverAnswers(call(), shapeOf());
  const { unmount } = show(view());
  const chart = await screen.findByRole("group", { name: "Duration curve, CHW-1B" });
  expect(
    screen.getByRole("img", { name: /from 490\.9\skW down to 60\.0\skW, at or above 180\.0/ }),
  ).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "Home" });
  expect(await screen.findByText(/^490\.9\skW or more for 0\sh/)).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "ArrowRight" });
  expect(await screen.findByText(/^180\.0\skW or more for 84\sh \(50\s%\)$/)).toBeInTheDocument();
  fireEvent.keyDown(chart, { key: "Escape" });
  await waitFor(() => expect(screen.queryByText(/or more for 84/)).toBeNull());
  unmount();
  show(view(undefined, { curve: "table" }));
  const table = await screen.findByRole("table", { name: "Duration curve, week 24" });
  expect(within(table).getAllByRole("row")).toHaveLength(4);
});

it("says why an hourly log has no quarter-hour peak", async () => {
  const none = { fixed: null, rolling: null };
  serverAnswers(call("windowMinutes=15&hours=all"), shapeOf({ windowMinutes: 15, peaks: none }));
  show(view(undefined, { window: "15" }));
  expect(await screen.findByText(/^The log writes every 1\sh, so it has no peak/)).toBeVisible();
});

it("shows days without readings, a silent server and a refusal as what they are", async () => {
  serverAnswers(call(), shapeOf({ coveredS: 0 }));
  const empty = show(view());
  expect(await screen.findByText("No readings in these dates")).toBeVisible();
  empty.unmount();
  serverIsSilent(call());
  const silent = show(view());
  expect(await screen.findByRole("button", { name: "Try now" })).toBeVisible();
  silent.unmount();
  serverRefuses(call(), 403, "denied");
  show(view());
  expect(await screen.findByText("You cannot see this")).toBeVisible();
});

it("stands aside for the reason where readings give no energy", async () => {
  serverAnswers(call(), shapeOf({ coveredS: 0 }));
  show(view(undefined, {}, <p>no energy here</p>));
  expect(await screen.findByText("no energy here")).toBeVisible();
  expect(screen.queryByText("No readings in these dates")).toBeNull();
});
