import {
  bodyOf,
  fill,
  loopOf,
  openWith,
  press,
  serverAnswers,
  serverIsSilent,
  serverRefuses,
  show,
  siteOf,
  visited,
} from "./test-kit";
import { fireEvent, screen, waitFor, within } from "@testing-library/react";

import { findPicks } from "./search-picker";
import { NewSiteScreen } from "./site-form-screen";
import { SiteScreen } from "./site-screen";
import { SitesScreen } from "./sites-screen";

const listed = (items: unknown[], create = true) => ({ items, nextCursor: null, can: { create } });

describe("the sites", () => {
  it("offers the first one to who may add it", async () => {
    serverAnswers("GET /sites", listed([]));
    show(<SitesScreen />);
    expect(await screen.findByRole("heading", { name: "No sites yet" })).toBeVisible();
    expect(screen.getAllByRole("link", { name: "Add a site" })[0]).toHaveAttribute(
      "href",
      "/sites/new",
    );
  });

  it("are listed with their marks, and cannot be added without the right", async () => {
    serverAnswers("GET /sites", listed([siteOf({ isDemo: true, loopCount: 8 })], false));
    show(<SitesScreen />);
    const link = await screen.findByRole("link", { name: "Harbour Court Works" });
    expect(link).toHaveAttribute("href", "/sites/1");
    expect(screen.getByText("Invented data")).toBeVisible();
    expect(screen.queryByRole("link", { name: "Add a site" })).toBeNull();
  });

  it("say when the server is silent, and when the role forbids it", async () => {
    serverIsSilent("GET /sites");
    const { unmount } = show(<SitesScreen />);
    expect(await screen.findByRole("button", { name: "Try now" })).toBeVisible();
    unmount();
    serverRefuses("GET /sites", 403, "denied");
    show(<SitesScreen />);
    await waitFor(() => expect(screen.queryByRole("button", { name: "Try now" })).toBeNull());
    expect(await screen.findByRole("heading", { level: 2 })).toBeVisible();
  });
});

it("a new site gets its zone from a searched list", async () => {
  serverAnswers("POST /sites", siteOf({ id: "5" }));
  show(<NewSiteScreen />);
  fill("Name", "Quay Works");
  press(/^Time zone/);
  fill("Search time zones", "new york");
  fireEvent.click(
    within(screen.getByRole("dialog")).getByRole("button", { name: /America\/New York/ }),
  );
  press("Add a site");
  expect(await screen.findByText("Choose the currency of the site.")).toBeVisible();
  press(/^Currency/);
  fill("Search currencies", "usd");
  fireEvent.click(within(screen.getByRole("dialog")).getByRole("button", { name: /^USD/ }));
  press("Add a site");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/sites/5"));
  expect(bodyOf("POST /sites")).toMatchObject({
    name: "Quay Works",
    zone: "America/New_York",
    currency: "USD",
    address: null,
  });
});

it("a search finds words in any order, without accents, beginnings first", () => {
  const picks = ["America/Sao Paulo", "São Tomé", "Europe/Paris"].map((label) => ({
    value: label,
    label,
  }));
  expect(findPicks(picks, "sao").map(({ label }) => label)).toEqual([
    "São Tomé",
    "America/Sao Paulo",
  ]);
  expect(findPicks(picks, "paulo america")).toHaveLength(1);
});

describe("the page of a site", () => {
  const monday = "2026-05-11";
  const loops = [
    {
      loop: { ...loopOf(), id: "7", tag: "CHW-1", name: "Chilled mains", buildingId: "2" },
      mainPointId: "9",
      nominalSizeDn: 150,
      energyKwh: 27170,
      heatingKwh: 0,
      coolingKwh: 27170,
      plusMinus: {
        heating: { energy: null, deltaT: null },
        cooling: {
          energy: { expanded: 750, percent: 3, basis: "evidence" },
          deltaT: { expanded: 0.13, percent: 3, basis: "evidence" },
        },
        volume: null,
        lacks: null,
      },
      flowWeightedDeltaTK: 4.5,
      coverage: 0.9996,
      filledShare: 0.0125,
      quality: [
        { from: "2026-05-10T23:00:00Z", to: "2026-05-17T20:54:00Z", kind: "measured" },
        { from: "2026-05-17T20:54:00Z", to: "2026-05-17T23:00:00Z", kind: "filled" },
      ],
    },
    {
      loop: { ...loopOf({ id: "8", tag: "CHW-1A", name: "Chandlery", parentLoopId: "7" }) },
      mainPointId: null,
      nominalSizeDn: null,
      energyKwh: null,
      heatingKwh: null,
      coolingKwh: null,
      plusMinus: null,
      flowWeightedDeltaTK: null,
      coverage: null,
      filledShare: null,
      quality: [],
    },
  ];
  const building = {
    id: "2",
    siteId: "1",
    name: "Energy centre",
    note: null,
    archivedAt: null,
    can: { edit: true, archive: true, remove: false },
  };

  it("says each loop's week in one sentence, and why one has no figure", async () => {
    openWith({ siteId: "1", week: monday });
    serverAnswers("GET /sites/1", siteOf({ isDemo: true }));
    const answer = {
      site: siteOf(),
      buildings: [building],
      loops,
      firstReadingAt: "2026-04-01T00:00:00Z",
      lastReadingAt: "2026-05-17T22:00:00Z",
    };
    globalThis.fetch = withOverview(globalThis.fetch, answer);
    show(<SiteScreen />);
    // 99.96 % is not rounded up to a whole week.
    const said =
      "CHW-1, Chilled mains: cooling 27,170\u00A0kWh, ΔT 4.5\u00A0K, 99.9\u00A0% covered, 1.3\u00A0% filled";
    const link = await screen.findByRole("link", { name: said });
    expect(link).toHaveAttribute("href", "/loops/7?week=2026-05-11");
    expect(screen.getByText("Estimated")).toBeVisible();
    const other = "CHW-1A, Chandlery: No metering point yet";
    expect(screen.getByRole("link", { name: other })).toBeVisible();
    expect(screen.getByText("Invented data")).toBeVisible();
    expect(screen.getByRole("button", { name: /^Week 20, 11–17 May/ })).toBeVisible();
    expect(screen.getByRole("group", { name: "Energy centre" })).toHaveTextContent("Mains");
  });
});

/** Answers every week of the overview alike: which weeks are asked for follows the clock. */
function withOverview(others: typeof fetch, answer: unknown): typeof fetch {
  return ((url: string, init: RequestInit) => {
    if (!url.includes("/overview?")) return others(url, init);
    return Promise.resolve({
      ok: true,
      status: 200,
      text: () => Promise.resolve(JSON.stringify(answer)),
    });
  }) as unknown as typeof fetch;
}
