import { screen, within } from "@testing-library/react";

import type { TodayAnswer } from "@shared/contracts/energy";
import { openWith, serverAnswers, serverRefuses, show, siteOf } from "@features/places/test-kit";

import { TodayScreen } from "./today-screen";

// jsdom has no layout; a loop card waits for its width.
jest.mock("@features/ui/theme/use-measured-width", () => ({
  useMeasuredWidth: () => [368, () => undefined],
}));

const sitesCall = "GET /sites?limit=200";
const todayCall = "GET /sites/1/today";

type TodayLoop = TodayAnswer["loops"][number];

function loopOf(more: Partial<TodayLoop> = {}): TodayLoop {
  return {
    loop: {
      id: "7",
      tag: "CHW-1B",
      name: "Ropewalk House chilled water",
      service: "chilled",
      buildingName: "Ropewalk House",
      isMain: false,
    },
    pointId: "9",
    nominalSizeDn: 100,
    meterSide: "return",
    card: {
      from: "2026-05-17T23:00:00.000Z",
      to: "2026-05-18T23:00:00.000Z",
      supplyC: 6.43,
      returnC: 11.51,
      flowM3PerHour: 17.2,
      deltaTK: 5.1,
      powerKw: 101.9,
      plusMinus: { expanded: 3.3, percent: 3.2, basis: "evidence" },
      register: "cooling",
    },
    energyKwh: 2445,
    energyPlusMinus: { expanded: 79, percent: 3.2, basis: "evidence" },
    emptyReason: null,
    lastReadingAt: "2026-05-18T22:59:00.000Z",
    ...more,
  };
}

function todayOf(more: Partial<TodayAnswer> = {}): TodayAnswer {
  return {
    site: { id: "1", name: "Harbour Court Works", zone: "Europe/London", isDemo: true },
    now: "2026-05-19T09:00:00.000Z",
    today: "2026-05-19",
    needsALook: [],
    day: "2026-05-18",
    loops: [loopOf()],
    ...more,
  };
}

beforeEach(() => {
  openWith({});
  serverAnswers(sitesCall, { items: [siteOf()], nextCursor: null, can: { create: true } });
});

it("names the day, and says so where nothing needs a look", async () => {
  serverAnswers(todayCall, todayOf());
  show(<TodayScreen />);
  expect(await screen.findByRole("heading", { name: "Nothing needs a look" })).toBeVisible();
  expect(screen.getByRole("heading", { level: 1 })).toHaveTextContent(/^Tuesday 19 May$/);
  expect(screen.getByRole("heading", { name: "Loops, Mon 18 May" })).toBeVisible();
  expect(screen.getByRole("link", { name: /^Open CHW-1B/ })).toHaveAttribute("href", "/loops/7");
});

it("names the year of a day that lies in another than the site's own", async () => {
  serverAnswers(todayCall, todayOf({ today: "2027-01-04" }));
  show(<TodayScreen />);
  expect(await screen.findByRole("heading", { name: "Loops, Mon 18 May 2026" })).toBeVisible();
  expect(screen.getByRole("heading", { level: 1 })).toHaveTextContent(/^Monday 4 January$/);
});

it("makes sentences of what the server found, each leading to its place", async () => {
  const loop = { id: "7", tag: "CHW-1", service: "chilled" } as const;
  serverAnswers(
    todayCall,
    todayOf({
      needsALook: [
        {
          weight: "look",
          code: "unmeteredRemainder",
          loop,
          values: {
            remainderKwh: 1370,
            share: 0.092,
            hours: 146,
            service: "chilled",
            from: "2026-05-11",
            until: "2026-05-18",
          },
          link: { to: "loop", loopId: "7", from: "2026-05-11", until: "2026-05-18" },
        },
        {
          weight: "look",
          code: "noRecentReadings",
          loop: null,
          values: { since: "2026-05-17T08:12:00.000Z", days: 2, loops: 3 },
          link: { to: "site", siteId: "1" },
        },
      ],
    }),
  );
  show(<TodayScreen />);
  const list = await screen.findByRole("list", { name: "Needs a look" });
  expect(
    within(list).getByText(
      /^1,370\skWh of the main, 9.2 %, is in no branch \(11 May to 17 May, 146 common hours\)\.$/,
    ),
  ).toBeVisible();
  expect(within(list).getByText("No readings since Sun 17 May, 09:12")).toBeVisible();
  const links = within(list).getAllByRole("link");
  expect(links.map((link) => link.getAttribute("href"))).toEqual([
    "/loops/7?from=2026-05-11&to=2026-05-17",
    "/sites/1",
  ]);
});

it("gives an empty loop its reason instead of zeros", async () => {
  serverAnswers(
    todayCall,
    todayOf({ loops: [loopOf({ card: null, energyKwh: null, emptyReason: "concentration" })] }),
  );
  show(<TodayScreen />);
  expect(await screen.findByText("Glycol")).toBeVisible();
  expect(screen.queryByText(/\b0\skW/)).toBeNull();
});

it("starts somebody without a site, and tells somebody who may not see one", async () => {
  serverAnswers(sitesCall, { items: [], nextCursor: null, can: { create: false } });
  const { unmount } = show(<TodayScreen />);
  expect(await screen.findByRole("heading", { name: "No sites yet" })).toBeVisible();
  expect(screen.queryByRole("link", { name: "Add a site" })).toBeNull();
  unmount();
  serverRefuses(sitesCall, 403, "denied");
  show(<TodayScreen />);
  expect(await screen.findByText(/not allowed|may not|cannot/i)).toBeVisible();
});
